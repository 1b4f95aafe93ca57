// What a gate should read, from the trusted gates around it.

import { lengthOf, REACH, type Nodes } from './nodes.ts';

export interface Prediction {
  /** m/s; NaN where too few trusted gates are near. */
  u: number;
  v: number;
  /** Length of the difference of the gate's value and the prediction, m/s. */
  distance: number;
}

/** Gates above and below that are looked at. */
const GATES = 2;
/** A prediction rests on so many trusted gates at least; on so many of like height on one side in time. */
const FEWEST = 4;
const FEWEST_ON_A_SIDE = REACH;
/** Time that counts as much as one gate spacing, ms. */
const TIME_UNIT_MS = 1_200_000;
/** Least gate spacing that heights are measured by, m. */
const LEAST_SPACING = 20;
const SPAN = 2 * REACH + 1;

/** Weighted sums of the gates of like height, before or after. */
interface Side {
  count: number;
  weight: number;
  u: number;
  v: number;
}

const before: Side = { count: 0, weight: 0, u: 0, v: 0 };
const after: Side = { count: 0, weight: 0, u: 0, v: 0 };

/**
 * Predicts a node's wind in several ways: from all trusted gates around it by a straight line in height; from those of like
 * height; from those before alone and those after alone. The one nearest to the node's value counts: a shear layer is no
 * error, a steady wind neither, nor is the wind on either side of a front.
 */
export function predict(nodes: Nodes, trusted: Uint8Array, n: number, out: Prediction): void {
  const { u, v, height, timeMs, profile, start, like } = nodes;
  const z0 = height[n]!;
  const i0 = profile[n]!;
  const t0 = timeMs[i0]!;
  const below = n > start[i0]! ? z0 - height[n - 1]! : Infinity;
  const above = n + 1 < start[i0 + 1]! ? height[n + 1]! - z0 : Infinity;
  const unit = Math.min(100, Math.max(LEAST_SPACING, Math.min(below, above)));
  let [members, w, wz, wzz, wu, wv, wzu, wzv] = [0, 0, 0, 0, 0, 0, 0, 0];
  clear(before);
  clear(after);
  for (let d = -REACH; d <= REACH; d++) {
    const centre = like[n * SPAN + REACH + d]!;
    if (centre < 0) continue;
    const i = profile[centre]!;
    const t = (timeMs[i]! - t0) / TIME_UNIT_MS;
    const low = Math.max(start[i]!, centre - GATES);
    const high = Math.min(start[i + 1]! - 1, centre + GATES);
    for (let m = low; m <= high; m++) {
      if (trusted[m] === 0 || m === n) continue;
      const z = (height[m]! - z0) / unit;
      const weight = 1 / (1 + 3 * z * z + t * t);
      members++;
      w += weight;
      wz += weight * z;
      wzz += weight * z * z;
      wu += weight * u[m]!;
      wv += weight * v[m]!;
      wzu += weight * z * u[m]!;
      wzv += weight * z * v[m]!;
      if (m !== centre) continue;
      const side = d < 0 ? before : after;
      side.count++;
      side.weight += weight;
      side.u += weight * u[m]!;
      side.v += weight * v[m]!;
    }
  }
  out.u = NaN;
  out.v = NaN;
  out.distance = NaN;
  const offer = (predictedU: number, predictedV: number): void => {
    const distance = lengthOf(u[n]! - predictedU, v[n]! - predictedV);
    if (distance >= out.distance) return;
    out.u = predictedU;
    out.v = predictedV;
    out.distance = distance;
  };
  if (members >= FEWEST) {
    // A little ridge keeps the line level where all trusted gates lie at one height.
    const spread = wzz + 0.2 * w - (wz * wz) / w;
    const slopeU = (wzu - (wz * wu) / w) / spread;
    const slopeV = (wzv - (wz * wv) / w) / spread;
    offer((wu - slopeU * wz) / w, (wv - slopeV * wz) / w);
  }
  if (before.count + after.count >= FEWEST) {
    const weight = before.weight + after.weight;
    offer((before.u + after.u) / weight, (before.v + after.v) / weight);
  }
  for (const side of [before, after]) {
    if (side.count >= FEWEST_ON_A_SIDE) offer(side.u / side.weight, side.v / side.weight);
  }
}

function clear(side: Side): void {
  side.count = 0;
  side.weight = 0;
  side.u = 0;
  side.v = 0;
}
