// The surroundings that parcels rise through: virtual temperature on a ladder of pressures fine enough to integrate on.

import { EPSILON, saturationVapourPressure } from '../air/index.ts';
import type { Sounding } from './sounding.ts';

/** Widest rung in ln p: 10 hPa at 1000 hPa. What the linear steps cost lies below 1 J/kg. */
export const RUNG = 0.01;

/** Columns by rising `x`. */
export interface Environment {
  readonly count: number;
  /** -ln of Pa, rising */
  readonly x: Float64Array;
  /** K */
  readonly virtualTemperature: Float64Array;
}

/** Virtual temperature, K, of air with this vapour pressure (Pa): T p / (p - (1 - eps) e). */
export function virtualOfVapour(temperature: number, pressure: number, vapourPressure: number): number {
  return (temperature * pressure) / (pressure - (1 - EPSILON) * vapourPressure);
}

/** Every level of the sounding, and rungs between where levels lie wide apart. */
export function fineEnvironment(sounding: Sounding): Environment {
  const { lnPressure, count } = sounding;
  let total = count > 0 ? 1 : 0;
  for (let k = 1; k < count; k++) total += rungsBetween(lnPressure[k - 1]!, lnPressure[k]!);
  const x = new Float64Array(total);
  const virtualTemperature = new Float64Array(total);
  let filled = 0;
  for (let k = 0; k < count; k++) {
    const rungs = k === 0 ? 1 : rungsBetween(lnPressure[k - 1]!, lnPressure[k]!);
    for (let rung = 1; rung <= rungs; rung++) {
      const below = Math.max(k - 1, 0);
      const share = rung / rungs;
      x[filled] = -(lnPressure[below]! + share * (lnPressure[k]! - lnPressure[below]!));
      virtualTemperature[filled] = virtualAt(sounding, below, k, share);
      filled++;
    }
  }
  return { count: total, x, virtualTemperature };
}

/** Rungs only, levels between them passed over: for the many parcels tried in search of the inflow layer. */
export function coarseEnvironment(sounding: Sounding): Environment {
  const { lnPressure, count } = sounding;
  const rungs = Math.ceil((lnPressure[0]! - lnPressure[count - 1]!) / RUNG);
  const x = new Float64Array(rungs + 1);
  const virtualTemperature = new Float64Array(rungs + 1);
  let k = 1;
  for (let rung = 0; rung <= rungs; rung++) {
    const wanted = Math.max(lnPressure[0]! - rung * RUNG, lnPressure[count - 1]!);
    while (k < count - 1 && lnPressure[k]! > wanted) k++;
    const share = (lnPressure[k - 1]! - wanted) / (lnPressure[k - 1]! - lnPressure[k]!);
    x[rung] = -wanted;
    virtualTemperature[rung] = virtualAt(sounding, k - 1, k, share);
  }
  return { count: rungs + 1, x, virtualTemperature };
}

/** Virtual temperature at -ln p, linear between the columns. @returns NaN outside them */
export function virtualAtX(environment: Environment, x: number): number {
  const { x: xs, virtualTemperature, count } = environment;
  const above = firstAbove(environment, x);
  if (above === 0 || count === 0) return NaN;
  if (above === count) return xs[count - 1] === x ? virtualTemperature[count - 1]! : NaN;
  const share = (x - xs[above - 1]!) / (xs[above]! - xs[above - 1]!);
  return virtualTemperature[above - 1]! + share * (virtualTemperature[above]! - virtualTemperature[above - 1]!);
}

/** Index of the first entry above x, `count` when there is none. */
export function firstAbove(environment: Environment, x: number): number {
  let low = 0;
  let high = environment.count;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (environment.x[middle]! <= x) low = middle + 1;
    else high = middle;
  }
  return low;
}

function rungsBetween(lnBelow: number, lnAbove: number): number {
  return Math.max(1, Math.ceil((lnBelow - lnAbove) / RUNG));
}

function virtualAt(sounding: Sounding, below: number, above: number, share: number): number {
  const { lnPressure, temperature, dewPoint } = sounding;
  const between = (column: Float64Array): number => column[below]! + share * (column[above]! - column[below]!);
  const pressure = Math.exp(between(lnPressure));
  const dew = between(dewPoint);
  const vapour = Number.isNaN(dew) ? 0 : saturationVapourPressure(dew);
  return virtualOfVapour(between(temperature), pressure, vapour);
}
