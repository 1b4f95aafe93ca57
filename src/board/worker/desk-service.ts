// What the worker does: reads files, keeps the desk, prepares and paints sections. No worker globals here, so that the
// same code runs under test on one thread.

import { Cancelled, type Problem } from '../../air/index.ts';
import {
  Desk,
  type FarmRecord,
  type FeedState,
  type InflowState,
  type MoistureState,
  type NightState,
  type NoInflow,
  type TransportHistory,
} from '../../desk/index.ts';
import { readProfiles } from '../../ingest/index.ts';
import {
  buildSectionGrid,
  colourScale,
  FIELDS,
  sectionCsv,
  SectionPainter,
  type SectionView,
} from '../../plot/index.ts';
import { pickProfiles, type ProfileBlock, type Station } from '../../profile/index.ts';
import {
  PLAIN_SITE,
  readSite,
  withFarmFactor,
  type DisplayUnits,
  type Site,
  type TurbineType,
} from '../../site/index.ts';
import { archiveFileOf, breath, readArchiveTables } from './archive-tables.ts';
import { blobSource } from './blob-source.ts';
import { isOutput, readOutput } from './farm-output.ts';
import { sectionTable } from './section-table.ts';
import { areStationLists, readStationLists } from './station-lists.ts';
import type {
  ArchiveProgress,
  ArchiveReport,
  BoardWorker,
  FileReport,
  OpenFile,
  OpenSite,
  Painted,
  PaintRequest,
  ReadingProgress,
  ReadingReport,
  SectionInfo,
  SectionQuestion,
  SectionRequest,
  SectionTable,
  SiteReport,
} from './protocol.ts';

/** Progress is told at most this often, in bytes, or reading would be slowed by telling of it. */
const PROGRESS_STEP = 2 ** 18;
/** The worker hears at least this often whether to stop, ms, and tells this often how far an archive has come. */
const LONGEST_WITHOUT_BREATH_MS = 30;
const ARCHIVE_TOLD_EVERY_MS = 100;

interface PreparedSection {
  readonly question: SectionQuestion;
  readonly block: ProfileBlock;
  readonly painter: SectionPainter;
}

export class DeskService implements BoardWorker {
  #desk = new Desk(PLAIN_SITE);
  #section: PreparedSection | null = null;
  #stationList: readonly Station[] = [];
  readonly #jobs = new Map<number, AbortController>();
  /** Transports of other nights by station, out of the tables read last. */
  #transports: ReadonlyMap<string, TransportHistory> = new Map();

  open({ file, disc }: OpenSite): SiteReport {
    const read = file === null ? { site: null, problems: [] } : readSite(file.text, file.name);
    const site = withDisc(read.site ?? PLAIN_SITE, disc);
    this.#desk = new Desk(site);
    this.#section = null;
    this.#stationList = [];
    return { site, problems: read.problems };
  }

