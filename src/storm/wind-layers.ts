// What the wind's change with height offers a storm: bulk shear and storm-relative helicity of layers.

import { figure, type Figure, type VectorFigure } from './figure.ts';
import { walkLayer, whyNotUpTo, windAt, type Hodograph } from './hodograph.ts';

/** Size of the wind difference between the lowest level and a height above ground, m/s. */
export function bulkShear(hodograph: Hodograph, top: number): Figure {
  const why = whyNotUpTo(hodograph, top);
  return why === '' ? shearBetween(hodograph, hodograph.heightAgl[0]!, top) : figure(NaN, why);
}

/** Size of the wind difference between two heights above ground, m/s. */
export function shearBetween(hodograph: Hodograph, bottom: number, top: number): Figure {
  const lower = windAt(hodograph, bottom);
  const upper = windAt(hodograph, top);
  const why = lower.why === '' ? upper.why : lower.why;
  return figure(Math.hypot(upper.u - lower.u, upper.v - lower.v), why);
}

/**
 * Storm-relative helicity from the lowest level to a height above ground, m2/s2 (Davies-Jones, Burgess & Foster 1990,
 * 16th Conf. on Severe Local Storms): twice the area swept by the storm-relative wind, clockwise turning positive.
 */
export function helicity(hodograph: Hodograph, top: number, motion: VectorFigure): Figure {
  const why = whyNotUpTo(hodograph, top);
  return why === '' ? helicityBetween(hodograph, hodograph.heightAgl[0]!, top, motion) : figure(NaN, why);
}

/** The same between two heights above ground. */
export function helicityBetween(hodograph: Hodograph, bottom: number, top: number, motion: VectorFigure): Figure {
  if (motion.why !== '') return figure(NaN, motion.why);
  const ends = shearBetween(hodograph, bottom, top);
  if (ends.why !== '') return ends;
  let sum = 0;
  walkLayer(hodograph, bottom, top, (_below, u1, v1, _above, u2, v2) => {
    sum += (u2 - motion.u) * (v1 - motion.v) - (u1 - motion.u) * (v2 - motion.v);
  });
  return figure(sum);
}
