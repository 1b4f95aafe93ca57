// The same question asked of many profiles at once: noses and categories as columns, for scans over years.

import { gatherWindAt, INSTRUMENTS, profileAt, REJECTING, windColumn, type ProfileBlock } from '../profile/index.ts';
import { between, cutAtCeilingInto, type Cut } from './column.ts';
import type { Criteria } from './criteria.ts';
import { findJets } from './find-jets.ts';
import { ALLOWANCE, categoryOf, chooseNose, findNosesInto, noseColumn, noseList } from './nose.ts';
import { completeUncertainty } from './uncertainty.ts';

/** Category of a profile that was judged and holds no jet, and of one that could not be judged. */
export const NO_JET = -1;
export const NOT_ASSESSABLE = -2;

/** A row for each profile of a block, by its index. Numbers are NaN where there is no jet. */
export interface NoseTable {
  /** Highest category met (0 where the set knows none), NO_JET or NOT_ASSESSABLE. */
  readonly category: Int8Array;
  /** m above ground */
  readonly noseHeight: Float32Array;
  /** m/s */
  readonly noseSpeed: Float32Array;
  /** Degrees, from */
  readonly noseDirection: Float32Array;
  /** m/s */
  readonly falloff: Float32Array;
  /** 1 where the fall-off is a lower bound. */
  readonly falloffIsBound: Uint8Array;
}

function noseTable(count: number): NoseTable {
  const missing = (): Float32Array => new Float32Array(count).fill(NaN);
  return {
    category: new Int8Array(count).fill(NO_JET),
    noseHeight: missing(),
    noseSpeed: missing(),
    noseDirection: missing(),
    falloff: missing(),
    falloffIsBound: new Uint8Array(count),
  };
}

/**
 * Judges every profile of a block by one criteria set: the same answers as `findJets`, as columns, without the evidence.
 * Sets decided by the levels run a kernel; one decided by confidence runs its ensemble and takes a few hundred times
 * longer.
 */
export function scanNoses(block: ProfileBlock, criteria: Criteria): NoseTable {
  const table = noseTable(block.profileCount);
  const monotone = isMonotone(criteria);
  for (let index = 0; index < block.profileCount; index++) {
    if (criteria.decides === 'confidence') scanByConfidence(block, index, criteria, table);
    else if (!monotone || !scanMonotone(block, index, criteria, table)) scanByEngine(block, index, criteria, table);
  }
  return table;
}

/** Whether a jet by these criteria is no more than a run of speeds that never rises, after a rise. */
function isMonotone(criteria: Criteria): boolean {
  return (
    criteria.candidates === 'every-maximum' &&
    criteria.falloffTo === 'first-minimum' &&
    criteria.noseCeiling >= criteria.ceiling &&
    criteria.ratioAbove <= 1 &&
    criteria.riseBelow <= 0
  );
}

/**
 * The fast way for such criteria and for profiles without gaps: one pass over the speeds where they lie. The first level of
 * the run in hand is kept by arithmetic instead of a branch, because on noisy levels no branch can be foreseen; only a run
 * that falls deep enough is followed to its end.
 * @returns false when the profile has gaps or rejected levels and the engine must look
 */
