// Where the levels of a profile go on the rows of a section.

import { MARK, REJECTING, type ProfileBlock } from '../profile/index.ts';
import { LevelRows, type HeightRows } from './height-cells.ts';

/** Profiles with the same gates are placed once. */
export class ProfilePlaces {
  readonly #pairs = new LevelRows();
  readonly #rows: HeightRows;
  #heights = new Float64Array(256);
  #levels = new Uint32Array(256);
  #block: ProfileBlock | null = null;
  #run = -1;

  constructor(rows: HeightRows) {
    this.#rows = rows;
  }

  /**
   * @param run the first profile of those with the same gates
   * @param values of a sounding's levels: those without one own no place, since a sounding's levels are picked where
   * something changes. Null for gates: one that was rejected or is empty owns its place and leaves it empty.
   */
  of(block: ProfileBlock, index: number, run: number, values: Float32Array | null): LevelRows {
    if (values === null && this.#block === block && this.#run === run) return this.#pairs;
    const count = this.#gather(block, index, values);
    this.#pairs.assign(this.#heights, this.#levels, count, this.#rows);
    this.#block = values === null ? block : null;
    this.#run = run;
    return this.#pairs;
  }

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
