// Warming or cooling by the wind, told from how it turns with height, if the turn is that of the geostrophic wind
// (thermal wind; Holton & Hakim 2013). In the north veering warms and backing cools, in the south the reverse.

import { GAS_CONSTANT_DRY, GRAVITY } from './constants.ts';
import { coriolisParameter } from './coriolis.ts';
import { eastward, northward } from './wind.ts';

/** Wind at one end of a layer. */
export interface LayerWind {
  /** m/s */
  readonly speed: number;
  /** degrees; may be NaN when calm */
  readonly direction: number;
}

/**
 * Temperature advection of a layer, K/s, warming positive; between heights.
 * @param lower wind and height (m) of the lower level
 * @param upper wind and height (m) of the upper level
 * @param options latitude in degrees, mean temperature of the layer in K
 * @returns NaN at equal heights; 0 on the equator, where it means nothing
 */
export function advectionBetweenHeights(
  lower: LayerWind & { readonly height: number },
  upper: LayerWind & { readonly height: number },
  options: { readonly latitude: number; readonly meanTemperature: number },
): number {
  const depth = upper.height - lower.height;
  if (!(depth > 0)) return NaN;
  return (coriolisParameter(options.latitude) * options.meanTemperature * turning(lower, upper)) / (GRAVITY * depth);
}

/**
 * Temperature advection of a layer, K/s, warming positive; between pressures (Pa).
 * @returns NaN unless the lower level's pressure is the higher one
 */
export function advectionBetweenPressures(
  lower: LayerWind & { readonly pressure: number },
  upper: LayerWind & { readonly pressure: number },
  options: { readonly latitude: number },
): number {
  if (!(lower.pressure > upper.pressure)) return NaN;
  const thickness = GAS_CONSTANT_DRY * Math.log(lower.pressure / upper.pressure);
  return (coriolisParameter(options.latitude) * turning(lower, upper)) / thickness;
}

/** V1 V2 sin(D2 - D1), by components so that calm has no say. */
function turning(lower: LayerWind, upper: LayerWind): number {
  return (
    eastward(upper.speed, upper.direction) * northward(lower.speed, lower.direction) -
    eastward(lower.speed, lower.direction) * northward(upper.speed, upper.direction)
  );
}
