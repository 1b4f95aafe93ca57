// Saturation vapour pressure as the Guide to Instruments and Methods of Observation states it (WMO-No. 8, Annex 4.B):
// for what is compared with observations. The house itself reckons with Bolton's form in `humidity.ts`.

import { ZERO_CELSIUS } from './constants.ts';

/** Saturation vapour pressure of the pure phase over water, Pa; temperature in K. */
export function saturationOverWater(temperature: number): number {
  const celsius = temperature - ZERO_CELSIUS;
  return 611.2 * Math.exp((17.62 * celsius) / (243.12 + celsius));
}

/** Saturation vapour pressure of the pure phase over ice, Pa; temperature in K. NaN above freezing. */
export function saturationOverIce(temperature: number): number {
  const celsius = temperature - ZERO_CELSIUS;
  return celsius <= 0 ? 611.2 * Math.exp((22.46 * celsius) / (272.62 + celsius)) : NaN;
}

/** Factor by which saturation in moist air exceeds that of the pure phase; pressure in Pa. */
export function moistAirFactor(pressure: number): number {
  const hectopascal = pressure / 100;
  return 1.0016 + 3.15e-6 * hectopascal - 0.074 / hectopascal;
}
