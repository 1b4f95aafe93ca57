// The wind of a profile at a height between its levels.

import { eastward, northward } from '../air/index.ts';
import { gatherWind, windColumn, type Profile } from '../profile/index.ts';
import { between } from './column.ts';

/** Eastward and northward, m/s; NaN where not known. */
export interface WindVector {
  readonly u: number;
  readonly v: number;
}

const UNKNOWN: WindVector = { u: NaN, v: NaN };
const wind = windColumn();

/** Levels further apart than this, m, or than half the height, say nothing of what lies between. Our own choice. */
const WIDEST_GAP = 150;

/**
 * The wind at each height, components linear in height between the usable levels around it.
 * @param heights m above ground
 * @returns NaN outside the levels, across a wide gap and where a level has no direction
 */
export function windAtHeights(profile: Profile, heights: readonly number[]): WindVector[] {
  gatherWind(profile, wind);
  return heights.map(windAt);
}

function windAt(height: number): WindVector {
  const { count, heightAgl } = wind;
  let upper = 0;
  while (upper < count && heightAgl[upper]! < height) upper++;
  if (upper === count) return UNKNOWN;
  if (heightAgl[upper] === height) return vector(upper);
  if (upper === 0) return UNKNOWN;
  const lower = upper - 1;
  const gap = heightAgl[upper]! - heightAgl[lower]!;
  if (gap > Math.max(WIDEST_GAP, height / 2)) return UNKNOWN;
  const share = (height - heightAgl[lower]!) / gap;
  const below = vector(lower);
  const above = vector(upper);
  return { u: between(below.u, above.u, share), v: between(below.v, above.v, share) };
}

function vector(level: number): WindVector {
  const speed = wind.speed[level]!;
  const direction = wind.direction[level]!;
  return { u: eastward(speed, direction), v: northward(speed, direction) };
}