  async read(
    job: number,
    files: readonly OpenFile[],
    onProgress: (progress: ReadingProgress) => void,
  ): Promise<ReadingReport> {
    const control = new AbortController();
    this.#jobs.set(job, control);
    const desk = this.#desk;
    const reports: FileReport[] = [];
    const accepted = { added: 0, repeated: 0, replaced: 0 };
    const bytesTotal = files.reduce((sum, file) => sum + file.blob.size, 0);
    let bytesBefore = 0;
    let told = -Infinity;
    const tell = (current: string, bytesRead: number): void => {
      if (bytesRead - told < PROGRESS_STEP && bytesRead !== bytesBefore) return;
      told = bytesRead;
      onProgress({ current, done: reports.length, bytesRead, bytesTotal, profiles: accepted.added });
    };
    try {
      const lists = await readStationLists(files, control.signal);
      const listed = [...lists.values()].flatMap(({ stations }) => stations);
      if (listed.length > 0) this.#stationList = [...this.#stationList, ...listed];
      for (const file of files) {
        tell(file.name, bytesBefore);
        const list = lists.get(file);
        if (list !== undefined) {
          const { stations, problems } = list;
          bytesBefore += file.blob.size;
          reports.push({
            name: file.name,
            formats: [],
            profiles: 0,
            stations: stations.length,
            outputTimes: 0,
            problems,
          });
          continue;
        }
        if (await isOutput(file)) {
          reports.push(await readOutput(file, desk));
          bytesBefore += file.blob.size;
          continue;
        }
        const formats = new Set<string>();
        const problems: Problem[] = [];
        let profiles = 0;
        const readings = readProfiles(blobSource(file), {
          site: desk.site,
          stationList: this.#stationList,
          referenceTimeMs: file.writtenMs,
          signal: control.signal,
          onProgress: ({ bytesRead }) => tell(file.name, bytesBefore + bytesRead),
        });
        for await (const reading of readings) {
          if (reading.format !== '') formats.add(reading.format);
          problems.push(...reading.problems);
          profiles += reading.block.profileCount;
          const { added, repeated, replaced } = desk.accept(reading.block);
          accepted.added += added;
          accepted.repeated += repeated;
          accepted.replaced += replaced;
        }
        bytesBefore += file.blob.size;
        reports.push({ name: file.name, formats: [...formats], profiles, stations: 0, outputTimes: 0, problems });
      }
      return { files: reports, accepted, cancelled: false };
    } catch (error) {
      if (!(error instanceof Cancelled)) throw error;
      return { files: reports, accepted, cancelled: true };
    } finally {
      this.#jobs.delete(job);
    }
  }

  cancel(job: number): void {
    this.#jobs.get(job)?.abort();
  }

  stationLists(files: readonly OpenFile[]): Promise<boolean[]> {
    return areStationLists(files);
  }

  feeds(): FeedState[] {
    return this.#desk.feeds();
  }

  night(atMs: number, feed: string, criteria: string): NightState | null {
    return this.#desk.night(atMs, criteria === '' ? { feed } : { feed, criteria });
  }

  section(question: SectionQuestion): SectionInfo | null {
    const painter = this.#prepare(question);
    if (painter === null) return null;
    const { startMs, endMs, edges, values, columnCount, rowCount } = painter.grid;
    return {
      field: question.field,
      startMs: columnCount > 0 ? startMs[0]! : NaN,
      endMs: columnCount > 0 ? endMs[columnCount - 1]! : NaN,
      top: rowCount > 0 ? edges[rowCount]! : NaN,
      filled: values.some((value) => !Number.isNaN(value)),
    };
  }

  paint(request: PaintRequest): Painted | null {
    const painter = this.#prepare(request);
    const view = cutAt(request.view, request.untilMs);
    if (painter === null || view === null) return null;
    const scale = colourScale(FIELDS[request.field].scale, request.theme);
    return { view, pixels: painter.paint(view, { scale, range: request.range }) };
  }

  profiles(feed: string, startMs: number, endMs: number): ProfileBlock | null {
    const block = this.#desk.block(feed);
    if (block === null) return null;
    const picks = [];
    for (let index = 0; index < block.profileCount; index++) {
      if (block.timeMs[index]! >= startMs && block.timeMs[index]! <= endMs) picks.push({ block, index });
    }
    return pickProfiles(picks);
  }

  table({ view, untilMs, ...question }: SectionRequest): SectionTable | null {
    const painter = this.#prepare(question);
    return painter === null ? null : sectionTable(painter.grid, view, untilMs);
  }

  csv({ view, untilMs, ...question }: SectionRequest, units: DisplayUnits): string {
    const painter = this.#prepare(question);
    if (painter === null) return '';
    return [...sectionCsv(painter.grid, units, { ...view, endMs: Math.min(view.endMs, untilMs) })].join('');
  }

