// One profile's air, ready for moisture: wind, humidity, temperature and pressure at each height, the pressure worked out
// where the instrument does not measure it.

import {
  airDensity,
  eastward,
  GAS_CONSTANT_DRY,
  GRAVITY,
  northward,
  specificHumidityOfRelative,
  standardAtmosphere,
  virtualTemperature,
} from '../air/index.ts';
import { REJECTING, REJECTING_AIR, type Profile } from '../profile/index.ts';

/** Columns of equal length, ascending, without rejected levels; NaN where missing. */
export interface AirColumn {
  readonly count: number;
  /** m above ground */
  readonly heightAgl: Float64Array;
  /** Pa; measured or worked out, see `pressureFrom` */
  readonly pressure: Float64Array;
  /** K */
  readonly temperature: Float64Array;
  /** kg/kg */
  readonly specificHumidity: Float64Array;
  /** m/s, eastward and northward */
  readonly u: Float64Array;
  readonly v: Float64Array;
  /** kg/m3 */
  readonly density: Float64Array;
  /** Empty where every pressure is measured, else how the others were had, for people. */
  readonly pressureFrom: string;
  /** Levels whose humidity is left out since their dew point lies clearly above the temperature. */
  readonly contradicted: number;
}

/** Relative humidity, fraction, beyond which a level contradicts itself: a dew point some 1.5 K above the temperature. */
const CONTRADICTED = 1.1;

/** @param surfacePressure Pa at the ground, where the profile itself has no pressure; NaN when not known */
export function airColumn(profile: Profile, surfacePressure = NaN): AirColumn {
  const levels: number[] = [];
  for (let k = 0; k < profile.levelCount; k++) {
    if ((profile.mark[k]! & REJECTING) === 0 && Number.isFinite(profile.heightAgl[k]!)) levels.push(k);
  }
  const take = (column: Float32Array | null): Float64Array =>
    Float64Array.from(levels, (k) => (column === null ? NaN : column[k]!));
  const speed = take(profile.speed);
  const direction = take(profile.direction);
  const heightAgl = take(profile.heightAgl);
  const takeAir = (column: Float32Array | null): Float64Array =>
    take(column).map((value, position) => ((profile.mark[levels[position]!]! & REJECTING_AIR) === 0 ? value : NaN));
  const temperature = takeAir(profile.temperature);
  const specificHumidity = takeAir(profile.specificHumidity);
  return completeAir(
    {
      heightAgl,
      pressure: take(profile.pressure),
      temperature,
      specificHumidity,
      u: speed.map((value, k) => eastward(value, direction[k]!)),
      v: speed.map((value, k) => northward(value, direction[k]!)),
    },
    { surfacePressure, elevation: profile.station.elevation },
  );
}

/** Adds pressure where it is missing, and density. */
export function completeAir(
  air: Omit<AirColumn, 'count' | 'density' | 'pressureFrom' | 'contradicted'>,
  ground: { readonly surfacePressure: number; readonly elevation: number },
): AirColumn {
  const { pressure, pressureFrom } = fillPressure(air, ground);
  let contradicted = 0;
  const specificHumidity = air.specificHumidity.map((value, k) => {
    if (!(value > specificHumidityOfRelative(CONTRADICTED, air.temperature[k]!, pressure[k]!))) return value;
    contradicted++;
    return NaN;
  });
  const density = air.temperature.map((value, k) => airDensity(value, pressure[k]!, specificHumidity[k]!));
  const count = air.heightAgl.length;
  return { ...air, count, pressure, specificHumidity, density, pressureFrom, contradicted };
}

interface Thermal {
  readonly heightAgl: Float64Array;
  readonly pressure: Float64Array;
  readonly temperature: Float64Array;
  readonly specificHumidity: Float64Array;
}

/**
 * Pressure at every height: between measured pressures its logarithm is linear in height; beyond them, or from the ground up
 * where none is measured, the air is in hydrostatic balance with the temperature of the levels. With neither measured nor
 * given surface pressure the standard atmosphere's (US Standard Atmosphere 1976) at the station's elevation begins.
 */
function fillPressure(
  air: Thermal,
  ground: { readonly surfacePressure: number; readonly elevation: number },
): { pressure: Float64Array; pressureFrom: string } {
  const { heightAgl } = air;
  const pressure = air.pressure.slice();
  const measured: number[] = [];
  pressure.forEach((value, k) => {
    if (value > 0) measured.push(k);
    else pressure[k] = NaN;
  });
  if (measured.length === pressure.length) return { pressure, pressureFrom: '' };

  const virtual = virtualProfile(air);
  if (virtual === undefined) return { pressure, pressureFrom: 'levels without temperature have no pressure' };
  const carry = (from: number, fromHeight: number, to: number): number => {
    const warmth = (virtual(fromHeight) + virtual(to)) / 2;
    return from * Math.exp((-GRAVITY * (to - fromHeight)) / (GAS_CONSTANT_DRY * warmth));
  };
  if (measured.length === 0) {
    const known = ground.surfacePressure > 0;
    let below = known ? ground.surfacePressure : standardAtmosphere(ground.elevation).pressure;
    let belowHeight = 0;
    heightAgl.forEach((height, k) => {
      below = carry(below, belowHeight, height);
      belowHeight = height;
      pressure[k] = below;
    });
    if (Number.isNaN(below))
      return { pressure, pressureFrom: 'no pressure, and no elevation to take a standard one from' };
    const words = known ? 'the surface pressure' : 'the standard surface pressure of the station';
    return { pressure, pressureFrom: `pressure worked up from ${words}` };
  }

  const [lowest, highest] = [measured[0]!, measured.at(-1)!];
  for (let k = highest + 1; k < pressure.length; k++)
    pressure[k] = carry(pressure[k - 1]!, heightAgl[k - 1]!, heightAgl[k]!);
  for (let k = lowest - 1; k >= 0; k--) pressure[k] = carry(pressure[k + 1]!, heightAgl[k + 1]!, heightAgl[k]!);
  for (let gap = 1; gap < measured.length; gap++) {
    const [below, above] = [measured[gap - 1]!, measured[gap]!];
    const slope = Math.log(pressure[above]! / pressure[below]!) / (heightAgl[above]! - heightAgl[below]!);
    for (let k = below + 1; k < above; k++) {
      pressure[k] = pressure[below]! * Math.exp(slope * (heightAgl[k]! - heightAgl[below]!));
    }
  }
  return { pressure, pressureFrom: 'pressure worked out at levels that have none' };
}

/** Virtual temperature by height, linear between levels that have temperature, that of the end level beyond them. */
function virtualProfile(air: Thermal): ((height: number) => number) | undefined {
  const heights: number[] = [];
  const values: number[] = [];
  air.temperature.forEach((temperature, k) => {
    if (!(temperature > 0)) return;
    const humidity = air.specificHumidity[k]!;
    heights.push(air.heightAgl[k]!);
    values.push(virtualTemperature(temperature, Number.isNaN(humidity) ? 0 : humidity));
  });
  if (heights.length === 0) return undefined;
  return (height) => linearHeld(heights, values, height);
}

/** Linear between ascending points, the end value held beyond them. */
export function linearHeld(heights: ArrayLike<number>, values: ArrayLike<number>, height: number): number {
  const last = heights.length - 1;
  if (!(height > heights[0]!)) return values[0]!;
  if (height >= heights[last]!) return values[last]!;
  let low = 0;
  let high = last;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (heights[middle]! <= height) low = middle;
    else high = middle;
  }
  const weight = (height - heights[low]!) / (heights[high]! - heights[low]!);
  return values[low]! * (1 - weight) + values[high]! * weight;
}
