// Several instruments on one site, joined into one profile by height: the better one wins where both measure, the join is
// shown, and a steady disagreement between them is not read as a turn of the wind.

import { DuskveerError, normalDirection } from '../air/index.ts';
import { completeUncertainty } from '../jet/index.ts';
import {
  BlockBuilder,
  gatherWind,
  profileAt,
  REJECTING_AIR,
  windColumn,
  type Instrument,
  type Profile,
} from '../profile/index.ts';
import type { Disagreement } from './disagreement.ts';

/** Where one instrument hands over to another. */
export interface Join {
  /** m above ground, between the two levels that meet */
  readonly height: number;
  readonly below: Instrument;
  readonly above: Instrument;
  /** Degrees by which the worse one's directions were turned to fit the better one; 0 where nothing steady is known. */
  readonly turned: number;
  readonly words: string;
}

export interface JoinedProfile {
  readonly profile: Profile;
  readonly joins: readonly Join[];
  /** The levels with wind, from the ground up, each with the profile that it comes from. */
  readonly levels: readonly { readonly heightAgl: number; readonly profile: Profile }[];
}

/** What is known of the disagreement of two instruments, told by a profile of each; undefined where nothing is. */
export type KnownDisagreement = (better: Profile, worse: Profile) => Disagreement | undefined;

export interface JoinOptions {
  readonly disagreement?: KnownDisagreement;
  /** Standard uncertainty of a level's speed, m/s, that the site states; NaN takes the profile's own or the kind's. */
  readonly speedUncertainty?: (profile: Profile) => number;
}

/** m: within a wider gap between the better one's levels the worse one's are used. Our own choice. */
const HOLE = 150;

/**
 * Joins profiles of one time and place. They are ranked by the uncertainty of their levels, stated or assumed by kind of
 * instrument; of equals the one with the denser levels comes first. A level is left out where a better instrument measures
 * around it, and within half its own spacing of the better one's end, since it averages over that depth. Directions of an
 * instrument that is known to disagree steadily are turned by the mean disagreement; speeds stay as measured.
 * @throws DuskveerError `rotor/nothing-to-join` for an empty list
 */
export function joinProfiles(
  profiles: readonly Profile[],
  { disagreement = () => undefined, speedUncertainty = () => NaN }: JoinOptions = {},
): JoinedProfile {
  if (profiles.length === 0) {
    throw new DuskveerError({
      code: 'rotor/nothing-to-join',
      what: 'There is no profile to join.',
      mend: 'Give at least one profile of the site.',
      where: {},
    });
  }
  const parts = profiles.map((profile) => partOf(profile, speedUncertainty(profile)));
  const ranked = parts.sort((a, b) => a.uncertainty - b.uncertainty || a.spacing - b.spacing);
  const placed: PlacedPart[] = [];
  let taken: JoinLevel[] = [];
  for (const part of ranked) {
    const place = turnToFit(part, placed, disagreement);
    placed.push(place);
    const free = part.levels.filter((level) => !isCovered(taken, level.heightAgl, part.spacing / 2));
    const fitted = free.map((level) => ({
      ...level,
      direction: normalDirection(level.direction + place.turned),
      place,
    }));
    taken = [...taken, ...fitted].sort((a, b) => a.heightAgl - b.heightAgl);
  }
  const joins = joinsOf(taken);
  return {
    profile: profiles.length === 1 ? profiles[0]! : merged(ranked, taken, joins),
    joins,
    levels: taken.map(({ heightAgl, place }) => ({ heightAgl, profile: place.profile })),
  };
}

/** The turn that brings a part's directions to those of the best one it can be compared with, itself perhaps turned. */
function turnToFit(part: Part, placed: readonly PlacedPart[], disagreement: KnownDisagreement): PlacedPart {
  for (const better of placed) {
    const known = disagreement(better.profile, part.profile);
    if (known === undefined || known.times === 0) continue;
    return { profile: part.profile, turned: better.turned - (known.steadyDirection ? known.direction : 0), known };
  }
  return { profile: part.profile, turned: 0, known: undefined };
}

/** A profile in the join, by how much it was turned, and what that rests on. */
interface PlacedPart {
  readonly profile: Profile;
  readonly turned: number;
  readonly known: Disagreement | undefined;
}

interface PartLevel {
  readonly heightAgl: number;
  readonly speed: number;
  readonly direction: number;
  readonly speedUncertainty: number;
  readonly mark: number;
  /** Position in its own profile. */
  readonly level: number;
}

interface JoinLevel extends PartLevel {
  readonly place: PlacedPart;
}

interface Part {
  readonly profile: Profile;
  readonly levels: readonly PartLevel[];
  /** m/s: median of the levels' uncertainty */
  readonly uncertainty: number;
  /** m: median distance of the levels */
  readonly spacing: number;
}

function partOf(profile: Profile, stated: number): Part {
  const column = gatherWind(profile, windColumn(profile.levelCount));
  const marks = column.mark.slice();
  // Doubt widens an uncertainty where it is used; the joined profile carries the mark and must not be widened twice.
  column.mark.fill(0);
  completeUncertainty(column, profile.instrument, stated);
  const levels = Array.from({ length: column.count }, (_, k) => ({
    heightAgl: column.heightAgl[k]!,
    speed: column.speed[k]!,
    direction: column.direction[k]!,
    speedUncertainty: column.speedUncertainty[k]!,
    mark: marks[k]!,
    level: column.level[k]!,
  }));
  const gaps = levels.slice(1).map((level, k) => level.heightAgl - levels[k]!.heightAgl);
  return {
    profile,
    levels,
    uncertainty: levels.length === 0 ? Infinity : median(levels.map((level) => level.speedUncertainty)),
    spacing: gaps.length === 0 ? 0 : median(gaps),
  };
}

