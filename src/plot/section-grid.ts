// A time-height section as a regular grid: what the painter draws, the table lists and the CSV holds.

import type { FieldName } from './fields.ts';

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
  /**
   * Wind speed in the same layout for fields shown at the strongest wind, else null: 0 where the wind is not known,
   * -Infinity where there is no value.
   */
  readonly strength: Float32Array | null;
  /** One bit a cell: a value that fell into it is doubtful. Row r of column c: bit r & 31 of word `c * doubtWords + (r >> 5)`. */
  readonly doubt: Uint32Array;
  readonly doubtWords: number;
}
