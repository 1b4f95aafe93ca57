// Wind at one height, for limits that a site names by height.

import { directionOf, eastward, northward, speedOf } from '../air/index.ts';
import { gatherWind, windColumn, type Profile } from '../profile/index.ts';

/**
 * Wind at a height, u and v linear between the usable levels around it, the speed alone where no direction is known.
 * @returns speed and direction NaN where the levels do not enclose the height
 */
export function windAtHeight(profile: Profile, heightAgl: number): { speed: number; direction: number } {
  const column = gatherWind(profile, windColumn(profile.levelCount));
  let above = 0;
  while (above < column.count && column.heightAgl[above]! < heightAgl) above++;
  if (above === column.count) return { speed: NaN, direction: NaN };
  if (column.heightAgl[above] === heightAgl)
    return { speed: column.speed[above]!, direction: column.direction[above]! };
  if (above === 0) return { speed: NaN, direction: NaN };
  const below = above - 1;
  const weight = (heightAgl - column.heightAgl[below]!) / (column.heightAgl[above]! - column.heightAgl[below]!);
  const mix = (of: (level: number) => number): number => of(below) * (1 - weight) + of(above) * weight;
  const u = mix((k) => eastward(column.speed[k]!, column.direction[k]!));
  const v = mix((k) => northward(column.speed[k]!, column.direction[k]!));
  if (Number.isNaN(u)) return { speed: mix((k) => column.speed[k]!), direction: NaN };
  return { speed: speedOf(u, v), direction: directionOf(u, v) };
}
