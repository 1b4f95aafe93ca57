// How likely it is that the criteria hold, given how far each level may be off: an ensemble of what the true wind may
// have been, each member judged by the same engine as the levels themselves. An ensemble rather than a formula, because
// the criteria pick maxima and walk to minima: no distribution of those is known in closed form. Its random numbers are
// fixed and come in pairs of opposite sign, so that equal profiles have equal confidence.

import type { WindColumn } from '../profile/index.ts';
import { basinsOf, type Basin } from './basins.ts';
import { between, type Cut } from './column.ts';
import type { Criteria } from './criteria.ts';
import { NORMAL } from './normal.ts';
import {
  categoryOf,
  findNosesInto,
  noseColumn,
  noseList,
  RISE_FACTOR,
  type NoseColumn,
  type NoseList,
} from './nose.ts';
import { fitPosteriorInto, posterior, sampleQuad, samplesInto, type Posterior, type SampleQuad } from './posterior.ts';
import type { UncertaintyOrigin } from './uncertainty.ts';

/** What the members of the ensemble found. */
export interface Verdict {
  /** Share of members with a jet of at least this category, by category. */
  readonly atLeast: readonly number[];
  /** By basin, in the order given. */
  readonly basins: readonly BasinVerdict[];
}

export interface BasinVerdict {
  readonly basin: Basin;
  /** Share of members that have a nose meeting the criteria in this stretch. */
  readonly confidence: number;
  /** Standard deviation of the height of the greatest speed in the stretch, m; the spacing of the levels is part of it. */
  readonly heightSpread: number;
  /** The same of the greatest speed itself, m/s. */
  readonly speedSpread: number;
}

/** Working space of the ensemble, reused from profile to profile. */
export interface Ensemble {
  readonly fit: Posterior;
  /** Members, m/s by level: two pairs. */
  samples: SampleQuad;
  readonly column: NoseColumn;
  readonly list: NoseList;
}

export function ensemble(): Ensemble {
  return { fit: posterior(), samples: sampleQuad(256), column: noseColumn(), list: noseList() };
}

/** Pairs of members; 64 pairs leave a standard error of at most 0.044. */
export const MEMBER_PAIRS = 64;
/** Distance in the table of normal numbers between members. */
const STRIDE = 1021;

/**
 * Judges an ensemble of possible true winds.
 * @param wind the usable levels, uncertainties complete, as they were before the cut
 * @param judged the column cut from them; its heights, uncertainties and reach are used
 */
export function judgeEnsemble(
  wind: WindColumn,
  judged: NoseColumn,
  cut: Cut,
  criteria: Criteria,
  origin: UncertaintyOrigin,
  pairs: number,
  work: Ensemble,
): Verdict {
  const { fit, column, list } = work;
  const levels = cut.ceilingShare >= 0 ? cut.kept + 1 : cut.kept;
  fitPosteriorInto(wind, levels, origin, fit);
  if (work.samples[0].length < levels) work.samples = sampleQuad(2 * levels);
  const { mean } = fit;
  if (column.heightAgl.length < judged.count) Object.assign(column, noseColumn(2 * judged.count));
  column.count = judged.count;
  column.reachesCeiling = judged.reachesCeiling;
  column.heightAgl.set(judged.heightAgl.subarray(0, judged.count));
  const tolerated = toleratedRise(criteria);
  for (let k = 0; k < judged.count; k++) column.uncertainty[k] = tolerated * fit.uncertainty[Math.min(k, levels - 1)]!;
  const asked = askedOfMembers(criteria);
  const basins = basinsOf(fit.mean, fit.uncertainty, cut.kept);
  const tallies = basins.map(() => ({ hits: 0, height: 0, heightSquare: 0, speed: 0, speedSquare: 0 }));
  const counts = new Array<number>(criteria.categories.length).fill(0);
  const members = 2 * pairs;
  const { kept } = cut;
  for (let member = 0; member < members; member++) {
    const which = (member & 3) as 0 | 1 | 2 | 3;
    if (which === 0) samplesInto(fit, NORMAL, (member >> 1) * STRIDE, STRIDE, work.samples);
    const speed = work.samples[which];
    column.speed = speed;
    if (cut.ceilingShare >= 0) speed[kept] = between(speed[kept - 1]!, speed[kept]!, cut.ceilingShare);
    findNosesInto(column, asked, list);
    let best = -1;
    let hit = 0;
    for (let i = 0; i < list.count; i++) {
      const category = categoryOf(column, asked, list, i);
      if (category < 0) continue;
      best = Math.max(best, category);
      hit |= 1 << basinAt(basins, list.nose[i]!);
    }
    for (let k = 0; k <= best; k++) counts[k]!++;
    for (let i = 0; i < basins.length; i++) {
      const basin = basins[i]!;
      const tally = tallies[i]!;
      if ((hit & (1 << i)) !== 0) tally.hits++;
      const nose = strongestOf(speed, basin);
      // Around the smooth curve's own nose, so that squares stay small.
      const higher = column.heightAgl[nose]! - column.heightAgl[basin.nose]!;
      const faster = speed[nose]! - mean[basin.nose]!;
      tally.height += higher;
      tally.heightSquare += higher * higher;
      tally.speed += faster;
      tally.speedSquare += faster * faster;
    }
  }
  const spread = (sum: number, squares: number): number =>
    Math.sqrt(Math.max(0, squares / members - (sum / members) ** 2));
  return {
    atLeast: counts.map((count) => count / members),
    basins: basins.map((basin, i) => {
      const { hits, height, heightSquare, speed, speedSquare } = tallies[i]!;
      return {
        basin,
        confidence: hits / members,
        heightSpread: Math.hypot(spread(height, heightSquare), betweenLevels(column.heightAgl, basin.nose)),
        speedSpread: spread(speed, speedSquare),
      };
    }),
  };
}

/**
 * Members are smoother than the levels but keep some of their wiggles. For a fall-off as shallow as 2 m/s these would end
 * the fall too soon: there a rise within so many uncertainties of the levels does not. Found on simulated nights, where
 * confidence is then right about as often as it says (test/jet/nights.test.ts).
 */
const TOLERATED_RISE = 0.4;
const SHALLOW_FALLOFF = 4;

function toleratedRise(criteria: Criteria): number {
  return criteria.categories[0]!.falloff < SHALLOW_FALLOFF ? TOLERATED_RISE / RISE_FACTOR : 0;
}

/** The criteria as put to members: their first minimum tolerates such rises. */
function askedOfMembers(criteria: Criteria): Criteria {
  if (criteria.falloffTo !== 'first-minimum') return criteria;
  return { ...criteria, falloffTo: 'risen-minimum', endingRise: 'uncertainty' };
}

/** Which basin a level belongs to; 31, which no basin has, where it belongs to none. */
function basinAt(basins: readonly Basin[], level: number): number {
  for (let i = 0; i < basins.length && i < 31; i++)
    if (level >= basins[i]!.lowest && level <= basins[i]!.highest) return i;
  return 31;
}

/** Standard deviation of a height known to lie within the half ways to the levels around, m: even odds in between. */
function betweenLevels(heightAgl: Float64Array, nose: number): number {
  return (heightAgl[nose + 1]! - heightAgl[nose - 1]!) / 2 / Math.sqrt(12);
}

function strongestOf(speed: Float64Array, { lowest, highest }: Basin): number {
  let strongest = lowest;
  let most = speed[lowest]!;
  for (let k = lowest + 1; k <= highest; k++) {
    if (speed[k]! > most) {
      most = speed[k]!;
      strongest = k;
    }
  }
  return strongest;
}
