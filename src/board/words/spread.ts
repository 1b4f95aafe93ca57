// Numbers out of a histogram, for words: where the middle of the values lies, and the middle half.

import type { Histogram } from '../../desk/index.ts';

/** The value that a share of all lies below, straight lines within a class; NaN of none, the ends where it lies beyond. */
export function quantile({ start, step, counts, below, total }: Histogram, share: number): number {
  if (total === 0) return NaN;
  const wanted = share * total;
  let passed = below;
  if (wanted <= passed) return start;
  for (const [k, count] of counts.entries()) {
    if (passed + count >= wanted) return start + (k + (wanted - passed) / count) * step;
    passed += count;
  }
  return start + counts.length * step;
}
