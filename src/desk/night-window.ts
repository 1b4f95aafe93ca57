// Which stretch of time belongs to one evening's picture: the night with its dusk and dawn, as far as data or sun say.

import { nightOf, type Night } from '../air/index.ts';
import type { Station } from '../profile/index.ts';

export interface NightWindow {
  readonly startMs: number;
  readonly endMs: number;
  readonly night: Night;
}

const HOUR_MS = 3_600_000;
/** The afternoon out of which the jet grows, and the morning in which it is mixed away. */
const BEFORE_SUNSET_MS = 2.5 * HOUR_MS;
const AFTER_SUNRISE_MS = 1.5 * HOUR_MS;
/** Where no sun times are known: so much of what lies behind, and a part of it ahead. */
const LOOK_BACK_MS = 24 * HOUR_MS;
const LOOK_AHEAD_SHARE = 1 / 8;

/**
 * The window around a moment.
 * @param timesMs valid times of the profiles at hand, ascending
 * @returns with sun times: from 2.5 h before sunset to 1.5 h after sunrise, widened to `atMs`. Without (position unknown,
 * sun up or down all day): up to 24 h back as far as there are data, and an eighth of that ahead.
 */
export function nightWindow(atMs: number, station: Station, timesMs: ArrayLike<number>): NightWindow {
  const night = nightOf(atMs, station.latitude, station.longitude);
  if (night.kind === 'night') {
    return {
      startMs: Math.min(atMs, night.startMs - BEFORE_SUNSET_MS),
      endMs: Math.max(atMs, night.endMs + AFTER_SUNRISE_MS),
      night,
    };
  }
  let first = 0;
  while (first < timesMs.length && timesMs[first]! < atMs - LOOK_BACK_MS) first++;
  const reaches = first < timesMs.length && timesMs[first]! < atMs;
  const startMs = reaches ? timesMs[first]! : atMs - HOUR_MS;
  return { startMs, endMs: atMs + Math.max(HOUR_MS, (atMs - startMs) * LOOK_AHEAD_SHARE), night };
}
