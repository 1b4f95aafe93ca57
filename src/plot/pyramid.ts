// The one value that a pixel shows of many that fall into it, exactly, at every zoom. Over a stretch of columns it is
// put together from aligned runs of 1, 2, 4, 8 … columns whose winners are kept ready (binary range decomposition), so
// that a year costs no more than a night, and nothing at the edges of a pixel is guessed.

import { FIELDS, type PixelRule } from './fields.ts';
import { takeWinners, type RowWinners } from './pixel-rule.ts';
import type { SectionGrid } from './section-grid.ts';

export class Pyramid {
  readonly rule: PixelRule;
  readonly rowCount: number;
  readonly columnCount: number;
  /** floors[k] holds runs of 2^k columns; the first is the grid itself. */
  readonly #floors: RowWinners[];

  constructor(grid: SectionGrid) {
    this.rule = FIELDS[grid.field].pixelRule;
    this.rowCount = grid.rowCount;
    this.columnCount = grid.columnCount;
    this.#floors = [{ values: grid.values, strength: grid.strength }];
    for (let runs = grid.columnCount >> 1; runs > 0; runs >>= 1) {
      this.#floors.push(this.#nextFloor(this.#floors[this.#floors.length - 1]!, runs));
    }
  }

  /** Room for `winnersInto`. */
  emptyWinners(): RowWinners {
    return {
      values: new Float32Array(this.rowCount),
      strength: this.rule === 'at-strongest-wind' ? new Float32Array(this.rowCount) : null,
    };
  }

  /** Winners of the columns from `first` up to, not including, `end`. */
  winnersInto(out: RowWinners, first: number, end: number): void {
    out.values.fill(-Infinity);
    out.strength?.fill(-Infinity);
    let from = Math.max(0, first);
    let to = Math.min(this.columnCount, end);
    for (let k = 0; from < to; k++, from >>= 1, to >>= 1) {
      if ((from & 1) === 1) takeWinners(this.rule, out, this.#floors[k]!, this.rowCount * from++);
      if ((to & 1) === 1) takeWinners(this.rule, out, this.#floors[k]!, this.rowCount * --to);
    }
  }

  #nextFloor(below: RowWinners, runs: number): RowWinners {
    const { rowCount } = this;
    const values = new Float32Array(runs * rowCount);
    const strength = below.strength === null ? null : new Float32Array(runs * rowCount);
    if (this.rule === 'greatest') {
      greatestOfPairs(values, below.values, rowCount);
      return { values, strength };
    }
    values.fill(-Infinity);
    strength?.fill(-Infinity);
    for (let run = 0; run < runs; run++) {
      const out = {
        values: values.subarray(run * rowCount, (run + 1) * rowCount),
        strength: strength?.subarray(run * rowCount, (run + 1) * rowCount) ?? null,
      };
      takeWinners(this.rule, out, below, 2 * run * rowCount);
      takeWinners(this.rule, out, below, (2 * run + 1) * rowCount);
    }
    return { values, strength };
  }
}

/** The common case in one pass, straight into the new floor. */
function greatestOfPairs(out: Float32Array, below: Float32Array, rowCount: number): void {
  let at = 0;
  for (let first = 0; at < out.length; first += 2 * rowCount) {
    for (let row = first; row < first + rowCount; row++, at++) {
      const one = below[row]!;
      const other = below[row + rowCount]!;
      out[at] = one > other ? one : Number.isNaN(other) ? one : other;
    }
  }
}