  async archive(
    job: number,
    feed: string,
    criteria: string,
    onProgress: (progress: ArchiveProgress) => void,
  ): Promise<ArchiveReport> {
    return this.#archiveJob(job, async (signal) => {
      const steps = this.#desk.archive(criteria === '' ? { feed } : { feed, criteria });
      for (let beganMs = performance.now(), toldMs = beganMs; ;) {
        const step = steps.next();
        if (step.done === true) return { views: step.value === null ? [] : [step.value], problems: [] };
        const nowMs = performance.now();
        if (nowMs - beganMs < LONGEST_WITHOUT_BREATH_MS) continue;
        if (nowMs - toldMs > ARCHIVE_TOLD_EVERY_MS) {
          toldMs = nowMs;
          onProgress({ share: step.value, current: '' });
        }
        await breath();
        if (signal.aborted) throw new Cancelled();
        beganMs = performance.now();
      }
    });
  }

  async archiveTables(
    job: number,
    files: readonly OpenFile[],
    onProgress: (progress: ArchiveProgress) => void,
  ): Promise<ArchiveReport> {
    return this.#archiveJob(job, async (signal) => {
      const { views, problems, transports } = await readArchiveTables(files, {
        signal,
        onProgress: (bytesRead, bytesTotal, current) => onProgress({ share: bytesRead / bytesTotal, current }),
      });
      this.#transports = transports;
      return { views, problems };
    });
  }

  async areArchiveFiles(files: readonly OpenFile[]): Promise<boolean[]> {
    return Promise.all(files.map(async (file) => (await archiveFileOf(file)) !== null));
  }

  async areOutputs(files: readonly OpenFile[]): Promise<boolean[]> {
    return Promise.all(files.map(isOutput));
  }

  farmRecord(feed: string, atMs: number): FarmRecord | null {
    return this.#desk.farmRecord(feed, atMs);
  }

  siteWithFactor(text: string, factor: number): string {
    return withFarmFactor(text, factor);
  }

  async #archiveJob(
    job: number,
    work: (signal: AbortSignal) => Promise<Omit<ArchiveReport, 'cancelled'>>,
  ): Promise<ArchiveReport> {
    const control = new AbortController();
    this.#jobs.set(job, control);
    try {
      return { ...(await work(control.signal)), cancelled: false };
    } catch (error) {
      if (!(error instanceof Cancelled)) throw error;
      return { views: [], problems: [], cancelled: true };
    } finally {
      this.#jobs.delete(job);
    }
  }

  moisture(atMs: number, feed: string, criteria: string, humidityFrom: string): MoistureState | null {
    const archive = this.#transports.get(feed.slice(0, feed.lastIndexOf('/')));
    const question = { feed, humidityFrom, ...(criteria === '' ? {} : { criteria }) };
    return this.#desk.moisture(atMs, question, archive === undefined ? [] : [archive]);
  }

  inflow(atMs: number, feed: string, criteria: string): InflowState | NoInflow | null {
    return this.#desk.inflow(atMs, criteria === '' ? { feed } : { feed, criteria });
  }

  #prepare({ feed, field, ceiling }: SectionQuestion): SectionPainter | null {
    const block = field === 'humidity-flux' ? this.#desk.moistBlock(feed) : this.#desk.block(feed);
    if (block === null) return null;
    const held = this.#section;
    if (
      held?.block !== block ||
      held.question.feed !== feed ||
      held.question.field !== field ||
      held.question.ceiling !== ceiling
    ) {
      const painter = new SectionPainter(buildSectionGrid([block], { field, ceiling }));
      this.#section = { question: { feed, field, ceiling }, block, painter };
    }
    return this.#section!.painter;
  }
}

/** The part of a view up to a moment, at the same scale, whole pixels; null where nothing of it is left. */
function cutAt(view: SectionView, untilMs: number): SectionView | null {
  if (untilMs >= view.endMs) return view;
  const msPerPixel = (view.endMs - view.startMs) / view.width;
  const width = Math.floor((untilMs - view.startMs) / msPerPixel);
  return width > 0 ? { ...view, width, endMs: view.startMs + width * msPerPixel } : null;
}

/** A site without turbines gets the reader's own disc, so that a lone file still shows rotor numbers. */
function withDisc(site: Site, disc: OpenSite['disc']): Site {
  if (site.turbines.length > 0) return site;
  return { ...site, turbines: [{ ...PLAIN_TURBINE, ...disc }] };
}

const PLAIN_TURBINE: Omit<TurbineType, keyof OpenSite['disc']> = {
  name: 'Disc',
  count: 1,
  powerCurve: null,
  cutIn: NaN,
  rated: NaN,
  cutOut: NaN,
  restart: NaN,
  groundElevation: NaN,
};
