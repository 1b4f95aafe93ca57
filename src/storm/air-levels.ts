// Pressure, temperature and humidity of a profile's levels; the pressure worked out where the instrument measures none.

import { airColumn } from '../moisture/index.ts';
import { REJECTING_AIR, type Profile } from '../profile/index.ts';
import { metres } from './figure.ts';

/** Level columns as a profile has them, ascending; pressure measured, or worked out as `pressureFrom` tells. */
export interface AirLevels {
  readonly levelCount: number;
  /** m above ground */
  readonly heightAgl: ArrayLike<number>;
  /** Pa */
  readonly pressure: ArrayLike<number> | null;
  /** K */
  readonly temperature: ArrayLike<number> | null;
  /** kg/kg */
  readonly specificHumidity: ArrayLike<number> | null;
  readonly mark: ArrayLike<number>;
  /** In words; empty where pressure was measured. */
  readonly pressureFrom: string;
  /** Why there is no pressure; empty where there is. */
  readonly noPressure: string;
}

/**
 * The levels with pressure. Where fewer than two levels with temperature have one, all heights get theirs by hydrostatic
 * balance: up from the lowest that was measured, else from that of the standard atmosphere (US Standard Atmosphere 1976)
 * at the station's elevation.
 */
export function airLevelsOf(profile: Profile): AirLevels {
  const { levelCount, heightAgl, pressure, temperature, specificHumidity, mark, station } = profile;
  const measured = {
    levelCount,
    heightAgl,
    pressure,
    temperature,
    specificHumidity,
    mark,
    pressureFrom: '',
    noPressure: '',
  };
  if (temperature === null || pressuresOf(profile) >= 2) return measured;
  const air = airColumn(profile);
  if (!air.pressure.some((value) => value > 0)) {
    return {
      ...measured,
      noPressure: 'The profile has no pressure, and its station no elevation to work one out from.',
    };
  }
  const { elevation } = station;
  const begin =
    pressuresOf(profile) > 0
      ? 'from the level that has one'
      : `from the standard atmosphere’s at the station’s elevation, ${metres(elevation)}: weather moves it by some 2 % (common practice, without source), and parcels’ energies with it by less than 5 %`;
  return {
    levelCount: air.count,
    heightAgl: air.heightAgl,
    pressure: air.pressure,
    temperature: air.temperature,
    specificHumidity: air.specificHumidity,
    mark: new Uint32Array(air.count),
    pressureFrom: `Pressure was not measured; it is worked up by hydrostatic balance ${begin}.`,
    noPressure: '',
  };
}

/** Usable levels that have both pressure and temperature; two are as good as many here. */
function pressuresOf({ levelCount, pressure, temperature, mark }: Profile): number {
  let count = 0;
  if (pressure === null || temperature === null) return count;
  for (let k = 0; k < levelCount && count < 2; k++) {
    if ((mark[k]! & REJECTING_AIR) === 0 && pressure[k]! > 0 && temperature[k]! > 0) count++;
  }
  return count;
}
