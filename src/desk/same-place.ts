// Which feeds stand at one place, so that their winds are winds of the same discs.

import { distanceBetween } from '../air/index.ts';
import type { Instrument } from '../profile/index.ts';
import type { FeedName } from './feed-name.ts';

/** Instruments nearer to each other than this, m along the ground and up, stand at one place. Our own choice. */
const NEAR = 1000;
const LEVEL = 60;

/** What stands and measures winds above itself; a balloon drifts away, a model is no instrument. */
const STANDING: ReadonlySet<Instrument> = new Set<Instrument>(['mast', 'lidar', 'sodar', 'wind-profiler', 'radar']);

/** Whether two feeds measure at one place: several instruments of one station, or stations within a kilometre. */
export function standTogether(a: FeedName, b: FeedName): boolean {
  if (a.key === b.key || !STANDING.has(a.instrument) || !STANDING.has(b.instrument)) return false;
  if (a.station.id === b.station.id) return true;
  const rise = Math.abs(a.station.elevation - b.station.elevation);
  return distanceBetween(a.station, b.station) <= NEAR && !(rise > LEVEL);
}
