// Puts one profile's values into its column of a section.

import { DOUBTING, REJECTING } from '../profile/index.ts';
import type { PlainColumn } from './field-values.ts';
import { FIELDS } from './fields.ts';
import type { LevelRows } from './height-cells.ts';
import { wins } from './pixel-rule.ts';
import type { SectionGrid } from './section-grid.ts';

/** Where a profile's levels stand in its block. */
export interface LevelRange {
  readonly speed: Float32Array;
  readonly mark: Uint32Array;
  readonly start: number;
  readonly count: number;
}

/** A stored column of the block straight into an empty column; no row has more than one level. */
export function fillPlain(
  { rowCount, values, strength }: SectionGrid,
  column: number,
  { count, level, row }: LevelRows,
  { speed, mark, start }: LevelRange,
  plain: PlainColumn,
): void {
  const base = column * rowCount;
  const from = plain.values;
  const { rejecting } = plain;
  // The array begins as zeros: only rows that no level owns need to be told apart.
  if (count < rowCount) values.fill(NaN, base, base + rowCount);
  for (let i = 0; i < count; i++) {
    const at = start + level[i]!;
    values[base + row[i]!] = (mark[at]! & rejecting) === 0 ? from[at]! : NaN;
  }
  if (strength === null) return;
  if (count < rowCount) strength.fill(-Infinity, base, base + rowCount);
  for (let i = 0; i < count; i++) {
    const at = base + row[i]!;
    strength[at] = Number.isNaN(values[at]!) ? -Infinity : strengthOf(speed[start + level[i]!]!);
  }
}

/** A value beside which no wind is known competes as one in a calm. */
function strengthOf(speed: number): number {
  return Number.isNaN(speed) ? 0 : speed;
}

/** Empties a column that nothing was put into yet. */
export function clearColumn({ rowCount, values, strength }: SectionGrid, column: number): void {
  values.fill(NaN, column * rowCount, (column + 1) * rowCount);
  strength?.fill(-Infinity, column * rowCount, (column + 1) * rowCount);
}

/** Any column, into one that may hold values already: the winner of each cell stays. */
export function mergeColumn(
  { field, rowCount, values, strength }: SectionGrid,
  column: number,
  pairs: LevelRows,
  { speed, start }: LevelRange,
  levelValues: Float32Array,
): void {
  const rule = FIELDS[field].pixelRule;
  for (let i = 0; i < pairs.count; i++) {
    const value = levelValues[pairs.level[i]!]!;
    if (Number.isNaN(value)) continue;
    const at = column * rowCount + pairs.row[i]!;
    const wind = strengthOf(speed[start + pairs.level[i]!]!);
    if (!Number.isNaN(values[at]!) && !wins(rule, value, wind, values[at]!, strength?.[at] ?? 0)) continue;
    values[at] = value;
    if (strength !== null) strength[at] = wind;
  }
}

/** A cell is doubtful when any value that fell into it is. */
export function markDoubt(
  { rowCount, values, doubt, doubtWords }: SectionGrid,
  column: number,
  { count, level, row }: LevelRows,
  { mark, start, count: levelCount }: LevelRange,
): void {
  let bits = 0;
  for (let k = start; k < start + levelCount; k++) bits |= mark[k]!;
  if ((bits & DOUBTING) === 0) return;
  for (let i = 0; i < count; i++) {
    const levelBits = mark[start + level[i]!]!;
    if ((levelBits & DOUBTING) === 0 || (levelBits & REJECTING) !== 0) continue;
    if (Number.isNaN(values[column * rowCount + row[i]!]!)) continue;
    const word = column * doubtWords + (row[i]! >> 5);
    doubt[word] = doubt[word]! | (1 << (row[i]! & 31));
  }
}
