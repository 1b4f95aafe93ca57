// Wind from one instrument, temperature and humidity from another: the profiler now, the sounding of the evening.

import { OLDEST_HUMIDITY_S } from '../moisture/index.ts';
import type { Profile } from '../profile/index.ts';
import { soundingOf } from './sounding.ts';

export interface JoinOptions {
  /** s; air measured longer ago is not used. Unless told, as for the moisture it carries: 13 h. */
  readonly oldestS: number;
}

/** Wind, and the air to go with it; `air` null as `why` says. */
export interface WindAndAir {
  readonly wind: Profile;
  readonly air: Profile | null;
  /** How much earlier the air was measured than the wind, s; NaN without air. */
  readonly airAgeS: number;
  readonly why: string;
}

/**
 * Finds the air for a wind profile: its own if it has any, else the newest of the candidates that is not later than the
 * wind, not too old, and can be lifted.
 * @param candidates profiles of any stations and times, in any order
 */
export function joinWindAndAir(
  wind: Profile,
  candidates: Iterable<Profile>,
  options: Partial<JoinOptions> = {},
): WindAndAir {
  const oldestS = options.oldestS ?? OLDEST_HUMIDITY_S;
  if (isAir(wind)) return { wind, air: wind, airAgeS: 0, why: '' };
  const earlier = [...candidates]
    .filter((profile) => profile.timeMs <= wind.timeMs)
    .sort((a, b) => b.timeMs - a.timeMs);
  const air = earlier.find(isAir);
  if (air === undefined)
    return { wind, air: null, airAgeS: NaN, why: 'No sounding with temperature and humidity is at hand.' };
  const airAgeS = (wind.timeMs - air.timeMs) / 1000;
  if (airAgeS <= oldestS) return { wind, air, airAgeS, why: '' };
  const why = `The last temperature and humidity are ${hours(airAgeS)} old; more than ${hours(oldestS)} is not used.`;
  return { wind, air: null, airAgeS, why };
}

function isAir(profile: Profile): boolean {
  return soundingOf(profile).noAir === '';
}

function hours(seconds: number): string {
  return `${(seconds / 3600).toFixed(1)} h`;
}
