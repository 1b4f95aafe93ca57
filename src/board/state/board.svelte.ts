// What the page knows: the open files, the feeds, the moment looked at, and the night as the worker tells it.

import { proxy, type Remote } from 'comlink';
import { untrack } from 'svelte';
import { DuskveerError, type Problem } from '../../air/index.ts';
import type { FeedState, NightState } from '../../desk/index.ts';
import { PLAIN_SITE, type Site } from '../../site/index.ts';
import type { BoardWorker, OpenFile, ReadingProgress } from '../worker/protocol.ts';
import { fetchDemo, listDemo, type DemoList, type DemoNight } from './demo.ts';
import type { Preferences } from './preferences.svelte.ts';

export interface OpenedFile extends OpenFile {
  readonly formats: readonly string[];
  readonly profiles: number;
  readonly stations: number;
  /** Times of a farm's actual output; 0 in a file of profiles. */
  readonly outputTimes: number;
  readonly problems: readonly Problem[];
}

export interface ReadingJob extends ReadingProgress {
  readonly number: number;
  readonly files: number;
}

/** What was open and looked at, to come back to. */
interface Kept {
  readonly files: readonly OpenFile[];
  readonly tables: readonly OpenFile[];
  readonly site: { readonly text: string; readonly name: string } | null;
  readonly demo: string;
  readonly feedKey: string;
  readonly atMs: number;
}

/** Data newer than this are taken for live: the moment looked at then follows the clock. */
const LIVE_MS = 3 * 3_600_000;
/** More files than this are counted, not named. */
const MOST_NAMED = 6;
const CLOCK_TICK_MS = 20_000;
const REPLAY_TICK_MS = 160;
/** Step of a replay where the feed's own interval cannot be told. */
const PLAIN_STEP_MS = 600_000;

export class Board {
  readonly preferences: Preferences;
  readonly worker: Remote<BoardWorker>;

  /** `empty` when nothing is open and the demo is not at hand. */
  phase = $state<'starting' | 'empty' | 'ready'>('starting');
  site = $state.raw<Site>(PLAIN_SITE);
  /** Identifier of the invented night that is open; empty when the files are the reader's own. */
  demo = $state('');
  demoList = $state.raw<DemoList>({ opens: '', nights: [] });
  files = $state.raw<readonly OpenedFile[]>([]);
  /** Tables that a scan wrote, for the page of nights. */
  tables = $state.raw<readonly OpenFile[]>([]);
  feeds = $state.raw<readonly FeedState[]>([]);
  feedKey = $state('');
  /** UTC ms: the moment looked at; nothing later is shown. */
  atMs = $state(NaN);
  /** Whether the moment follows the clock. */
  live = $state(false);
  replaying = $state(false);
  night = $state.raw<NightState | null>(null);
  /** Counts changes of the data, so that pictures know when to be made again. */
  dataVersion = $state(0);
  job = $state.raw<ReadingJob | null>(null);
  problems = $state.raw<readonly Problem[]>([]);
  /** What was just done and can be undone. */
  notice = $state.raw<{ readonly words: string; readonly undo: (() => void) | null } | null>(null);

  readonly feed: FeedState | undefined = $derived(this.feeds.find((feed) => feed.key === this.feedKey));
  /** Interval of the feed's profiles, ms. */
  readonly stepMs: number = $derived(stepOf(this.feed));

  #siteFile: { readonly text: string; readonly name: string } | null = null;
  #jobs = 0;
  #questions = 0;

  constructor(worker: Remote<BoardWorker>, preferences: Preferences) {
    this.worker = worker;
    this.preferences = preferences;
  }

  /** Opens the demo if there is one, else waits for files. */
  async start(): Promise<void> {
    await this.#openSite(null);
    this.demoList = await listDemo();
    const night = this.demoList.nights.find(({ id }) => id === this.demoList.opens);
    if (night !== undefined) await this.openDemo(night);
    if (this.phase === 'starting') this.phase = 'empty';
  }

  /** Keeps the moment on the clock while data are live. @returns how to stop */
  followClock(): () => void {
    const timer = setInterval(() => {
      if (this.live) this.atMs = Date.now();
    }, CLOCK_TICK_MS);
    return () => clearInterval(timer);
  }

  async openDemo(night: DemoNight): Promise<void> {
    this.notice = null;
    try {
      const demo = await fetchDemo(night);
      await this.#openSite(demo.site);
      this.files = [];
      this.feedKey = '';
      await this.#read(demo.files);
      this.demo = night.id;
      this.lookAt(demo.nowMs);
    } catch (error) {
      this.problems = [...this.problems, failed(error)];
    }
  }

