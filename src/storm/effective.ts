// Shear and helicity of the air a storm really draws on (Thompson et al. 2007, Wea. Forecasting 22, 102-115).

import { figure, type Figure, type VectorFigure } from './figure.ts';
import { NEAR_GROUND, type Hodograph } from './hodograph.ts';
import type { Inflow } from './inflow.ts';
import type { Parcel } from './parcel.ts';
import { helicityBetween, shearBetween } from './wind-layers.ts';

/** From the inflow's bottom up half the way to the most unstable parcel's EL . */
export function effectiveShear(hodograph: Hodograph, inflow: Inflow, parcels: readonly Parcel[]): Figure {
  if (Number.isNaN(inflow.bottom)) return figure(NaN, inflow.why);
  const unstable = parcels.find((parcel) => parcel.name === 'most-unstable')!;
  if (unstable.positiveAtTop)
    return figure(NaN, 'Data end below the equilibrium level, so the depth of storms is not known.');
  if (Number.isNaN(unstable.elHeight)) return figure(NaN, unstable.why);
  const bottom = atLeastLowest(hodograph, inflow.bottom);
  return shearBetween(hodograph, bottom, bottom + (unstable.elHeight - bottom) / 2);
}

/** Storm-relative helicity through the inflow layer, m2/s2. */
export function inflowHelicity(hodograph: Hodograph, inflow: Inflow, motion: VectorFigure): Figure {
  const bottom = atLeastLowest(hodograph, inflow.bottom);
  if (!(inflow.top > bottom)) return figure(NaN, 'The inflow layer is a single level.');
  return helicityBetween(hodograph, bottom, inflow.top, motion);
}

/** An inflow that begins at the ground begins, for the wind, at its lowest level if that is near. */
function atLeastLowest(hodograph: Hodograph, height: number): number {
  const lowest = hodograph.heightAgl[0] ?? NaN;
  return height < lowest && lowest <= height + NEAR_GROUND ? lowest : height;
}
