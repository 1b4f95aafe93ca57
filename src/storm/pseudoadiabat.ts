// The temperature of saturated air that has rained out on its way up: constant equivalent potential temperature by
// Bolton (1980, Mon. Wea. Rev. 108), eq. 39, with his eq. 10 for the vapour pressure.

import { EPSILON, KAPPA_BOLTON, saturationVapourPressure, ZERO_CELSIUS } from '../air/index.ts';

/** ln of eq. 39 for air whose condensation temperature is its own; vapour pressure in Pa. */
export function lnEquivalent(temperature: number, pressure: number, vapourPressure: number): number {
  const mixingRatio = (EPSILON * vapourPressure) / (pressure - vapourPressure);
  return (
    Math.log(temperature) -
    KAPPA_BOLTON * Math.log((pressure - vapourPressure) / 100_000) +
    (3036 / temperature - 1.78) * mixingRatio * (1 + 0.448 * mixingRatio)
  );
}

/**
 * Temperature, K, at which saturated air has the given ln of equivalent potential temperature; Newton's method.
 * @param guess K, near the answer
 * @returns NaN when no such temperature is found
 */
export function saturatedTemperature(lnWanted: number, pressure: number, guess: number): number {
  let temperature = guess;
  for (let turn = 0; turn < 30; turn++) {
    const vapour = saturationVapourPressure(temperature);
    const dry = pressure - vapour;
    if (!(dry > 0)) {
      temperature -= 10;
      continue;
    }
    const mixingRatio = (EPSILON * vapour) / dry;
    const celsius = temperature - ZERO_CELSIUS;
    const vapourSlope = (vapour * 17.67 * 243.5) / ((celsius + 243.5) * (celsius + 243.5));
    const ratioSlope = (EPSILON * vapourSlope * pressure) / (dry * dry);
    const latent = 3036 / temperature - 1.78;
    const moisture = mixingRatio * (1 + 0.448 * mixingRatio);
    const value = Math.log(temperature) - KAPPA_BOLTON * Math.log(dry / 100_000) + latent * moisture;
    const slope =
      1 / temperature +
      (KAPPA_BOLTON * vapourSlope) / dry -
      (3036 / (temperature * temperature)) * moisture +
      latent * (1 + 0.896 * mixingRatio) * ratioSlope;
    const step = (lnWanted - value) / slope;
    temperature += step;
    if (Math.abs(step) < 1e-5) return temperature;
    if (Number.isNaN(step)) return NaN;
  }
  return NaN;
}
