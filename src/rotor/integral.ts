// The other form of the rotor-equivalent speed: the wind linear between levels, integrated over the disc. Where levels are
// coarse it tells what the slice form's steps cost.

import { bottomTip, topTip, type Disc } from './disc.ts';

/** Points at which the wind is read so that the integral over the disc is exact to rounding. */
export interface DiscQuadrature {
  /** Each point lies between this level and the next. */
  readonly below: Uint32Array;
  /** Weight of the upper of the two. */
  readonly weight: Float64Array;
  /** Share of the disc's area that the point stands for; they add up to 1. */
  readonly share: Float64Array;
}

/** Nodes a segment. The integrand is smooth in the angle, so this many leave no more than rounding on half a turn. */
const NODES = 16;
const LEGENDRE = legendreNodes(NODES);

/**
 * Prepares the integral over a disc of what is linear between levels; beyond the end levels their value is held, as the
 * slice form does. With height = hub + R sin(angle) the area element is 2 R2 cos2(angle), and Gauss-Legendre in the angle
 * integrates every segment between levels.
 * @param heightAgl m, ascending
 */
export function discQuadrature(disc: Disc, heightAgl: ArrayLike<number>, count: number): DiscQuadrature {
  const below: number[] = [];
  const weight: number[] = [];
  const share: number[] = [];
  const add = (from: number, to: number, level: number, upperWeight: (height: number) => number): void => {
    const [low, high] = [angleOf(disc, from), angleOf(disc, to)];
    if (!(high > low)) return;
    for (const node of LEGENDRE) {
      const angle = (low + high) / 2 + ((high - low) / 2) * node.at;
      below.push(level);
      weight.push(upperWeight(disc.hubHeight + (disc.rotorDiameter / 2) * Math.sin(angle)));
      share.push((node.weight * (high - low) * Math.cos(angle) ** 2) / Math.PI);
    }
  };
  const last = count - 1;
  add(bottomTip(disc), Math.min(heightAgl[0]!, topTip(disc)), 0, () => 0);
  for (let k = 0; k < last; k++) {
    const [low, high] = [heightAgl[k]!, heightAgl[k + 1]!];
    add(Math.max(low, bottomTip(disc)), Math.min(high, topTip(disc)), k, (height) =>
      Math.max(0, Math.min(1, (height - low) / (high - low))),
    );
  }
  add(Math.max(heightAgl[last]!, bottomTip(disc)), topTip(disc), last, () => 0);
  return { below: Uint32Array.from(below), weight: Float64Array.from(weight), share: Float64Array.from(share) };
}

/** Cube root of the mean cube over the disc of values that are linear between levels; signs are kept. NaN in, NaN out. */
export function cubeMean(quadrature: DiscQuadrature, values: (level: number) => number): number {
  let sum = 0;
  for (let k = 0; k < quadrature.share.length; k++) {
    const level = quadrature.below[k]!;
    const weight = quadrature.weight[k]!;
    const value = weight === 0 ? values(level) : values(level) * (1 - weight) + values(level + 1) * weight;
    sum += quadrature.share[k]! * value * value * value;
  }
  return Math.cbrt(sum);
}

function angleOf(disc: Disc, height: number): number {
  const sine = (height - disc.hubHeight) / (disc.rotorDiameter / 2);
  return Math.asin(Math.max(-1, Math.min(1, sine)));
}

/** Gauss-Legendre nodes and weights on [-1, 1], by Newton's method on the Legendre polynomial. */
function legendreNodes(count: number): { at: number; weight: number }[] {
  return Array.from({ length: count }, (_, k) => {
    let at = Math.cos((Math.PI * (k + 0.75)) / (count + 0.5));
    let slope = NaN;
    for (let round = 0; round < 8; round++) {
      let previous = 1;
      let value = at;
      for (let degree = 2; degree <= count; degree++) {
        [previous, value] = [value, ((2 * degree - 1) * at * value - (degree - 1) * previous) / degree];
      }
      slope = (count * (at * value - previous)) / (at * at - 1);
      at -= value / slope;
    }
    return { at, weight: 2 / ((1 - at * at) * slope * slope) };
  });
}
