// How firmly air resists lifting and mixing, between two levels. Means of the two levels stand in the denominators.

import { GRAVITY } from './constants.ts';

/** A level whose buoyancy is known. */
export interface ThermalLevel {
  /** m */
  readonly height: number;
  /** K */
  readonly virtualPotentialTemperature: number;
}

/** A level whose buoyancy and wind are known. */
export interface MovingLevel extends ThermalLevel {
  /** m/s, eastward */
  readonly u: number;
  /** m/s, northward */
  readonly v: number;
}

/** Square of the Brunt-Väisälä frequency, 1/s2 (AMS Glossary); negative when unstable, NaN unless upper is higher. */
export function bruntVaisalaSquared(lower: ThermalLevel, upper: ThermalLevel): number {
  const depth = upper.height - lower.height;
  return depth > 0 ? (GRAVITY * relativeRise(lower, upper)) / depth : NaN;
}

/** Brunt-Väisälä frequency, 1/s; NaN when unstable. */
export function bruntVaisalaFrequency(lower: ThermalLevel, upper: ThermalLevel): number {
  const squared = bruntVaisalaSquared(lower, upper);
  return squared >= 0 ? Math.sqrt(squared) : NaN;
}

/** Bulk Richardson number (Stull 1988); negative when unstable, NaN without shear. */
export function bulkRichardson(lower: MovingLevel, upper: MovingLevel): number {
  const shearSquared = (upper.u - lower.u) ** 2 + (upper.v - lower.v) ** 2;
  if (!(shearSquared > 0)) return NaN;
  return (GRAVITY * relativeRise(lower, upper) * (upper.height - lower.height)) / shearSquared;
}

/** Froude number of flow against an obstacle: speed (m/s) over frequency (1/s) times height (m). NaN unless both > 0. */
export function froudeNumber(speed: number, bruntVaisala: number, height: number): number {
  return bruntVaisala > 0 && height > 0 ? speed / (bruntVaisala * height) : NaN;
}

function relativeRise(lower: ThermalLevel, upper: ThermalLevel): number {
  const mean = (lower.virtualPotentialTemperature + upper.virtualPotentialTemperature) / 2;
  return (upper.virtualPotentialTemperature - lower.virtualPotentialTemperature) / mean;
}
