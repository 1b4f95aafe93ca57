// Builds a block out of whole columns: for readers that have regular grids or long runs of levels at hand, at the speed
// of memory. The rules are those of BlockBuilder, which is the one to use where profiles come one by one.

import { VALUE_COLUMNS, type ProfileBlock, type ValueColumn } from './block.ts';
import { heightOrder } from './builder.ts';
import { descentStart } from './descent.ts';
import { MARK } from './marks.ts';

/** A block as a reader has it: levels as the file orders them, columns that it has not left out. */
export type ColumnsInput = Omit<ProfileBlock, ValueColumn | 'mark' | 'revision'> &
  Partial<Record<Exclude<ValueColumn, 'heightAgl'>, Float32Array | null>> & {
    readonly heightAgl: Float32Array;
    readonly mark?: Uint32Array;
    readonly revision?: Uint8Array;
  };

/**
 * The block of these columns, which it takes over: the arrays given become the block's own and are put in order in place.
 * Levels are stored by ascending height within a profile, those without height last; moved, doubled and heightless ones
 * are marked as BlockBuilder marks them. Infinities become NaN, columns without a value null (wind columns stay).
 */
export function blockOfColumns(input: ColumnsInput): ProfileBlock {
  const { heightAgl, offsets } = input;
  const count = heightAgl.length;
  const mark = input.mark ?? new Uint32Array(count);
  const columns = new Map<ValueColumn, Float32Array>();
  for (const name of VALUE_COLUMNS) {
    const column = input[name];
    if (column === undefined || column === null) continue;
    if (dropInfinities(column)) columns.set(name, column);
  }
  const all = [mark, ...columns.values()];
  for (let index = 0; index < input.profileCount; index++) {
    const start = offsets[index]!;
    const end = offsets[index + 1]!;
    if (!ascends(heightAgl, start, end)) orderLevels(heightAgl, mark, all, start, end);
  }
  const optional = (name: ValueColumn): Float32Array | null => columns.get(name) ?? null;
  return {
    ...input,
    revision: input.revision ?? new Uint8Array(input.profileCount),
    heightAgl,
    speed: columns.get('speed') ?? input.speed ?? new Float32Array(count).fill(NaN),
    direction: columns.get('direction') ?? input.direction ?? new Float32Array(count).fill(NaN),
    verticalSpeed: optional('verticalSpeed'),
    pressure: optional('pressure'),
    temperature: optional('temperature'),
    specificHumidity: optional('specificHumidity'),
    signal: optional('signal'),
    speedUncertainty: optional('speedUncertainty'),
    consensus: optional('consensus'),
    spectralWidth: optional('spectralWidth'),
    speedDeviation: optional('speedDeviation'),
    gust: optional('gust'),
    mark,
  };
}

/** @returns whether the column holds any value at all */
function dropInfinities(column: Float32Array): boolean {
  let filled = false;
  for (let k = 0; k < column.length; k++) {
    const value = column[k]!;
    if (value - value === 0) filled = true;
    else column[k] = NaN;
  }
  return filled;
}

/** Strictly, and no height missing: nothing is then to be marked or moved. */
function ascends(heights: Float32Array, start: number, end: number): boolean {
  let previous = -Infinity;
  for (let k = start; k < end; k++) {
    const height = heights[k]!;
    if (!(height > previous)) return false;
    previous = height;
  }
  return true;
}

function orderLevels(
  heights: Float32Array,
  mark: Uint32Array,
  columns: readonly (Float32Array | Uint32Array)[],
  start: number,
  end: number,
): void {
  const order = heightOrder(heights.subarray(start, end));
  if (order !== null) {
    const descent = descentStart(heights.subarray(start, end));
    if (descent >= 0) for (let k = start + descent; k < end; k++) mark[k]! |= MARK.descent;
    for (const column of columns) {
      const before = column.slice(start, end);
      for (let k = 0; k < order.length; k++) column[start + k] = before[order[k]!]!;
    }
  }
  let previous = NaN;
  for (let k = start; k < end; k++) {
    const height = heights[k]!;
    if (Number.isNaN(height)) mark[k]! |= MARK['no-height'];
    else if (height === previous) mark[k]! |= MARK.doubled;
    if (order !== null && order[k - start] !== k - start && !Number.isNaN(height)) mark[k]! |= MARK['out-of-order'];
    previous = height;
  }
}
