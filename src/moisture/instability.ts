// How deep the moist air is and whether lifting it as a layer would overturn it.

import { equivalentPotentialTemperature, lclTemperature, mixingRatioOf, vapourPressureOf } from '../air/index.ts';
import type { AirColumn } from './air-column.ts';

/** m above ground: where the house looks for the moist layer's richest air and the greatest theta-e. */
const SEARCH_TOP = 3000;
/** m above ground: the fall of theta-e is followed up to here. */
const FALL_TOP = 6000;
/** m above ground: the moist layer's humidity is judged against the greatest value up to here. */
const MOIST_SEARCH_TOP = 1000;

export interface PotentialInstability {
  /** K and m above ground: greatest theta-e up to 3 km. */
  readonly greatest: number;
  readonly greatestHeight: number;
  /** K and m above ground: least theta-e above that, up to 6 km or the top of data. */
  readonly least: number;
  readonly leastHeight: number;
  /** K/m between the two; negative where layer lifting would overturn the air, NaN with fewer than two levels. */
  readonly slope: number;
}

/** Equivalent potential temperature of each level, K, by Bolton (1980) eq. 39 with eq. 15; NaN where not known. */
export function thetaEProfile(air: AirColumn): Float64Array {
  return air.temperature.map((temperature, k) => {
    const pressure = air.pressure[k]!;
    const humidity = air.specificHumidity[k]!;
    const vapour = vapourPressureOf(humidity, pressure);
    const lcl = lclTemperature(temperature, vapour);
    return equivalentPotentialTemperature(temperature, pressure, vapour, mixingRatioOf(humidity), lcl);
  });
}

/** Potential (layer) instability: theta-e that falls with height (Holton & Hakim 2013). */
export function potentialInstability(heightAgl: ArrayLike<number>, thetaE: ArrayLike<number>): PotentialInstability {
  const top = extremeLevel(heightAgl, thetaE, 0, SEARCH_TOP, 1);
  const least = top < 0 ? -1 : extremeLevel(heightAgl, thetaE, top + 1, FALL_TOP, -1);
  const valueAt = (level: number, values: ArrayLike<number>): number => (level < 0 ? NaN : values[level]!);
  const [greatest, greatestHeight] = [valueAt(top, thetaE), valueAt(top, heightAgl)];
  const [lowest, leastHeight] = [valueAt(least, thetaE), valueAt(least, heightAgl)];
  return {
    greatest,
    greatestHeight,
    least: lowest,
    leastHeight,
    slope: (lowest - greatest) / (leastHeight - greatestHeight),
  };
}

/**
 * Top of the moist layer, m above ground: where humidity first falls below half of its greatest value in the lowest
 * kilometre, linear between levels (common practice, without source).
 * @returns NaN where no level up to 1 km has humidity or the data end while the air is still moist
 */
export function moistLayerTop(heightAgl: ArrayLike<number>, specificHumidity: ArrayLike<number>): number {
  const richest = extremeLevel(heightAgl, specificHumidity, 0, MOIST_SEARCH_TOP, 1);
  if (richest < 0) return NaN;
  const half = specificHumidity[richest]! / 2;
  let below = richest;
  for (let k = richest + 1; k < heightAgl.length; k++) {
    const humidity = specificHumidity[k]!;
    if (Number.isNaN(humidity)) continue;
    if (humidity < half) {
      const weight = (specificHumidity[below]! - half) / (specificHumidity[below]! - humidity);
      return heightAgl[below]! + weight * (heightAgl[k]! - heightAgl[below]!);
    }
    below = k;
  }
  return NaN;
}

/** Level of the greatest (sense 1) or least (-1) value from a level up to a height, the lowest of equals; -1 for none. */
function extremeLevel(
  heightAgl: ArrayLike<number>,
  values: ArrayLike<number>,
  first: number,
  ceiling: number,
  sense: 1 | -1,
): number {
  let best = -1;
  for (let k = first; k < heightAgl.length && heightAgl[k]! <= ceiling; k++) {
    if (Number.isNaN(values[k])) continue;
    if (best < 0 || sense * (values[k]! - values[best]!) > 0) best = k;
  }
  return best;
}
