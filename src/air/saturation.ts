// Where lifted air becomes cloud, and the temperature it keeps while it rains out: Bolton (1980, Mon. Wea. Rev. 108,
// 1046-1053). Temperatures in K, pressures in Pa, humidities in kg/kg or as a fraction. NaN in, NaN out.

import { KAPPA, KAPPA_BOLTON } from './constants.ts';

/**
 * Temperature at the lifting condensation level by eq. 15, from temperature and vapour pressure; the house's choice.
 * The formula may overshoot saturated air by some hundredths of a kelvin; it is not capped here.
 */
export function lclTemperature(temperature: number, vapourPressure: number): number {
  return 2840 / (3.5 * Math.log(temperature) - Math.log(vapourPressure / 100) - 4.805) + 55;
}

/** The same by eq. 21, from temperature and dew point. */
export function lclTemperatureOfDewPoint(temperature: number, dewPoint: number): number {
  return 1 / (1 / (dewPoint - 56) + Math.log(temperature / dewPoint) / 800) + 56;
}

/** The same by eq. 22, from temperature and relative humidity (fraction). */
export function lclTemperatureOfRelative(temperature: number, relativeHumidity: number): number {
  return 1 / (1 / (temperature - 55) - Math.log(relativeHumidity) / 2840) + 55;
}

/** Pressure at the lifting condensation level, Pa: up the dry adiabat to `lclTemperature`, never below the start. */
export function lclPressure(temperature: number, pressure: number, temperatureAtLcl: number): number {
  return temperatureAtLcl >= temperature ? pressure : pressure * Math.pow(temperatureAtLcl / temperature, 1 / KAPPA);
}

/** Equivalent potential temperature by eq. 39, K, the most exact of Bolton's forms; the house's choice. */
export function equivalentPotentialTemperature(
  temperature: number,
  pressure: number,
  vapourPressure: number,
  mixingRatio: number,
  temperatureAtLcl: number,
): number {
  const dry = temperature * Math.pow(100_000 / (pressure - vapourPressure), KAPPA_BOLTON);
  const dryAtLcl = dry * Math.pow(temperature / temperatureAtLcl, 0.28 * mixingRatio);
  return dryAtLcl * Math.exp((3036 / temperatureAtLcl - 1.78) * mixingRatio * (1 + 0.448 * mixingRatio));
}

/** The same by eq. 43, Bolton's simpler form. */
export function equivalentPotentialTemperatureSimple(
  temperature: number,
  pressure: number,
  mixingRatio: number,
  temperatureAtLcl: number,
): number {
  const dry = temperature * Math.pow(100_000 / pressure, KAPPA_BOLTON * (1 - 0.28 * mixingRatio));
  return dry * Math.exp((3376 / temperatureAtLcl - 2.54) * mixingRatio * (1 + 0.81 * mixingRatio));
}
