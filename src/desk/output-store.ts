// A farm's actual output as its own systems report it, out of any number of files.

/** Output by time, kW; times are ends of averaging periods, UTC ms, ascending. */
export interface ActualOutput {
  readonly timeMs: Float64Array;
  readonly powerKw: Float64Array;
  /** Names of the files, in the order of the alphabet. */
  readonly sources: readonly string[];
}

/** Holds output by file. Where two files tell of one time, the file last in the alphabet counts, whichever came first. */
export class OutputStore {
  readonly #files = new Map<string, { readonly timeMs: Float64Array; readonly powerKw: Float64Array }>();
  #merged: ActualOutput | null = null;

  accept(source: string, timeMs: Float64Array, powerKw: Float64Array): void {
    this.#files.set(source, { timeMs, powerKw });
    this.#merged = null;
  }

  /** All of it; null where nothing is held. */
  all(): ActualOutput | null {
    if (this.#files.size === 0) return null;
    if (this.#merged === null) {
      const sources = [...this.#files.keys()].sort();
      const byTime = new Map<number, number>();
      for (const source of sources) {
        const { timeMs, powerKw } = this.#files.get(source)!;
        timeMs.forEach((time, k) => byTime.set(time, powerKw[k]!));
      }
      const sorted = [...byTime].sort(([a], [b]) => a - b);
      this.#merged = {
        timeMs: Float64Array.from(sorted, ([time]) => time),
        powerKw: Float64Array.from(sorted, ([, power]) => power),
        sources,
      };
    }
    return this.#merged;
  }
}
