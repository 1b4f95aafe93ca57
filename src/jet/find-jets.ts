// Is there a jet in this profile? One profile and one criteria set in; jets, their confidence and the reason out.

import { directionOf, eastward, northward } from '../air/index.ts';
import { gatherWind, windColumn, type Profile } from '../profile/index.ts';
import { between, cutAtCeilingInto, type Cut } from './column.ts';
import { ensemble, judgeEnsemble, MEMBER_PAIRS, type Verdict } from './confidence.ts';
import { hasCategories, type Criteria } from './criteria.ts';
import { coreOf, type JetCore } from './layer.ts';
import {
  categoryOf,
  chooseNose,
  findNosesInto,
  minimumBelow,
  noseColumn,
  noseList,
  type NoseColumn,
  type NoseList,
} from './nose.ts';
import { refineNose } from './refine.ts';
import { completeUncertainty } from './uncertainty.ts';
import { whyNoJet, whyNotAssessable } from './words.ts';

/** A nose that meets the criteria, on the profile's own levels. Heights in m above ground, speeds in m/s. */
export interface Jet {
  /** Highest category met; null where the set knows none. */
  readonly category: number | null;
  /** Position of the nose within the profile's levels. */
  readonly level: number;
  readonly noseHeight: number;
  readonly noseSpeed: number;
  /** Degrees, from; NaN where the level has none. */
  readonly noseDirection: number;
  /** Nose less minimum above. */
  readonly falloff: number;
  /** Data stop below the ceiling while the speed still falls: the fall-off is at least this. */
  readonly falloffIsBound: boolean;
  readonly minimumHeight: number;
  readonly minimumSpeed: number;
  /** Nose less minimum below. */
  readonly rise: number;
  readonly minimumBelowHeight: number;
  readonly minimumBelowSpeed: number;
  /** Nose by the parabola through three levels. */
  readonly refinedHeight: number;
  readonly refinedSpeed: number;
  readonly core: JetCore;
  /** Probability that a jet by these criteria is here, given the uncertainty of the levels. */
  readonly confidence: number;
  /** Probability that it is of this category or above. */
  readonly categoryConfidence: number;
}

/** A distinct nose of the smoothed profile, whether or not it meets the criteria; what tracks are joined from. */
export interface SmoothNose {
  /** m above ground, between levels */
  readonly height: number;
  /** m/s */
  readonly speed: number;
  /** Degrees, from; NaN where the levels around it have none. */
  readonly direction: number;
  /** m and m/s, one standard deviation */
  readonly heightSpread: number;
  readonly speedSpread: number;
  /** Probability that the criteria hold here. */
  readonly confidence: number;
}

export interface JetFinding {
  readonly criteria: string;
  readonly status: 'jet' | 'no-jet' | 'not-assessable';
  /** Reason in words; empty when there is a jet. */
  readonly why: string;
  /** What the criteria chose; several only where they let several stand side by side. */
  readonly jets: readonly Jet[];
  readonly noses: readonly SmoothNose[];
  /** Probability that there is at least one jet; NaN when not assessable for want of levels. */
  readonly confidence: number;
  /** m above ground: highest level that was looked at; NaN when none. */
  readonly assessedTo: number;
}

export interface FindOptions {
  /** Standard uncertainty of a level's speed, m/s, where the profile states none; NaN takes the kind of instrument's. */
  readonly speedUncertainty: number;
  /** Pairs in the ensemble behind the confidence. */
  readonly memberPairs: number;
}

const DEFAULTS: FindOptions = { speedUncertainty: NaN, memberPairs: MEMBER_PAIRS };

/** What a profile needs at least, or nothing can be said. */
const LEAST_LEVELS = 3;
/** Data that end below this, m, leave the usual heights of noses unseen (the ceiling of Baas et al. 2009). */
const LEAST_TOP = 500;

/** Working space shared by all calls: a call runs to its end before the next begins. */
const wind = windColumn();
const column = noseColumn();
const list = noseList();
const work = ensemble();
const cut: Cut = { kept: 0, ceilingShare: NaN };

/**
 * Looks for jets in a profile.
 *
 * Published criteria are decided by the levels as measured: a jet, or no jet, on whatever levels there are from three
 * upward. The house's own are decided by the probability that they hold, and are not assessable where data end too low.
 * Levels with rejecting marks are left out; doubtful ones stay in and lower the confidence.
 * @example findJets(profile, CRITERIA.duskveer).jets[0]?.noseHeight
 */
