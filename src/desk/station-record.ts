// All that one station's instrument has measured up to a moment, of which only what is asked for is laid open.

import { distanceBetween } from '../air/index.ts';
import { profileAt, type Profile, type ProfileBlock, type Station } from '../profile/index.ts';
import { lowHumidity } from './transport-level.ts';

export interface StationRecord {
  readonly station: Station;
  /** UTC ms, ascending. */
  readonly timeMs: Float64Array;
  /** Mean specific humidity of the lowest 1500 m, kg/kg, in parallel; NaN where there is none. */
  readonly lowHumidity: Float64Array;
  /** Profiles valid between two moments, both included, and never later than the record's own. */
  between(fromMs: number, toMs: number): Profile[];
}

/** The record of a screened block. @param humidity as `lowHumidityOf` gives it, of the whole block */
export function stationRecord(
  block: ProfileBlock,
  station: Station,
  atMs: number,
  humidity: Float64Array,
): StationRecord {
  let count = 0;
  while (count < block.profileCount && block.timeMs[count]! <= atMs) count++;
  const timeMs = block.timeMs.subarray(0, count);
  return {
    station,
    timeMs,
    lowHumidity: humidity.subarray(0, count),
    between(fromMs, toMs) {
      const found: Profile[] = [];
      let index = timeMs.length;
      while (index > 0 && timeMs[index - 1]! > toMs) index--;
      for (index--; index >= 0 && timeMs[index]! >= fromMs; index--) found.push(profileAt(block, index));
      return found.reverse();
    },
  };
}

export function lowHumidityOf(block: ProfileBlock): Float64Array {
  if (block.specificHumidity === null) return new Float64Array(block.profileCount).fill(NaN);
  return Float64Array.from({ length: block.profileCount }, (_, index) => lowHumidity(profileAt(block, index)));
}

/** Instruments no further apart than this stand at one place, m. */
export const SAME_PLACE = 2000;

/** Of the records at one place the one with the most profiles; those without a position are left out. */
export function onePerPlace(records: Iterable<StationRecord>): StationRecord[] {
  const places: StationRecord[] = [];
  for (const record of [...records].sort((a, b) => b.timeMs.length - a.timeMs.length)) {
    const { station } = record;
    const apart = (other: StationRecord): boolean => distanceBetween(other.station, station) > SAME_PLACE;
    if (Number.isFinite(station.latitude + station.longitude) && places.every(apart)) places.push(record);
  }
  return places;
}
