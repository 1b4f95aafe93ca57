// Times as the CF conventions write them ("hours since 2024-04-13 00:00:00 +00:00"), section 4.4 of CF-1.11.

export interface TimeUnit {
  /** ms in one unit */
  readonly scaleMs: number;
  /** UTC, ms, of the zero */
  readonly originMs: number;
}

const SCALES_MS: readonly (readonly [names: string, ms: number])[] = [
  ['microsecond|microseconds|microsec|microsecs|us', 0.001],
  ['millisecond|milliseconds|millisec|millisecs|msec|msecs|ms', 1],
  ['second|seconds|sec|secs|s', 1000],
  ['minute|minutes|min|mins', 60_000],
  ['hour|hours|hr|hrs|h', 3_600_000],
  ['day|days|d', 86_400_000],
  ['week|weeks', 604_800_000],
];
const SCALE_BY_NAME: ReadonlyMap<string, number> = new Map(
  SCALES_MS.flatMap(([names, ms]) => names.split('|').map((name): [string, number] => [name, ms])),
);

/** Calendars whose days are those of the real world. */
const REAL_CALENDARS = new Set(['', 'standard', 'gregorian', 'proleptic_gregorian', 'none']);

const FORM =
  /^([a-z]+)\s+since\s+([+-]?\d{1,6})-(\d{1,2})-(\d{1,2})(?:(?:\s+|t)(\d{1,2})(?::?(\d{2})(?::?(\d{2}(?:\.\d*)?))?)?)?\s*(.*)$/u;

/** The day the Gregorian calendar began, 15 October 1582, UTC ms: `standard` is Julian before it. */
const GREGORIAN_START_MS = Date.UTC(1582, 9, 15);

/**
 * Reads a unit of time.
 * @returns null when it is no unit of time this house knows, or the calendar is not that of the real world
 * @example parseTimeUnit('seconds since 2019-01-01 00:00:00 0:00', 'standard')
 */
export function parseTimeUnit(units: string, calendar: string): TimeUnit | null {
  const real = calendar.trim().toLowerCase();
  const match = FORM.exec(units.trim().toLowerCase());
  if (match === null || !REAL_CALENDARS.has(real)) return null;
  const [, name, year, month, day, hour = '0', minute = '0', second = '0', zone] = match;
  const scaleMs = SCALE_BY_NAME.get(name!);
  const zoneMs = zoneOffsetMs(zone!);
  if (scaleMs === undefined || zoneMs === null) return null;
  let midnight = utcMidnight(Number(year), Number(month), Number(day));
  if (midnight < GREGORIAN_START_MS && real !== 'proleptic_gregorian') {
    midnight = julianMidnight(Number(year), Number(month), Number(day));
  }
  const clock = Number(hour) * 3_600_000 + Number(minute) * 60_000 + Number(second) * 1000;
  return { scaleMs, originMs: midnight + clock - zoneMs };
}

/** UTC ms, whole, of a value in the unit; NaN stays. */
export function timeMsOf(value: number, unit: TimeUnit): number {
  return Math.round(unit.originMs + value * unit.scaleMs);
}

/** `Date.UTC`, but years below 100 are those years. */
function utcMidnight(year: number, month: number, day: number): number {
  const date = new Date(0);
  return date.setUTCFullYear(year, month - 1, day);
}

/** A date of the Julian calendar; by the day-number formula of Fliegel & Van Flandern (1968, Comm. ACM 11). */
function julianMidnight(year: number, month: number, day: number): number {
  const a = Math.floor((14 - month) / 12);
  const y = year + 4800 - a;
  const m = month + 12 * a - 3;
  const dayNumber = day + Math.floor((153 * m + 2) / 5) + 365 * y + Math.floor(y / 4) - 32_083;
  return (dayNumber - 2_440_588) * 86_400_000;
}

/** What may stand behind the clock: `Z`, `UTC`, `+05:30`, `-6`, `0:00`, or nothing, which is UTC. */
function zoneOffsetMs(zone: string): number | null {
  if (/^(?:z|utc|gmt)?$/u.test(zone)) return 0;
  const match = /^(?:utc|gmt)?\s*([+-]?)(\d{1,2})(?::?(\d{2}))?$/u.exec(zone);
  if (match === null) return null;
  const [, sign, hours, minutes = '0'] = match;
  return (sign === '-' ? -1 : 1) * (Number(hours) * 3_600_000 + Number(minutes) * 60_000);
}
