// Which night a moment belongs to, by the mean sun at the station, and when the sun was down in it.

import { nightOf, type Night } from '../../air/index.ts';
import type { Station } from '../../profile/index.ts';

const DAY_MS = 86_400_000;
const MS_PER_DEGREE = DAY_MS / 360;

/** What the mean sun at a longitude is ahead of UTC, ms; nothing where the longitude is not known. */
export function solarShiftMs(longitude: number): number {
  return Number.isFinite(longitude) ? longitude * MS_PER_DEGREE : 0;
}

/** Number of the night a moment belongs to, from mean noon to mean noon: the days since 1970 of its evening. */
export function nightNumber(timeMs: number, longitude: number): number {
  return Math.floor((timeMs + solarShiftMs(longitude)) / DAY_MS - 0.5);
}

/** The date of a night's evening by the sun, `2024-05-21`. */
export function nightDate(number: number): string {
  return new Date(number * DAY_MS).toISOString().slice(0, 10);
}

/** Sun times of a night. */
export function sunOfNight(number: number, { latitude, longitude }: Station): Night {
  // Mean midnight lies well between the two true noons, whichever way the equation of time moves them.
  return nightOf((number + 1) * DAY_MS - solarShiftMs(longitude), latitude, longitude);
}

/** Whether the sun is down at a moment of that night; true where nobody knows. */
export function isDark(timeMs: number, sun: Night): boolean {
  if (sun.kind === 'unknown') return true;
  return timeMs >= sun.startMs && timeMs <= sun.endMs;
}

/** By row: the night's number, and 1 while the sun is down. @param timeMs ascending, so that each night's sun is sought once */
export function nightsOfRows(
  timeMs: Float64Array,
  station: Station,
): { readonly number: Int32Array; readonly dark: Uint8Array } {
  const number = new Int32Array(timeMs.length);
  const dark = new Uint8Array(timeMs.length);
  let sun: Night | null = null;
  for (let row = 0; row < timeMs.length; row++) {
    number[row] = nightNumber(timeMs[row]!, station.longitude);
    if (sun === null || number[row] !== number[row - 1]) sun = sunOfNight(number[row]!, station);
    dark[row] = Number(isDark(timeMs[row]!, sun));
  }
  return { number, dark };
}
