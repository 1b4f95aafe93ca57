// Whether a lidar's ranges can be right: gates that overlap are sometimes written as if they lay end to end.

/** Lidars for the lower atmosphere reach so far, m; common practice, without source. */
const FARTHEST = 20_000;
/** Noise of neighbouring gates correlates more than this only if they share samples. */
const SHARED = 0.5;

export interface RangeDoubt {
  /** What speaks against the ranges, a sentence. */
  readonly what: string;
  /** m between gates if they overlap as the noise says; NaN where it does not tell. */
  readonly likelySpacing: number;
}

/**
 * Looks at the ranges and at the noise of the farthest gates.
 * @param range m, ascending @param ratio signal of one sweep, rays times gates @param gates gates of a ray
 * @returns null when nothing speaks against the ranges
 */
export function rangeDoubt(range: Float64Array, ratio: Float64Array | null, gates: number): RangeDoubt | null {
  const farthest = range[gates - 1]!;
  if (!(farthest > FARTHEST)) return null;
  const spacing = (farthest - range[0]!) / Math.max(1, gates - 1);
  const said = `The ranges run to ${Math.round(farthest / 1000)} km, farther than such a lidar sees`;
  const shared = ratio === null ? 1 : sharedGates(ratio, gates);
  if (shared < 2) return { what: `${said}.`, likelySpacing: NaN };
  const likelySpacing = spacing / shared;
  return {
    what: `${said}, and the noise of neighbouring gates is alike as if each overlapped the next ${shared - 1}: the gates probably lie ${Number(likelySpacing.toPrecision(2))} m apart, not ${Number(spacing.toPrecision(3))} m.`,
    likelySpacing,
  };
}

/**
 * Gates that share samples: windows of n gates' length, shifted by one, correlate as 1 - lag/n, so that n is where the
 * correlation of pure noise falls to zero; read off the slope over the first lags.
 */
function sharedGates(ratio: Float64Array, gates: number): number {
  // The far half holds no echo, but for its last gates, where some writers pad.
  const from = gates >> 1;
  const to = gates - Math.ceil(gates / 50);
  const first = correlation(ratio, gates, from, to, 1);
  if (!(first > SHARED)) return 1;
  let lag = 1;
  while (lag < 100 && correlation(ratio, gates, from, to, lag + 1) > SHARED) lag++;
  const last = correlation(ratio, gates, from, to, lag);
  return Math.max(2, Math.round(lag / (1 - last)));
}

/** Of the noise about each ray's own mean, since the floor differs from ray to ray. */
function correlation(ratio: Float64Array, gates: number, from: number, to: number, lag: number): number {
  let product = 0;
  let square = 0;
  for (let row = 0; row < ratio.length; row += gates) {
    let sum = 0;
    let count = 0;
    for (let k = from; k < to; k++) {
      if (Number.isNaN(ratio[row + k]!)) continue;
      sum += ratio[row + k]!;
      count++;
    }
    const mean = sum / count;
    for (let k = from; k + lag < to; k++) {
      const a = ratio[row + k]! - mean;
      const b = ratio[row + k + lag]! - mean;
      if (Number.isNaN(a * b)) continue;
      product += a * b;
      square += (a * a + b * b) / 2;
    }
  }
  return product / square;
}
