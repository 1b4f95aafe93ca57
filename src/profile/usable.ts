// The levels that computations use: known height and speed, no rejecting mark.

import type { Profile, ProfileBlock } from './block.ts';
import { REJECTING } from './marks.ts';

/** Usable wind levels of one profile, packed and ascending. Reused from profile to profile: copy what must last. */
export interface WindColumn {
  count: number;
  /** m above ground */
  heightAgl: Float64Array;
  /** m/s */
  speed: Float64Array;
  /** degrees; NaN where only the speed is known */
  direction: Float64Array;
  /** m/s; NaN where not stated */
  speedUncertainty: Float64Array;
  /** Quality marks of the kept levels. */
  mark: Uint32Array;
  /** Position of each kept level within its profile. */
  level: Uint32Array;
}

/** An empty column with room for so many levels; `gatherWind` enlarges it when needed. */
export function windColumn(capacity = 256): WindColumn {
  return {
    count: 0,
    heightAgl: new Float64Array(capacity),
    speed: new Float64Array(capacity),
    direction: new Float64Array(capacity),
    speedUncertainty: new Float64Array(capacity),
    mark: new Uint32Array(capacity),
    level: new Uint32Array(capacity),
  };
}

/**
 * Gathers the usable wind levels of a profile into `out`.
 * @returns `out`, for chaining; levels with NaN height or speed or with a rejecting mark are passed over
 */
export function gatherWind(profile: Profile, out: WindColumn): WindColumn {
  return gather(profile, 0, profile.levelCount, Infinity, out);
}

/**
 * The same for the i-th profile of a block, without making the view.
 * @param upTo m above ground: the first usable level at or above it is the last one taken
 */
export function gatherWindAt(block: ProfileBlock, index: number, out: WindColumn, upTo = Infinity): WindColumn {
  return gather(block, block.offsets[index]!, block.offsets[index + 1]!, upTo, out);
}

function gather(levels: Profile | ProfileBlock, start: number, end: number, upTo: number, out: WindColumn): WindColumn {
  if (out.heightAgl.length < end - start) Object.assign(out, windColumn(2 * (end - start)));
  const { heightAgl, speed, direction, speedUncertainty, mark } = levels;
  let count = 0;
  for (let k = start; k < end; k++) {
    if ((mark[k]! & REJECTING) !== 0 || !(heightAgl[k]! > -Infinity) || !(speed[k]! >= 0)) continue;
    out.heightAgl[count] = heightAgl[k]!;
    out.speed[count] = speed[k]!;
    out.direction[count] = direction[k]!;
    out.speedUncertainty[count] = speedUncertainty === null ? NaN : speedUncertainty[k]!;
    out.mark[count] = mark[k]!;
    out.level[count] = k - start;
    count++;
    if (heightAgl[k]! >= upTo) break;
  }
  out.count = count;
  return out;
}
