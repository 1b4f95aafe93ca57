// Specific humidity of levels out of whatever humidity a file gives.

import { specificHumidityOfDewPoint, specificHumidityOfRelative, standardAtmosphere } from '../air/index.ts';

/** Columns of equal length, NaN missing; a column that the file does not have is null. */
export interface HumidityColumns {
  /** kg/kg */
  readonly specificHumidity: Float32Array | null;
  /** kg/kg */
  readonly mixingRatio: Float32Array | null;
  /** K */
  readonly dewPoint: Float32Array | null;
  /** fraction */
  readonly relativeHumidity: Float32Array | null;
  /** K */
  readonly temperature: Float32Array | null;
  /** Pa */
  readonly pressure: Float32Array | null;
}

/** Specific humidity, kg/kg, and whether any level's pressure had to be that of the standard atmosphere. */
export interface LevelHumidity {
  readonly specificHumidity: Float32Array | null;
  readonly pressureAssumed: boolean;
}

/** To be told with profiles whose humidity rests on an assumed pressure. */
export const ASSUMED_PRESSURE_NOTE =
  'no pressure in the file: humidity worked out with that of the standard atmosphere, which is off by some 2 % of its value';

/**
 * Level by level the first that is there of: specific humidity, mixing ratio, dew point, relative humidity with
 * temperature. The last two need a pressure; where none is given the US Standard Atmosphere 1976 at that height serves.
 * @param heightAmsl m above sea level of a level, asked only where pressure is missing
 */
export function levelHumidity(columns: HumidityColumns, heightAmsl: (level: number) => number): LevelHumidity {
  const { specificHumidity, mixingRatio, dewPoint, relativeHumidity, temperature, pressure } = columns;
  const length = (specificHumidity ?? mixingRatio ?? dewPoint ?? relativeHumidity)?.length;
  if (length === undefined) return { specificHumidity: null, pressureAssumed: false };
  if (mixingRatio === null && dewPoint === null && relativeHumidity === null) {
    return { specificHumidity, pressureAssumed: false };
  }
  const out = new Float32Array(length);
  let pressureAssumed = false;
  const pressureAt = (level: number): number => {
    const given = pressure?.[level] ?? NaN;
    if (!Number.isNaN(given)) return given;
    const assumed = standardAtmosphere(heightAmsl(level)).pressure;
    if (!Number.isNaN(assumed)) pressureAssumed = true;
    return assumed;
  };
  for (let k = 0; k < length; k++) {
    let humidity = specificHumidity?.[k] ?? NaN;
    if (Number.isNaN(humidity) && mixingRatio !== null) humidity = mixingRatio[k]! / (1 + mixingRatio[k]!);
    if (Number.isNaN(humidity) && dewPoint !== null && !Number.isNaN(dewPoint[k]!)) {
      humidity = specificHumidityOfDewPoint(dewPoint[k]!, pressureAt(k));
    }
    if (Number.isNaN(humidity) && relativeHumidity !== null && temperature !== null) {
      if (!Number.isNaN(relativeHumidity[k]!) && !Number.isNaN(temperature[k]!)) {
        humidity = specificHumidityOfRelative(relativeHumidity[k]!, temperature[k]!, pressureAt(k));
      }
    }
    out[k] = humidity;
  }
  return { specificHumidity: out, pressureAssumed };
}
