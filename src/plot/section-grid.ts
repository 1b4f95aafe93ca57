// A time-height section as a regular grid: what the painter draws, the table lists and the CSV holds.

import { DOUBTING, MARK, REJECTING, type ProfileBlock } from '../profile/index.ts';
import { fieldValuesInto } from './field-values.ts';
import { FIELDS, type FieldName, type PixelRule } from './fields.ts';
import { gateRuns, heightRows, LevelRows, type HeightRows } from './height-cells.ts';
import { isSounding, timeCells } from './time-cells.ts';

/** Plain data: it can be posted to a worker. */
export interface SectionGrid {
  readonly field: FieldName;
  readonly columnCount: number;
  readonly rowCount: number;
  /** UTC ms per column, ascending and not overlapping; between two cells there may be a gap. */
  readonly startMs: Float64Array;
  readonly endMs: Float64Array;
  /** m above ground, rowCount + 1, ascending. */
  readonly edges: Float32Array;
  /** SI, `column * rowCount + row`; NaN where nothing was measured or the level was rejected. */
  readonly values: Float32Array;
  /** Wind speed in the same layout, for fields shown at the strongest wind; else null. */
  readonly strength: Float32Array | null;
  /** One bit a cell: a value that fell into it is doubtful. Row r of column c: bit r & 31 of word `c * doubtWords + (r >> 5)`. */
  readonly doubt: Uint32Array;
  readonly doubtWords: number;
}

export interface SectionGridOptions {
  readonly field: FieldName;
  /** m above ground; 3000 unless told. */
  readonly ceiling?: number;
  /** Where profiles have more distinct gates than this, they are put on so many rows of equal height; 256 unless told. */
  readonly maxRows?: number;
}

/**
 * Puts profiles of one station on a regular grid. Profiles may come in any order; those of one time share a column.
 * Several levels in one cell become one by the field's pixel rule.
 */
export function buildSectionGrid(blocks: readonly ProfileBlock[], options: SectionGridOptions): SectionGrid {
  const { field, ceiling = 3000, maxRows = 256 } = options;
  const cells = timeCells(blocks);
  const runs = blocks.map(gateRuns);
  const rows = heightRows(blocks, runs, ceiling, maxRows);
  const columnCount = cells.startMs.length;
  const rowCount = rows.centres.length;
  const rule = FIELDS[field].pixelRule;
  const doubtWords = Math.ceil(rowCount / 32);
  const values = new Float32Array(columnCount * rowCount).fill(NaN);
  const strength = rule === 'at-strongest-wind' ? new Float32Array(columnCount * rowCount).fill(NaN) : null;
  const doubt = new Uint32Array(columnCount * doubtWords);

  const grid = {
    field,
    columnCount,
    rowCount,
    startMs: cells.startMs,
    endMs: cells.endMs,
    edges: rows.edges,
    values,
    strength,
    doubt,
    doubtWords,
  };

  const places = new ProfilePlaces(rows);
  let levelValues = new Float32Array(256);
  let filledColumn = -1;
  for (let i = 0; i < cells.column.length; i++) {
    const at = cells.blockIndex[i]!;
    const block = blocks[at]!;
    const index = cells.profileIndex[i]!;
    const column = cells.column[i]!;
    const start = block.offsets[index]!;
    const count = block.offsets[index + 1]! - start;
    if (levelValues.length < count) levelValues = new Float32Array(2 * count);
    fieldValuesInto(block, index, field, levelValues);
    const pairs = places.of(block, index, runs[at]![index]!, levelValues);
    if (column !== filledColumn && pairs.distinct) fillColumn(grid, column, pairs, levelValues, block.speed, start);
    else mergeColumn(grid, rule, column, pairs, levelValues, block.speed, start);
    if (hasDoubt(block.mark, start, count)) markDoubt(grid, column, pairs, levelValues, block.mark, start);
    filledColumn = column;
  }
  return grid;
}

/** The common case: nothing stands in the column yet, and no row gets two levels. */
function fillColumn(
  { rowCount, values, strength }: SectionGrid,
  column: number,
  pairs: LevelRows,
  levelValues: Float32Array,
  speed: Float32Array,
  start: number,
): void {
  const base = column * rowCount;
  const { count, level, row } = pairs;
  for (let i = 0; i < count; i++) values[base + row[i]!] = levelValues[level[i]!]!;
  if (strength === null) return;
  for (let i = 0; i < count; i++) strength[base + row[i]!] = speed[start + level[i]!]!;
}

