// Times as tables write them, to UTC: ISO 8601 and its relaxations, day-month-year, compact digits, seconds since 1970.

import { tzOffset } from '@date-fns/tz';

const CLOCK = String.raw`(?:(?:T|\s+|\s*[,;]\s*)(\d{1,2})(?::(\d{2})(?::(\d{2}(?:[.,]\d+)?))?)?\s*(am|pm)?)?`;
const ZONE = String.raw`\s*(Z|UTC|GMT|[+-]\d{2}(?::?\d{2})?)?`;
const YEAR_FIRST = new RegExp(String.raw`^(\d{4})[-/.](\d{1,2})[-/.](\d{1,2})${CLOCK}${ZONE}$`, 'i');
const YEAR_LAST = new RegExp(String.raw`^(\d{1,2})([-/.])(\d{1,2})[-/.](\d{4})${CLOCK}${ZONE}$`, 'i');
const COMPACT = new RegExp(
  String.raw`^((?:19|20)\d{2})(\d{2})(\d{2})(?:[T_\s]?(\d{2})(\d{2})(\d{2}(?:\.\d+)?)?)?${ZONE}$`,
  'i',
);
const EPOCH = /^-?\d{9,10}(?:\.\d+)?$|^-?\d\.\d+e\+?0?9$/iu;
const EPOCH_MS = /^\d{13}$/u;

/** How the times of a table were understood, for notes. */
export interface TimeFindings {
  /** Some time stated no zone. */
  zoneless: boolean;
  /** Some time was a number of seconds or milliseconds since 1970. */
  epoch: boolean;
  /** Some day and month could have been either. */
  ambiguousDays: boolean;
}

/** Reads the times of one table. */
export class TimeText {
  readonly findings: TimeFindings = { zoneless: false, epoch: false, ambiguousDays: false };
  readonly #zone: string;
  readonly #monthFirst: boolean;

  /**
   * @param zone IANA name of the zone of times that state none
   * @param monthFirst whether `3/4/2024` is the fourth of March
   */
  constructor(zone: string, monthFirst: boolean) {
    this.#zone = zone;
    this.#monthFirst = monthFirst;
  }

  /** UTC ms; NaN for what is no time. */
  read(text: string): number {
    const trimmed = text.trim();
    const yearFirst = YEAR_FIRST.exec(trimmed);
    if (yearFirst !== null) {
      const [, year, month, day, hour, minute, second, half, zone] = yearFirst;
      return this.#utc([year, month, day, hour, minute, second], half, zone);
    }
    if (EPOCH.test(trimmed)) return this.#sinceEpoch(Number(trimmed) * 1000);
    if (EPOCH_MS.test(trimmed)) return this.#sinceEpoch(Number(trimmed));
    const compact = COMPACT.exec(trimmed);
    if (compact !== null) {
      const [, year, month, day, hour, minute, second, zone] = compact;
      return this.#utc([year, month, day, hour, minute, second], undefined, zone);
    }
    const yearLast = YEAR_LAST.exec(trimmed);
    if (yearLast === null) return NaN;
    const [, one, separator, two, year, hour, minute, second, half, zone] = yearLast;
    // Full stops are written between day and month nearly everywhere that uses them, strokes either way.
    const monthFirst = separator !== '.' && this.#monthFirst;
    if (separator !== '.' && Number(one) <= 12 && Number(two) <= 12) this.findings.ambiguousDays = true;
    const [month, day] = monthFirst ? [one, two] : [two, one];
    return this.#utc([year, month, day, hour, minute, second], half, zone);
  }

  /** UTC ms of numbers in columns of their own; NaN where they make no date. */
  ofParts(parts: readonly (string | undefined)[]): number {
    return this.#utc(parts, undefined, undefined);
  }

  /** UTC ms of a number of seconds since 1970. */
  ofEpoch(seconds: number): number {
    return this.#sinceEpoch(seconds * 1000);
  }

  #sinceEpoch(ms: number): number {
    this.findings.epoch = true;
    return ms;
  }

  #utc(parts: readonly (string | undefined)[], half: string | undefined, zone: string | undefined): number {
    const [year, month, day, clockHour, minute, second] = parts.map((part) =>
      Number((part ?? '0').replace(',', '.')),
    ) as [number, number, number, number, number, number];
    let hour = clockHour;
    if (half !== undefined) hour = (hour % 12) + (half.toLowerCase() === 'pm' ? 12 : 0);
    if (!(month >= 1 && month <= 12 && day >= 1 && hour >= 0 && hour <= 24 && minute < 60 && second < 61)) return NaN;
    const midnight = Date.UTC(year, month - 1, day);
    if (new Date(midnight).getUTCDate() !== day || new Date(midnight).getUTCFullYear() !== year) return NaN;
    const local = midnight + Math.round(((hour * 60 + minute) * 60 + second) * 1000);
    return zone === undefined ? this.#fromZone(local) : local - offsetMs(zone);
  }

  #fromZone(local: number): number {
    this.findings.zoneless = true;
    if (this.#zone === 'UTC') return local;
    // The offset is asked at the time itself, which it takes two steps to know.
    const first = local - tzOffset(this.#zone, new Date(local)) * 60_000;
    return local - tzOffset(this.#zone, new Date(first)) * 60_000;
  }
}

function offsetMs(zone: string): number {
  const match = /^([+-])(\d{2}):?(\d{2})?$/u.exec(zone);
  if (match === null) return 0;
  const minutes = Number(match[2]) * 60 + Number(match[3] ?? 0);
  return (match[1] === '-' ? -minutes : minutes) * 60_000;
}

/** Whether days come after months in dates with strokes, as far as the samples tell. */
export function monthFirstIn(samples: readonly string[]): boolean {
  return samples.some((sample) => {
    const match = YEAR_LAST.exec(sample.trim());
    return match !== null && Number(match[3]) > 12;
  });
}
