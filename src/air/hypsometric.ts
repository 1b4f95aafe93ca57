// Heights of pressure levels from the weight of the air between them.

import { GAS_CONSTANT_DRY, GRAVITY } from './constants.ts';
import { virtualTemperature } from './humidity.ts';

/**
 * Heights of a sounding's levels by the hypsometric equation with the mean virtual temperature of each layer.
 * @param pressure Pa, one per level, the station's level first
 * @param temperature K, same length
 * @param specificHumidity kg/kg, same length; NaN is taken as dry
 * @param stationHeight m, height of the first level that has pressure and temperature
 * @returns m above the same datum; NaN where pressure or temperature are missing, the levels around are joined
 */
export function hypsometricHeights(
  pressure: ArrayLike<number>,
  temperature: ArrayLike<number>,
  specificHumidity: ArrayLike<number>,
  stationHeight: number,
): Float64Array {
  const heights = new Float64Array(pressure.length).fill(NaN);
  let height = stationHeight;
  let pressureBelow = NaN;
  let virtualBelow = NaN;
  for (let k = 0; k < pressure.length; k++) {
    const humidity = specificHumidity[k]!;
    const virtual = virtualTemperature(temperature[k]!, Number.isNaN(humidity) ? 0 : humidity);
    if (!(pressure[k]! > 0) || !(virtual > 0)) continue;
    if (!Number.isNaN(pressureBelow)) {
      height += ((GAS_CONSTANT_DRY / GRAVITY) * (virtualBelow + virtual) * Math.log(pressureBelow / pressure[k]!)) / 2;
    }
    heights[k] = height;
    pressureBelow = pressure[k]!;
    virtualBelow = virtual;
  }
  return heights;
}
