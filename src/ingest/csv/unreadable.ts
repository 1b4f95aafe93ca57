// Tallies what could not be read in a table: one problem a kind, with the count and the first place.

import type { Problem } from '../../air/index.ts';

interface Tally {
  count: number;
  readonly line: number;
  readonly key: string | undefined;
  readonly text: string;
}

/** What the tallies of each kind say; `one` and `many` get the count and the first text. */
const KINDS = {
  time: {
    code: 'ingest/csv-time',
    what: (count: number, text: string) =>
      `${count === 1 ? 'A row has' : `${count} rows have`} no time that can be read, first “${text}”; left out.`,
    mend: 'Write times as 2024-06-01T21:40:00Z, or as seconds since 1970.',
  },
  cell: {
    code: 'ingest/csv-cell',
    what: (count: number, text: string) =>
      `${count === 1 ? 'A cell of the column holds' : `${count} cells of the column hold`} no number, first “${text}”; taken as missing.`,
    mend: 'Leave cells without a value empty.',
  },
  width: {
    code: 'ingest/csv-width',
    what: (count: number, text: string) =>
      `${count === 1 ? 'A row has' : `${count} rows have`} another number of cells than the heading, first ${text}.`,
    mend: 'Check the delimiter and whether texts that contain it are in quotation marks.',
  },
  cutShort: {
    code: 'ingest/csv-cut-short',
    what: () => 'The file ends within a row; the row was left out.',
    mend: 'Fetch the file again if more should be in it.',
  },
  repeat: {
    code: 'ingest/csv-time-again',
    what: (count: number) =>
      `${count === 1 ? 'A time comes' : `${count} times come`} a second time in the file; of equal levels the first counts.`,
    mend: 'Check whether the file was joined from overlapping parts.',
  },
  position: {
    code: 'ingest/csv-position',
    what: (_: number, text: string) => `The position of the station ${text} lies not on Earth; taken as unknown.`,
    mend: 'Give latitude and longitude in degrees, or the station in the site file.',
  },
} as const;
type Kind = keyof typeof KINDS;

export class Unreadable {
  readonly #source: string;
  readonly #tallies = new Map<string, Tally & { kind: Kind }>();

  constructor(source: string) {
    this.#source = source;
  }

  time(line: number, text: string): void {
    this.#add('time', line, undefined, text);
  }

  cell(line: number, column: string, text: string): void {
    this.#add('cell', line, column, text);
  }

  width(line: number, cells: number, headings: number): void {
    this.#add('width', line, undefined, `${cells} instead of ${headings}`);
  }

  cutShort(line: number): void {
    this.#add('cutShort', line, undefined, '');
  }

  repeat(line: number): void {
    this.#add('repeat', line, undefined, '');
  }

  position(station: string): void {
    this.#add('position', NaN, station, station);
  }

  /** All tallies as problems, in the order in which they began. */
  problems(): Problem[] {
    return [...this.#tallies.values()].map(({ kind, count, line, key, text }) => ({
      code: KINDS[kind].code,
      what: KINDS[kind].what(count, shown(text)),
      mend: KINDS[kind].mend,
      where: {
        source: this.#source,
        ...(Number.isNaN(line) ? {} : { line }),
        ...(key === undefined || kind === 'position' ? {} : { key }),
      },
    }));
  }

  #add(kind: Kind, line: number, key: string | undefined, text: string): void {
    const id = `${kind} ${key ?? ''}`;
    const known = this.#tallies.get(id);
    if (known === undefined) this.#tallies.set(id, { kind, count: 1, line, key, text });
    else known.count++;
  }
}

/** A foreign text, fit to stand in a message. */
function shown(text: string): string {
  const plain = text.replace(/[\p{Cc}\p{Cf}\ufffd]/gu, '·').trim();
  return plain.length > 40 ? `${plain.slice(0, 40)}…` : plain;
}
