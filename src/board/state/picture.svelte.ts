// What the picture shows: the stretch of time and height in view, the painted section, the cursor, the table.

import { FIELDS, SectionPicture, type FieldName, type SectionView } from '../../plot/index.ts';
import { profileAt, type Profile, type ProfileBlock } from '../../profile/index.ts';
import { csvName, pngName, saveBlob } from '../words/files.ts';
import type {
  Painted,
  PaintRequest,
  SectionInfo,
  SectionQuestion,
  SectionRequest,
  SectionTable,
} from '../worker/protocol.ts';
import type { Board } from './board.svelte.ts';

export interface Extent {
  readonly startMs: number;
  readonly endMs: number;
  /** m above ground */
  readonly bottom: number;
  readonly top: number;
}

export interface Cursor {
  readonly timeMs: number;
  /** m above ground */
  readonly height: number;
}

/** Highest top of a picture that follows the data, m. */
const USUAL_TOP = 3000;
const SHORTEST_MS = 20 * 60_000;
const LOWEST_TOP = 50;
/** Single profiles, barbs and the hodograph make no sense in a view longer than this. */
const LONGEST_LISTED_MS = 5 * 86_400_000;

export class Picture {
  /** Whether the extent follows the night or the whole record, or is the reader's own. */
  mode = $state<'night' | 'record' | 'own'>('night');
  #own = $state.raw<Extent | null>(null);
  /** Size of the painted area, device pixels. */
  size = $state.raw({ width: 0, height: 0 });
  /** What the worker painted last; drawn shifted or stretched until the next comes. */
  readonly section = new SectionPicture();
  /** Counts paintings, so that the section knows when to draw itself anew. */
  paintings = $state(0);
  info = $state.raw<SectionInfo | null>(null);
  cursor = $state.raw<Cursor | null>(null);
  /** The feed's profiles of the stretch in view up to the moment looked at; none when the stretch is too long for barbs. */
  profiles = $state.raw<ProfileBlock | null>(null);
  table = $state.raw<SectionTable | null>(null);

  readonly #board: Board;
  #painting = false;
  #wanted: PaintRequest | null = null;
  #profileQuestions = 0;

  readonly #ownField: FieldName | null;

  /** @param field what the picture shows; null follows the reader's choice */
  constructor(board: Board, field: FieldName | null = null) {
    this.#board = board;
    this.#ownField = field;
  }

  get field(): FieldName {
    return this.#ownField ?? this.#board.preferences.field;
  }

