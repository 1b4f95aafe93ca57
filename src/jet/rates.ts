// How fast a track changes, and what that makes of its phase.

/** Change an hour, by the slope of Theil (1950) and Sen (1968, J. Amer. Stat. Assoc. 63). */
export interface Rate {
  /** Per hour; NaN with fewer than three points. */
  readonly perHour: number;
  /** Half the width of the interval that holds the slope with 68 %, from Kendall's statistic as Sen gives it. */
  readonly uncertainty: number;
}

/** What a jet is doing. */
export type Phase = 'building' | 'steady' | 'easing' | 'ended';

const HOUR_MS = 3600_000;
/** Rates are taken over this much of a track, ms. */
const WINDOW_MS = 1.5 * HOUR_MS;
/** A change of speed slower than this, m/s an hour, is steady whatever its certainty. Our own choice. */
const STEADY = 0.3;

/** Median slope over all pairs of points in the last hour and a half, robust against stray points. */
export function rateOf<P extends { readonly timeMs: number }>(
  points: readonly P[],
  valueOf: (point: P, reference: P) => number,
): Rate {
  const last = points.at(-1);
  if (last === undefined) return { perHour: NaN, uncertainty: NaN };
  const recent = points
    .filter(({ timeMs }) => last.timeMs - timeMs <= WINDOW_MS)
    .map((point) => ({ timeMs: point.timeMs, value: valueOf(point, last) }))
    .filter(({ value }) => !Number.isNaN(value));
  const slopes: number[] = [];
  recent.forEach((to, k) => {
    for (const from of recent.slice(0, k)) slopes.push(((to.value - from.value) / (to.timeMs - from.timeMs)) * HOUR_MS);
  });
  if (recent.length < 3) return { perHour: NaN, uncertainty: NaN };
  slopes.sort((a, b) => a - b);
  const n = recent.length;
  const width = Math.sqrt((n * (n - 1) * (2 * n + 5)) / 18);
  const at = (rank: number): number => slopes[Math.min(slopes.length - 1, Math.max(0, Math.round(rank)))]!;
  const middle = (slopes.length - 1) / 2;
  return {
    perHour: (at(Math.floor(middle)) + at(Math.ceil(middle))) / 2,
    uncertainty: (at(middle + width / 2) - at(middle - width / 2)) / 2,
  };
}

/** Building or easing only where the rate of speed stands clear of its uncertainty. */
export function phaseOf(speedRate: Rate, ended: boolean): Phase {
  if (ended) return 'ended';
  const { perHour, uncertainty } = speedRate;
  if (!(Math.abs(perHour) > Math.max(STEADY, uncertainty))) return 'steady';
  return perHour > 0 ? 'building' : 'easing';
}
