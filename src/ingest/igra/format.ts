// The text of an open radiosonde archive: IGRA version 2 (Durre et al. 2018, J. Atmos. Oceanic Technol. 35; format
// description of the archive), a period of any length, streamed.

import { throwIfCancelled, type Problem } from '../../air/index.ts';
import { concatBlocks, type Station } from '../../profile/index.ts';
import type { FileFormat, Reading, ReadOptions } from '../format.ts';
import { stationBySite } from '../site-station.ts';
import type { ByteSource } from '../source.ts';
import { isHeader, readHeader, type SoundingHeader } from './header.ts';
import { Soundings } from './soundings.ts';

/** Levels handed out at once. */
const BATCH = 100_000;
/** No line of the archive is half as long. */
const LONGEST_LINE = 256;
/** A data line reaches at least to its height. */
const SHORTEST_LEVEL = 21;

export const igra: FileFormat = {
  name: 'igra',
  title: 'IGRA version 2 text (radiosonde archive)',
  recognise: (head) => {
    const line = String.fromCharCode(...head.subarray(0, 72));
    return /^#[A-Z]{2}[A-Z0-9]{9} \d{4} \d{2} \d{2} \d{2} [\d ]{4} [\d ]{4} /u.test(line);
  },
  read: readArchive,
};

async function* readArchive(
  source: ByteSource,
  options: ReadOptions,
): AsyncGenerator<Pick<Reading, 'block' | 'problems'>> {
  const reader = new ArchiveReader(source.name, options);
  let rest = new Uint8Array(0);
  for await (const piece of source.stream()) {
    throwIfCancelled(options.signal);
    let bytes = piece;
    if (rest.length > 0) {
      bytes = new Uint8Array(rest.length + piece.length);
      bytes.set(rest);
      bytes.set(piece, rest.length);
    }
    const used = reader.take(bytes);
    // Of a line that never ends the beginning is enough to tell that it is none.
    rest = bytes.slice(used, used + LONGEST_LINE + 1);
    if (reader.soundings.waiting >= BATCH) yield { block: reader.soundings.handOut(), problems: [] };
  }
  reader.end(rest);
  const { soundings } = reader;
  yield { block: soundings.waiting > 0 ? soundings.handOut() : concatBlocks([]), problems: reader.problems() };
}

/** Goes through the lines of an archive file. */
class ArchiveReader {
  readonly soundings: Soundings;
  readonly #source: string;
  readonly #options: ReadOptions;
  readonly #tallies = new Map<string, { count: number; line: number; station: string }>();
  #header: SoundingHeader | null = null;
  #headerLine = 0;
  #line = 0;
  /** Inside a line too long to be one: everything up to its end is passed over. */
  #skipping = false;

  constructor(source: string, options: ReadOptions) {
    this.#source = source;
    this.#options = options;
    this.soundings = new Soundings(source);
  }

  /** Takes all whole lines; returns how many bytes they were. */
  take(bytes: Uint8Array): number {
    let start = 0;
    for (;;) {
      const end = bytes.indexOf(10, start);
      if (end < 0) break;
      if (this.#skipping) this.#skipping = false;
      else this.#takeLine(bytes, start, end);
      start = end + 1;
    }
    if (bytes.length - start <= LONGEST_LINE) return start;
    if (!this.#skipping) {
      this.#line++;
      this.#tally('line');
    }
    this.#skipping = true;
    return bytes.length;
  }

  /** The file ends, maybe within a line. */
  end(rest: Uint8Array): void {
    if (rest.length > 0 && !this.#skipping) this.#takeLine(rest, 0, rest.length);
    this.#close();
  }

  problems(): Problem[] {
    return [...this.#tallies].map(([kind, { count, line, station }]) => {
      const where = { source: this.#source, line };
      if (kind === 'line') {
        return {
          code: 'ingest/igra-line',
          what: `${count === 1 ? 'A line is' : `${count} lines are`} neither header nor level; passed over.`,
          mend: 'Fetch the file from the archive again.',
          where,
        };
      }
      if (kind === 'time') {
        return {
          code: 'ingest/igra-time',
          what: `${count === 1 ? 'A sounding has' : `${count} soundings have`} neither hour nor time of release; left out.`,
          mend: 'Nothing to mend here: the archive does not know the time.',
          where,
        };
      }
      return {
        code: 'ingest/igra-cut-short',
        what: `${count === 1 ? 'A sounding has' : `${count} soundings have`} fewer levels than announced, first one of ${station}; what is there is used.`,
        mend: 'Fetch the file from the archive again if more should be in it.',
        where,
      };
    });
  }

  #takeLine(bytes: Uint8Array, start: number, lineEnd: number): void {
    this.#line++;
    const end = bytes[lineEnd - 1] === 13 ? lineEnd - 1 : lineEnd;
    if (isHeader(bytes, start, end)) {
      this.#close();
      this.#header = readHeader(bytes, start, end);
      this.#headerLine = this.#line;
    } else if (this.#header !== null && this.#isLevel(bytes, start, end)) {
      this.soundings.takeLevel(bytes, start, end);
    } else if (end > start) this.#tally('line');
  }

  /** The type of the level, 1 to 3 and 0 to 2, and a blank after it. */
  #isLevel(bytes: Uint8Array, start: number, end: number): boolean {
    const major = bytes[start]!;
    return end - start >= SHORTEST_LEVEL && major >= 49 && major <= 51 && bytes[start + 8] === 32;
  }

  #close(): void {
    const header = this.#header;
    if (header === null) return;
    this.#header = null;
    const { open } = this.soundings;
    if (open < header.levelCount) this.#tally('short', header.id, this.#headerLine);
    if (open === 0) return;
    if (Number.isNaN(header.timeMs)) {
      this.#tally('time', header.id, this.#headerLine);
      this.soundings.drop();
    } else this.soundings.close(this.#stationOf(header), header.timeMs);
  }

  #stationOf({ id, latitude, longitude }: SoundingHeader): Station {
    // Stations of the WMO are known by the last five figures.
    const number = /^..M.*(\d{5})$/u.exec(id)?.[1] ?? id;
    return stationBySite(this.#options, { id, name: id, latitude, longitude, elevation: NaN }, [number]);
  }

  #tally(kind: string, station = '', line = this.#line): void {
    const known = this.#tallies.get(kind);
    if (known === undefined) this.#tallies.set(kind, { count: 1, line, station });
    else known.count++;
  }
}
