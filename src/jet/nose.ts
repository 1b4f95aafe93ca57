// The one engine behind every criteria set: finds noses in a column of levels and judges them. Flat arrays, nothing
// allocated on the way, so that a scan over years and a single profile run the same code.

import type { Criteria } from './criteria.ts';

/**
 * What the engine reads: levels at or below the ceiling, ascending, height and speed known, perhaps followed by one point
 * at the ceiling itself. Reused from profile to profile.
 */
export interface NoseColumn {
  count: number;
  /** m above ground */
  heightAgl: Float64Array;
  /** m/s */
  speed: Float64Array;
  /** Standard uncertainty of the speed, m/s; read only where the criteria ask for it. */
  uncertainty: Float64Array;
  /** Whether levels reach the ceiling, so that a fall that lasts to the last point is no mere bound. */
  reachesCeiling: boolean;
}

/** Noses of a column, lowest first; positions are indices into the column. Reused. */
export interface NoseList {
  count: number;
  nose: Int32Array;
  /** Where the fall-off ends. */
  minimum: Int32Array;
  /** 1 where data stop below the ceiling while the speed still falls. */
  isBound: Uint8Array;
}

/**
 * Allowance on every threshold, m/s. Columns of a block are 32-bit floats: below 64 m/s each value is off by at most
 * 1.9e-6 m/s, so a difference by 3.8e-6. Reported speeds have at most three decimals, so no honest margin is this small.
 */
export const ALLOWANCE = 1e-5;

/** How many times its standard uncertainty a rise must reach to be more than the levels' uncertainty explains. */
export const RISE_FACTOR = 2;

export function noseColumn(capacity = 256): NoseColumn {
  return {
    count: 0,
    heightAgl: new Float64Array(capacity),
    speed: new Float64Array(capacity),
    uncertainty: new Float64Array(capacity),
    reachesCeiling: false,
  };
}

export function noseList(capacity = 256): NoseList {
  return {
    count: 0,
    nose: new Int32Array(capacity),
    minimum: new Int32Array(capacity),
    isBound: new Uint8Array(capacity),
  };
}

/** Finds every nose the criteria want looked at, with the end of its fall-off, into `out`. */
export function findNosesInto(column: NoseColumn, criteria: Criteria, out: NoseList): void {
  if (out.nose.length < column.count) Object.assign(out, noseList(2 * column.count));
  out.count = 0;
  if (column.count < 3) return;
  if (criteria.candidates === 'strongest') addStrongest(column, criteria, out);
  else addLocalMaxima(column, criteria, out);
}

/** The lowest of the greatest speeds, at an edge too; nothing lies above the top, so its fall-off is nought. */
function addStrongest(column: NoseColumn, criteria: Criteria, out: NoseList): void {
  const { heightAgl, speed, count } = column;
  if (heightAgl[0]! > criteria.noseCeiling) return;
  let nose = 0;
  for (let k = 1; k < count && heightAgl[k]! <= criteria.noseCeiling; k++) if (speed[k]! > speed[nose]!) nose = k;
  addNose(column, criteria, nose, out);
}

/**
 * Local maxima: the next lower level is strictly slower and the first different speed above is lower. A flat top counts
 * once, at its lowest level; one that runs to the last point, into a rise or down to the lowest level does not count.
 */
function addLocalMaxima(column: NoseColumn, criteria: Criteria, out: NoseList): void {
  const { heightAgl, speed, count } = column;
  const least = criteria.categories[0]!.speed - ALLOWANCE;
  const { noseCeiling } = criteria;
  // Only levels fast enough can be noses: the walk begins at the first of them and ends one above the last.
  let first = 1;
  while (first < count && speed[first]! < least) first++;
  let end = count - 1;
  while (end > first && speed[end - 1]! < least) end--;
  let rising = false;
  let top = 0;
  let below = speed[first - 1]!;
  for (let k = first; k <= end; k++) {
    const here = speed[k]!;
    if (here > below) {
      rising = true;
      top = k;
    } else if (here < below) {
      if (rising && below >= least && heightAgl[top]! <= noseCeiling) addNose(column, criteria, top, out);
      rising = false;
    }
    below = here;
  }
}

function addNose(column: NoseColumn, criteria: Criteria, nose: number, out: NoseList): void {
  const at = out.count++;
  const minimum =
    criteria.falloffTo === 'first-minimum'
      ? firstMinimum(column, nose)
      : criteria.falloffTo === 'layer-minimum'
        ? layerMinimum(column, nose)
        : risenMinimum(column, criteria.endingRise, nose);
  out.nose[at] = nose;
  // A fall that no rise has ended is told by the sign.
  const stillFalling = minimum < 0;
  out.minimum[at] = stillFalling ? ~minimum : minimum;
  out.isBound[at] = stillFalling && !column.reachesCeiling ? 1 : 0;
}

