// The wind that carries the moist air: at which height, how strong, and how much it varies about that height and time.

import { eastward, northward } from '../air/index.ts';
import { airColumn, fluxOf, type WayWind } from '../moisture/index.ts';
import { gatherWind, windColumn, type Profile, type Station } from '../profile/index.ts';

/** m above ground: up to here the greatest flux is sought. */
const HIGHEST = 3000;
/** Levels so far from the transport level, m, count with it. Our own choice. */
const AROUND = 150;
/** Standard uncertainty of a component where a single level is all there is, m/s; common practice, without source. */
const SINGLE = 1.5;
/** m above ground: humidity up to here tells whether moist air has come. */
const MOIST_DEPTH = 1500;

/** Height of the greatest flux of vapour up to 3 km, m above ground; NaN without humidity or wind. */
export function transportLevel(profile: Profile): number {
  const { count, heightAgl, density, specificHumidity, u, v } = airColumn(profile);
  let [level, greatest] = [NaN, -Infinity];
  for (let k = 0; k < count && heightAgl[k]! <= HIGHEST; k++) {
    const flux = fluxOf(density[k]!, specificHumidity[k]!, Math.hypot(u[k]!, v[k]!));
    if (flux > greatest) [level, greatest] = [heightAgl[k]!, flux];
  }
  return level;
}

/**
 * Mean wind about a height over several profiles of one station; its uncertainty is the spread of the levels and times.
 * Null where no level is near enough.
 */
export function windAbout(station: Station, profiles: readonly Profile[], level: number): WayWind | null {
  const u: number[] = [];
  const v: number[] = [];
  for (const profile of profiles) {
    const wind = gatherWind(profile, windColumn(profile.levelCount));
    for (let k = 0; k < wind.count; k++) {
      if (!(Math.abs(wind.heightAgl[k]! - level) <= AROUND) || Number.isNaN(wind.direction[k]!)) continue;
      u.push(eastward(wind.speed[k]!, wind.direction[k]!));
      v.push(northward(wind.speed[k]!, wind.direction[k]!));
    }
  }
  const timeMs = profiles.at(-1)?.timeMs ?? NaN;
  if (u.length === 0) return null;
  const spread = u.length === 1 ? SINGLE : Math.sqrt((varianceOf(u) + varianceOf(v)) / 2);
  return { station, timeMs, u: meanOf(u), v: meanOf(v), uncertainty: spread };
}

/** Mean specific humidity of the lowest 1500 m as far as data reach, kg/kg; NaN with fewer than two levels of it. */
export function lowHumidity(profile: Profile): number {
  const { count, heightAgl, specificHumidity } = airColumn(profile);
  let [sum, depth, below] = [0, 0, -1];
  for (let k = 0; k < count && heightAgl[k]! <= MOIST_DEPTH; k++) {
    if (Number.isNaN(specificHumidity[k]!)) continue;
    if (below >= 0) {
      const step = heightAgl[k]! - heightAgl[below]!;
      sum += (step * (specificHumidity[k]! + specificHumidity[below]!)) / 2;
      depth += step;
    }
    below = k;
  }
  return depth > 0 ? sum / depth : NaN;
}

function meanOf(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

function varianceOf(values: readonly number[]): number {
  const mean = meanOf(values);
  return values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1);
}
