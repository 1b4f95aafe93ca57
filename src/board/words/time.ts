// Times as the reader wants them: site time or UTC, with date-fns and its time-zone companions.

import { TZDate } from '@date-fns/tz';
import { UTCDate } from '@date-fns/utc';
import { format, formatISO } from 'date-fns';

export type Clock = 'site' | 'utc';

/** Formats instants for one choice of clock and zone. */
export interface TimeWords {
  /** IANA name, `UTC` for that clock. */
  readonly zone: string;
  /** For a heading: `site time` or `UTC`. */
  readonly zoneWords: string;
  /** `02:40` */
  clock(timeMs: number): string;
  /** `Sat 9 Nov` */
  day(timeMs: number): string;
  /** `Sat 9 Nov 2013, 02:40` */
  full(timeMs: number): string;
  /** ISO 8601 with offset. */
  iso(timeMs: number): string;
}

export function timeWords(clock: Clock, siteZone: string): TimeWords {
  const zone = clock === 'utc' ? 'UTC' : siteZone;
  const at = (timeMs: number): Date => (zone === 'UTC' ? new UTCDate(timeMs) : new TZDate(timeMs, zone));
  const put = (timeMs: number, pattern: string): string =>
    Number.isFinite(timeMs) ? format(at(timeMs), pattern) : '–';
  return {
    zone,
    zoneWords: zone === 'UTC' ? 'UTC' : 'site time',
    clock: (timeMs) => put(timeMs, 'HH:mm'),
    day: (timeMs) => put(timeMs, 'EEE d MMM'),
    full: (timeMs) => put(timeMs, 'EEE d MMM yyyy, HH:mm'),
    iso: (timeMs) => (Number.isFinite(timeMs) ? formatISO(at(timeMs)) : ''),
  };
}

/** How long something lasted or how old it is: `6 min`, `2 h 40 min`, `3 days`. */
export function durationWords(durationMs: number): string {
  if (!Number.isFinite(durationMs)) return 'unknown';
  const minutes = Math.round(Math.abs(durationMs) / 60_000);
  if (minutes < 60) return `${minutes} min`;
  if (minutes < 48 * 60) {
    const rest = minutes % 60;
    return rest === 0 ? `${Math.floor(minutes / 60)} h` : `${Math.floor(minutes / 60)} h ${rest} min`;
  }
  return `${Math.round(minutes / 1440)} days`;
}
