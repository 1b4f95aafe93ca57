// Counts by classes of equal width, that can be joined in any order with the same result to the last bit.

/** Plain data: counts of values in classes [start + i step, start + (i + 1) step); beyond both ends they are counted apart. */
export interface Histogram {
  readonly start: number;
  readonly step: number;
  readonly counts: readonly number[];
  readonly below: number;
  readonly above: number;
  /** All values counted, those below and above too. */
  readonly total: number;
  /** Mean of all values; NaN of none. */
  readonly mean: number;
}

/** Sums run in whole thousandths, which add up exactly: so the mean does not depend on the order. */
const PARTS = 1000;

export class HistogramTally {
  readonly #start: number;
  readonly #step: number;
  readonly #counts: Float64Array;
  #below = 0;
  #above = 0;
  #sum = 0;

  constructor(start: number, step: number, classes: number) {
    this.#start = start;
    this.#step = step;
    this.#counts = new Float64Array(classes);
  }

  /** Counts a value; NaN is passed over. */
  add(value: number): void {
    if (Number.isNaN(value)) return;
    const place = Math.floor((value - this.#start) / this.#step);
    if (place < 0) this.#below++;
    else if (place >= this.#counts.length) this.#above++;
    else this.#counts[place]!++;
    this.#sum += Math.round(value * PARTS);
  }

  /** Takes in what another tally of the same classes counted. */
  merge(other: HistogramTally): void {
    for (let k = 0; k < this.#counts.length; k++) this.#counts[k]! += other.#counts[k]!;
    this.#below += other.#below;
    this.#above += other.#above;
    this.#sum += other.#sum;
  }

  histogram(): Histogram {
    const total = this.#counts.reduce((sum, count) => sum + count, this.#below + this.#above);
    return {
      start: this.#start,
      step: this.#step,
      counts: [...this.#counts],
      below: this.#below,
      above: this.#above,
      total,
      mean: total === 0 ? NaN : this.#sum / PARTS / total,
    };
  }
}
