// Distinct noses of a smooth profile: local maxima that stand out from each other, each with the stretch of levels that
// belongs to it, from the minimum below to the minimum above.

/** A nose of the smooth curve and its stretch of levels; indices into the column, all inclusive. */
export interface Basin {
  readonly nose: number;
  readonly lowest: number;
  readonly highest: number;
}

/** A nose that stands out by less than this, m/s, is no nose of its own, however certain the levels. Our own choice. */
const LEAST_PROMINENCE = 1;
/** And by so many times the uncertainty of its level. */
const PROMINENCE_FACTOR = 2;

/**
 * Splits a column at the minima between its distinct noses. A maximum that stands out from the saddle to a greater one by
 * less than twice the uncertainty of its level, or by less than 1 m/s, is merged into it.
 * @param speed m/s, smooth, `count` values
 * @param uncertainty m/s of the levels the curve was drawn through
 * @returns lowest first; maxima at the lowest or highest level are no noses, but hold their stretch against others
 */
export function basinsOf(speed: ArrayLike<number>, uncertainty: ArrayLike<number>, count: number): Basin[] {
  const basins = stretches(speed, count);
  for (;;) {
    let weakest = -1;
    let least = 1;
    basins.forEach((basin, i) => {
      if (basins.length === 1) return;
      const peak = speed[basin.nose]!;
      const saddleBelow = i > 0 ? speed[basin.lowest]! : -Infinity;
      const saddleAbove = i < basins.length - 1 ? speed[basin.highest]! : -Infinity;
      const prominence =
        (peak - Math.max(saddleBelow, saddleAbove)) /
        Math.max(LEAST_PROMINENCE, PROMINENCE_FACTOR * uncertainty[basin.nose]!);
      if (prominence < least) {
        least = prominence;
        weakest = i;
      }
    });
    if (weakest < 0) break;
    mergeOver(basins, weakest, speed);
  }
  return basins.filter(({ nose }) => nose > 0 && nose < count - 1);
}

/** Every local maximum, edges included, with its stretch; neighbours share the level of the minimum between them. */
function stretches(speed: ArrayLike<number>, count: number): Basin[] {
  const basins: Basin[] = [];
  let lowest = 0;
  let nose = 0;
  let falling = false;
  for (let k = 1; k < count; k++) {
    const change = speed[k]! - speed[k - 1]!;
    if (change > 0) {
      if (falling) {
        basins.push({ nose, lowest, highest: k - 1 });
        lowest = k - 1;
        falling = false;
      }
      nose = k;
    } else if (change < 0) falling = true;
  }
  if (count > 0) basins.push({ nose, lowest, highest: count - 1 });
  return basins;
}

/** Joins a basin to its neighbour over the higher saddle, in place; the greater maximum stays. */
function mergeOver(basins: Basin[], i: number, speed: ArrayLike<number>): void {
  const basin = basins[i]!;
  const saddleBelow = i > 0 ? speed[basin.lowest]! : -Infinity;
  const saddleAbove = i < basins.length - 1 ? speed[basin.highest]! : -Infinity;
  const first = saddleBelow >= saddleAbove ? i - 1 : i;
  const lower = basins[first]!;
  const upper = basins[first + 1]!;
  const nose = speed[upper.nose]! > speed[lower.nose]! ? upper.nose : lower.nose;
  basins.splice(first, 2, { nose, lowest: lower.lowest, highest: upper.highest });
}
