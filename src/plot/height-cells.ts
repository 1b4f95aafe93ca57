// Rows of a section and which rows a level fills: its own, and those around it up to mid-height to its neighbours, but
// never far into a gap.

import { MARK, type ProfileBlock } from '../profile/index.ts';

export interface HeightRows {
  /** m above ground, rows + 1 values, ascending. */
  readonly edges: Float32Array;
  /** m above ground, one per row: the height that decides which level a row belongs to. */
  readonly centres: Float32Array;
}

/** Heights closer than this, m, are one gate: sources round. */
const SAME_GATE = 0.25;
/** A level reaches at most this many of its usual spacings up and down: one and a half in all. */
const REACH = 0.75;
const NEAREST_GAPS = 5;

/**
 * Rows that all profiles share: one per distinct gate where these are few, else `maxRows` of equal height.
 * @param runs as by `gateRuns`, one per block
 * @param ceiling m above ground; gates above it are left out
 */
export function heightRows(
  blocks: readonly ProfileBlock[],
  runs: readonly Uint32Array[],
  ceiling: number,
  maxRows: number,
): HeightRows {
  const gates = new Set<number>();
  let highest = 0;
  for (const [b, block] of blocks.entries()) {
    for (let index = 0; index < block.profileCount; index++) {
      if (runs[b]![index] !== index) continue;
      for (let k = block.offsets[index]!; k < block.offsets[index + 1]!; k++) {
        const height = block.heightAgl[k]!;
        if (!(height <= ceiling) || height < 0) continue;
        if (gates.size <= maxRows) gates.add(Math.round(height / SAME_GATE));
        if (height > highest) highest = height;
      }
    }
  }
  if (gates.size === 0) return { edges: new Float32Array(0), centres: new Float32Array(0) };
  return gates.size <= maxRows ? rowsAt(gates) : equalRows(highest, maxRows);
}

/** For each profile of a block the first of the run of profiles before it that have the same gates; itself if none. */
export function gateRuns(block: ProfileBlock): Uint32Array {
  const runs = new Uint32Array(block.profileCount);
  for (let index = 1; index < block.profileCount; index++) {
    runs[index] = sameGates(block, index - 1, index) ? runs[index - 1]! : index;
  }
  return runs;
}

/** Whether two profiles of a block have levels at the same heights, doubled ones at the same places. */
function sameGates({ offsets, heightAgl, mark }: ProfileBlock, first: number, second: number): boolean {
  const start = offsets[first]!;
  const other = offsets[second]!;
  const count = offsets[first + 1]! - start;
  if (offsets[second + 1]! - other !== count) return false;
  for (let k = 0; k < count; k++) {
    if (heightAgl[start + k] !== heightAgl[other + k]) return false;
    if (((mark[start + k]! ^ mark[other + k]!) & MARK.doubled) !== 0) return false;
  }
  return true;
}

function rowsAt(gates: ReadonlySet<number>): HeightRows {
  const centres = Float32Array.from(gates, (gate) => gate * SAME_GATE).sort();
  const edges = new Float32Array(centres.length + 1);
  for (let row = 1; row < centres.length; row++) edges[row] = (centres[row - 1]! + centres[row]!) / 2;
  const last = centres.length - 1;
  // A lone gate gets an arbitrary but visible row.
  const bottomHalf = last > 0 ? edges[1]! - centres[0]! : 25;
  const topHalf = last > 0 ? centres[last]! - edges[last]! : 25;
  edges[0] = Math.max(0, centres[0]! - bottomHalf);
  edges[last + 1] = centres[last]! + topHalf;
  return { edges, centres };
}

function equalRows(highest: number, count: number): HeightRows {
  const step = highest / (count - 0.5);
  return {
    edges: Float32Array.from({ length: count + 1 }, (_, row) => row * step),
    centres: Float32Array.from({ length: count }, (_, row) => (row + 0.5) * step),
  };
}

/** Row that holds a height; -1 outside. */
export function rowOf(edges: Float32Array, height: number): number {
  let low = 0;
  let high = edges.length - 2;
  if (!(height >= edges[0]! && height <= edges[high + 1]!)) return -1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (edges[middle]! <= height) low = middle;
    else high = middle - 1;
  }
  return low;
}

/** Pairs of a level and a row it fills; a row may have several levels. Reused from profile to profile. */
export class LevelRows {
  count = 0;
  /** No row has more than one level. */
  distinct = true;
  level = new Uint32Array(256);
  row = new Uint32Array(256);

  /**
   * @param heights m above ground, ascending, of `levels.length` levels that own a place in the profile
   * @param levels position of each within its profile
   */
  assign(heights: Float64Array, levels: Uint32Array, levelCount: number, { edges, centres }: HeightRows): void {
    this.count = 0;
    this.distinct = true;
    let row = 0;
    let taken = -1;
    for (let k = 0; k < levelCount; k++) {
      const height = heights[k]!;
      const reach = REACH * usualGap(heights, levelCount, k);
      const below = k > 0 ? (height - heights[k - 1]!) / 2 : Infinity;
      const above = k < levelCount - 1 ? (heights[k + 1]! - height) / 2 : Infinity;
      // At either end a level owns half a usual spacing outward.
      const bottom = height - Math.min(reach, k > 0 ? below : reach / (2 * REACH));
      const top = height + Math.min(reach, k < levelCount - 1 ? above : reach / (2 * REACH));
      const own = rowOf(edges, height);
      const takenBefore = taken;
      if (own >= 0) this.#add(levels[k]!, own, takenBefore);
      while (row < centres.length && centres[row]! < bottom) row++;
      for (; row < centres.length && centres[row]! < top; row++) {
        if (row !== own) this.#add(levels[k]!, row, takenBefore);
        taken = Math.max(taken, row);
      }
      taken = Math.max(taken, own);
    }
  }

  #add(level: number, row: number, taken: number): void {
    if (row <= taken) this.distinct = false;
    if (this.count === this.level.length) {
      this.level = grown(this.level);
      this.row = grown(this.row);
    }
    this.level[this.count] = level;
    this.row[this.count] = row;
    this.count++;
  }
}

const gaps = new Float64Array(NEAREST_GAPS);

/** Median of the nearest five spacings; of a lone level 50 m. */
function usualGap(heights: Float64Array, levelCount: number, k: number): number {
  const first = Math.max(0, Math.min(k - 3, levelCount - 1 - NEAREST_GAPS));
  const count = Math.min(NEAREST_GAPS, levelCount - 1 - first);
  if (count <= 0) return 50;
  for (let i = 0; i < count; i++) {
    const gap = heights[first + i + 1]! - heights[first + i]!;
    let at = i;
    for (; at > 0 && gaps[at - 1]! > gap; at--) gaps[at] = gaps[at - 1]!;
    gaps[at] = gap;
  }
  return gaps[count >> 1]!;
}

function grown(array: Uint32Array): Uint32Array<ArrayBuffer> {
  const larger = new Uint32Array(2 * array.length);
  larger.set(array);
  return larger;
}
