// Where an ascent turns into a descent: some files follow a sonde until it is down again.

/** A descent is told by so many levels at least, over so many metres at least. */
const FEWEST_LEVELS = 20;
const LEAST_FALL = 500;
/** This share of the steps goes the way of the whole. */
const STEADY = 0.8;

/**
 * Place of the first level after the highest one where the levels first rise and then fall again; -1 where they do not.
 * A profile given from the top down does not rise first and is none.
 * @param heights m, in the order measured; NaN is passed over
 */
export function descentStart(heights: ArrayLike<number>): number {
  let top = 0;
  for (let k = 1; k < heights.length; k++) if (heights[k]! > heights[top]! || Number.isNaN(heights[top]!)) top = k;
  const last = heights.length - 1;
  const fallen = heights[top]! - lowestAfter(heights, top);
  if (!(fallen >= LEAST_FALL) || top < FEWEST_LEVELS || last - top < FEWEST_LEVELS) return -1;
  return share(heights, 0, top) >= STEADY && share(heights, top, last) <= 1 - STEADY ? top + 1 : -1;
}

function lowestAfter(heights: ArrayLike<number>, top: number): number {
  let lowest = heights[top]!;
  for (let k = top + 1; k < heights.length; k++) if (heights[k]! < lowest) lowest = heights[k]!;
  return lowest;
}

/** Share of the steps between two places that do not fall. */
function share(heights: ArrayLike<number>, from: number, to: number): number {
  let rising = 0;
  for (let k = from; k < to; k++) if (!(heights[k + 1]! < heights[k]!)) rising++;
  return rising / (to - from);
}
