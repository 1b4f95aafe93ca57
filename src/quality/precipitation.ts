// Precipitation: where the vertical speed is that of falling rain or snow, the wind is that of the drops, and a profiler's
// horizontal wind may be off where the rain is uneven. Fall speeds: Gunn & Kinzer (1949, J. Meteor. 6), 2 to 9 m/s for drops
// of 0.5 to 5 mm (from memory); snow falls at 1 to 2 m/s. The threshold is common practice, without source.

import { MARK } from '../profile/index.ts';
import type { Screened } from './series.ts';

/** Downward, m/s: beyond the subsidence and the waves of a 10-minute mean. */
const FALLING = 1.5;
/** So many gates in a row: a lone one is noise. */
const FEWEST_GATES = 3;

/** Adds `precipitation` to levels in a falling layer. */
export function precipitation({ block }: Screened, marks: Uint32Array): void {
  const { verticalSpeed, offsets } = block;
  if (verticalSpeed === null) return;
  for (let i = 0; i < block.profileCount; i++) {
    const end = offsets[i + 1]!;
    let first = offsets[i]!;
    for (let k = first; k <= end; k++) {
      if (k < end && verticalSpeed[k]! <= -FALLING) continue;
      if (k - first >= FEWEST_GATES) for (let m = first; m < k; m++) marks[m]! |= MARK.precipitation;
      first = k + 1;
    }
  }
}
