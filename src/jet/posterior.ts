// What the true wind may have been, given uncertain levels: a smooth curve through them and its scatter.
//
// The true profile is taken as smooth in height, its curvature as independent from level to level with a variance that
// falls with height (a smoothing spline in its Bayesian form: Wahba 1978, J. Roy. Stat. Soc. B 40; as a Gaussian Markov
// field: Rue & Held 2005). Precision is then a matrix with five diagonals; its Cholesky factor gives mean and samples in a
// handful of operations a level. How rough the profile is and how noisy its levels are is weighed by marginal likelihood.

import type { WindColumn } from '../profile/index.ts';
import type { UncertaintyOrigin } from './uncertainty.ts';

/** Gaussian posterior of the speeds of a column. Reused from profile to profile. */
export interface Posterior {
  count: number;
  /** m/s */
  mean: Float64Array;
  /** Standard uncertainty taken for each level after weighing the roughness, m/s. */
  uncertainty: Float64Array;
  /** Cholesky factor of the precision: one over its diagonal, for divisions are slow, and the two below it. */
  inverse: Float64Array;
  below1: Float64Array;
  below2: Float64Array;
  /** One over the variance of each level. */
  precision: Float64Array;
  /** Precision of the smooth curve alone, same form, and work space. */
  smooth0: Float64Array;
  smooth1: Float64Array;
  smooth2: Float64Array;
}

export function posterior(capacity = 256): Posterior {
  const column = (): Float64Array => new Float64Array(capacity);
  return {
    count: 0,
    mean: column(),
    uncertainty: column(),
    inverse: column(),
    below1: column(),
    below2: column(),
    precision: column(),
    smooth0: column(),
    smooth1: column(),
    smooth2: column(),
  };
}

/**
 * Intensity of the curvature of wind profiles, (m/s/m2)2 m: at 100 m, and the least aloft. From the true profiles of
 * simulated nights, widened aloft because the real air has layers; the likelihood scales it for each profile.
 */
const CURVATURE_AT_100M = 5e-6;
const CURVATURE_LEAST = 3e-8;

/** Factors tried on the curvature relative to the noise, and on the noise. */
const RATIOS = [0.01, 0.1, 1, 10, 100];
const NOISE_FACTORS = [0.25, 0.35, 0.5, 0.7, 1, 1.4, 2, 2.8, 4];
/** Standard deviation of ln(noise factor) beforehand: stated uncertainties are trusted more than assumed ones. */
const NOISE_DOUBT: Readonly<Record<UncertaintyOrigin, number>> = { stated: 0.15, assumed: 0.7 };
/** The same for the curvature ratio. */
const RATIO_DOUBT = 2.5;

/** Fits the posterior to the first `count` levels of a column with complete uncertainties. */
export function fitPosteriorInto(wind: WindColumn, count: number, origin: UncertaintyOrigin, out: Posterior): void {
  // Two more than levels: see `departuresInto`.
  if (out.mean.length < count + 2) Object.assign(out, posterior(2 * count + 2));
  out.count = count;
  fillSmoothness(wind, count, out);
  out.uncertainty.set(wind.speedUncertainty.subarray(0, count));
  widenWild(wind, out);
  weigh(wind, origin, out);
}

/** Room for two pairs of samples. */
export type SampleQuad = readonly [Float64Array, Float64Array, Float64Array, Float64Array];

export function sampleQuad(capacity: number): SampleQuad {
  return [0, 1, 2, 3].map(() => new Float64Array(capacity)) as unknown as SampleQuad;
}

/**
 * Two pairs of samples of the true speeds, m/s by level. A pair comes of independent standard normal numbers, its members
 * lie as far from the mean, one on either side, and are equally likely.
 * @param from place in `normal` of the first pair's numbers; the second pair's begin `stride` further on
 */
