// Density of moist air. Temperature in K, pressure in Pa. NaN in, NaN out.

import { GAS_CONSTANT_DRY, GAS_CONSTANT_VAPOUR } from './constants.ts';
import { vapourPressureOf } from './humidity.ts';

/** Density, kg/m3, by the gas law for dry air and vapour each; specific humidity in kg/kg, 0 for dry air. */
export function airDensity(temperature: number, pressure: number, specificHumidity: number): number {
  const vapour = vapourPressureOf(specificHumidity, pressure);
  return ((pressure - vapour) / GAS_CONSTANT_DRY + vapour / GAS_CONSTANT_VAPOUR) / temperature;
}

/**
 * Density, kg/m3, as power-performance measurement states it (IEC 61400-12-1:2017), with that standard's own fit for
 * the vapour pressure.
 * @param relativeHumidity fraction; the standard takes 0.5 where it is not measured
 */
export function airDensityIec(temperature: number, pressure: number, relativeHumidity: number): number {
  const saturation = 0.0000205 * Math.exp(0.0631846 * temperature);
  const lack = relativeHumidity * saturation * (1 / GAS_CONSTANT_DRY - 1 / GAS_CONSTANT_VAPOUR);
  return (pressure / GAS_CONSTANT_DRY - lack) / temperature;
}
