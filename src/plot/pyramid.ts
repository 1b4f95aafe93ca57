// The one value that a pixel shows of many that fall into it, exactly, at every zoom. Over a stretch of columns it is
// put together from aligned runs of 1, 2, 4, 8 … columns whose winners are kept ready (binary range decomposition), so
// that a year costs no more than a night, and nothing at the edges of a pixel is guessed.

import { FIELDS, type PixelRule } from './fields.ts';
import { wins, type SectionGrid } from './section-grid.ts';

/** Winners of runs of 2^k columns, one value a row; NaN where the whole run is empty. */
interface Floor {
  readonly values: Float32Array;
  readonly strength: Float32Array | null;
}

/** Winners of a stretch of columns, one a row. */
export interface RowWinners {
  /** NaN where nothing was measured. */
  readonly values: Float32Array;
  readonly strength: Float32Array | null;
}

export class Pyramid {
  readonly rule: PixelRule;
  readonly rowCount: number;
  readonly columnCount: number;
  /** floors[k] holds runs of 2^k columns; the first is the grid itself. */
  readonly #floors: Floor[];

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
    out.values.fill(NaN);
    out.strength?.fill(NaN);
    let from = Math.max(0, first);
    let to = Math.min(this.columnCount, end);
    for (let k = 0; from < to; k++, from >>= 1, to >>= 1) {
      if ((from & 1) === 1) this.#take(out, this.#floors[k]!, from++);
      if ((to & 1) === 1) this.#take(out, this.#floors[k]!, --to);
    }
  }

  #nextFloor(below: Floor, runs: number): Floor {
    const { rowCount } = this;
    const values = new Float32Array(runs * rowCount);
    const strength = below.strength === null ? null : new Float32Array(runs * rowCount);
    if (this.rule === 'greatest') {
      greatestOfPairs(values, below.values, rowCount);
      return { values, strength };
    }
    values.fill(NaN);
    strength?.fill(NaN);
    for (let run = 0; run < runs; run++) {
      const out = {
        values: values.subarray(run * rowCount, (run + 1) * rowCount),
        strength: strength?.subarray(run * rowCount, (run + 1) * rowCount) ?? null,
      };
      this.#take(out, below, 2 * run);
      this.#take(out, below, 2 * run + 1);
    }
    return { values, strength };
  }

  /** Lets one run's winners compete with those in `out`. */
  #take(out: RowWinners, floor: Floor, run: number): void {
    const base = run * this.rowCount;
    if (this.rule === 'greatest') takeGreatest(out.values, floor.values, base);
    else takeByRule(this.rule, out, floor, base);
  }
}

/** The common case by itself, since it is most of the painter's work. Comparisons are so worded that NaN loses. */
function takeGreatest(out: Float32Array, values: Float32Array, base: number): void {
  for (let row = 0; row < out.length; row++) {
    const value = values[base + row]!;
    if (!(value <= out[row]!) && value === value) out[row] = value;
  }
}

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

function takeByRule(rule: PixelRule, out: RowWinners, floor: Floor, base: number): void {
  for (let row = 0; row < out.values.length; row++) {
    const value = floor.values[base + row]!;
    if (Number.isNaN(value)) continue;
    const wind = floor.strength?.[base + row] ?? NaN;
    const held = out.values[row]!;
    if (!Number.isNaN(held) && !wins(rule, value, wind, held, out.strength?.[row] ?? NaN)) continue;
    out.values[row] = value;
    if (out.strength !== null) out.strength[row] = wind;
  }
}