export function samplesInto(
  fit: Posterior,
  normal: Float64Array,
  from: number,
  stride: number,
  [one, two, three, four]: SampleQuad,
): void {
  const { count, mean, inverse, below1, below2 } = fit;
  // Beyond the top nothing pulls: zeros there spare the loop its questions.
  below1[count] = 0;
  below2[count] = 0;
  below2[count + 1] = 0;
  let place = (from + count - 1) % normal.length;
  let otherPlace = (from + stride + count - 1) % normal.length;
  let above1 = 0;
  let above2 = 0;
  let other1 = 0;
  let other2 = 0;
  // Each departure waits for the one above: two pairs side by side fill the wait.
  for (let k = count - 1; k >= 0; k--) {
    const pull1 = below1[k + 1]!;
    const pull2 = below2[k + 2]!;
    const scale = inverse[k]!;
    const middle = mean[k]!;
    const departure = (normal[place]! - pull2 * above2 - pull1 * above1) * scale;
    const other = (normal[otherPlace]! - pull2 * other2 - pull1 * other1) * scale;
    above2 = above1;
    above1 = departure;
    other2 = other1;
    other1 = other;
    one[k] = atLeastCalm(middle + departure);
    two[k] = atLeastCalm(middle - departure);
    three[k] = atLeastCalm(middle + other);
    four[k] = atLeastCalm(middle - other);
    place = place === 0 ? normal.length - 1 : place - 1;
    otherPlace = otherPlace === 0 ? normal.length - 1 : otherPlace - 1;
  }
}

/** Quicker than Math.max, which must think of signed zeros. */
function atLeastCalm(speed: number): number {
  return speed > 0 ? speed : 0;
}

/** Falls with the power 2.5 of height, which a root gives sooner than a power; lowest values as at 20 m. */
function curvatureAt(height: number): number {
  const hundreds = Math.max(height, 20) / 100;
  return CURVATURE_AT_100M / (hundreds * hundreds * Math.sqrt(hundreds)) + CURVATURE_LEAST;
}

/** Spacing of levels, m, from which on each may stand for a bend of its own. Our own choice. */
const COARSE = 60;

/**
 * How much more curvature is allowed where levels are far apart. Gates sample whatever there is; a sounding's significant
 * levels are chosen where the wind bends (WMO FM 35), so a lone fast one is the nose and not noise about a smooth curve.
 */
function coarseness(spacing: number): number {
  return spacing > COARSE ? (spacing / COARSE) ** 2 : 1;
}

/** Sum of squared second derivatives, each over its share of height, as a matrix of five diagonals. */
function fillSmoothness(wind: WindColumn, count: number, out: Posterior): void {
  const { smooth0, smooth1, smooth2 } = out;
  smooth0.fill(0, 0, count);
  smooth1.fill(0, 0, count);
  smooth2.fill(0, 0, count);
  for (let k = 1; k < count - 1; k++) {
    const height = wind.heightAgl[k]!;
    const lower = height - wind.heightAgl[k - 1]!;
    const upper = wind.heightAgl[k + 1]! - height;
    const a = 2 / (lower * (lower + upper));
    const c = 2 / (upper * (lower + upper));
    const b = -a - c;
    const spacing = (lower + upper) / 2;
    const weight = spacing / (curvatureAt(height) * coarseness(spacing));
    smooth0[k - 1]! += weight * a * a;
    smooth0[k]! += weight * b * b;
    smooth0[k + 1]! += weight * c * c;
    smooth1[k]! += weight * a * b;
    smooth1[k + 1]! += weight * b * c;
    smooth2[k + 1]! += weight * a * c;
  }
}

/** Chooses noise and curvature by marginal likelihood times what was thought beforehand, and leaves the fit in `out`. */
function weigh(wind: WindColumn, origin: UncertaintyOrigin, out: Posterior): void {
  const free = Math.max(1, out.count - 2);
  let best = -Infinity;
  let bestRatio = 1;
  let bestNoise = 1;
  fillPrecision(out);
  for (const ratio of RATIOS) {
    const logDeterminant = factorise(out, ratio);
    solveMean(wind, out);
    const misfit = misfitOf(wind, out, ratio);
    for (const noise of NOISE_FACTORS) {
      const scale = noise * noise;
      const likelihood = -logDeterminant - 0.5 * (free * Math.log(ratio) + free * Math.log(scale) + misfit / scale);
      const beforehand =
        -0.5 * ((Math.log(noise) / NOISE_DOUBT[origin]) ** 2 + (Math.log(ratio * scale) / RATIO_DOUBT) ** 2);
      if (likelihood + beforehand > best) {
        best = likelihood + beforehand;
        bestRatio = ratio;
        bestNoise = noise;
      }
    }
  }
  for (let k = 0; k < out.count; k++) out.uncertainty[k]! *= bestNoise;
  fillPrecision(out);
  factorise(out, bestRatio * bestNoise * bestNoise);
  solveMean(wind, out);
}

