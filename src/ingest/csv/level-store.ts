// Levels in the order of the table, as columns of numbers, each with the profile it belongs to.

import type { LevelMeaning } from './headings.ts';

/** The levels of one profile together, in table order. */
export interface Gathered {
  /** Length of `groups` + 1: group i owns levels offsets[i] up to offsets[i + 1]. */
  readonly offsets: Uint32Array;
  readonly columns: ReadonlyMap<LevelMeaning, Float64Array>;
}

/** Grows as levels come; columns of equal length, NaN missing. */
export class LevelStore {
  readonly meanings: readonly LevelMeaning[];
  readonly columns: Float64Array[];
  count = 0;
  #group = new Uint32Array(4096);

  constructor(meanings: readonly LevelMeaning[]) {
    this.meanings = meanings;
    this.columns = meanings.map(() => new Float64Array(4096).fill(NaN));
  }

  /** A new level of a group; returns its position, all its values missing. */
  next(group: number): number {
    if (this.count === this.#group.length) this.#grow();
    this.#group[this.count] = group;
    return this.count++;
  }

  /** Values of a column so far, up to the given number, for a look. */
  peek(meaning: LevelMeaning, most: number): Float64Array {
    return this.columns[this.meanings.indexOf(meaning)]!.subarray(0, Math.min(this.count, most));
  }

  /** Takes out the levels of groups 0 up to `groupCount`; the levels of later groups stay and count from 0. */
  takeOut(groupCount: number): Gathered {
    const offsets = new Uint32Array(groupCount + 1);
    let left = 0;
    for (let k = 0; k < this.count; k++) {
      const group = this.#group[k]!;
      if (group < groupCount) offsets[group + 1]!++;
      else left++;
    }
    for (let group = 0; group < groupCount; group++) offsets[group + 1]! += offsets[group]!;
    const taken = this.count - left;
    const place = this.#places(offsets, groupCount);
    const columns = new Map(
      this.meanings.map((meaning, c) => {
        const from = this.columns[c]!;
        const to = new Float64Array(taken);
        for (let k = 0; k < this.count; k++) if (place[k]! < taken) to[place[k]!] = from[k]!;
        return [meaning, to];
      }),
    );
    this.#keepOnly(place, taken, groupCount, left);
    return { offsets, columns };
  }

  /** Where each level goes: within its group in table order; levels that stay get a place past all those taken. */
  #places(offsets: Uint32Array, groupCount: number): Uint32Array {
    const next = offsets.slice();
    const place = new Uint32Array(this.count);
    const taken = offsets[groupCount]!;
    for (let k = 0; k < this.count; k++) {
      const group = this.#group[k]!;
      place[k] = group < groupCount ? next[group]!++ : taken;
    }
    return place;
  }

  #keepOnly(place: Uint32Array, taken: number, groupCount: number, left: number): void {
    let to = 0;
    for (let k = 0; k < this.count; k++) {
      if (place[k]! < taken) continue;
      this.#group[to] = this.#group[k]! - groupCount;
      for (const column of this.columns) column[to] = column[k]!;
      to++;
    }
    for (const column of this.columns) column.fill(NaN, left, this.count);
    this.count = left;
  }

  #grow(): void {
    const length = this.#group.length * 2;
    const group = new Uint32Array(length);
    group.set(this.#group);
    this.#group = group;
    this.columns.forEach((column, c) => {
      const grown = new Float64Array(length).fill(NaN);
      grown.set(column);
      this.columns[c] = grown;
    });
  }
}