function scanMonotone(block: ProfileBlock, index: number, criteria: Criteria, table: NoseTable): boolean {
  const { heightAgl, speed, mark } = block;
  const start = block.offsets[index]!;
  const beyond = block.offsets[index + 1]!;
  const { ceiling, categories } = criteria;
  let end = beyond;
  while (end > start && !(heightAgl[end - 1]! <= ceiling)) end--;
  const wantsPoint = end < beyond && end > start && heightAgl[end - 1]! < ceiling;
  if (end - start + Number(wantsPoint) < 3) {
    table.category[index] = NOT_ASSESSABLE;
    return true;
  }
  const leastSpeed = categories[0]!.speed - ALLOWANCE;
  const leastFalloff = categories[0]!.falloff - ALLOWANCE;
  best.category = -1;
  best.nose = -1;
  let top = start;
  let below = speed[start]!;
  let unusable = (mark[start]! & REJECTING) | Number(!(below >= 0));
  for (let k = start + 1; k < end; k++) {
    const here = speed[k]!;
    unusable |= (mark[k]! & REJECTING) | Number(!(here >= 0));
    const rising = -Number(here > below);
    top = (top & ~rising) | (k & rising);
    below = here;
    const peak = speed[top]!;
    if (peak - here >= leastFalloff && peak >= leastSpeed && top > start) {
      while (k + 1 < end && speed[k + 1]! <= below) {
        below = speed[++k]!;
        unusable |= mark[k]! & REJECTING;
      }
      unusable |= Number(below < 0);
      take(categories, top, peak, below);
    }
  }
  if (unusable !== 0) return false;
  if (wantsPoint) {
    if ((mark[end]! & REJECTING) !== 0 || !(speed[end]! >= 0)) return false;
    const share = (ceiling - heightAgl[end - 1]!) / (heightAgl[end]! - heightAgl[end - 1]!);
    const here = between(below, speed[end]!, share);
    const peak = speed[top]!;
    if (here <= below && peak - here >= leastFalloff && peak >= leastSpeed && top > start) {
      take(categories, top, peak, here);
    }
  }
  const { nose } = best;
  if (nose < 0) return true;
  const reachesCeiling = end < beyond || heightAgl[end - 1]! >= ceiling;
  table.category[index] = best.category;
  table.noseHeight[index] = heightAgl[nose]!;
  table.noseSpeed[index] = best.peak;
  table.noseDirection[index] = block.direction[nose]!;
  table.falloff[index] = best.peak - best.minimum;
  table.falloffIsBound[index] = Number(!reachesCeiling && nose === top);
  return true;
}

/** The best nose of the profile in hand. */
const best = { category: -1, nose: -1, peak: 0, minimum: 0 };

/** Takes a nose and how far its run has fallen so far, if that is the same nose further down or a better one. */
function take(categories: Criteria['categories'], nose: number, peak: number, here: number): void {
  let category = 0;
  for (let k = 1; k < categories.length; k++) {
    if (peak >= categories[k]!.speed - ALLOWANCE && peak - here >= categories[k]!.falloff - ALLOWANCE) category = k;
  }
  if (nose !== best.nose && (category < best.category || (category === best.category && peak <= best.peak))) return;
  best.category = category;
  best.nose = nose;
  best.peak = peak;
  best.minimum = here;
}

const wind = windColumn();
const column = noseColumn();
const list = noseList();
const cut: Cut = { kept: 0, ceilingShare: NaN };

function scanByEngine(block: ProfileBlock, index: number, criteria: Criteria, table: NoseTable): void {
  gatherWindAt(block, index, wind);
  if (criteria.endingRise === 'uncertainty') {
    completeUncertainty(wind, INSTRUMENTS[block.instrumentIndex[index]!]!, NaN);
  }
  cutAtCeilingInto(wind, criteria, column, cut);
  if (column.count < 3 || column.heightAgl[0]! > criteria.noseCeiling) {
    table.category[index] = NOT_ASSESSABLE;
    return;
  }
  findNosesInto(column, criteria, list);
  const chosen = chooseNose(column, criteria, list);
  if (chosen < 0) return;
  const nose = list.nose[chosen]!;
  table.category[index] = categoryOf(column, criteria, list, chosen);
  table.noseHeight[index] = column.heightAgl[nose]!;
  table.noseSpeed[index] = column.speed[nose]!;
  table.noseDirection[index] = wind.direction[nose]!;
  table.falloff[index] = column.speed[nose]! - column.speed[list.minimum[chosen]!]!;
  table.falloffIsBound[index] = list.isBound[chosen]!;
}

function scanByConfidence(block: ProfileBlock, index: number, criteria: Criteria, table: NoseTable): void {
  const { status, jets } = findJets(profileAt(block, index), criteria);
  if (status === 'not-assessable') table.category[index] = NOT_ASSESSABLE;
  const jet = jets[0];
  if (jet === undefined) return;
  table.category[index] = jet.category ?? 0;
  table.noseHeight[index] = jet.noseHeight;
  table.noseSpeed[index] = jet.noseSpeed;
  table.noseDirection[index] = jet.noseDirection;
  table.falloff[index] = jet.falloff;
  table.falloffIsBound[index] = Number(jet.falloffIsBound);
}
