// How far the disc's numbers may be off, carried from the uncertainty of the levels, each measured level taken as independent.

import type { ScannedLevels } from './fleet-scan.ts';
import type { Between, DiscPlan } from './plan.ts';

/** One standard deviation each; NaN where the number itself is not known. */
export interface DiscUncertainty {
  /** m/s */
  readonly hubSpeed: number;
  /** m/s */
  readonly equivalentSpeed: number;
  readonly shearExponent: number;
  /** degrees over the disc */
  readonly veer: number;
}

const DEGREES = 180 / Math.PI;

/**
 * Linear error propagation. Errors of the vector are taken as equal along and across the wind, so that direction is
 * uncertain by the speed's uncertainty over the speed.
 * @param sigma standard uncertainty of each scanned level's speed, m/s
 * @param origin measured level behind each scanned level: what is continued from one level errs with it
 */
export function discUncertainty(
  plan: DiscPlan,
  levels: Readonly<ScannedLevels>,
  sigma: ArrayLike<number>,
  origin: ArrayLike<number>,
  numbers: { readonly equivalentSpeed: number; readonly bottomSpeed: number; readonly topSpeed: number },
): DiscUncertainty {
  const { speed } = levels;
  const slices = byOrigin(plan.first, plan.share, (level, share) => share * speed[level]! ** 2 * sigma[level]!, origin);
  const fit = byOrigin(
    plan.fitFirst,
    plan.fitWeight,
    (level, weight) => (speed[level]! > 0 ? (weight * sigma[level]!) / speed[level]! : 0),
    origin,
  );
  const bottom = between(sigma, plan.bottom) / numbers.bottomSpeed;
  const top = between(sigma, plan.top) / numbers.topSpeed;
  return {
    hubSpeed: between(sigma, plan.hub),
    equivalentSpeed: numbers.equivalentSpeed > 0 ? slices / numbers.equivalentSpeed ** 2 : between(sigma, plan.hub),
    shearExponent: plan.fitWeight.length > 0 ? fit : NaN,
    veer: levels.directed ? DEGREES * Math.hypot(bottom, top) : NaN,
  };
}

/** Adds what comes from one measured level as it is, and what comes from different ones in squares. */
function byOrigin(
  first: number,
  weights: Float64Array,
  term: (level: number, weight: number) => number,
  origin: ArrayLike<number>,
): number {
  const sums = new Map<number, number>();
  weights.forEach((weight, k) => {
    const from = origin[first + k]!;
    sums.set(from, (sums.get(from) ?? 0) + term(first + k, weight));
  });
  let squares = 0;
  for (const sum of sums.values()) squares += sum * sum;
  return Math.sqrt(squares);
}

/** Uncertainty of a value between two levels of independent error. */
function between(sigma: ArrayLike<number>, at: Between): number {
  if (at.below < 0) return NaN;
  if (at.weight === 0) return sigma[at.below]!;
  return Math.hypot(sigma[at.below]! * (1 - at.weight), sigma[at.below + 1]! * at.weight);
}
