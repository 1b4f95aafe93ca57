// The header line of a sounding (IGRA version 2, format description of the archive, section "header records").

import { MISSING, numberAt, textAt } from './fixed-columns.ts';

const HOUR_MS = 3_600_000;
const DAY_MS = 24 * HOUR_MS;

export interface SoundingHeader {
  readonly id: string;
  /** Launch where it is given, else the nominal hour, UTC ms; NaN where neither is. */
  readonly timeMs: number;
  readonly levelCount: number;
  /** Degrees; NaN where the archive marks a moving station, or nothing makes sense. */
  readonly latitude: number;
  readonly longitude: number;
}

/** True for a line that begins like a header. */
export function isHeader(bytes: Uint8Array, start: number, end: number): boolean {
  return bytes[start] === 35 && end - start >= 71 && bytes[start + 12] === 32;
}

/** Reads a header line; columns are those of the description, less one. */
export function readHeader(bytes: Uint8Array, start: number, end: number): SoundingHeader {
  const number = (from: number, to: number): number => numberAt(bytes, start + from, start + to, end);
  const latitude = number(55, 62) / 10_000;
  const longitude = number(63, 71) / 10_000;
  return {
    id: textAt(bytes, start + 1, start + 12),
    timeMs: timeOf(number(13, 17), number(18, 20), number(21, 23), number(24, 26), number(27, 31)),
    levelCount: Math.max(0, number(32, 36)),
    latitude: Math.abs(latitude) <= 90 ? latitude : NaN,
    longitude: Math.abs(longitude) <= 180 ? longitude : NaN,
  };
}

/** The date is that of the nominal hour; the release may lie on the day before or after. */
function timeOf(year: number, month: number, day: number, hour: number, release: number): number {
  if (!(year > 1800 && month >= 1 && month <= 12 && day >= 1 && day <= 31)) return NaN;
  const midnight = Date.UTC(year, month - 1, day);
  const nominal = hour >= 0 && hour <= 23 ? midnight + hour * HOUR_MS : NaN;
  const minutes = release % 100;
  const releaseHour = Math.floor(release / 100);
  if (release === MISSING || releaseHour > 23 || (minutes > 59 && minutes !== 99)) return nominal;
  const launch = midnight + releaseHour * HOUR_MS + (minutes === 99 ? 0 : minutes) * 60_000;
  if (Number.isNaN(nominal)) return launch;
  return launch + DAY_MS * Math.round((nominal - launch) / DAY_MS);
}
