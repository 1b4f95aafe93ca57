// From a profile's usable levels to what the engine reads: cut at the ceiling, with a point at the ceiling where asked.

import type { WindColumn } from '../profile/index.ts';
import type { Criteria } from './criteria.ts';
import { noseColumn, type NoseColumn } from './nose.ts';

/** How the column was cut, so that other speeds of the same levels can be cut alike. */
export interface Cut {
  /** Levels at or below the ceiling. */
  kept: number;
  /** Share of the way from the highest kept level to the next one at which the ceiling lies; NaN if no point was added. */
  ceilingShare: number;
}

/**
 * Cuts the usable levels at the ceiling of the criteria into `out`. Where levels lie above the ceiling and the highest
 * kept one is below it, a point at the ceiling is added, speed linear in height, except for criteria that look at the
 * greatest speed only.
 */
export function cutAtCeilingInto(wind: WindColumn, criteria: Criteria, out: NoseColumn, cut: Cut): void {
  if (out.heightAgl.length < wind.count + 1) Object.assign(out, noseColumn(2 * wind.count + 2));
  const { ceiling } = criteria;
  const { heightAgl, speed, uncertainty } = out;
  let kept = 0;
  for (; kept < wind.count; kept++) {
    const height = wind.heightAgl[kept]!;
    if (height > ceiling) break;
    heightAgl[kept] = height;
    speed[kept] = wind.speed[kept]!;
  }
  cut.kept = kept;
  cut.ceilingShare = NaN;
  out.count = kept;
  out.reachesCeiling = kept < wind.count || (kept > 0 && heightAgl[kept - 1]! >= ceiling);
  if (criteria.endingRise === 'uncertainty') {
    for (let k = 0; k < kept; k++) uncertainty[k] = wind.speedUncertainty[k]!;
  }
  const wantsPoint = criteria.candidates !== 'strongest' && kept > 0 && kept < wind.count;
  if (!wantsPoint || heightAgl[kept - 1]! >= ceiling) return;
  const share = (ceiling - heightAgl[kept - 1]!) / (wind.heightAgl[kept]! - heightAgl[kept - 1]!);
  cut.ceilingShare = share;
  heightAgl[kept] = ceiling;
  speed[kept] = between(speed[kept - 1]!, wind.speed[kept]!, share);
  if (criteria.endingRise === 'uncertainty') {
    uncertainty[kept] = Math.hypot((1 - share) * uncertainty[kept - 1]!, share * wind.speedUncertainty[kept]!);
  }
  out.count = kept + 1;
}

/** Linear between two values. */
export function between(from: number, to: number, share: number): number {
  return from + (to - from) * share;
}
