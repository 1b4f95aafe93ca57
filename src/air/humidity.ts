// Water vapour: from what instruments report (dew point, relative humidity) to specific humidity and back.
// Pressures in Pa, temperatures in K, humidities in kg/kg or as a fraction. NaN in, NaN out.

import { EPSILON, KAPPA, ZERO_CELSIUS } from './constants.ts';

/** Saturation vapour pressure over water, Pa, by Bolton (1980, Mon. Wea. Rev. 108, eq. 10). */
export function saturationVapourPressure(temperature: number): number {
  const celsius = temperature - ZERO_CELSIUS;
  return 611.2 * Math.exp((17.67 * celsius) / (celsius + 243.5));
}

/** Temperature at which the vapour pressure is that of saturation, K: Bolton's eq. 10 solved for temperature. */
export function dewPointOfVapourPressure(vapourPressure: number): number {
  if (!(vapourPressure > 0)) return NaN;
  const logarithm = Math.log(vapourPressure / 611.2);
  return (243.5 * logarithm) / (17.67 - logarithm) + ZERO_CELSIUS;
}

/** Vapour pressure, Pa, of air with this specific humidity at this pressure. */
export function vapourPressureOf(specificHumidity: number, pressure: number): number {
  return (specificHumidity * pressure) / (EPSILON + (1 - EPSILON) * specificHumidity);
}

/** Specific humidity, kg/kg, of air with this vapour pressure at this pressure. NaN when the vapour would fill the air. */
export function specificHumidityOfVapour(vapourPressure: number, pressure: number): number {
  return vapourPressure < pressure ? (EPSILON * vapourPressure) / (pressure - (1 - EPSILON) * vapourPressure) : NaN;
}

/** Specific humidity, kg/kg, from dew point (K) and pressure (Pa). */
export function specificHumidityOfDewPoint(dewPoint: number, pressure: number): number {
  return specificHumidityOfVapour(saturationVapourPressure(dewPoint), pressure);
}

/** Specific humidity, kg/kg, from relative humidity over water (fraction), temperature (K) and pressure (Pa). */
export function specificHumidityOfRelative(relativeHumidity: number, temperature: number, pressure: number): number {
  return specificHumidityOfVapour(relativeHumidity * saturationVapourPressure(temperature), pressure);
}

/** Dew point, K, from specific humidity and pressure. NaN for dry air. */
export function dewPointOf(specificHumidity: number, pressure: number): number {
  return dewPointOfVapourPressure(vapourPressureOf(specificHumidity, pressure));
}

/** Relative humidity over water, fraction. */
export function relativeHumidityOf(specificHumidity: number, temperature: number, pressure: number): number {
  return vapourPressureOf(specificHumidity, pressure) / saturationVapourPressure(temperature);
}

/** Mixing ratio, kg/kg, from specific humidity. */
export function mixingRatioOf(specificHumidity: number): number {
  return specificHumidity / (1 - specificHumidity);
}

/** Virtual temperature, K (AMS Glossary): T (1 + r/eps)/(1 + r). */
export function virtualTemperature(temperature: number, specificHumidity: number): number {
  const mixingRatio = mixingRatioOf(specificHumidity);
  return (temperature * (1 + mixingRatio / EPSILON)) / (1 + mixingRatio);
}

/** Potential temperature, K, referred to 1000 hPa. */
export function potentialTemperature(temperature: number, pressure: number): number {
  return temperature * Math.pow(100_000 / pressure, KAPPA);
}