  /** m above ground: as chosen, else as far as the data reach, 3 km at most. */
  get ceiling(): number {
    const chosen = this.#board.preferences.ceiling;
    return chosen > 0 ? chosen : niceTop(Math.min(USUAL_TOP, this.#board.feed?.top ?? USUAL_TOP));
  }

  get extent(): Extent | null {
    const { night, feed, stepMs } = this.#board;
    if (this.mode === 'own' && this.#own !== null) return this.#own;
    if (night === null || feed === undefined) return null;
    const heights = { bottom: 0, top: this.ceiling };
    return this.mode === 'record'
      ? { startMs: feed.firstMs - stepMs, endMs: Math.max(feed.lastMs, this.#board.atMs), ...heights }
      : { startMs: night.window.startMs, endMs: night.window.endMs, ...heights };
  }

  get question(): SectionQuestion {
    return { feed: this.#board.feedKey, field: this.field, ceiling: this.ceiling };
  }

  /** What is to be painted now; null while there is nothing to paint or no room for it. */
  get request(): PaintRequest | null {
    const { extent, size } = this;
    if (extent === null || !(size.width > 0 && size.height > 0)) return null;
    const { preferences, atMs } = this.#board;
    const { field } = this;
    const { theme } = preferences;
    const range = preferences.ranges[field] ?? FIELDS[field].range;
    return { ...this.question, view: { ...extent, ...size }, untilMs: atMs, theme, range };
  }

  showNight(): void {
    this.mode = 'night';
  }

  showRecord(): void {
    this.mode = 'record';
  }

  /** Shows a stretch of the reader's own; kept within sense. */
  show({ startMs, endMs, bottom, top }: Extent): void {
    const span = Math.max(SHORTEST_MS, endMs - startMs);
    const middle = (startMs + endMs) / 2;
    this.#own = {
      startMs: middle - span / 2,
      endMs: middle + span / 2,
      bottom: Math.max(0, bottom),
      top: Math.max(LOWEST_TOP, Math.min(top, this.ceiling)),
    };
    this.mode = 'own';
  }

  /** Zooms by a factor (below 1 nearer) about a moment; heights stay. */
  zoom(factor: number, aboutMs: number): void {
    const { extent } = this;
    if (extent === null) return;
    const startMs = aboutMs + (extent.startMs - aboutMs) * factor;
    const endMs = aboutMs + (extent.endMs - aboutMs) * factor;
    if (endMs - startMs >= SHORTEST_MS) this.show({ ...extent, startMs, endMs });
  }

  /** Moves the view by a share of its width, later positive. */
  pan(share: number): void {
    const { extent } = this;
    if (extent === null) return;
    const shift = (extent.endMs - extent.startMs) * share;
    this.show({ ...extent, startMs: extent.startMs + shift, endMs: extent.endMs + shift });
  }

  /** Has the worker paint; while it is at work only the newest wish is kept. */
  async paint(request: PaintRequest): Promise<void> {
    this.#wanted = request;
    if (this.#painting) return;
    this.#painting = true;
    try {
      while (this.#wanted !== null) {
        const next: PaintRequest = this.#wanted;
        this.#wanted = null;
        const painted = await this.#board.worker.paint(next);
        if (painted === null) this.section.clear();
        else this.section.set(painted.pixels, painted.view);
        this.paintings++;
      }
    } finally {
      this.#painting = false;
    }
  }

  /** Paints another view of the same section, for a sheet. */
  async paintOnce(view: SectionView): Promise<Painted | null> {
    const { request } = this;
    return request === null ? null : this.#board.worker.paint({ ...request, view });
  }

  async prepare(question: SectionQuestion): Promise<void> {
    this.info = await this.#board.worker.section(question);
    if (this.table !== null) await this.#fillTable();
  }

  /** Fetches the profiles of a stretch; answers overtaken by a newer question are dropped. */
  async fetchProfiles(feed: string, startMs: number, endMs: number): Promise<void> {
    const question = ++this.#profileQuestions;
    const profiles =
      endMs - startMs > LONGEST_LISTED_MS ? null : await this.#board.worker.profiles(feed, startMs, endMs);
    if (question === this.#profileQuestions) this.profiles = profiles;
  }

  /** The profile valid at or last before the cursor, else before the moment looked at. */
  get profile(): Profile | null {
    const { profiles, cursor } = this;
    if (profiles === null) return null;
    const atMs = Math.min(this.#board.atMs, cursor?.timeMs ?? Infinity);
    const index = lastAtOrBefore(profiles.timeMs, atMs + (cursor === null ? 0 : this.#board.stepMs / 2));
    return index < 0 ? null : profileAt(profiles, index);
  }

  /** Steps the cursor from profile to profile and layer to layer. */
  moveCursor(profiles: number, layers: number): void {
    const { extent } = this;
    if (extent === null) return;
    const { stepMs, atMs } = this.#board;
    const from = this.cursor ?? { timeMs: Math.min(atMs, extent.endMs), height: (extent.bottom + extent.top) / 2 };
    const layer = (extent.top - extent.bottom) / 40;
    this.cursor = {
      timeMs: clamp(from.timeMs + profiles * stepMs, extent.startMs, extent.endMs),
      height: clamp(from.height + layers * layer, extent.bottom, extent.top),
    };
  }

  async toggleTable(): Promise<void> {
    if (this.table !== null) this.table = null;
    else await this.#fillTable();
  }

  async saveCsv(): Promise<void> {
    const request = this.#sectionRequest();
    if (request === null) return;
    const text = await this.#board.worker.csv(request, this.#board.preferences.units);
    saveBlob(new Blob([text], { type: 'text/csv' }), csvName(this.#board.site.name, this.#board.atMs));
  }

  /** Set by the section, which alone knows how it is drawn. */
  drawPng: (() => Promise<Blob>) | null = null;

  async savePng(): Promise<void> {
    if (this.drawPng === null) return;
    saveBlob(await this.drawPng(), pngName(this.#board.site.name, this.#board.atMs));
  }

  async #fillTable(): Promise<void> {
    const request = this.#sectionRequest();
    this.table = request === null ? null : await this.#board.worker.table(request);
  }

  #sectionRequest(): SectionRequest | null {
    const { extent } = this;
    if (extent === null) return null;
    const view: SectionView = { ...extent, width: Math.max(1, this.size.width), height: Math.max(1, this.size.height) };
    return { ...this.question, view, untilMs: this.#board.atMs };
  }
}

function clamp(value: number, low: number, high: number): number {
  return Math.min(high, Math.max(low, value));
}

/** A round height at or a little above the top of the data, m. */
function niceTop(top: number): number {
  const step = top > 1200 ? 200 : top > 400 ? 100 : 50;
  return Math.max(LOWEST_TOP, Math.ceil(top / step) * step);
}

function lastAtOrBefore(times: Float64Array, atMs: number): number {
  let index = times.length - 1;
  while (index >= 0 && times[index]! > atMs) index--;
  return index;
}
