// The elements of one data section, in order: the instruction each came from, its value, what is said of its quality.

import { tooLarge } from './trouble.ts';

/** Values of a data section in all; a report of a second's resolution has some 100,000. */
const MOST_VALUES = 2 ** 22;

/** Bits of what is said of a value. */
export const SAID = {
  doubted: 1,
  rejected: 2,
  /** The value belongs to what follows a 2 22 to 2 32 operator: about data, not data. */
  aside: 4,
  /** The sender holds the value for poor and gives a better one further on. */
  substituted: 8,
} as const;

export class Elements {
  count = 0;
  /** Reports side by side: 1, or all of a compressed message. */
  reports = 1;
  /** Instruction of each element. */
  instruction = new Int32Array(4096);
  /** Element-major: the value of report r of element e is at e * reports + r. NaN missing; of texts, the index in `texts`. */
  value = new Float64Array(4096);
  /** Bits of SAID, placed like `value`. */
  said = new Uint8Array(4096);
  texts: string[] = [];

  clear(reports: number): void {
    this.count = 0;
    this.reports = reports;
    this.texts = [];
  }

  /**
   * Adds an element whose values the caller then fills in.
   * @returns place of its first value
   * @throws DuskveerError `ingest/bufr-too-large`
   */
  add(instruction: number, said: number): number {
    const { count, reports } = this;
    const first = count * reports;
    const end = first + reports;
    if (end > this.value.length || count === this.instruction.length) this.#grow(end);
    this.instruction[count] = instruction;
    if (reports === 1) this.said[first] = said;
    else this.said.fill(said, first, end);
    this.count = count + 1;
    return first;
  }

  #grow(needed: number): void {
    if (needed > MOST_VALUES) throw tooLarge(`The message unfolds to more than ${MOST_VALUES} values.`);
    const grown = <T extends Int32Array | Float64Array | Uint8Array>(from: T, to: T): T => {
      to.set(from);
      return to;
    };
    if (this.count === this.instruction.length) {
      this.instruction = grown(this.instruction, new Int32Array(2 * this.count));
    }
    if (needed > this.value.length) {
      const length = Math.max(needed, 2 * this.value.length);
      this.value = grown(this.value, new Float64Array(length));
      this.said = grown(this.said, new Uint8Array(length));
    }
  }
}
