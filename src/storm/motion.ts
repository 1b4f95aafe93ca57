// Which way storms move: single storms by Bunkers et al. (2000, Wea. Forecasting 15, 61-79), clusters by Corfidi (2003,
// Wea. Forecasting 18, 997-1017).

import { noVector, vectorFigure, type VectorFigure } from './figure.ts';
import { meanWind, whyNotUpTo, type Hodograph } from './hodograph.ts';

/** Departure of the movers from the mean wind, m/s. */
const DEVIATION = 7.5;
/** The mean wind's layer, and the two that make the shear, m above ground. */
const MEAN_TOP = 6000;
const SHEAR_BOTTOM_TOP = 500;
const SHEAR_TOP_BOTTOM = 5500;

export interface StormMotion {
  /** Mean wind from the lowest level to 6 km. */
  readonly mean: VectorFigure;
  readonly right: VectorFigure;
  readonly left: VectorFigure;
}

/** Motion of right- and left-moving storms; height means, not weighted by pressure. */
export function stormMotion(hodograph: Hodograph): StormMotion {
  const why = whyNotUpTo(hodograph, MEAN_TOP);
  if (why !== '') return { mean: noVector(why), right: noVector(why), left: noVector(why) };
  const bottom = hodograph.heightAgl[0]!;
  const mean = meanWind(hodograph, bottom, MEAN_TOP);
  const low = meanWind(hodograph, bottom, SHEAR_BOTTOM_TOP);
  const high = meanWind(hodograph, SHEAR_TOP_BOTTOM, MEAN_TOP);
  const shearU = high.u - low.u;
  const shearV = high.v - low.v;
  const size = Math.hypot(shearU, shearV);
  // Rounding leaves some 1e-15 m/s where there is no shear.
  if (!(size > 1e-6)) {
    const none = noVector('Without shear there is no right or left of it.');
    return { mean, right: none, left: none };
  }
  const acrossU = (DEVIATION * shearV) / size;
  const acrossV = (-DEVIATION * shearU) / size;
  return {
    mean,
    right: vectorFigure(mean.u + acrossU, mean.v + acrossV),
    left: vectorFigure(mean.u - acrossU, mean.v - acrossV),
  };
}

/** Pressures whose winds make the cloud-layer wind, Pa. */
export const CLOUD_LEVELS = [85_000, 70_000, 50_000, 30_000] as const;

export interface ClusterMotion {
  /** Mean wind of 850, 700, 500 and 300 hPa. */
  readonly cloudLayer: VectorFigure;
  /** Where new cells of an upwind-developing cluster take it: cloud-layer wind minus jet. */
  readonly upwind: VectorFigure;
  /** Motion of a downwind-developing cluster: cloud-layer wind plus the upwind vector. */
  readonly downwind: VectorFigure;
}

/**
 * Cluster vectors.
 * @param cloudWinds winds at `CLOUD_LEVELS`
 * @param jet wind of the low-level jet
 */
export function clusterMotion(cloudWinds: readonly VectorFigure[], jet: VectorFigure): ClusterMotion {
  const missing = cloudWinds.find((wind) => wind.why !== '');
  if (missing !== undefined || cloudWinds.length === 0) {
    const none = noVector(missing?.why ?? 'No cloud-layer wind is known.');
    return { cloudLayer: none, upwind: none, downwind: none };
  }
  const mean = (of: (wind: VectorFigure) => number): number =>
    cloudWinds.reduce((sum, wind) => sum + of(wind), 0) / cloudWinds.length;
  const cloudLayer = vectorFigure(
    mean((wind) => wind.u),
    mean((wind) => wind.v),
  );
  if (jet.why !== '') return { cloudLayer, upwind: jet, downwind: jet };
  const upwind = vectorFigure(cloudLayer.u - jet.u, cloudLayer.v - jet.v);
  return { cloudLayer, upwind, downwind: vectorFigure(cloudLayer.u + upwind.u, cloudLayer.v + upwind.v) };
}
