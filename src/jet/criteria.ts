// Which question is asked of a profile: every published set of jet criteria, and the house's own, as data that one
// engine (`nose.ts`) reads. Thresholds are as commonly quoted from the papers named, from memory.

import { DuskveerError } from '../air/index.ts';
import type { OwnCriteria } from '../site/index.ts';

/**
 * A criteria set. What `candidates` says decides the edges of the profile too:
 * - `every-maximum` and `lowest-maximum`: local maxima, never the lowest or the last level; where levels lie above the
 *   ceiling a point is added at the ceiling, linear in height, so that a fall through it counts up to there. Of all that
 *   meet the criteria the best category wins, then the greater speed, then the lower height; or simply the lowest.
 * - `strongest`: the greatest speed at or below the nose ceiling, the lowest of equals, wherever it sits; no point is
 *   added at the ceiling.
 */
export interface Criteria extends OwnCriteria {
  /** For people, a line. */
  readonly title: string;
  /** Where the thresholds come from, or that there is no source. */
  readonly source: string;
  /** Whether the levels as measured decide, or the probability that the criteria hold. */
  readonly decides: 'levels' | 'confidence';
}

export type CriteriaName =
  | 'whiteman-1997'
  | 'whiteman-1997-strongest'
  | 'whiteman-1997-layer'
  | 'stull-1988'
  | 'andreas-2000'
  | 'baas-2009'
  | 'duskveer';

const WHITEMAN: Criteria = {
  name: 'whiteman-1997',
  title: 'Four categories up to 3 km: 10/5, 12/6, 16/8 and 20/10 m/s of speed and fall-off, every local maximum tried',
  source:
    'Bonner (1968, Mon. Wea. Rev. 96), with the lowest category of Whiteman, Bian & Zhong (1997, J. Appl. Meteor. 36)',
  decides: 'levels',
  ceiling: 3000,
  noseCeiling: 3000,
  candidates: 'every-maximum',
  falloffTo: 'first-minimum',
  endingRise: 0,
  categories: [
    { speed: 10, falloff: 5 },
    { speed: 12, falloff: 6 },
    { speed: 16, falloff: 8 },
    { speed: 20, falloff: 10 },
  ],
  ratioAbove: 1,
  riseBelow: 0,
};

const ANDREAS: Criteria = {
  ...WHITEMAN,
  name: 'andreas-2000',
  title: 'Lowest maximum up to 1500 m that stands 2 m/s above the minima below and above it',
  source: 'Andreas, Claffey & Makshtas (2000, Boundary-Layer Meteor. 97)',
  ceiling: 1500,
  noseCeiling: 1500,
  candidates: 'lowest-maximum',
  categories: [{ speed: 0, falloff: 2 }],
  riseBelow: 2,
};

/** Every criteria set known by name. */
export const CRITERIA: Readonly<Record<CriteriaName, Criteria>> = {
  'whiteman-1997': WHITEMAN,
  'whiteman-1997-strongest': {
    ...WHITEMAN,
    name: 'whiteman-1997-strongest',
    title: 'The four categories, asked of the greatest speed only; fall-off to the first higher minimum',
    candidates: 'strongest',
  },
  'whiteman-1997-layer': {
    ...WHITEMAN,
    name: 'whiteman-1997-layer',
    title: 'The four categories, asked of the greatest speed only; fall-off to the lowest speed above it up to 3 km',
    candidates: 'strongest',
    falloffTo: 'layer-minimum',
  },
  'stull-1988': {
    ...ANDREAS,
    name: 'stull-1988',
    source: 'Stull (1988, An Introduction to Boundary Layer Meteorology), worked out as by Andreas et al. (2000)',
  },
  'andreas-2000': ANDREAS,
  'baas-2009': {
    ...WHITEMAN,
    name: 'baas-2009',
    title: 'Lowest maximum up to 500 m that is 2 m/s and 25 % faster than the minimum above it',
    source: 'Baas, Bosveld, Klein Baltink & Holtslag (2009, J. Appl. Meteor. Climatol. 48)',
    noseCeiling: 500,
    candidates: 'lowest-maximum',
    categories: [{ speed: 0, falloff: 2 }],
    ratioAbove: 1.25,
  },
  duskveer: {
    ...WHITEMAN,
    name: 'duskveer',
    title:
      'The four categories, every local maximum; rises that the levels’ uncertainty explains do not end the fall-off, ' +
      'and the probability that the criteria hold decides',
    source: 'Thresholds of Bonner (1968) and Whiteman et al. (1997); the handling of uncertainty is our own',
    decides: 'confidence',
    falloffTo: 'risen-minimum',
    endingRise: 'uncertainty',
  },
};

/** The names in their order, for lists and messages. */
export const CRITERIA_NAMES = Object.keys(CRITERIA) as readonly CriteriaName[];

/**
 * The criteria set of a site or a command line: one by name, or one of the site's own.
 * @throws DuskveerError `jet/unknown-criteria` when no set has that name
 */
export function criteriaOf(choice: string | OwnCriteria): Criteria {
  if (typeof choice !== 'string') {
    return { ...choice, title: 'Criteria of the site’s own', source: 'The site file', decides: 'levels' };
  }
  const name = CRITERIA_NAMES.find((known) => known === choice.trim().toLowerCase());
  if (name !== undefined) return CRITERIA[name];
  throw new DuskveerError({
    code: 'jet/unknown-criteria',
    what: `There is no criteria set called “${choice}”.`,
    mend: `Choose one of ${CRITERIA_NAMES.join(', ')}, or describe one in the site file.`,
    where: {},
  });
}

/** Whether the set tells categories apart; with a single pair of thresholds there is only met or not met. */
export function hasCategories(criteria: Criteria): boolean {
  return criteria.categories.length > 1;
}
