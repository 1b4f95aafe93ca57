// The wind by height as storms feel it: usable levels as components, taken as linear in height between them.

import { eastward, northward } from '../air/index.ts';
import { gatherWind, windColumn, type Profile } from '../profile/index.ts';
import { metres, noVector, vectorFigure, type VectorFigure } from './figure.ts';

/** Above this height, m above ground, the lowest level cannot stand for the wind near the ground (without source). */
export const NEAR_GROUND = 250;

export interface Hodograph {
  readonly count: number;
  /** m above ground, rising */
  readonly heightAgl: Float64Array;
  /** m/s */
  readonly u: Float64Array;
  /** m/s */
  readonly v: Float64Array;
}

/** Gathers the levels with a known height, speed and direction; calm needs no direction. */
export function hodographOf(profile: Profile): Hodograph {
  const column = gatherWind(profile, windColumn(profile.levelCount));
  const heightAgl = new Float64Array(column.count);
  const u = new Float64Array(column.count);
  const v = new Float64Array(column.count);
  let count = 0;
  for (let k = 0; k < column.count; k++) {
    const east = eastward(column.speed[k]!, column.direction[k]!);
    const height = column.heightAgl[k]!;
    if (Number.isNaN(east) || (count > 0 && height <= heightAgl[count - 1]!)) continue;
    heightAgl[count] = height;
    u[count] = east;
    v[count] = northward(column.speed[k]!, column.direction[k]!);
    count++;
  }
  return { count, heightAgl, u, v };
}

/**
 * Why the layer from the ground to `top` cannot be told; empty when it can.
 * @param top m above ground
 */
export function whyNotUpTo(hodograph: Hodograph, top: number): string {
  const { heightAgl, count } = hodograph;
  if (count === 0) return 'No level has a usable wind.';
  if (heightAgl[0]! > NEAR_GROUND) {
    return `The lowest wind level lies ${metres(heightAgl[0]!)} above ground; the wind near the ground is missing.`;
  }
  if (heightAgl[count - 1]! < top) {
    return `Wind data end at ${metres(heightAgl[count - 1]!)} above ground; ${metres(top)} are needed.`;
  }
  return '';
}

/** Wind at a height above ground, m; missing outside the data. */
export function windAt(hodograph: Hodograph, height: number): VectorFigure {
  const { heightAgl, u, v, count } = hodograph;
  const k = indexBelow(hodograph, height);
  if (k < 0) return noVector(whyOutside(hodograph, height, height));
  if (k + 1 >= count || heightAgl[k] === height) return vectorFigure(u[k]!, v[k]!);
  const share = (height - heightAgl[k]!) / (heightAgl[k + 1]! - heightAgl[k]!);
  return vectorFigure(u[k]! + share * (u[k + 1]! - u[k]!), v[k]! + share * (v[k + 1]! - v[k]!));
}

/** Mean wind over a layer by height, exact for the piecewise-linear wind; missing unless data span the layer. */
export function meanWind(hodograph: Hodograph, bottom: number, top: number): VectorFigure {
  const lower = windAt(hodograph, bottom);
  const upper = windAt(hodograph, top);
  if (lower.why !== '' || upper.why !== '' || !(top > bottom)) return noVector(whyOutside(hodograph, bottom, top));
  let sumU = 0;
  let sumV = 0;
  walkLayer(hodograph, bottom, top, (below, u1, v1, above, u2, v2) => {
    sumU += ((u1 + u2) / 2) * (above - below);
    sumV += ((v1 + v2) / 2) * (above - below);
  });
  return vectorFigure(sumU / (top - bottom), sumV / (top - bottom));
}

type Segment = (below: number, u1: number, v1: number, above: number, u2: number, v2: number) => void;

/** Visits the straight pieces of the hodograph between two heights that lie within the data. */
export function walkLayer(hodograph: Hodograph, bottom: number, top: number, visit: Segment): void {
  const { heightAgl, u, v } = hodograph;
  let height = bottom;
  let { u: fromU, v: fromV } = windAt(hodograph, bottom);
  for (let k = indexBelow(hodograph, bottom) + 1; k < hodograph.count && heightAgl[k]! < top; k++) {
    visit(height, fromU, fromV, heightAgl[k]!, u[k]!, v[k]!);
    height = heightAgl[k]!;
    fromU = u[k]!;
    fromV = v[k]!;
  }
  const end = windAt(hodograph, top);
  visit(height, fromU, fromV, top, end.u, end.v);
}

function whyOutside(hodograph: Hodograph, bottom: number, top: number): string {
  const { heightAgl, count } = hodograph;
  if (count === 0) return 'No level has a usable wind.';
  const lowest = metres(heightAgl[0]!);
  const highest = metres(heightAgl[count - 1]!);
  const wanted = bottom === top ? metres(top) : `${metres(bottom)} to ${metres(top)}`;
  return `Wind data reach from ${lowest} to ${highest} above ground; ${wanted} is needed.`;
}

/** Highest level at or below a height; -1 outside the data. */
function indexBelow(hodograph: Hodograph, height: number): number {
  const { heightAgl, count } = hodograph;
  if (count === 0 || !(height >= heightAgl[0]!) || !(height <= heightAgl[count - 1]!)) return -1;
  let low = 0;
  let high = count;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (heightAgl[middle]! <= height) low = middle;
    else high = middle;
  }
  return low;
}
