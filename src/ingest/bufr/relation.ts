// Data present bit-maps: which earlier element each value behind a 2 22 to 2 32 operator relates to.

import { damaged } from './trouble.ts';

export class Relation {
  /** Kind of operator in force: 22 quality, 23 substituted, 24 and 25 statistics, 32 replaced; 0: none. */
  kind = 0;
  /** Elements before this one are what bit-maps relate to; -1: not yet fixed. */
  #anchor = -1;
  #bits: number[] = [];
  #targets: number[] | null = null;
  #next = 0;

  /** An operator of the kind begins. @param count elements so far */
  begin(kind: number, count: number): void {
    this.kind = kind;
    this.#bits = [];
    this.#next = 0;
    // Later operators relate to the same data as the first, until a 2 35 (its definition in Table C).
    if (this.#anchor < 0) this.#anchor = count;
  }

  /** 2 35: the next bit-map relates to what stands directly before its operator. */
  forget(): void {
    this.kind = 0;
    this.#anchor = -1;
    this.#bits = [];
    this.#targets = null;
    this.#next = 0;
  }

  /** A data present indicator: 0 present, 1 not. */
  indicate(bit: number): void {
    this.#targets = null;
    this.#bits.push(bit);
  }

  /**
   * The element that the next value relates to; -1 when all are served.
   * @throws DuskveerError `ingest/bufr-damaged` when the bit-map is longer than the data before it
   */
  next(): number {
    this.#targets ??= this.#place();
    return this.#next < this.#targets.length ? this.#targets[this.#next++]! : -1;
  }

  #place(): number[] {
    const first = this.#anchor - this.#bits.length;
    if (first < 0) throw damaged('A bit-map of data present is longer than the data it speaks of.');
    const targets: number[] = [];
    for (let k = 0; k < this.#bits.length; k++) if (this.#bits[k] === 0) targets.push(first + k);
    return targets;
  }
}
