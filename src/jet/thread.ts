// A calm line through scattered points: what a nose did between profiles is slow, what single profiles say of it is not.

/** A smoothed series and its standard deviation, same length as the series given. */
export interface Thread {
  readonly value: Float64Array;
  readonly spread: Float64Array;
}

const HOUR_MS = 3600_000;
/** Rounds of reweighting, and degrees of freedom of the noise taken: few, so that a stray point loses its say. */
const ROUNDS = 5;
const FREEDOM = 4;

/**
 * Smooths a series as a random walk seen with noise (a Kalman smoother, here as one system of three diagonals), the noise
 * of Student's distribution, by reweighting (Lange, Little & Taylor 1989, J. Amer. Stat. Assoc. 84).
 * @param timeMs ascending
 * @param spread standard deviation of each point, positive
 * @param wander standard deviation of what the true value changes in an hour
 */
export function threadThrough(
  timeMs: readonly number[],
  value: readonly number[],
  spread: readonly number[],
  wander: number,
): Thread {
  const n = value.length;
  const step = Float64Array.from({ length: n }, (_, k) =>
    k === 0 ? 0 : HOUR_MS / (wander * wander * (timeMs[k]! - timeMs[k - 1]!)),
  );
  const weight = Float64Array.from(spread, (one) => 1 / (one * one));
  const smooth = new Float64Array(n);
  const variance = new Float64Array(n);
  for (let round = 0; round < ROUNDS; round++) {
    solve(value, weight, step, smooth, variance);
    for (let k = 0; k < n; k++) {
      const noise = spread[k]! * spread[k]!;
      const off = value[k]! - smooth[k]!;
      weight[k] = (FREEDOM + 1) / (FREEDOM + (off * off) / noise) / noise;
    }
  }
  solve(value, weight, step, smooth, variance);
  return { value: smooth, spread: variance.map(Math.sqrt) };
}

/** Solves for the smooth values, forward and backward, and fills their variances. */
function solve(
  value: readonly number[],
  weight: Float64Array,
  step: Float64Array,
  smooth: Float64Array,
  variance: Float64Array,
): void {
  const n = value.length;
  const diagonal = new Float64Array(n);
  for (let k = 0; k < n; k++) {
    const after = k + 1 < n ? step[k + 1]! : 0;
    diagonal[k] = weight[k]! + step[k]! + after;
    smooth[k] = weight[k]! * value[k]!;
    if (k === 0) continue;
    diagonal[k]! -= (step[k]! * step[k]!) / diagonal[k - 1]!;
    smooth[k]! += (step[k]! * smooth[k - 1]!) / diagonal[k - 1]!;
  }
  for (let k = n - 1; k >= 0; k--) {
    const after = k + 1 < n ? step[k + 1]! : 0;
    smooth[k] = (smooth[k]! + (k + 1 < n ? after * smooth[k + 1]! : 0)) / diagonal[k]!;
    // Diagonal of the inverse of a matrix of three diagonals, from the last upward.
    variance[k] = 1 / diagonal[k]! + (k + 1 < n ? (after / diagonal[k]!) ** 2 * variance[k + 1]! : 0);
  }
}
