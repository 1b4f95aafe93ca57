// What a disc asks of a set of heights, worked out once: the share of the disc that each height owns, where hub and tips
// lie between the heights, and the weights of the shear fit. Profiles of the same heights then cost multiplications only.

import { bottomTip, shareBelow, topTip, type Disc } from './disc.ts';

/** A height between two levels: value = (1 - weight) below + weight above. `below` is -1 outside the levels. */
export interface Between {
  readonly below: number;
  readonly weight: number;
}

export interface DiscPlan {
  readonly disc: Disc;
  /** Empty when the heights suffice, else why they do not. */
  readonly why: string;
  /** Part of the disc between lowest and highest level, 0 to 1. */
  readonly coverage: number;
  /** First level with a share of the disc. */
  readonly first: number;
  /** Share of the disc's area owned by each level from `first` on. */
  readonly share: Float64Array;
  readonly hub: Between;
  readonly bottom: Between;
  readonly top: Between;
  /** The lowest and highest heights of the disc that lie within the levels, and the metres between them. */
  readonly coveredBottom: Between;
  readonly coveredTop: Between;
  readonly coveredSpan: number;
  /** Whether both tips lie within the levels. */
  readonly isCovered: boolean;
  /** First level within the disc, for the shear fit. */
  readonly fitFirst: number;
  /** Exponent = sum of fitWeight x ln V from `fitFirst` on; empty with fewer than two different heights in the disc. */
  readonly fitWeight: Float64Array;
}

/** Allowance on the asked heights, as a share of the radius (checks of the equivalent speed). */
const ALLOWANCE = 1e-9;

/**
 * Plans a disc over levels, by the slice form of IEC 61400-12-1:2017: each level owns the slice between the mid-heights to
 * its neighbours, the lowest owns all below it and the highest all above, each cut to the disc. It takes levels from at
 * most a third of the radius above the lower tip to at most a third below the upper one, and three slices with area. The
 * standard also asks for levels inside the disc and at the hub (from memory); here those outside count too.
 * @param heightAgl m, ascending
 * @param logHeight their natural logarithms
 * @param count how many of them are used
 */
export function planDisc(
  disc: Disc,
  heightAgl: ArrayLike<number>,
  logHeight: ArrayLike<number>,
  count: number,
): DiscPlan {
  const lowest = count > 0 ? heightAgl[0]! : NaN;
  const highest = count > 0 ? heightAgl[count - 1]! : NaN;
  const coverage = count > 0 ? shareBelow(disc, highest) - shareBelow(disc, lowest) : 0;
  const { first, share } = slices(disc, heightAgl, count);
  const coveredLow = Math.max(lowest, bottomTip(disc));
  const coveredHigh = Math.min(highest, topTip(disc));
  const { fitFirst, fitWeight } = shearFit(disc, heightAgl, logHeight, count);
  return {
    disc,
    why: whyNot(disc, lowest, highest, coverage, count, share),
    coverage,
    first,
    share,
    hub: between(disc.hubHeight, heightAgl, count),
    bottom: between(bottomTip(disc), heightAgl, count),
    top: between(topTip(disc), heightAgl, count),
    coveredBottom: between(coveredLow, heightAgl, count),
    coveredTop: between(coveredHigh, heightAgl, count),
    coveredSpan: Math.max(0, coveredHigh - coveredLow),
    isCovered: coveredLow === bottomTip(disc) && coveredHigh === topTip(disc),
    fitFirst,
    fitWeight,
  };
}

function whyNot(
  disc: Disc,
  lowest: number,
  highest: number,
  coverage: number,
  count: number,
  share: Float64Array,
): string {
  if (count === 0) return 'no usable wind level';
  if (!(lowest <= topTip(disc) && highest >= bottomTip(disc))) return 'the rotor lies outside the data';
  const reach = disc.rotorDiameter * (1 / 3 - ALLOWANCE / 2);
  if (!(lowest <= disc.hubHeight - reach && highest >= disc.hubHeight + reach)) {
    return `rotor only ${Math.floor(100 * coverage)} % covered`;
  }
  let withArea = 0;
  for (let k = 0; k < share.length; k++) if (share[k]! > 0) withArea++;
  if (withArea < 3) return `only ${withArea} of the levels reach into the rotor, three are needed`;
  return '';
}

function slices(disc: Disc, heightAgl: ArrayLike<number>, count: number): { first: number; share: Float64Array } {
  const [lowTip, highTip] = [bottomTip(disc), topTip(disc)];
  let first = Math.max(0, firstFrom(lowTip, heightAgl, count) - 1);
  while (first < count - 1 && (heightAgl[first]! + heightAgl[first + 1]!) / 2 <= lowTip) first++;
  let end = first;
  while (end < count && (end === first || (heightAgl[end - 1]! + heightAgl[end]!) / 2 < highTip)) end++;
  const share = new Float64Array(end - first);
  let below = 0;
  for (let k = first; k < end; k++) {
    const above = k === end - 1 ? 1 : shareBelow(disc, (heightAgl[k]! + heightAgl[k + 1]!) / 2);
    share[k - first] = above - below;
    below = above;
  }
  return { first, share };
}

/** Where a height lies between ascending levels. */
function between(height: number, heightAgl: ArrayLike<number>, count: number): Between {
  if (count === 0 || !(height >= heightAgl[0]!) || !(height <= heightAgl[count - 1]!)) return OUTSIDE;
  if (count === 1) return { below: 0, weight: 0 };
  const above = Math.max(1, firstFrom(height, heightAgl, count));
  const low = heightAgl[above - 1]!;
  const span = heightAgl[above]! - low;
  return { below: above - 1, weight: span > 0 ? (height - low) / span : 0 };
}

const OUTSIDE: Between = { below: -1, weight: NaN };

/** First level at or above a height; `count` where there is none. */
function firstFrom(height: number, heightAgl: ArrayLike<number>, count: number): number {
  let low = 0;
  let high = count;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (heightAgl[middle]! < height) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Least squares of ln V on ln z over the levels from tip to tip (IEC 61400-1 power law), as weights on ln V. */
function shearFit(
  disc: Disc,
  heightAgl: ArrayLike<number>,
  logHeight: ArrayLike<number>,
  count: number,
): { fitFirst: number; fitWeight: Float64Array } {
  const low = bottomTip(disc);
  const high = topTip(disc);
  let fitFirst = firstFrom(low, heightAgl, count);
  while (fitFirst < count && !(heightAgl[fitFirst]! > 0)) fitFirst++;
  let end = fitFirst;
  while (end < count && heightAgl[end]! <= high) end++;
  return { fitFirst, fitWeight: powerLawWeights(logHeight, fitFirst, end) };
}

/** Weights w so that the exponent of the least-squares power law over levels first..end is the sum of w ln V. */
function powerLawWeights(logHeight: ArrayLike<number>, first: number, end: number): Float64Array {
  const count = end - first;
  if (count < 2 || !(logHeight[end - 1]! > logHeight[first]!)) return new Float64Array(0);
  let mean = 0;
  for (let k = first; k < end; k++) mean += logHeight[k]! / count;
  let squares = 0;
  for (let k = first; k < end; k++) squares += (logHeight[k]! - mean) ** 2;
  const weights = new Float64Array(count);
  for (let k = 0; k < count; k++) weights[k] = (logHeight[first + k]! - mean) / squares;
  return weights;
}
