// Paints a section into pixels. Pure: same grid and view, same bytes; runs in a worker as well as on the page.

import { columnRanges, rowRanges, type PixelRanges, type SectionView } from './pixel-ranges.ts';
import { Pyramid } from './pyramid.ts';
import { SCALE_STEPS, type ColourScale, type ValueRange } from './scales.ts';
import { takeWinners, type RowWinners } from './pixel-rule.ts';
import type { SectionGrid } from './section-grid.ts';

export interface SectionPaint {
  readonly scale: ColourScale;
  readonly range: ValueRange;
  /** Distance of the hatching lines over doubtful values, device pixels; 0 leaves them out. 8 unless told. */
  readonly hatch?: number;
  /** How much is to be trusted, 0 to 1, per column: what is trusted less fades into the ground. All 1 unless told. */
  readonly trust?: Float32Array;
}

/** Share of a doubtful value's colour that stays under a hatching line. */
const HATCH_STAYS = 0.5;

/** What falls into the view's pixel columns, one line of `width` values per row of the grid in view. */
interface Gathered extends RowWinners {
  readonly firstRow: number;
}

/**
 * Holds a grid with what is needed to paint it fast, and paints any view of it.
 * A pixel shows the winner, by the field's pixel rule, of all cells that overlap it; where there is none it stays
 * transparent, so that the ground shows. Any doubtful value among them hatches it.
 */
export class SectionPainter {
  readonly grid: SectionGrid;
  readonly #pyramid: Pyramid;
  readonly #winners: RowWinners;
  readonly #anyDoubt: boolean;

  constructor(grid: SectionGrid) {
    this.grid = grid;
    this.#pyramid = new Pyramid(grid);
    this.#winners = this.#pyramid.emptyWinners();
    this.#anyDoubt = grid.doubt.some((word) => word !== 0);
  }

  /**
   * @param out where to paint, `4 * width * height` long, to spare the making of a new one
   * @returns red, green, blue, alpha of each pixel, from the upper left, row by row
   */
  paint(view: SectionView, paint: SectionPaint, out?: Uint8ClampedArray<ArrayBuffer>): Uint8ClampedArray<ArrayBuffer> {
    const { width, height } = view;
    const pixels = out ?? new Uint8ClampedArray(4 * width * height);
    const image = new Uint32Array(pixels.buffer, pixels.byteOffset, width * height);
    const columns = columnRanges(this.grid, view);
    const lines = rowRanges(this.grid, view);
    const gathered = this.#gather(columns, lines);
    this.#fill(image, lines, gathered, paint);
    if (this.#anyDoubt && paint.hatch !== 0) this.#hatch(pixels, view, columns, lines, paint.hatch ?? 8);
    if (paint.trust !== undefined) fade(pixels, columns, paint.trust);
    return pixels;
  }

  #gather(columns: PixelRanges, lines: PixelRanges): Gathered {
    const { rowCount } = this.grid;
    const width = columns.first.length;
    const height = lines.first.length;
    const firstRow = lines.first[height - 1] ?? 0;
    const rows = Math.max(0, (lines.end[0] ?? 0) - firstRow);
    const values = new Float32Array(rows * width).fill(-Infinity);
    const strength = this.grid.strength === null ? null : new Float32Array(rows * width).fill(-Infinity);
    const winners = this.#winners;
    for (let x = 0; x < width; x++) {
      const first = columns.first[x]!;
      const end = columns.end[x]!;
      if (first >= end) continue;
      const same = x > 0 && first === columns.first[x - 1] && end === columns.end[x - 1];
      if (!same) this.#pyramid.winnersInto(winners, first, end);
      for (let row = 0; row < rows; row++) values[row * width + x] = winners.values[firstRow + row]!;
      if (strength === null) continue;
      for (let row = 0; row < rows; row++) strength[row * width + x] = winners.strength![firstRow + row]!;
    }
    return { firstRow: Math.min(firstRow, rowCount), values, strength };
  }

