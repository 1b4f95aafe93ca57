// Puts profiles, however irregular, on the regular grid of a section.

import type { ProfileBlock } from '../profile/index.ts';
import { fieldValuesInto, plainColumn } from './field-values.ts';
import { FIELDS, type FieldName } from './fields.ts';
import { clearColumn, fillPlain, markDoubt, mergeColumn } from './fill-column.ts';
import { gateRuns, heightRows } from './height-cells.ts';
import { ProfilePlaces } from './profile-places.ts';
import type { SectionGrid } from './section-grid.ts';
import { isSounding, timeCells } from './time-cells.ts';

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
  const values = new Float32Array(columnCount * rowCount);
  const strength = rule === 'at-strongest-wind' ? new Float32Array(columnCount * rowCount) : null;
  const doubt = new Uint32Array(columnCount * doubtWords);

  const grid: SectionGrid = {
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
  const plains = blocks.map((block) => plainColumn(block, field));
  let levelValues = new Float32Array(256);
  let lastColumn = -1;
  for (let i = 0; i < cells.column.length; i++) {
    const b = cells.blockIndex[i]!;
    const block = blocks[b]!;
    const index = cells.profileIndex[i]!;
    const column = cells.column[i]!;
    const start = block.offsets[index]!;
    const count = block.offsets[index + 1]! - start;
    const range = { speed: block.speed, mark: block.mark, start, count };
    const fresh = column !== lastColumn;
    lastColumn = column;
    const plain = plains[b]!;
    if (levelValues.length < count) levelValues = new Float32Array(2 * count);
    // Where a sounding's levels go depends on which have a value.
    const sounding = isSounding(block, index);
    if (plain === null || sounding) fieldValuesInto(block, index, field, levelValues);
    const pairs = places.of(block, index, runs[b]![index]!, sounding ? levelValues : null);
    if (fresh && plain !== null && pairs.distinct) fillPlain(grid, column, pairs, range, plain);
    else {
      if (plain !== null && !sounding) fieldValuesInto(block, index, field, levelValues);
      if (fresh) clearColumn(grid, column);
      mergeColumn(grid, column, pairs, range, levelValues);
    }
    markDoubt(grid, column, pairs, range);
  }
  return grid;
}
