// The wind across a disc slice by slice, as the slice form of the equivalent speed sees it: for the picture of the disc.

import { completeUncertainty } from '../jet/index.ts';
import { gatherWind, windColumn, type Profile } from '../profile/index.ts';
import { continueWind } from './continuation.ts';
import { bottomTip, topTip, type Disc } from './disc.ts';
import type { DiscWindOptions } from './disc-wind.ts';
import { FleetScan } from './fleet-scan.ts';

/** A slice of the disc and the level that speaks for it. Heights are above the turbine's ground. */
export interface DiscSlice {
  /** m, edges of the slice within the disc */
  readonly bottom: number;
  readonly top: number;
  /** m, of the level; may lie outside the disc */
  readonly height: number;
  readonly speed: number;
  /** NaN where not known */
  readonly direction: number;
  /** Rests on the site's power-law continuation instead of data. */
  readonly continued: boolean;
}

export interface DiscSlices {
  /** From the lower tip up; none where no level is usable. */
  readonly slices: readonly DiscSlice[];
  /** m above the turbine's ground: lowest and highest measured level; NaN without. */
  readonly measuredFrom: number;
  readonly measuredTo: number;
}

/** The slices of a disc; the lowest and the highest level speak for what lies below and above them. */
export function discSlices(profile: Profile, disc: Disc, options: DiscWindOptions = {}): DiscSlices {
  const offset = options.groundOffset ?? 0;
  const raised = { hubHeight: disc.hubHeight + offset, rotorDiameter: disc.rotorDiameter };
  const measured = gatherWind(profile, windColumn(profile.levelCount));
  completeUncertainty(measured, profile.instrument, options.speedUncertainty ?? NaN);
  const column = options.continuation === 'power-law' ? continueWind(measured, raised).column : measured;
  const lowest = measured.count > 0 ? measured.heightAgl[0]! : NaN;
  const highest = measured.count > 0 ? measured.heightAgl[measured.count - 1]! : NaN;
  const scan = new FleetScan([raised]);
  const plan = scan.scan(column).plans[0]!;
  const { heightAgl, speed, direction, count } = scan.levels;
  const slices: DiscSlice[] = [];
  for (let k = plan.first; k < plan.first + plan.share.length; k++) {
    const below = k === plan.first ? -Infinity : (heightAgl[k - 1]! + heightAgl[k]!) / 2;
    const above = k === count - 1 ? Infinity : (heightAgl[k]! + heightAgl[k + 1]!) / 2;
    const [bottom, top] = [Math.max(below, bottomTip(raised)), Math.min(above, topTip(raised))];
    if (!(top > bottom)) continue;
    slices.push({
      bottom: bottom - offset,
      top: top - offset,
      height: heightAgl[k]! - offset,
      speed: speed[k]!,
      direction: direction[k]!,
      continued: heightAgl[k]! < lowest || heightAgl[k]! > highest,
    });
  }
  return { slices, measuredFrom: lowest - offset, measuredTo: highest - offset };
}