function mergeColumn(
  { rowCount, values, strength }: SectionGrid,
  rule: PixelRule,
  column: number,
  pairs: LevelRows,
  levelValues: Float32Array,
  speed: Float32Array,
  start: number,
): void {
  for (let i = 0; i < pairs.count; i++) {
    const value = levelValues[pairs.level[i]!]!;
    if (Number.isNaN(value)) continue;
    const at = column * rowCount + pairs.row[i]!;
    const wind = speed[start + pairs.level[i]!]!;
    if (!Number.isNaN(values[at]!) && !wins(rule, value, wind, values[at]!, strength?.[at] ?? NaN)) continue;
    values[at] = value;
    if (strength !== null) strength[at] = wind;
  }
}

function hasDoubt(mark: Uint32Array, start: number, count: number): boolean {
  let bits = 0;
  for (let k = start; k < start + count; k++) bits |= mark[k]!;
  return (bits & DOUBTING) !== 0;
}

/** A cell is doubtful when any value that fell into it is. */
function markDoubt(
  { doubt, doubtWords }: SectionGrid,
  column: number,
  pairs: LevelRows,
  levelValues: Float32Array,
  mark: Uint32Array,
  start: number,
): void {
  for (let i = 0; i < pairs.count; i++) {
    const level = pairs.level[i]!;
    if ((mark[start + level]! & DOUBTING) === 0 || Number.isNaN(levelValues[level]!)) continue;
    const row = pairs.row[i]!;
    const word = column * doubtWords + (row >> 5);
    doubt[word] = doubt[word]! | (1 << (row & 31));
  }
}

/** Whether the first of two values is the one to show. Decides for every pair, so that order never matters. */
export function wins(rule: PixelRule, value: number, wind: number, held: number, heldWind: number): boolean {
  if (rule === 'greatest') return value > held;
  if (rule === 'largest-size') {
    const size = Math.abs(value);
    const heldSize = Math.abs(held);
    return size > heldSize || (size === heldSize && value > held);
  }
  // A value of unknown wind counts as calm.
  const strong = Number.isNaN(wind) ? 0 : wind;
  const heldStrong = Number.isNaN(heldWind) ? 0 : heldWind;
  return strong > heldStrong || (strong === heldStrong && value > held);
}

/** Where the levels of a profile go; profiles with the same gates are placed once. */
class ProfilePlaces {
  readonly #pairs = new LevelRows();
  readonly #rows: HeightRows;
  #heights = new Float64Array(256);
  #levels = new Uint32Array(256);
  #block: ProfileBlock | null = null;
  #run = -1;

  constructor(rows: HeightRows) {
    this.#rows = rows;
  }

  /** @param run the first profile of those with the same gates */
  of(block: ProfileBlock, index: number, run: number, values: Float32Array): LevelRows {
    const passEmpty = isSounding(block, index);
    if (!passEmpty && this.#block === block && this.#run === run) return this.#pairs;
    const count = this.#gather(block, index, passEmpty ? values : null);
    this.#pairs.assign(this.#heights, this.#levels, count, this.#rows);
    this.#block = passEmpty ? null : block;
    this.#run = run;
    return this.#pairs;
  }

  /**
   * Levels that own a place. A gate that was rejected or is empty owns its place and leaves it empty; a sounding's level
   * without a value does not, since its levels are picked where something changes.
   */
  #gather(block: ProfileBlock, index: number, values: Float32Array | null): number {
    const start = block.offsets[index]!;
    const count = block.offsets[index + 1]! - start;
    if (this.#heights.length < count) {
      this.#heights = new Float64Array(2 * count);
      this.#levels = new Uint32Array(2 * count);
    }
    let kept = 0;
    for (let k = 0; k < count; k++) {
      const bits = block.mark[start + k]!;
      const height = block.heightAgl[start + k]!;
      if (!(height >= 0) || (bits & MARK.doubled) !== 0) continue;
      if (values !== null && Number.isNaN(values[k]!) && (bits & REJECTING) === 0) continue;
      this.#heights[kept] = height;
      this.#levels[kept] = k;
      kept++;
    }
    return kept;
  }
}
