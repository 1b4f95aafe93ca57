// The power law of wind and height, V = V_ref (z / z_ref)^alpha (IEC 61400-1), fitted.

/** A fitted power law, anchored at the geometric means of the heights and speeds it was fitted to. */
export interface PowerLaw {
  /** The shear exponent alpha; NaN when not computable. */
  readonly exponent: number;
  /** m */
  readonly referenceHeight: number;
  /** m/s */
  readonly referenceSpeed: number;
  /** How many levels took part. */
  readonly used: number;
}

/**
 * Shear exponent by ordinary least squares of ln V on ln z.
 * @param heights m; levels with no height above 0 are passed over
 * @param speeds m/s, same length; NaN and calm levels are passed over
 * @returns NaN with fewer than two different heights, `used` then still counts the levels kept
 */
export function shearExponent(heights: ArrayLike<number>, speeds: ArrayLike<number>): PowerLaw {
  let used = 0;
  let sumX = 0;
  let sumY = 0;
  for (let k = 0; k < heights.length; k++) {
    if (!isUsable(heights[k]!, speeds[k]!)) continue;
    used++;
    sumX += Math.log(heights[k]!);
    sumY += Math.log(speeds[k]!);
  }
  const meanX = sumX / used;
  const meanY = sumY / used;
  let squares = 0;
  let products = 0;
  for (let k = 0; k < heights.length; k++) {
    if (!isUsable(heights[k]!, speeds[k]!)) continue;
    const x = Math.log(heights[k]!) - meanX;
    squares += x * x;
    products += x * (Math.log(speeds[k]!) - meanY);
  }
  // Equal heights leave rounding noise in the sum of squares, of the order of 1e-30.
  if (!(squares > 1e-20)) return { exponent: NaN, referenceHeight: NaN, referenceSpeed: NaN, used };
  return { exponent: products / squares, referenceHeight: Math.exp(meanX), referenceSpeed: Math.exp(meanY), used };
}

/** Speed of a power law at a height, m/s. */
export function powerLawSpeed(law: PowerLaw, height: number): number {
  return law.referenceSpeed * Math.pow(height / law.referenceHeight, law.exponent);
}

function isUsable(height: number, speed: number): boolean {
  return height > 0 && speed > 0 && height < Infinity && speed < Infinity;
}
