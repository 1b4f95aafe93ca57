// Warming and cooling aloft that the turning wind implies, by layers above the friction of the ground.

import { advectionBetweenHeights, directionOf, speedOf } from '../air/index.ts';
import { figure, metres, type Figure, type VectorFigure } from './figure.ts';
import { windAt, type Hodograph } from './hodograph.ts';
import { temperatureAtHeight, type Sounding } from './sounding.ts';

/** Temperature advection of a layer that the turning wind implies. */
export interface LayerAdvection extends Figure {
  /** m above ground */
  readonly bottom: number;
  /** m above ground */
  readonly top: number;
}

/** m above ground; friction turns the wind below. */
const ADVECTION_LAYERS = [
  [1000, 2000],
  [2000, 3000],
] as const;
/** K/s, warming positive. The wind's turn is taken for that of the geostrophic wind, least true in the jet itself. */
export function advectionByLayers(hodograph: Hodograph, sounding: Sounding, latitude: number): LayerAdvection[] {
  return ADVECTION_LAYERS.map(([bottom, top]) => advectionOf(hodograph, sounding, latitude, bottom, top));
}

function advectionOf(
  hodograph: Hodograph,
  sounding: Sounding,
  latitude: number,
  bottom: number,
  top: number,
): LayerAdvection {
  const missing = (why: string): LayerAdvection => ({ bottom, top, value: NaN, why });
  if (Number.isNaN(latitude))
    return missing('The station has no position, so the turning of the Earth there is not known.');
  const lower = windAt(hodograph, bottom);
  const upper = windAt(hodograph, top);
  if (lower.why !== '') return missing(lower.why);
  if (upper.why !== '') return missing(upper.why);
  const meanTemperature = (temperatureAtHeight(sounding, bottom) + temperatureAtHeight(sounding, top)) / 2;
  if (Number.isNaN(meanTemperature))
    return missing(`No temperature is known from ${metres(bottom)} to ${metres(top)}.`);
  // A calm has no direction, and brings nothing from anywhere.
  if (Number.isNaN(directionOf(lower.u, lower.v)) || Number.isNaN(directionOf(upper.u, upper.v))) {
    return { bottom, top, ...figure(0) };
  }
  const level = (wind: VectorFigure, height: number): { speed: number; direction: number; height: number } => ({
    speed: speedOf(wind.u, wind.v),
    direction: directionOf(wind.u, wind.v),
    height,
  });
  return {
    bottom,
    top,
    ...figure(advectionBetweenHeights(level(lower, bottom), level(upper, top), { latitude, meanTemperature })),
  };
}
