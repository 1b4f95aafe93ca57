// The time of a row, out of one column or several.

import { TimeText, type TimeFindings } from './time-text.ts';
import type { Plan } from './plan.ts';

type Row = readonly string[];

/** Reads the times of rows; a row whose time cells equal those of the row before costs nothing. */
export class RowTime {
  readonly #text: TimeText;
  readonly #columns: Plan['once'];
  #lastKey: string | undefined;
  #last = NaN;

  constructor(columns: Plan['once'], zone: string, monthFirst: boolean) {
    this.#text = new TimeText(zone, monthFirst);
    this.#columns = columns;
  }

  get findings(): Readonly<TimeFindings> {
    return this.#text.findings;
  }

  /** UTC ms; NaN where the row has no time that can be read. */
  read(row: Row): number {
    const key = this.written(row);
    if (key !== this.#lastKey) {
      this.#lastKey = key;
      this.#last = this.#parse(row);
    }
    return this.#last;
  }

  /** The time as it stands in the row, for messages. */
  written(row: Row): string {
    const { time, epoch, date, year, month, day, clock, hour, minute, second } = this.#columns;
    if (date === undefined && year === undefined) return row[time ?? epoch ?? -1] ?? '';
    return [date, time, clock, year, month, day, hour, minute, second]
      .flatMap((cell) => (cell === undefined ? [] : [(row[cell] ?? '').trim()]))
      .join(' ');
  }

  #parse(row: Row): number {
    const columns = this.#columns;
    const at = (cell: number | undefined): string | undefined => (cell === undefined ? undefined : row[cell]?.trim());
    if (columns.date !== undefined) {
      const date = at(columns.date) ?? '';
      const clock = at(columns.clock) ?? at(columns.time) ?? at(columns.hour) ?? '';
      const minutes = at(columns.hour) !== undefined ? `:${(at(columns.minute) ?? '0').padStart(2, '0')}` : '';
      const joined = this.#text.read(`${date} ${clockText(clock)}${minutes}`);
      // Some tables hold the whole time in the one column or the other.
      return Number.isNaN(joined) ? orElse(this.#text.read(clock), () => this.#text.read(date)) : joined;
    }
    if (columns.year !== undefined) {
      const { year, month, day, hour, minute, second } = columns;
      const known = [year, month, day, hour, minute, second].map((cell) => at(cell));
      if (known[0] === '' || known[1] === undefined || known[2] === undefined) return NaN;
      return this.#text.ofParts(known);
    }
    if (columns.time !== undefined) return this.#text.read(at(columns.time) ?? '');
    const seconds = at(columns.epoch) ?? '';
    return seconds === '' ? NaN : this.#text.ofEpoch(Number(seconds));
  }
}

/** `1230` and `123015` as `12:30` and `12:30:15`. */
function clockText(text: string): string {
  const match = /^(\d{1,2})(\d{2})(\d{2})?(?:\.0+)?$/u.exec(
    text.length >= 3 ? text.padStart(text.length + (text.length % 2), '0') : '',
  );
  if (match === null) return text;
  return match[3] === undefined ? `${match[1]}:${match[2]}` : `${match[1]}:${match[2]}:${match[3]}`;
}

function orElse(value: number, otherwise: () => number): number {
  return Number.isNaN(value) ? otherwise() : value;
}
