// Why there is no jet, or why it cannot be told, in a sentence for the person who asked.

import { REJECTING, type Profile, type WindColumn } from '../profile/index.ts';
import type { Criteria } from './criteria.ts';
import type { NoseColumn, NoseList } from './nose.ts';

const metres = (height: number): string => `${Math.round(height)} m`;
const mps = (speed: number): string => `${speed.toFixed(1)} m/s`;

/** Why a profile cannot be judged at all. */
export function whyNotAssessable(profile: Profile, wind: WindColumn, column: NoseColumn, criteria: Criteria): string {
  if (profile.levelCount === 0) return 'The profile holds no levels.';
  if (wind.count === 0) {
    const screened = profile.mark.reduce((sum, bits) => sum + ((bits & REJECTING) !== 0 ? 1 : 0), 0);
    return screened > 0
      ? `None of the ${profile.levelCount} levels can be used: ${screened} are screened out.`
      : `None of the ${profile.levelCount} levels has both height and speed.`;
  }
  const lowest = wind.heightAgl[0]!;
  const ceiling = Math.min(criteria.ceiling, criteria.noseCeiling);
  if (lowest > ceiling) return `No level below ${metres(ceiling)}: the lowest lies at ${metres(lowest)}.`;
  return `Only ${column.count} usable ${column.count === 1 ? 'level' : 'levels'} up to ${metres(criteria.ceiling)}; three are needed.`;
}

/** Why no nose was taken for a jet, and whether data simply end too low to tell. */
export function whyNoJet(
  column: NoseColumn,
  criteria: Criteria,
  list: NoseList,
  confidence: number,
  leastTop: number,
): { words: string; dataEndTooLow: boolean } {
  const { heightAgl, speed, count } = column;
  const top = heightAgl[count - 1]!;
  const least = criteria.categories[0]!;
  let strongest = -1;
  for (let i = 0; i < list.count; i++) {
    if (strongest < 0 || speed[list.nose[i]!]! > speed[list.nose[strongest]!]!) strongest = i;
  }
  if (strongest < 0) {
    const dataEndTooLow = !column.reachesCeiling && top < Math.min(leastTop, criteria.ceiling);
    const fast = least.speed > 0 ? ` of ${mps(least.speed)} or more` : '';
    const words = `No local maximum${fast} up to ${metres(Math.min(top, criteria.noseCeiling))}`;
    return { words: dataEndTooLow ? `${words}, where data end.` : `${words}.`, dataEndTooLow };
  }
  const nose = list.nose[strongest]!;
  const falloff = speed[nose]! - speed[list.minimum[strongest]!]!;
  const isBound = list.isBound[strongest] === 1;
  const where = `${mps(speed[nose]!)} at ${metres(heightAgl[nose]!)}`;
  if (isBound && falloff < least.falloff) {
    return {
      words: `${where} falls by at least ${mps(falloff)}; data end at ${metres(top)} while the speed still falls.`,
      dataEndTooLow: true,
    };
  }
  const chance =
    criteria.decides === 'confidence' ? ` The criteria hold with a chance of ${Math.round(100 * confidence)} %.` : '';
  return { words: `${where} falls by ${mps(falloff)}, short of the criteria.${chance}`, dataEndTooLow: false };
}
