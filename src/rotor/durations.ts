// How long something lasted, out of samples that each stand for the time since the one before.

/** A sample stands for no more than this many usual intervals: longer is a gap, and a gap counts for nothing. */
const GAP = 2.5;

/**
 * Seconds that each sample stands for: the time since the sample before, at most 2.5 usual (median) intervals; the first
 * one a usual interval. Valid times are ends of averaging periods, so time belongs to the sample at its end.
 * @param timeMs ascending
 */
export function sampleDurationsS(timeMs: ArrayLike<number>): Float64Array {
  const count = timeMs.length;
  const intervals = Float64Array.from(
    { length: Math.max(0, count - 1) },
    (_, k) => (timeMs[k + 1]! - timeMs[k]!) / 1000,
  );
  const usual = intervals.slice().sort()[intervals.length >> 1] ?? 0;
  return Float64Array.from({ length: count }, (_, k) => {
    if (k === 0) return usual;
    const since = intervals[k - 1]!;
    return since > GAP * usual ? usual : since;
  });
}

/** Time a value spent in each band. */
export interface BandTimes {
  /** Band i lies between edges[i - 1] and edges[i]; the first is below all edges, the last above. */
  readonly edges: readonly number[];
  readonly seconds: Float64Array;
  /** Seconds without a value. */
  readonly unknownS: number;
}

/** Time in bands of a value, for shear and veer through the night. A value on an edge counts to the band above it. */
export function timeInBands(timeMs: ArrayLike<number>, values: ArrayLike<number>, edges: readonly number[]): BandTimes {
  const durations = sampleDurationsS(timeMs);
  const seconds = new Float64Array(edges.length + 1);
  let unknownS = 0;
  durations.forEach((duration, k) => {
    const value = values[k]!;
    if (Number.isNaN(value)) unknownS += duration;
    else seconds[edges.filter((edge) => value >= edge).length]! += duration;
  });
  return { edges, seconds, unknownS };
}
