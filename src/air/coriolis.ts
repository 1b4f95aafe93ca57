// The turning of the Earth as the wind feels it (Holton & Hakim 2013).

import { EARTH_ROTATION } from './constants.ts';

/** Coriolis parameter 2 Omega sin(latitude), 1/s; negative in the south, 0 on the equator, NaN for no latitude. */
export function coriolisParameter(latitude: number): number {
  return 2 * EARTH_ROTATION * Math.sin((latitude * Math.PI) / 180);
}

/**
 * Period of an inertial oscillation, s: 2 pi / |f|, which is the half-pendulum day (AMS Glossary).
 * @returns NaN on the equator, where nothing turns
 */
export function inertialPeriodS(latitude: number): number {
  const f = Math.abs(coriolisParameter(latitude));
  return f > 0 ? (2 * Math.PI) / f : NaN;
}
