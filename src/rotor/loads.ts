// Loads watch: whether the wind on the disc is harder on the machine, or on people at work, than what was assumed.

import type { Profile } from '../profile/index.ts';
import type { Site, WorkLimit } from '../site/index.ts';
import type { DiscWind } from './disc-wind.ts';
import { sampleDurationsS } from './durations.ts';
import { windAtHeight } from './wind-at-height.ts';

/** A watched state at one time. */
export interface LoadState {
  /** Stable: `shear-over-design`, `veer-strong`, `speed-falls-above-nose`, `nose-in-rotor`, or `limit/` and its name. */
  readonly name: string;
  /** null where it cannot be told. */
  readonly on: boolean | null;
  readonly value: number;
  /** Unit of value and limit, SI: empty for exponents and yes-or-no. */
  readonly unit: '' | 'deg/100 m' | 'm/s';
  readonly limit: number;
  /** Where the limit comes from. */
  readonly source: string;
  /** For people. */
  readonly words: string;
}

/** Turn per 100 m of height above which veer is shown as strong, degrees. Common practice, without source. */
const STRONG_VEER = 10;

/** Said with every use of the watch. */
export const LOADS_CAUTION =
  "Stops, lifts and climbs follow the site's rules, the maker's limits and the person in charge; this is an aid to judgement.";

/**
 * All states of one disc at one time. Site limits look at the wind at the height they name.
 * @param site design shear and limits
 */
export function watchLoads(
  wind: DiscWind,
  profile: Profile,
  site: Pick<Site, 'designShear' | 'limits'>,
): readonly LoadState[] {
  return [
    shearState(wind, site.designShear),
    veerState(wind),
    negativeShearState(wind),
    noseState(wind),
    ...site.limits.map((limit) => limitState(profile, limit)),
  ];
}

function shearState(wind: DiscWind, limit: number): LoadState {
  const value = wind.shearExponent;
  return {
    name: 'shear-over-design',
    on: over(value, limit),
    value,
    unit: '',
    limit,
    source: designSource(limit),
    words: known(value, () => `shear exponent ${value.toFixed(2)}, design assumes ${limit}`, wind.why),
  };
}

function designSource(limit: number): string {
  if (limit === 0.2) return 'IEC 61400-1, normal wind profile on land';
  if (limit === 0.14) return 'IEC 61400-3-1, normal wind profile offshore';
  return 'site file';
}

function veerState(wind: DiscWind): LoadState {
  const value = wind.veerPer100M;
  const turns = value >= 0 ? 'veers' : 'backs';
  return {
    name: 'veer-strong',
    on: over(Math.abs(value), STRONG_VEER),
    value,
    unit: 'deg/100 m',
    limit: STRONG_VEER,
    source: 'common practice',
    words: known(value, () => `wind ${turns} ${Math.abs(value).toFixed(1)}° per 100 m over the disc`, wind.why),
  };
}

/** Speed that falls with height in the upper half: the disc's top is in the air above a nose. */
function negativeShearState(wind: DiscWind): LoadState {
  const value = wind.shearUpper;
  return {
    name: 'speed-falls-above-nose',
    on: Number.isNaN(value) ? null : value < 0 && wind.noseInRotor !== null,
    value,
    unit: '',
    limit: 0,
    source: 'IEC 61400-1 assumes speed that grows with height',
    words: known(value, () => `shear exponent of the upper half ${value.toFixed(2)}`, wind.why),
  };
}

function noseState(wind: DiscWind): LoadState {
  const on = wind.noseInRotor ?? false;
  return {
    name: 'nose-in-rotor',
    on,
    value: on ? 1 : 0,
    unit: '',
    limit: 1,
    source: 'geometry',
    words: wind.noseInRotor === null ? 'no jet' : `nose ${on ? 'between the tips' : 'outside the disc'}`,
  };
}

function limitState(profile: Profile, limit: WorkLimit): LoadState {
  const { speed } = windAtHeight(profile, limit.height);
  return {
    name: `limit/${limit.name}`,
    on: over(speed, limit.speed),
    value: speed,
    unit: 'm/s',
    limit: limit.speed,
    source: `site limit for ${limit.kind === 'other' ? limit.name : limit.kind} at ${limit.height} m`,
    words: known(
      speed,
      () => `${speed.toFixed(1)} m/s at ${limit.height} m, ${limit.name} stops above ${limit.speed} m/s`,
      `no wind at ${limit.height} m`,
    ),
  };
}

function over(value: number, limit: number): boolean | null {
  return Number.isNaN(value) ? null : value > limit;
}

function known(value: number, words: () => string, otherwise: string): string {
  return Number.isNaN(value) ? `not assessable: ${otherwise === '' ? 'no level to tell it from' : otherwise}` : words();
}

/** How long a state lasted through a series. */
export interface TimeInState {
  readonly totalS: number;
  readonly longestS: number;
  /** Begin of the spell that the series ends in, UTC ms; NaN when it ends off. */
  readonly sinceMs: number;
  /** Seconds in which it could not be told. */
  readonly unknownS: number;
}

/**
 * Time in a state. Each sample stands for the time since the one before; a gap or an unknown ends a spell.
 * @param timeMs ascending
 * @param on the state at each time, null unknown
 */
export function timeInState(timeMs: ArrayLike<number>, on: readonly (boolean | null)[]): TimeInState {
  const durations = sampleDurationsS(timeMs);
  let [totalS, longestS, spellS, unknownS, sinceMs] = [0, 0, 0, 0, NaN];
  on.forEach((state, k) => {
    const duration = durations[k]!;
    const afterGap = k > 0 && timeMs[k]! - timeMs[k - 1]! > duration * 1000;
    if (state === null) unknownS += duration;
    if (state !== true) {
      spellS = 0;
      sinceMs = NaN;
      return;
    }
    if (spellS === 0 || afterGap) {
      spellS = 0;
      sinceMs = timeMs[k]! - duration * 1000;
    }
    spellS += duration;
    totalS += duration;
    longestS = Math.max(longestS, spellS);
  });
  return { totalS, longestS, sinceMs, unknownS };
}