export function findJets(profile: Profile, criteria: Criteria, options: Partial<FindOptions> = {}): JetFinding {
  const { speedUncertainty, memberPairs } = { ...DEFAULTS, ...options };
  gatherWind(profile, wind);
  const origin = completeUncertainty(wind, profile.instrument, speedUncertainty);
  cutAtCeilingInto(wind, criteria, column, cut);
  const assessedTo = column.count > 0 ? column.heightAgl[column.count - 1]! : NaN;
  const nothing = { criteria: criteria.name, jets: [], noses: [], assessedTo };
  if (column.count < LEAST_LEVELS || column.heightAgl[0]! > criteria.noseCeiling) {
    const why = whyNotAssessable(profile, wind, column, criteria);
    return { ...nothing, status: 'not-assessable', why, confidence: NaN };
  }
  findNosesInto(column, criteria, list);
  const verdict = judgeEnsemble(wind, column, cut, criteria, origin, memberPairs, work);
  const confidence = verdict.atLeast[0]!;
  const found = { ...nothing, noses: smoothNoses(verdict), confidence };
  const jets = criteria.decides === 'levels' ? chosenByLevels(verdict) : chosenByConfidence(verdict);
  if (jets.length > 0) return { ...found, status: 'jet', why: '', jets };
  const reason = whyNoJet(column, criteria, list, confidence, LEAST_TOP);
  const unseen = criteria.decides === 'confidence' && reason.dataEndTooLow;
  return { ...found, status: unseen ? 'not-assessable' : 'no-jet', why: reason.words };

  function chosenByLevels(verdict: Verdict): Jet[] {
    const chosen = chooseNose(column, criteria, list);
    return chosen < 0 ? [] : [jetAt(chosen, categoryOf(column, criteria, list, chosen), confidence, verdict)];
  }

  /** The strongest level of every basin in which the criteria hold more likely than not. */
  function chosenByConfidence(verdict: Verdict): Jet[] {
    const jets: Jet[] = [];
    for (const { basin, confidence: here } of verdict.basins) {
      if (here < 0.5) continue;
      let best = -1;
      for (let i = 0; i < list.count; i++) {
        const nose = list.nose[i]!;
        if (nose < basin.lowest || nose > basin.highest) continue;
        if (best < 0 || column.speed[nose]! > column.speed[list.nose[best]!]!) best = i;
      }
      if (best < 0) continue;
      let category = verdict.atLeast.length - 1;
      while (category > 0 && verdict.atLeast[category]! < 0.5) category--;
      jets.push(jetAt(best, category, here, verdict));
    }
    return jets.sort((a, b) => b.noseSpeed - a.noseSpeed);
  }

  function jetAt(i: number, category: number, here: number, verdict: Verdict): Jet {
    return {
      ...describe(profile, column, criteria, list, i),
      category: hasCategories(criteria) ? category : null,
      confidence: here,
      categoryConfidence: verdict.atLeast[category]!,
    };
  }
}

function describe(
  profile: Profile,
  column: NoseColumn,
  criteria: Criteria,
  list: NoseList,
  i: number,
): Omit<Jet, 'category' | 'confidence' | 'categoryConfidence'> {
  const { heightAgl, speed, count } = column;
  const nose = list.nose[i]!;
  const minimum = list.minimum[i]!;
  const below = minimumBelow(column, criteria, nose);
  const refined = refineNose(heightAgl, speed, count, nose);
  const level = wind.level[nose]!;
  return {
    level,
    noseHeight: heightAgl[nose]!,
    noseSpeed: speed[nose]!,
    noseDirection: profile.direction[level]!,
    falloff: speed[nose]! - speed[minimum]!,
    falloffIsBound: list.isBound[i] === 1,
    minimumHeight: heightAgl[minimum]!,
    minimumSpeed: speed[minimum]!,
    rise: speed[nose]! - speed[below]!,
    minimumBelowHeight: heightAgl[below]!,
    minimumBelowSpeed: speed[below]!,
    refinedHeight: refined.height,
    refinedSpeed: refined.speed,
    core: coreOf(column, nose, minimum),
  };
}

function smoothNoses(verdict: Verdict): SmoothNose[] {
  const { mean } = work.fit;
  return verdict.basins.map(({ basin, confidence, heightSpread, speedSpread }) => {
    const { height, speed } = refineNose(wind.heightAgl, mean, cut.kept, basin.nose);
    return { height, speed, direction: directionNear(basin.nose, height), heightSpread, speedSpread, confidence };
  });
}

/** Direction at a height beside a level: of the unit vectors of the levels around it, linear in height. */
function directionNear(level: number, height: number): number {
  const other = height < wind.heightAgl[level]! ? level - 1 : level + 1;
  const here = wind.direction[level]!;
  const there = wind.direction[other]!;
  if (Number.isNaN(here) || Number.isNaN(there)) return Number.isNaN(here) ? there : here;
  const share = (height - wind.heightAgl[level]!) / (wind.heightAgl[other]! - wind.heightAgl[level]!);
  return directionOf(
    between(eastward(1, here), eastward(1, there), share),
    between(northward(1, here), northward(1, there), share),
  );
}
