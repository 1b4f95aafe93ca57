// The cells of a section in view as numbers, for those who would rather read a table than a picture.

import type { SectionGrid, SectionView } from '../../plot/index.ts';
import type { SectionTable } from './protocol.ts';

/** More columns than this nobody reads; the newest are kept, and the table says how many it leaves out. */
const MOST_COLUMNS = 300;

/** The cells that the view touches and that ended by `untilMs`. */
export function sectionTable(grid: SectionGrid, view: SectionView, untilMs: number): SectionTable {
  const columns: number[] = [];
  for (let c = 0; c < grid.columnCount; c++) {
    if (grid.endMs[c]! > view.startMs && grid.startMs[c]! < view.endMs && grid.endMs[c]! <= untilMs) columns.push(c);
  }
  const rows: number[] = [];
  for (let r = 0; r < grid.rowCount; r++) {
    if (grid.edges[r + 1]! > view.bottom && grid.edges[r]! < view.top) rows.push(r);
  }
  const kept = columns.slice(-MOST_COLUMNS);
  const values = new Float32Array(kept.length * rows.length);
  kept.forEach((c, k) => rows.forEach((r, j) => (values[k * rows.length + j] = grid.values[c * grid.rowCount + r]!)));
  return {
    timeMs: Float64Array.from(kept, (c) => grid.endMs[c]!),
    bottom: Float32Array.from(rows, (r) => grid.edges[r]!),
    top: Float32Array.from(rows, (r) => grid.edges[r + 1]!),
    values,
    left: columns.length - kept.length,
  };
}
