// What every format of the house looks like to the front door: one file or folder a format, all of this shape.

import type { Problem } from '../air/index.ts';
import type { ProfileBlock, Station } from '../profile/index.ts';
import type { Site } from '../site/index.ts';
import type { ByteSource, ReadLimits } from './source.ts';

export interface ReadProgress {
  readonly source: string;
  readonly bytesRead: number;
  /** Missing where the length is not known beforehand. */
  readonly bytesTotal: number | undefined;
}

export interface ReadOptions {
  /** Stations, positions and column headings the user has stated. */
  readonly site: Site;
  readonly limits: ReadLimits;
  readonly signal: AbortSignal | undefined;
  /** Called by the front door as bytes are taken; formats need not. */
  readonly onProgress: ((progress: ReadProgress) => void) | undefined;
  /**
   * UTC, ms: a time not long after the file was written, today for what just came in. Codes that give only the day of
   * the month need it, and no profile can lie more than a day behind it. Undefined where nobody knows.
   */
  readonly referenceTimeMs: number | undefined;
  /** Places of stations that files name without saying where they are; the site's own stations come first. */
  readonly stationList: readonly Station[];
}

/** Part of what a file holds; long files come in several, each with profiles in the file's order. */
export interface Reading {
  readonly source: string;
  /** Name of the format that read it; empty when no format knew the bytes. */
  readonly format: string;
  readonly block: ProfileBlock;
  readonly problems: readonly Problem[];
}

/** A format: the front door asks each in turn whether the bytes are its own, by content and never by file name. */
export interface FileFormat {
  /** Stable name, `netcdf-classic`. */
  readonly name: string;
  /** For people: `netCDF classic (CDF-1, CDF-2, CDF-5)`. */
  readonly title: string;
  /** @param head the first bytes of the unpacked file, up to 64 KiB, all of it if shorter */
  recognise(head: Uint8Array): boolean;
  /**
   * Reads the file. A damaged record is a problem in a Reading, and the rest goes on; what cannot be read at all is thrown
   * as DuskveerError and caught by the front door, which keeps what came before.
   */
  read(source: ByteSource, options: ReadOptions): AsyncGenerator<Omit<Reading, 'source' | 'format'>>;
}
