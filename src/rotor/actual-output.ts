// A farm's actual output beside the reckoned one: at the same times.

import { sampleDurationsS } from './durations.ts';

/**
 * Mean of a series over the time that each given time stands for: since the one before, at most the usual (median) interval.
 * Times of both are ends of their periods.
 * @param timeMs ascending, to which the series is brought
 * @param series ascending in time; NaN is passed over
 * @returns kW; NaN where nothing was measured in the interval
 */
export function meanOutputAt(
  timeMs: ArrayLike<number>,
  series: { readonly timeMs: ArrayLike<number>; readonly powerKw: ArrayLike<number> },
): Float64Array {
  const durations = sampleDurationsS(timeMs);
  let from = 0;
  return durations.map((duration, k) => {
    const end = timeMs[k]!;
    const begin = end - duration * 1000;
    while (from < series.timeMs.length && series.timeMs[from]! <= begin) from++;
    let [sum, count] = [0, 0];
    for (let j = from; j < series.timeMs.length && series.timeMs[j]! <= end; j++) {
      if (Number.isNaN(series.powerKw[j]!)) continue;
      sum += series.powerKw[j]!;
      count++;
    }
    return sum / count;
  });
}
