// Which cells of a section overlap which pixels of a view.

import type { SectionGrid } from './section-grid.ts';

/** What part of time and height is shown, on how many device pixels. */
export interface SectionView {
  /** UTC ms at the left and right edge. */
  readonly startMs: number;
  readonly endMs: number;
  /** m above ground at the lower and upper edge. */
  readonly bottom: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

/** Cells `first[i]` up to, not including, `end[i]` overlap pixel i; none when they are equal. */
export interface PixelRanges {
  readonly first: Int32Array;
  readonly end: Int32Array;
}

/** A cell that covers less than this share of a pixel does not overlap it: guards against rounding at equal edges. */
const TOUCH = 1e-6;

/** Columns under each pixel column, from the left. */
export function columnRanges(grid: SectionGrid, { startMs, endMs, width }: SectionView): PixelRanges {
  const step = (endMs - startMs) / width;
  return ranges(width, grid.columnCount, grid.startMs, grid.endMs, (pixel) => [
    startMs + (pixel + TOUCH) * step,
    startMs + (pixel + 1 - TOUCH) * step,
  ]);
}

/** Rows under each pixel line, from the top. */
export function rowRanges({ edges, rowCount }: SectionGrid, { bottom, top, height }: SectionView): PixelRanges {
  const step = (top - bottom) / height;
  const upward = ranges(height, rowCount, edges, edges.subarray(1), (pixel) => [
    bottom + (pixel + TOUCH) * step,
    bottom + (pixel + 1 - TOUCH) * step,
  ]);
  return { first: upward.first.reverse(), end: upward.end.reverse() };
}

type Edges = Float64Array | Float32Array;

/** One pass over pixels and cells, both ascending. */
function ranges(
  pixels: number,
  cells: number,
  lower: Edges,
  upper: Edges,
  extent: (pixel: number) => [from: number, to: number],
): PixelRanges {
  const first = new Int32Array(pixels);
  const end = new Int32Array(pixels);
  let low = cells > 0 && pixels > 0 ? firstAbove(upper, cells, extent(0)[0]) : 0;
  let high = low;
  for (let pixel = 0; pixel < pixels; pixel++) {
    const [from, to] = extent(pixel);
    while (low < cells && upper[low]! <= from) low++;
    if (high < low) high = low;
    while (high < cells && lower[high]! < to) high++;
    first[pixel] = low;
    end[pixel] = high;
  }
  return { first, end };
}

/** First cell whose upper edge lies above a value. */
function firstAbove(upper: Edges, cells: number, value: number): number {
  let low = 0;
  let high = cells;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (upper[middle]! <= value) low = middle + 1;
    else high = middle;
  }
  return low;
}