/** Up from the nose while the speed does not rise. @returns lowest index of the minimum, `~index` if the data end there */
function firstMinimum(column: NoseColumn, nose: number): number {
  const { speed, count } = column;
  let minimum = nose;
  let least = speed[nose]!;
  for (let k = nose + 1; k < count; k++) {
    const here = speed[k]!;
    if (here > speed[k - 1]!) return minimum;
    if (here < least) {
      minimum = k;
      least = here;
    }
  }
  return ~minimum;
}

/** The lowest speed anywhere above the nose. @returns its index, `~index` if it is the last point */
function layerMinimum(column: NoseColumn, nose: number): number {
  const { speed, count } = column;
  if (nose === count - 1) return ~nose;
  let minimum = nose + 1;
  for (let k = nose + 2; k < count; k++) if (speed[k]! < speed[minimum]!) minimum = k;
  return minimum === count - 1 ? ~minimum : minimum;
}

/** The least speed before it has risen by the ending rise, or above the nose. @returns its index, `~index` if it never has */
function risenMinimum(column: NoseColumn, endingRise: Criteria['endingRise'], nose: number): number {
  const { speed, uncertainty, count } = column;
  const peak = speed[nose]!;
  let minimum = nose;
  let least = peak;
  for (let k = nose + 1; k < count; k++) {
    const here = speed[k]!;
    if (here > peak) return minimum;
    if (here < least) {
      minimum = k;
      least = here;
    } else if (here > least) {
      const rise = endingRise === 'uncertainty' ? explainedRise(uncertainty[minimum]!, uncertainty[k]!) : endingRise;
      if (here - least >= rise - ALLOWANCE) return minimum;
    }
  }
  return ~minimum;
}

/** The greatest difference between two levels, m/s, that their uncertainty may well explain. */
export function explainedRise(oneUncertainty: number, otherUncertainty: number): number {
  return RISE_FACTOR * Math.sqrt(oneUncertainty * oneUncertainty + otherUncertainty * otherUncertainty);
}

/** The same as the fall-off, downward: index of the minimum below, by the rule that ends the fall-off above. */
export function minimumBelow(column: NoseColumn, criteria: Criteria, nose: number): number {
  const { speed, uncertainty } = column;
  const { endingRise, falloffTo } = criteria;
  let minimum = nose;
  let least = speed[nose]!;
  for (let k = nose - 1; k >= 0; k--) {
    const here = speed[k]!;
    if (falloffTo === 'first-minimum' && here > speed[k + 1]!) break;
    if (falloffTo === 'risen-minimum' && here > least) {
      const rise = endingRise === 'uncertainty' ? explainedRise(uncertainty[minimum]!, uncertainty[k]!) : endingRise;
      if (here > speed[nose]! || here - least >= rise - ALLOWANCE) break;
    }
    if (here < least) {
      minimum = k;
      least = here;
    }
  }
  return minimum;
}

/** Highest category the i-th nose of the list meets; -1 when none. */
export function categoryOf(column: NoseColumn, criteria: Criteria, list: NoseList, i: number): number {
  const { speed } = column;
  const nose = list.nose[i]!;
  const peak = speed[nose]! + ALLOWANCE;
  const least = speed[list.minimum[i]!]!;
  const falloff = peak - least;
  let category = criteria.categories.length - 1;
  for (; category >= 0; category--) {
    const wanted = criteria.categories[category]!;
    if (peak >= wanted.speed && falloff >= wanted.falloff) break;
  }
  if (category < 0) return -1;
  if (criteria.ratioAbove > 1 && !(peak >= criteria.ratioAbove * least)) return -1;
  if (criteria.riseBelow > 0) {
    const below = speed[minimumBelow(column, criteria, nose)]!;
    if (!(peak - below >= criteria.riseBelow)) return -1;
  }
  return category;
}

/**
 * Which nose of the list the criteria choose: the lowest that meets them, or the best category, then the greater speed,
 * then the lower height.
 * @returns position in the list; -1 when none meets the criteria
 */
export function chooseNose(column: NoseColumn, criteria: Criteria, list: NoseList): number {
  let chosen = -1;
  let best = -1;
  let peak = -Infinity;
  for (let i = 0; i < list.count; i++) {
    const category = categoryOf(column, criteria, list, i);
    if (category < 0) continue;
    if (criteria.candidates !== 'every-maximum') return i;
    const speed = column.speed[list.nose[i]!]!;
    if (category < best || (category === best && speed <= peak)) continue;
    chosen = i;
    best = category;
    peak = speed;
  }
  return chosen;
}
