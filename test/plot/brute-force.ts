// What a pixel must show, the slow and plain way: every cell that overlaps it, one after the other.

import type { PixelRule, SectionGrid, SectionView } from '../../src/plot/index.ts';

export interface BrutePixel {
  /** NaN where no cell with a value overlaps. */
  value: number;
  doubtful: boolean;
}

const TOUCH = 1e-6;

export function brutePixel(grid: SectionGrid, rule: PixelRule, view: SectionView, x: number, y: number): BrutePixel {
  const stepT = (view.endMs - view.startMs) / view.width;
  const stepZ = (view.top - view.bottom) / view.height;
  const line = view.height - 1 - y;
  const found: { value: number; wind: number }[] = [];
  let doubtful = false;
  for (let column = 0; column < grid.columnCount; column++) {
    if (!(grid.endMs[column]! > view.startMs + (x + TOUCH) * stepT)) continue;
    if (!(grid.startMs[column]! < view.startMs + (x + 1 - TOUCH) * stepT)) continue;
    for (let row = 0; row < grid.rowCount; row++) {
      if (!(grid.edges[row + 1]! > view.bottom + (line + TOUCH) * stepZ)) continue;
      if (!(grid.edges[row]! < view.bottom + (line + 1 - TOUCH) * stepZ)) continue;
      const at = column * grid.rowCount + row;
      if (Number.isNaN(grid.values[at]!)) continue;
      found.push({ value: grid.values[at]!, wind: grid.strength?.[at] ?? NaN });
      if (((grid.doubt[column * grid.doubtWords + (row >> 5)]! >>> (row & 31)) & 1) === 1) doubtful = true;
    }
  }
  if (found.length === 0) return { value: NaN, doubtful: false };
  const values = found.map((cell) => cell.value);
  if (rule === 'greatest') return { value: Math.max(...values), doubtful };
  if (rule === 'largest-size') {
    const size = Math.max(...values.map(Math.abs));
    return { value: values.includes(size) ? size : -size, doubtful };
  }
  const strongest = Math.max(...found.map((cell) => cell.wind));
  return { value: Math.max(...found.filter((cell) => cell.wind === strongest).map((cell) => cell.value)), doubtful };
}
