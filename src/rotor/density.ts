// Density of the air at hub height, out of whatever the profile carries, and from what it was taken.

import { airDensity, GAS_CONSTANT_DRY, GRAVITY, standardAtmosphere, virtualTemperature } from '../air/index.ts';
import { REJECTING_AIR, type Profile } from '../profile/index.ts';

export interface HubDensity {
  /** kg/m3; NaN when there is no temperature near the hub */
  readonly airDensity: number;
  /** How it was had, for people; why not when it is NaN. */
  readonly densityFrom: string;
}

/** kg/m3 that air at a rotor can have: from 4 km height in heat to sea level in the hardest cold, with room. */
const POSSIBLE = { least: 0.6, most: 1.7 };
/** A level without temperature at the hub may be replaced by one so near, m: 1 K there is 0.3 % of density. */
const NEAR = 150;

/**
 * Density of moist air at a height: the gas law for dry air and vapour. Temperature is linear in height between the levels around it, or that of the
 * nearest level within 150 m; pressure is carried from the nearest level that has one hydrostatically. Where the profile has
 * no pressure, that of the standard atmosphere (US Standard Atmosphere 1976) at the hub's height above sea level serves and
 * is said: weather moves it by 3 % at most, the normalised speed by 1 %. Without temperature there is no density.
 */
export function densityAt(profile: Profile, heightAgl: number): HubDensity {
  const warm = nearest(profile, profile.temperature, heightAgl, NEAR);
  if (warm === undefined) return { airDensity: NaN, densityFrom: 'no temperature near the hub' };
  const humid = nearest(profile, profile.specificHumidity, heightAgl, NEAR);
  const humidity = humid?.value ?? 0;
  const dry = humid === undefined ? ', taken as dry' : '';
  const level = nearest(profile, profile.pressure, heightAgl, Infinity);
  if (level !== undefined) {
    const scale = (GAS_CONSTANT_DRY * virtualTemperature(warm.value, humidity)) / GRAVITY;
    const pressure = level.nearValue * Math.exp((level.nearHeight - heightAgl) / scale);
    return plausible(airDensity(warm.value, pressure, humidity), `pressure and temperature${dry}`);
  }
  const { pressure } = standardAtmosphere(profile.station.elevation + heightAgl);
  if (Number.isNaN(pressure)) {
    return {
      airDensity: NaN,
      densityFrom: 'no pressure, and the station has no elevation to take the standard one from',
    };
  }
  return plausible(
    airDensity(warm.value, pressure, humidity),
    `temperature and the standard atmosphere's pressure${dry}`,
  );
}

function plausible(density: number, densityFrom: string): HubDensity {
  if (density >= POSSIBLE.least && density <= POSSIBLE.most) return { airDensity: density, densityFrom };
  return { airDensity: NaN, densityFrom: `pressure and temperature give ${density.toFixed(2)} kg/m3, which cannot be` };
}

interface Near {
  /** Interpolated to the height, or that of the nearest level. */
  readonly value: number;
  readonly nearValue: number;
  readonly nearHeight: number;
}

function nearest(profile: Profile, column: Float32Array | null, heightAgl: number, within: number): Near | undefined {
  if (column === null) return undefined;
  let below = -1;
  let above = -1;
  for (let k = 0; k < profile.levelCount; k++) {
    if ((profile.mark[k]! & REJECTING_AIR) !== 0 || !(column[k]! > 0 || column[k] === 0)) continue;
    if (profile.heightAgl[k]! <= heightAgl) below = k;
    else if (above < 0 && profile.heightAgl[k]! > heightAgl) above = k;
  }
  const distance = (k: number): number => (k < 0 ? Infinity : Math.abs(profile.heightAgl[k]! - heightAgl));
  const near = distance(below) <= distance(above) ? below : above;
  if (!(distance(near) <= within) || near < 0) return undefined;
  const nearValue = column[near]!;
  const nearHeight = profile.heightAgl[near]!;
  if (below < 0 || above < 0) return { value: nearValue, nearValue, nearHeight };
  const weight = (heightAgl - profile.heightAgl[below]!) / (profile.heightAgl[above]! - profile.heightAgl[below]!);
  return { value: column[below]! * (1 - weight) + column[above]! * weight, nearValue, nearHeight };
}