  /** Opens what a person dropped or chose; the demo gives way to it. */
  async openFiles(chosen: readonly File[]): Promise<void> {
    if (chosen.length === 0) return;
    const before = this.#kept();
    const sites: { text: string; name: string }[] = [];
    const others: OpenFile[] = [];
    const tables: OpenFile[] = [];
    const files = chosen.map((file) => ({ name: file.name, blob: file, writtenMs: writtenMs(file) }));
    const areTables = await this.worker.areArchiveFiles(files);
    for (const [k, file] of files.entries()) {
      const text = areTables[k] === true ? null : await siteText(file.blob);
      if (text !== null) sites.push({ text, name: file.name });
      else (areTables[k] === true ? tables : others).push(file);
    }
    this.notice = null;
    const [lists, outputs] = await Promise.all([this.worker.stationLists(others), this.worker.areOutputs(others)]);
    const hasProfiles = others.some((_, k) => lists[k] !== true && outputs[k] !== true);
    // The demo gives way to files of one's own; more of these, and a farm's output, join what is already open.
    const leaveDemo = before.demo !== '' && (hasProfiles || tables.length > 0);
    const site = sites.at(-1) ?? (leaveDemo ? null : before.site);
    const kept = leaveDemo ? this.files.filter(({ stations }) => stations > 0) : before.files;
    // A list of stations may place what was read before it came.
    if (site !== before.site || kept !== before.files || lists.includes(true)) {
      await this.#openSite(site);
      this.files = [];
      this.demo = kept === before.files ? before.demo : '';
      const remaining = kept.filter((file) => !others.some(({ name }) => name === file.name));
      await this.#read([...remaining, ...others]);
    } else if (others.length > 0) await this.#read(others);
    if (hasProfiles || this.feed === undefined) this.lookAtNewest();
    if (tables.length > 0) {
      this.tables = [
        ...this.tables.filter(({ name }) => !tables.some((table) => stemOf(table.name) === stemOf(name))),
        ...tables,
      ];
      location.hash = '#/nights';
    }
    this.notice = {
      words: `Opened ${chosen.length > MOST_NAMED ? `${chosen.length} files` : chosen.map((file) => file.name).join(', ')}.`,
      undo: () => void this.#goBack(before),
    };
    await this.refresh();
  }

  /** Closes one file; the others stay. */
  async closeFile(name: string): Promise<void> {
    const before = this.#kept();
    const others = ({ name: other }: OpenFile): boolean => other !== name;
    await this.#goBack({ ...before, files: before.files.filter(others), tables: before.tables.filter(others) });
    this.notice = { words: `Closed ${name}.`, undo: () => void this.#goBack(before) };
  }

  /** Reckons with this factor of the farm's output, in the site file as it is open here; can be undone. */
  async useFarmFactor(factor: number): Promise<void> {
    const before = this.#kept();
    if (before.site === null) return;
    const text = await this.worker.siteWithFactor(before.site.text, factor);
    await this.#goBack({ ...before, site: { ...before.site, text } });
    this.notice = {
      words: `Output is reckoned with the factor ${factor.toFixed(3)}.`,
      undo: () => void this.#goBack(before),
    };
  }

  /** Reads everything anew, after a change of what the reckoning rests on. */
  async reopen(): Promise<void> {
    await this.#goBack(this.#kept());
  }

  /** A number for a piece of work of the worker, to cancel it by. */
  nextJob(): number {
    return ++this.#jobs;
  }

  cancelReading(): void {
    if (this.job !== null) void this.worker.cancel(this.job.number);
  }

  chooseFeed(key: string): void {
    this.feedKey = key;
    const feed = this.feed;
    // A moment outside the new feed's record would show an empty night.
    if (feed !== undefined && !(this.atMs >= feed.firstMs)) this.lookAtNewest();
    void this.refresh();
  }

  /** Moves the moment looked at; nothing later than it is shown. */
  lookAt(atMs: number): void {
    this.atMs = atMs;
    this.live = false;
    void this.refresh();
  }

  /** By so many profiles, later or earlier. */
  step(profiles: number): void {
    const feed = this.feed;
    if (feed === undefined) return;
    const wanted = this.atMs + profiles * this.stepMs;
    this.lookAt(Math.max(feed.firstMs, wanted));
  }

  /** Lets the night run from the moment looked at, or from its begin when it is over. @returns how to stop */
  replay(): () => void {
    const night = untrack(() => this.night);
    if (night === null) return () => undefined;
    const { startMs, endMs } = night.window;
    const lastMs = Math.min(endMs, this.feed?.lastMs ?? endMs);
    if (this.atMs >= lastMs) this.lookAt(startMs + this.stepMs);
    this.replaying = true;
    const timer = setInterval(() => {
      if (this.atMs + this.stepMs > lastMs) stop();
      else this.step(1);
    }, REPLAY_TICK_MS);
    const stop = (): void => {
      clearInterval(timer);
      this.replaying = false;
    };
    return stop;
  }

  /** Asks the worker for the night anew; answers that a newer question has overtaken are dropped. */
  async refresh(): Promise<void> {
    const question = ++this.#questions;
    const { feedKey, atMs } = this;
    if (feedKey === '' || !Number.isFinite(atMs)) {
      this.night = null;
      return;
    }
    const night = await this.worker.night(atMs, feedKey, this.preferences.criteria);
    if (question === this.#questions) this.night = night;
  }

  #kept(): Kept {
    const { files, tables, demo, feedKey, atMs } = this;
    return { files, tables, site: this.#siteFile, demo, feedKey, atMs };
  }

  /** Reads what was open again and looks where the reader looked. */
  async #goBack({ files, tables, site, demo, feedKey, atMs }: Kept): Promise<void> {
    this.notice = null;
    await this.#openSite(site);
    this.files = [];
    this.tables = tables;
    this.demo = demo;
    this.feedKey = feedKey;
    await this.#read(files);
    if (this.feedKey === feedKey && Number.isFinite(atMs)) this.atMs = atMs;
    else this.lookAtNewest();
    await this.refresh();
  }

  async #openSite(file: { readonly text: string; readonly name: string } | null): Promise<void> {
    const { hubHeight, rotorDiameter } = this.preferences;
    const { site, problems } = await this.worker.open({ file, disc: { hubHeight, rotorDiameter } });
    this.#siteFile = file;
    this.site = site;
    this.problems = problems;
    if (file !== null) this.preferences.suggest(site.units);
  }

