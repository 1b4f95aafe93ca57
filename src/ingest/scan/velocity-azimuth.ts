// The wind above a scanning instrument out of radial velocities on a cone: velocity-azimuth display, the first harmonic
// of Browning & Wexler (1968, J. Appl. Meteor. 7), as plain least squares so that lost beams do no harm.

const RADIANS = Math.PI / 180;

/** Beams of one range gate; the first `count` of each array. Angles in degrees, velocities in m/s away from the instrument. */
export interface Beams {
  count: number;
  readonly azimuth: Float64Array;
  readonly elevation: Float64Array;
  readonly velocity: Float64Array;
}

export interface ConeFit {
  /** Eastward, northward, upward, m/s. */
  readonly u: number;
  readonly v: number;
  readonly w: number;
  readonly beams: number;
  /** Root of the mean squared residual, m/s. */
  readonly rmsResidual: number;
  /** Standard deviation of a beam about the fit, m/s: the squared residuals over (beams - 3). */
  readonly standardError: number;
  /** Standard uncertainty of the horizontal speed, m/s, from that deviation and the beams' geometry. */
  readonly speedUncertainty: number;
  /** How well the beams' directions tell the components apart: 1 for a full circle, large for a narrow sector. */
  readonly condition: number;
}

/** Beams for a fit that still has a residual to judge it by. */
export const LEAST_BEAMS = 4;

/**
 * Least squares of vr = u sin(az) cos(el) + v cos(az) cos(el) + w sin(el), equal weights.
 * @param leastDeviation m/s: no beam is taken to be better than this
 * @returns null with fewer than four beams or when their directions cannot tell the components apart
 */
export function fitCone(beams: Beams, leastDeviation = 0): ConeFit | null {
  const { count, azimuth, elevation, velocity } = beams;
  if (count < LEAST_BEAMS) return null;
  // Sums of the normal equations, a[i][j] = sum of x_i x_j.
  let a00 = 0;
  let a01 = 0;
  let a02 = 0;
  let a11 = 0;
  let a12 = 0;
  let a22 = 0;
  let b0 = 0;
  let b1 = 0;
  let b2 = 0;
  for (let k = 0; k < count; k++) {
    const level = Math.cos(elevation[k]! * RADIANS);
    const x0 = Math.sin(azimuth[k]! * RADIANS) * level;
    const x1 = Math.cos(azimuth[k]! * RADIANS) * level;
    const x2 = Math.sin(elevation[k]! * RADIANS);
    const y = velocity[k]!;
    a00 += x0 * x0;
    a01 += x0 * x1;
    a02 += x0 * x2;
    a11 += x1 * x1;
    a12 += x1 * x2;
    a22 += x2 * x2;
    b0 += x0 * y;
    b1 += x1 * y;
    b2 += x2 * y;
  }
  const condition = conditionOf(a00, a01, a02, a11, a12, a22);
  if (!(condition < WORST_CONDITION)) return null;
  // Inverse of the symmetric matrix by its cofactors.
  const c00 = a11 * a22 - a12 * a12;
  const c01 = a02 * a12 - a01 * a22;
  const c02 = a01 * a12 - a02 * a11;
  const c11 = a00 * a22 - a02 * a02;
  const c12 = a01 * a02 - a00 * a12;
  const c22 = a00 * a11 - a01 * a01;
  const determinant = a00 * c00 + a01 * c01 + a02 * c02;
  const u = (c00 * b0 + c01 * b1 + c02 * b2) / determinant;
  const v = (c01 * b0 + c11 * b1 + c12 * b2) / determinant;
  const w = (c02 * b0 + c12 * b1 + c22 * b2) / determinant;

  let squares = 0;
  for (let k = 0; k < count; k++) {
    const level = Math.cos(elevation[k]! * RADIANS);
    const fitted =
      (u * Math.sin(azimuth[k]! * RADIANS) + v * Math.cos(azimuth[k]! * RADIANS)) * level +
      w * Math.sin(elevation[k]! * RADIANS);
    squares += (velocity[k]! - fitted) ** 2;
  }
  const standardError = Math.sqrt(squares / (count - 3));
  const variance = Math.max(standardError, leastDeviation) ** 2 / determinant;
  const speedSquared = u * u + v * v;
  // The variance of speed along the wind; in calm, that of the worse component.
  const speedVariance =
    speedSquared > 0
      ? (variance * (u * u * c00 + 2 * u * v * c01 + v * v * c11)) / speedSquared
      : variance * Math.max(c00, c11);
  return {
    u,
    v,
    w,
    beams: count,
    rmsResidual: Math.sqrt(squares / count),
    standardError,
    speedUncertainty: Math.sqrt(speedVariance),
    condition,
  };
}

/** Beyond this the components cannot be told apart: beams within about a sixth of a circle. */
const WORST_CONDITION = 50;

/** Condition number of the directions, each component scaled to the same length so that the elevation does not count. */
function conditionOf(a00: number, a01: number, a02: number, a11: number, a12: number, a22: number): number {
  const p = a01 / Math.sqrt(a00 * a11);
  const q = a02 / Math.sqrt(a00 * a22);
  const r = a12 / Math.sqrt(a11 * a22);
  // Eigenvalues of a symmetric 3 x 3 matrix with ones on its diagonal, by the cosine form of the cubic's roots.
  const spread = Math.sqrt((p * p + q * q + r * r) / 3);
  if (Number.isNaN(spread)) return Infinity;
  if (spread === 0) return 1;
  const cosine = Math.min(1, Math.max(-1, (p * q * r) / spread ** 3));
  const angle = Math.acos(cosine) / 3;
  const largest = 1 + 2 * spread * Math.cos(angle);
  const least = 1 + 2 * spread * Math.cos(angle + (2 * Math.PI) / 3);
  return least > 0 ? Math.sqrt(largest / least) : Infinity;
}
