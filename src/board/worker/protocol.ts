// The whole vocabulary between the page and its worker: plain data, typed arrays, and the calls.

import type { Problem } from '../../air/index.ts';
import type {
  Acceptance,
  ArchiveView,
  FarmRecord,
  FeedState,
  InflowState,
  MoistureState,
  NightState,
  NoInflow,
} from '../../desk/index.ts';
import type { FieldName, SectionView, ThemeName, ValueRange } from '../../plot/index.ts';
import type { ProfileBlock } from '../../profile/index.ts';
import type { DisplayUnits, Site } from '../../site/index.ts';

/** A file as the browser hands it over; its bytes are read in the worker. */
export interface OpenFile {
  readonly name: string;
  readonly blob: Blob;
  /** UTC, ms, when it was last written: tells the month of bulletins that give only the day. Undefined: not known. */
  readonly writtenMs?: number | undefined;
}

/** How far reading has come. */
export interface ReadingProgress {
  /** Name of the file being read. */
  readonly current: string;
  /** Files finished. */
  readonly done: number;
  readonly bytesRead: number;
  readonly bytesTotal: number;
  readonly profiles: number;
}

/** What one file gave. */
export interface FileReport {
  readonly name: string;
  readonly formats: readonly string[];
  readonly profiles: number;
  /** Of a list of stations; zero for any other file. */
  readonly stations: number;
  /** Times of a farm's actual output; 0 in a file of profiles. */
  readonly outputTimes: number;
  readonly problems: readonly Problem[];
}

export interface ReadingReport {
  readonly files: readonly FileReport[];
  readonly accepted: Pick<Acceptance, 'added' | 'repeated' | 'replaced'>;
  readonly cancelled: boolean;
}

export interface SiteReport {
  readonly site: Site;
  readonly problems: readonly Problem[];
}

/** The extent and content of a prepared section. */
export interface SectionInfo {
  readonly field: FieldName;
  readonly startMs: number;
  readonly endMs: number;
  /** m above ground: top of the highest row. */
  readonly top: number;
  /** Whether any cell holds a value. */
  readonly filled: boolean;
}

export interface SectionQuestion {
  readonly feed: string;
  readonly field: FieldName;
  /** m above ground */
  readonly ceiling: number;
}

export interface SectionRequest extends SectionQuestion {
  readonly view: SectionView;
  /** UTC ms: nothing later is shown. */
  readonly untilMs: number;
}

export interface PaintRequest extends SectionRequest {
  readonly theme: ThemeName;
  readonly range: ValueRange;
}

export interface Painted {
  /** What was painted: the view asked for, cut at `untilMs`. */
  readonly view: SectionView;
  /** Four bytes a pixel, `view.width * view.height` of them; handed over. */
  readonly pixels: Uint8ClampedArray<ArrayBuffer>;
}

/** The cells of a section in view, as numbers. */
export interface SectionTable {
  /** UTC ms: end of each column's time. */
  readonly timeMs: Float64Array;
  /** m above ground: lower and upper edge of each row. */
  readonly bottom: Float32Array;
  readonly top: Float32Array;
  /** SI, `column * rows + row`; NaN where empty. */
  readonly values: Float32Array;
  /** Columns in view that the table leaves out because they are too many to read. */
  readonly left: number;
}

/** The calls of the worker. Each answers with plain data; big arrays are handed over, not copied. */
export interface BoardWorker {
  /** Starts over with this site file (none: the plain site with one disc); profiles held are forgotten. */
  open(site: OpenSite): SiteReport;
  read(
    job: number,
    files: readonly OpenFile[],
    onProgress: (progress: ReadingProgress) => void,
  ): Promise<ReadingReport>;
  cancel(job: number): void;
  /** Which of the files are lists of stations; what was read before them does not know of them yet. */
  stationLists(files: readonly OpenFile[]): Promise<boolean[]>;
  feeds(): FeedState[];
  night(atMs: number, feed: string, criteria: string): NightState | null;
  /** Builds the section's grid and makes it ready to be painted at any zoom. */
  section(question: SectionQuestion): SectionInfo | null;
  paint(request: PaintRequest): Painted | null;
  /** The feed's profiles valid from `startMs` to `endMs`, both included. */
  profiles(feed: string, startMs: number, endMs: number): ProfileBlock | null;
  /** The newest columns of the section in view, as numbers. */
  table(request: SectionRequest): SectionTable | null;
  /** The section in view as CSV, in the reader's units. */
  csv(request: SectionRequest, units: DisplayUnits): string;
  /** The figures of a feed's open profiles: one view, none where there is no such feed. */
  archive(
    job: number,
    feed: string,
    criteria: string,
    onProgress: (progress: ArchiveProgress) => void,
  ): Promise<ArchiveReport>;
  /** The figures out of the tables that a scan wrote: a view a feed. */
  archiveTables(
    job: number,
    files: readonly OpenFile[],
    onProgress: (progress: ArchiveProgress) => void,
  ): Promise<ArchiveReport>;
  /** Whether each file is one that a scan wrote, not one of profiles. */
  areArchiveFiles(files: readonly OpenFile[]): Promise<boolean[]>;
  /** The moist night; `criteria` and `humidityFrom` empty: the site's own, and whoever serves best. */
  moisture(atMs: number, feed: string, criteria: string, humidityFrom: string): MoistureState | null;
  /** What storms get of the air at a moment; null where there is no such feed or no profile yet. */
  inflow(atMs: number, feed: string, criteria: string): InflowState | NoInflow | null;
  /** Whether each file is a farm's actual output. */
  areOutputs(files: readonly OpenFile[]): Promise<boolean[]>;
  /** The farm over a feed's whole record up to a moment. */
  farmRecord(feed: string, atMs: number): FarmRecord | null;
  /** The text of a site file with this farm factor in it. */
  siteWithFactor(text: string, factor: number): string;
}

/** How far the figures of an archive have come. */
export interface ArchiveProgress {
  /** 0 to 1 */
  readonly share: number;
  /** Name of the table being read; empty for open profiles. */
  readonly current: string;
}

export interface ArchiveReport {
  readonly views: readonly ArchiveView[];
  readonly problems: readonly Problem[];
  readonly cancelled: boolean;
}

export interface OpenSite {
  /** The site file's text and name; null where there is none. */
  readonly file: { readonly text: string; readonly name: string } | null;
  /** The disc to reckon with where the site names no turbine, m. */
  readonly disc: { readonly hubHeight: number; readonly rotorDiameter: number };
}