/** Whether better levels stand around a height without a hole, or end within reach of it. */
function isCovered(taken: readonly JoinLevel[], height: number, reach: number): boolean {
  const above = taken.findIndex((level) => level.heightAgl >= height);
  const upper = above < 0 ? Infinity : taken[above]!.heightAgl;
  const lower =
    above === 0 || taken.length === 0 ? -Infinity : taken[(above < 0 ? taken.length : above) - 1]!.heightAgl;
  return upper - height <= reach || height - lower <= reach || upper - lower <= HOLE;
}

function joinsOf(levels: readonly JoinLevel[]): Join[] {
  const joins: Join[] = [];
  for (let k = 1; k < levels.length; k++) {
    const [below, above] = [levels[k - 1]!, levels[k]!];
    if (below.place === above.place) continue;
    const worse = above.place.known === undefined ? below.place : above.place;
    const [lower, upper] = [below.place.profile.instrument, above.place.profile.instrument];
    const words = [`${lower} up to ${Math.round(below.heightAgl)} m, ${upper} above`];
    if (worse.known?.steadyDirection === true)
      words.push(disagreementInWords(worse.known), 'turned to fit, not read as veer');
    else if (worse.known?.beyondUncertainty === true) words.push(disagreementInWords(worse.known), 'not corrected');
    joins.push({
      height: (below.heightAgl + above.heightAgl) / 2,
      below: lower,
      above: upper,
      turned: worse.turned,
      words: words.join('; '),
    });
  }
  return joins;
}

/** `directions differ by +9.8° and speeds by -0.3 m/s where both measure (151 to 206 m, 128 times)`. */
export function disagreementInWords(known: Disagreement): string {
  const signed = (value: number, digits: number): string => (value > 0 ? '+' : '') + value.toFixed(digits);
  const differences = `directions differ by ${signed(known.direction, 1)}° and speeds by ${signed(known.speed, 1)} m/s`;
  const where = known.bottom === known.top ? `${known.bottom} m` : `${known.bottom} to ${known.top} m`;
  return `${differences} where both measure (${where}, ${known.times} times)`;
}

function merged(ranked: readonly Part[], taken: readonly JoinLevel[], joins: readonly Join[]): Profile {
  const best = ranked[0]!.profile;
  const profiles = ranked.map((part) => part.profile);
  const levels = [...taken.map(fromPart), ...airOnly(profiles, new Set(taken.map((level) => level.heightAgl)))];
  const column = (name: keyof MergedLevel): number[] => levels.map((level) => level[name]);
  const builder = new BlockBuilder();
  builder.add({
    station: best.station,
    source: [...new Set(profiles.map((profile) => profile.source))].join(' + '),
    instrument: 'merged',
    timeMs: best.timeMs,
    periodS: best.periodS,
    notes: [...new Set([...profiles.flatMap((profile) => profile.notes), ...joins.map((join) => join.words)])],
    levels: Object.fromEntries(MERGED_COLUMNS.map((name) => [name, column(name)])) as Record<
      keyof MergedLevel,
      number[]
    >,
  });
  return profileAt(builder.finish(), 0);
}

const MERGED_COLUMNS = [
  'heightAgl',
  'speed',
  'direction',
  'speedUncertainty',
  'mark',
  'verticalSpeed',
  'temperature',
  'pressure',
  'specificHumidity',
  'speedDeviation',
  'gust',
] as const;
type MergedLevel = Record<(typeof MERGED_COLUMNS)[number], number>;

function fromPart({ heightAgl, speed, direction, speedUncertainty, mark, level, place }: JoinLevel): MergedLevel {
  return { heightAgl, speed, direction, speedUncertainty, mark, ...airAt(place.profile, level) };
}

/** Levels that carry temperature, pressure or humidity but no usable wind, where no joined level stands at their height. */
function airOnly(profiles: readonly Profile[], heights: Set<number>): MergedLevel[] {
  const levels: MergedLevel[] = [];
  for (const profile of profiles) {
    for (let k = 0; k < profile.levelCount; k++) {
      const heightAgl = profile.heightAgl[k]!;
      if ((profile.mark[k]! & REJECTING_AIR) !== 0 || heights.has(heightAgl)) continue;
      const air = airAt(profile, k);
      if (!(air.temperature > 0 || air.pressure > 0 || air.specificHumidity >= 0)) continue;
      heights.add(heightAgl);
      levels.push({ heightAgl, speed: NaN, direction: NaN, speedUncertainty: NaN, mark: profile.mark[k]!, ...air });
    }
  }
  return levels;
}

function airAt(
  profile: Profile,
  level: number,
): Pick<MergedLevel, 'verticalSpeed' | 'temperature' | 'pressure' | 'specificHumidity' | 'speedDeviation' | 'gust'> {
  return {
    verticalSpeed: profile.verticalSpeed?.[level] ?? NaN,
    temperature: profile.temperature?.[level] ?? NaN,
    pressure: profile.pressure?.[level] ?? NaN,
    specificHumidity: profile.specificHumidity?.[level] ?? NaN,
    speedDeviation: profile.speedDeviation?.[level] ?? NaN,
    gust: profile.gust?.[level] ?? NaN,
  };
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[sorted.length >> 1] ?? NaN;
}
