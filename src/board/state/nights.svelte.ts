// What the page of nights knows: the figures asked of the worker, what is chosen of them, and the night that was picked.

import { proxy } from 'comlink';
import type { ArchiveNight, ArchiveView } from '../../desk/index.ts';
import type { ArchiveProgress, ArchiveReport, OpenFile } from '../worker/protocol.ts';
import type { Board } from './board.svelte.ts';
import type { Picture } from './picture.svelte.ts';

/** Where the figures come from: profiles that are open, or tables that a scan wrote. */
export type NightsSource = 'open' | 'tables';

/** What the figures hang on; equal questions have equal answers. */
export interface NightsQuestion {
  readonly source: NightsSource;
  readonly dataVersion: number;
  readonly feed: string;
  readonly criteria: string;
  readonly tables: readonly OpenFile[];
}

const DAY_MS = 86_400_000;

export class Nights {
  /** The reader's choice; what is at hand decides until then. */
  chosenSource = $state<NightsSource | null>(null);
  report = $state.raw<ArchiveReport | null>(null);
  /** How far the worker is; null while it is not at work on this. */
  progress = $state.raw<ArchiveProgress | null>(null);
  failed = $state('');
  leastCategory = $state(0);
  disc = $state(0);
  /** Key of the feed looked at among those of the tables. */
  tableFeed = $state('');
  /** A night that was picked but whose profiles are not open. */
  wanted = $state.raw<ArchiveNight | null>(null);

  readonly #board: Board;
  #asked: NightsQuestion | null = null;
  #job = 0;

  constructor(board: Board) {
    this.#board = board;
  }

  get source(): NightsSource {
    const { tables, feeds } = this.#board;
    if (tables.length === 0) return 'open';
    return feeds.length === 0 ? 'tables' : (this.chosenSource ?? 'tables');
  }

  get question(): NightsQuestion {
    const { dataVersion, feedKey, preferences, tables } = this.#board;
    const { source } = this;
    // Only what the answer hangs on, so that nothing else asks again.
    return source === 'tables'
      ? { source, dataVersion: 0, feed: '', criteria: '', tables }
      : { source, dataVersion, feed: feedKey, criteria: preferences.criteria, tables: [] };
  }

  /** The archive looked at; null while there is none. */
  get view(): ArchiveView | null {
    const views = this.report?.views ?? [];
    return views.find(({ key }) => key === this.tableFeed) ?? fullest(views);
  }

  /** Asks the worker, unless this was asked last; what was under way is stopped. */
  async ask(question: NightsQuestion): Promise<void> {
    if (this.#asked !== null && same(this.#asked, question)) return;
    const { worker } = this.#board;
    this.stop();
    this.#asked = question;
    this.report = null;
    this.failed = '';
    this.wanted = null;
    if (question.source === 'open' && question.feed === '') return;
    const job = this.#board.nextJob();
    this.#job = job;
    this.progress = { share: 0, current: '' };
    const tell = (progress: ArchiveProgress): void => {
      if (job === this.#job) this.progress = progress;
    };
    try {
      const report =
        question.source === 'tables'
          ? await worker.archiveTables(job, [...question.tables], proxy(tell))
          : await worker.archive(job, question.feed, question.criteria, proxy(tell));
      if (job !== this.#job) return;
      this.report = report;
      this.#board.problems = [...this.#board.problems, ...report.problems];
    } catch (error) {
      if (job === this.#job) this.failed = error instanceof Error ? error.message : String(error);
    } finally {
      if (job === this.#job) this.progress = null;
    }
  }

  stop(): void {
    if (this.progress !== null) void this.#board.worker.cancel(this.#job);
  }

  /** Asks the same again, after it was stopped or failed. */
  async again(): Promise<void> {
    this.#asked = null;
    await this.ask(this.question);
  }

  /** Shows a night in Tonight, or keeps it as wanted where its profiles are not open. @returns whether it is shown */
  openNight(night: ArchiveNight, picture: Picture): boolean {
    const { view } = this;
    const board = this.#board;
    const { startMs, endMs } = spanOf(night, view?.longitude ?? NaN);
    const feed = board.feeds.find(
      ({ key, firstMs, lastMs }) => key === view?.key && firstMs < endMs && lastMs >= startMs,
    );
    if (feed === undefined) {
      this.wanted = night;
      return false;
    }
    this.wanted = null;
    // At the end of its jet a night has its whole story; without a jet at sunrise.
    const moment = [night.endMs, night.lastJetMs, night.sunriseMs, endMs].find((timeMs) => Number.isFinite(timeMs))!;
    board.feedKey = feed.key;
    picture.showNight();
    board.lookAt(Math.min(moment, feed.lastMs));
    location.hash = '#/tonight';
    return true;
  }
}

const known = new WeakMap<Board, Nights>();

/** The page's state outlives the page: coming back to it costs nothing. */
export function nightsOf(board: Board): Nights {
  let nights = known.get(board);
  if (nights === undefined) {
    nights = new Nights(board);
    known.set(board, nights);
  }
  return nights;
}

/** From mean noon to mean noon at the station; by UTC where its place is not known. */
function spanOf({ night }: ArchiveNight, longitude: number): { startMs: number; endMs: number } {
  const shift = Number.isFinite(longitude) ? (longitude / 360) * DAY_MS : 0;
  const startMs = Date.parse(night) + DAY_MS / 2 - shift;
  return { startMs, endMs: startMs + DAY_MS };
}

function fullest(views: readonly ArchiveView[]): ArchiveView | null {
  const size = ({ figures, nights }: ArchiveView): number => (figures[0]?.assessable ?? 0) + nights.length;
  return views.reduce<ArchiveView | null>(
    (best, view) => (best === null || size(view) > size(best) ? view : best),
    null,
  );
}

function same(a: NightsQuestion, b: NightsQuestion): boolean {
  return (
    a.source === b.source &&
    a.dataVersion === b.dataVersion &&
    a.feed === b.feed &&
    a.criteria === b.criteria &&
    a.tables.length === b.tables.length &&
    a.tables.every((table, k) => table.blob === b.tables[k]?.blob)
  );
}