/** Weight of each level's own value: one over its variance. */
function fillPrecision({ count, uncertainty, precision }: Posterior): void {
  for (let k = 0; k < count; k++) precision[k] = 1 / (uncertainty[k]! * uncertainty[k]!);
}

/** Cholesky factor of smoothness/curvature + 1/variance. @returns half the logarithm of its determinant */
function factorise(out: Posterior, curvature: number): number {
  const { count, precision, smooth0, smooth1, smooth2, inverse, below1, below2 } = out;
  const stiffness = 1 / curvature;
  let logSum = 0;
  let product = 1;
  for (let k = 0; k < count; k++) {
    const two = k >= 2 ? smooth2[k]! * stiffness * inverse[k - 2]! : 0;
    const one = k >= 1 ? (smooth1[k]! * stiffness - (k >= 2 ? two * below1[k - 1]! : 0)) * inverse[k - 1]! : 0;
    const root = Math.sqrt(smooth0[k]! * stiffness + precision[k]! - one * one - two * two);
    below2[k] = two;
    below1[k] = one;
    inverse[k] = 1 / root;
    // Logarithms are slow too: one for the product of several roots.
    product *= root;
    if ((k & 7) === 7) {
      logSum += Math.log(product);
      product = 1;
    }
  }
  return logSum + Math.log(product);
}

function solveMean(wind: WindColumn, out: Posterior): void {
  const { count, precision, inverse, below1, below2, mean } = out;
  for (let k = 0; k < count; k++) {
    let sum = wind.speed[k]! * precision[k]!;
    if (k >= 1) sum -= below1[k]! * mean[k - 1]!;
    if (k >= 2) sum -= below2[k]! * mean[k - 2]!;
    mean[k] = sum * inverse[k]!;
  }
  for (let k = count - 1; k >= 0; k--) {
    let sum = mean[k]!;
    if (k + 1 < count) sum -= below1[k + 1]! * mean[k + 1]!;
    if (k + 2 < count) sum -= below2[k + 2]! * mean[k + 2]!;
    mean[k] = sum * inverse[k]!;
  }
}

/** Squared distance of the levels from the curve plus the curve's own roughness, both in units of their variance. */
function misfitOf(wind: WindColumn, out: Posterior, curvature: number): number {
  const { count, precision, mean, smooth0, smooth1, smooth2 } = out;
  const stiffness = 1 / curvature;
  let misfit = 0;
  for (let k = 0; k < count; k++) {
    const residual = wind.speed[k]! - mean[k]!;
    let rough = smooth0[k]! * mean[k]!;
    if (k >= 1) rough += 2 * smooth1[k]! * mean[k - 1]!;
    if (k >= 2) rough += 2 * smooth2[k]! * mean[k - 2]!;
    misfit += residual * residual * precision[k]! + mean[k]! * rough * stiffness;
  }
  return misfit;
}

/** Levels on either side that a level is held against. */
const NEIGHBOURS = 2;
/**
 * A level further than so many uncertainties, and so many m/s, from the median around it is wild; more is allowed the
 * further its nearer neighbour is away, by a shear (1/s) that jets do reach. Our own choice.
 */
const WILD_UNCERTAINTIES = 5;
const WILD_LEAST = 3;
const WILD_SHEAR = 0.03;

/** Makes a lone wild level as uncertain as it is far off, so that it does not carry the profile. */
function widenWild(wind: WindColumn, out: Posterior): void {
  const { heightAgl, speed } = wind;
  const around = new Float64Array(2 * NEIGHBOURS + 1);
  for (let k = 0; k < out.count; k++) {
    const first = Math.max(0, k - NEIGHBOURS);
    const last = Math.min(out.count - 1, k + NEIGHBOURS);
    let held = 0;
    for (let j = first; j <= last; j++) {
      // Put in order as they come: five values are not worth calling a sort for.
      let place = held++;
      for (; place > 0 && around[place - 1]! > speed[j]!; place--) around[place] = around[place - 1]!;
      around[place] = speed[j]!;
    }
    const off = Math.abs(speed[k]! - around[held >> 1]!);
    const gap = Math.min(
      k > 0 ? heightAgl[k]! - heightAgl[k - 1]! : Infinity,
      k < out.count - 1 ? heightAgl[k + 1]! - heightAgl[k]! : Infinity,
    );
    const allowed = Math.max(WILD_LEAST, WILD_UNCERTAINTIES * out.uncertainty[k]!) + WILD_SHEAR * gap;
    if (off > allowed) out.uncertainty[k] = off;
  }
}