  async #read(files: readonly OpenFile[]): Promise<void> {
    if (files.length > 0) {
      const number = this.nextJob();
      const tell = (progress: ReadingProgress): void => {
        this.job = { ...progress, number, files: files.length };
      };
      try {
        const report = await this.worker.read(number, [...files], proxy(tell));
        const opened = report.files.map((file, index) => ({ ...files[index]!, ...file }));
        this.files = [...this.files.filter((file) => !opened.some((other) => other.name === file.name)), ...opened];
        const grave = opened.flatMap((file) => file.problems.filter(({ mild }) => mild !== true));
        this.problems = [...this.problems, ...grave];
        if (report.cancelled) this.problems = [...this.problems, stopped(files.length - report.files.length)];
      } catch (error) {
        this.problems = [...this.problems, failed(error)];
      } finally {
        this.job = null;
      }
    }
    this.feeds = await this.worker.feeds();
    this.dataVersion++;
    this.phase = this.feeds.length > 0 ? 'ready' : 'empty';
    if (this.feed === undefined) this.feedKey = mainFeed(this.feeds, this.site)?.key ?? '';
  }

  lookAtNewest(): void {
    const feed = this.feed;
    if (feed === undefined) {
      this.atMs = NaN;
      return;
    }
    const now = Date.now();
    this.live = now >= feed.lastMs && now - feed.lastMs < LIVE_MS;
    this.atMs = this.live ? now : feed.lastMs;
  }
}

/** A scan writes each table under one name with several endings. */
function stemOf(name: string): string {
  return name.replace(/\.[^.]*$/u, '');
}

/** When a file was written; undefined where an unpacker that keeps no times left one long before there were such files. */
function writtenMs({ lastModified }: File): number | undefined {
  const EARLIEST_MS = Date.UTC(2000, 0, 1);
  return lastModified >= EARLIEST_MS ? lastModified : undefined;
}

/** The text of a file that is a site file: JSON with a site's keys. Anything else is a matter for the readers. */
async function siteText(file: File): Promise<string | null> {
  const LARGEST_SITE = 2 ** 21;
  if (!file.name.toLowerCase().endsWith('.json') || file.size > LARGEST_SITE) return null;
  const text = await file.text();
  return /"(stations|turbines|time_zone)"\s*:/.test(text) ? text : null;
}

/** The fullest feed of the first station in the site file that sends any, else the fullest of all. */
function mainFeed(feeds: readonly FeedState[], site: Site): FeedState | undefined {
  const first = site.stations.find(({ id }) => feeds.some(({ station }) => station.id === id));
  return fullest(first === undefined ? feeds : feeds.filter(({ station }) => station.id === first.id));
}

/** The feed that shows most of a night: many profiles, each of a fair number of levels. */
function fullest(feeds: readonly FeedState[]): FeedState | undefined {
  const ENOUGH_LEVELS = 60;
  const shows = (feed: FeedState): number => {
    const levels = feed.screening.reduce((sum, part) => sum + part.windLevels, 0);
    return Math.min(levels, ENOUGH_LEVELS * feed.profiles);
  };
  return feeds.reduce<FeedState | undefined>(
    (best, feed) => (best === undefined || shows(feed) > shows(best) ? feed : best),
    undefined,
  );
}

function stepOf(feed: FeedState | undefined): number {
  if (feed === undefined || feed.profiles < 2) return PLAIN_STEP_MS;
  return feed.intervalMs;
}

function stopped(unread: number): Problem {
  return {
    code: 'board/reading-stopped',
    what: `Reading was stopped; ${unread} of the files were not read to their end.`,
    mend: 'Drop them again to read them; what had been read is shown.',
    where: {},
  };
}

function failed(error: unknown): Problem {
  if (error instanceof DuskveerError) return error.problem;
  return {
    code: 'board/worker-failed',
    what: `Reading failed: ${error instanceof Error ? error.message : String(error)}`,
    mend: 'Reload the page and open the file again; if it fails again, report the file.',
    where: {},
  };
}
