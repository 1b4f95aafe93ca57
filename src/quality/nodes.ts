// The usable wind levels of a series as nodes of a net in time and height, with who is whose neighbour.

import { eastward, northward } from '../air/index.ts';
import { REJECTING, type ProfileBlock } from '../profile/index.ts';
import type { Series } from './series.ts';

/** So many profiles before and after count as neighbours. */
export const REACH = 3;
const SPAN = 2 * REACH + 1;
/** Neighbours in time lie at most so far apart, ms: three quarters of an hour, or the reach of an hourly feed. */
export const LONGEST_GAP_MS = 75 * 60_000;
/** Gates of neighbouring profiles are the same height within this part of the gate spacing. */
const SAME_GATE = 0.6;

export interface Nodes {
  readonly count: number;
  /** Level of the block. */
  readonly level: Uint32Array;
  /** Position in the series. */
  readonly profile: Uint32Array;
  /** Length profiles + 1: nodes of the i-th profile of the series. */
  readonly start: Uint32Array;
  /** UTC, ms, by position in the series. */
  readonly timeMs: Float64Array;
  /** m above ground */
  readonly height: Float64Array;
  readonly u: Float64Array;
  readonly v: Float64Array;
  /** Node of like height, `d` profiles on (d from -REACH to REACH), at node * (2 REACH + 1) + REACH + d; -1: none. */
  readonly like: Int32Array;
}

/** Length of a vector; several times as fast as Math.hypot, whose care for huge numbers wind does not need. */
export function lengthOf(x: number, y: number): number {
  return Math.sqrt(x * x + y * y);
}

/** The net of all levels with height, speed and direction that carry no rejecting mark. */
export function nodesOf(block: ProfileBlock, marks: Uint32Array, series: Series): Nodes {
  const { profiles } = series;
  const most = profiles.reduce((sum, i) => sum + block.offsets[i + 1]! - block.offsets[i]!, 0);
  const level = new Uint32Array(most);
  const profile = new Uint32Array(most);
  const height = new Float64Array(most);
  const u = new Float64Array(most);
  const v = new Float64Array(most);
  const start = new Uint32Array(profiles.length + 1);
  let count = 0;
  profiles.forEach((i, position) => {
    start[position] = count;
    const end = block.offsets[i + 1]!;
    for (let k = block.offsets[i]!; k < end; k++) {
      if ((marks[k]! & REJECTING) !== 0) continue;
      const speed = block.speed[k]!;
      const x = eastward(speed, block.direction[k]!);
      if (!(x > -Infinity) || !(block.heightAgl[k]! > -Infinity)) continue;
      level[count] = k;
      profile[count] = position;
      height[count] = block.heightAgl[k]!;
      u[count] = x;
      v[count] = northward(speed, block.direction[k]!);
      count++;
    }
  });
  start[profiles.length] = count;
  const nodes = {
    count,
    level,
    profile,
    start,
    timeMs: Float64Array.from(profiles, (i) => block.timeMs[i]!),
    height,
    u,
    v,
  };
  return { ...nodes, like: likeNodes(nodes) };
}

function likeNodes({ count, start, timeMs, height }: Omit<Nodes, 'like'>): Int32Array {
  const like = new Int32Array(count * SPAN).fill(-1);
  for (let n = 0; n < count; n++) like[n * SPAN + REACH] = n;
  const last = start.length - 1;
  for (let i = 0; i < last; i++) {
    let alike = true;
    for (let d = 1; d <= REACH && i + d < last; d++) {
      if (timeMs[i + d]! - timeMs[i]! > LONGEST_GAP_MS) break;
      alike &&= sameHeights(i + d - 1, i + d);
      if (alike) pairAlike(i, i + d, d);
      else pair(i, i + d, d);
    }
  }
  return like;

  function sameHeights(i: number, j: number): boolean {
    const from = start[i]!;
    const shift = start[j]! - from;
    if (start[i + 1]! - from !== start[j + 1]! - start[j]!) return false;
    for (let n = from; n < start[i + 1]!; n++) if (height[n] !== height[n + shift]) return false;
    return true;
  }

  /** Profiles of the same heights, as those of fixed gates mostly are. */
  function pairAlike(i: number, j: number, d: number): void {
    const shift = start[j]! - start[i]!;
    for (let n = start[i]!; n < start[i + 1]!; n++) {
      like[n * SPAN + REACH + d] = n + shift;
      like[(n + shift) * SPAN + REACH - d] = n;
    }
  }

  /** Walks two profiles upward together and joins gates of like height. */
  function pair(i: number, j: number, d: number): void {
    let m = start[j]!;
    const end = start[j + 1]!;
    for (let n = start[i]!; n < start[i + 1]!; n++) {
      const z = height[n]!;
      while (m + 1 < end && Math.abs(height[m + 1]! - z) <= Math.abs(height[m]! - z)) m++;
      if (m >= end || Math.abs(height[m]! - z) > SAME_GATE * spacing(n, i)) continue;
      like[n * SPAN + REACH + d] = m;
      like[m * SPAN + REACH - d] = n;
    }
  }

  /** Distance to the nearer neighbour in the same profile, m. */
  function spacing(n: number, i: number): number {
    const below = n > start[i]! ? height[n]! - height[n - 1]! : Infinity;
    const above = n + 1 < start[i + 1]! ? height[n + 1]! - height[n]! : Infinity;
    const least = Math.min(below, above);
    return least === Infinity ? 0 : least;
  }
}