  #fill(image: Uint32Array, lines: PixelRanges, gathered: Gathered, paint: SectionPaint): void {
    const height = lines.first.length;
    const width = height === 0 ? 0 : image.length / height;
    const colours = new Uint32Array(paint.scale.rgba.buffer, paint.scale.rgba.byteOffset, SCALE_STEPS);
    for (let y = 0; y < height; y++) {
      const first = lines.first[y]!;
      const end = lines.end[y]!;
      const start = y * width;
      if (first >= end) image.fill(0, start, start + width);
      else if (y > 0 && first === lines.first[y - 1] && end === lines.end[y - 1]) {
        image.copyWithin(start, start - width, start);
      } else {
        const line = this.#lineOf(gathered, first - gathered.firstRow, end - gathered.firstRow, width);
        colourLine(image, start, line, colours, paint);
      }
    }
  }

  /** Winners of some rows of what was gathered: the row itself where it is one. */
  #lineOf(gathered: Gathered, first: number, end: number, width: number): Float32Array {
    const { values, strength } = gathered;
    if (end - first === 1) return values.subarray(first * width, end * width);
    const line = {
      values: values.slice(first * width, (first + 1) * width),
      strength: strength?.slice(first * width, (first + 1) * width) ?? null,
    };
    for (let row = first + 1; row < end; row++) takeWinners(this.#pyramid.rule, line, gathered, row * width);
    return line.values;
  }

  /** Crossed lines at a slant; they hold to the data's time, so that they move with it. */
  #hatch(
    pixels: Uint8ClampedArray,
    view: SectionView,
    columns: PixelRanges,
    lines: PixelRanges,
    spacing: number,
  ): void {
    const { width, height } = view;
    const phase = Math.round((view.startMs / (view.endMs - view.startMs)) * width) % spacing;
    const doubtful = this.#doubtOf(columns);
    for (let y = 0; y < height; y++) {
      const first = lines.first[y]!;
      const end = lines.end[y]!;
      for (const slant of [y, spacing - (y % spacing)]) {
        for (let x = (2 * spacing - ((phase + slant) % spacing)) % spacing; x < width; x += spacing) {
          const at = 4 * (y * width + x) + 3;
          if (pixels[at] === 0 || !doubtful(x, first, end)) continue;
          pixels[at] = Math.min(pixels[at]!, 255 * HATCH_STAYS);
        }
      }
    }
  }

  /** Whether any of some rows is doubtful under a pixel column. */
  #doubtOf(columns: PixelRanges): (x: number, firstRow: number, endRow: number) => boolean {
    const { doubt, doubtWords } = this.grid;
    const width = columns.first.length;
    const words = new Uint32Array(width * doubtWords);
    for (let x = 0; x < width; x++) {
      for (let column = columns.first[x]!; column < columns.end[x]!; column++) {
        for (let word = 0; word < doubtWords; word++) {
          words[x * doubtWords + word] = words[x * doubtWords + word]! | doubt[column * doubtWords + word]!;
        }
      }
    }
    return (x, firstRow, endRow) => {
      for (let row = firstRow; row < endRow; row++) {
        if ((words[x * doubtWords + (row >> 5)]! & (1 << (row & 31))) !== 0) return true;
      }
      return false;
    };
  }
}

function colourLine(
  image: Uint32Array,
  start: number,
  line: Float32Array,
  colours: Uint32Array,
  { scale, range }: SectionPaint,
): void {
  const factor = SCALE_STEPS / (range.high - range.low);
  const low = range.low;
  const last = SCALE_STEPS - 1;
  const cyclic = scale.kind === 'cyclic';
  for (let x = 0; x < line.length; x++) {
    const position = (line[x]! - low) * factor;
    if (position === -Infinity) image[start + x] = 0;
    else if (cyclic) image[start + x] = colours[Math.floor(position) & last]!;
    else image[start + x] = colours[position <= 0 ? 0 : position >= last ? last : position | 0]!;
  }
}

/** Opacity by trust; of several columns under a pixel the least trusted. */
function fade(pixels: Uint8ClampedArray, { first, end }: PixelRanges, trust: Float32Array): void {
  const width = first.length;
  for (let x = 0; x < width; x++) {
    let least = 1;
    for (let column = first[x]!; column < end[x]!; column++) least = Math.min(least, trust[column]!);
    if (least === 1) continue;
    for (let at = 4 * x + 3; at < pixels.length; at += 4 * width) pixels[at] = pixels[at]! * least;
  }
}
