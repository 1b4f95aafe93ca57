// Which air is lifted: from the surface, from the mixed lowest 100 hPa, the most unstable, and what feeds the jet.

import {
  EPSILON,
  equivalentPotentialTemperature,
  KAPPA,
  lclTemperature,
  mixingRatioOf,
  potentialTemperature,
  saturationVapourPressure,
  specificHumidityOfVapour,
} from '../air/index.ts';
import type { ParcelStart } from './ascent.ts';
import { hectopascals, metres } from './figure.ts';
import { atLnPressure, type Sounding } from './sounding.ts';

/** Depth of the mixed layer, Pa. */
const MIXED_DEPTH = 10_000;
/** Depth above the surface in which the most unstable parcel is sought, Pa. */
const UNSTABLE_DEPTH = 30_000;
/** Depth of the layer mixed for the jet-fed parcel, Pa (common practice, without source). */
const FED_DEPTH = 5000;
/** Height below which the jet-fed layer is sought, m above ground. */
const FED_CEILING = 3000;

export const PARCEL_NAMES = ['surface-based', 'mixed-layer', 'most-unstable', 'jet-fed'] as const;
export type ParcelName = (typeof PARCEL_NAMES)[number];

/** A start, or the reason why there is none. */
export type Start = { readonly start: ParcelStart; readonly why: '' } | { readonly start: null; readonly why: string };

/** Equivalent potential temperature (Bolton 1980, eq. 39), K, of every level that has humidity. */
export function equivalentTemperatures(sounding: Sounding): Float64Array {
  const out = new Float64Array(sounding.moistCount);
  for (let k = 0; k < sounding.moistCount; k++) {
    const temperature = sounding.temperature[k]!;
    const pressure = sounding.pressure[k]!;
    const vapour = saturationVapourPressure(sounding.dewPoint[k]!);
    out[k] = equivalentPotentialTemperature(
      temperature,
      pressure,
      vapour,
      (EPSILON * vapour) / (pressure - vapour),
      lclTemperature(temperature, vapour),
    );
  }
  return out;
}

/** The start of each named parcel. @param equivalent as by `equivalentTemperatures` */
export function parcelStarts(sounding: Sounding, equivalent: Float64Array): Record<ParcelName, Start> {
  if (sounding.noAir !== '') {
    const none: Start = { start: null, why: sounding.noAir };
    return { 'surface-based': none, 'mixed-layer': none, 'most-unstable': none, 'jet-fed': none };
  }
  const noSurface: Start = { start: null, why: sounding.noSurface };
  return {
    'surface-based': sounding.noSurface === '' ? found(startAtLevel(sounding, 0)) : noSurface,
    'mixed-layer': sounding.noSurface === '' ? mixedLayer(sounding) : noSurface,
    'most-unstable': found(startAtLevel(sounding, mostUnstable(sounding, equivalent))),
    'jet-fed': jetFed(sounding, equivalent),
  };
}

/** Air of one level. */
export function startAtLevel(sounding: Sounding, level: number): ParcelStart {
  const pressure = sounding.pressure[level]!;
  const vapour = saturationVapourPressure(sounding.dewPoint[level]!);
  return { pressure, temperature: sounding.temperature[level]!, mixingRatio: mixingRatioOfVapour(vapour, pressure) };
}

function found(start: ParcelStart): Start {
  return { start, why: '' };
}

function mostUnstable(sounding: Sounding, equivalent: Float64Array): number {
  let best = 0;
  for (let k = 1; k < equivalent.length; k++) {
    if (sounding.pressure[0]! - sounding.pressure[k]! > UNSTABLE_DEPTH) break;
    if (equivalent[k]! > equivalent[best]!) best = k;
  }
  return best;
}

function mixedLayer(sounding: Sounding): Start {
  const bottom = sounding.pressure[0]!;
  const top = bottom - MIXED_DEPTH;
  const highest = sounding.pressure[sounding.moistCount - 1]!;
  if (highest > top) {
    return {
      start: null,
      why: `Humidity ends at ${hectopascals(highest)}; the mixed layer reaches up to ${hectopascals(top)}.`,
    };
  }
  return found(mixed(sounding, bottom, top, bottom));
}

/** The layer of highest mean equivalent potential temperature, its air mixed, started from its middle. */
function jetFed(sounding: Sounding, equivalent: Float64Array): Start {
  let top = 0;
  while (top + 1 < sounding.moistCount && sounding.heightAgl[top + 1]! <= FED_CEILING) top++;
  const { pressure } = sounding;
  const integral = new Float64Array(top + 1);
  for (let k = 1; k <= top; k++) {
    integral[k] = integral[k - 1]! + ((equivalent[k - 1]! + equivalent[k]!) / 2) * (pressure[k - 1]! - pressure[k]!);
  }
  let best = -Infinity;
  let bestBottom = NaN;
  let above = 0;
  for (let k = 0; k <= top; k++) {
    const wanted = pressure[k]! - FED_DEPTH;
    while (above < top && pressure[above]! > wanted) above++;
    if (pressure[above]! > wanted) break;
    // Back from the level above to the layer's top, the value there linear in pressure.
    const share = (wanted - pressure[above]!) / (pressure[above - 1]! - pressure[above]!);
    const atTop = equivalent[above]! + share * (equivalent[above - 1]! - equivalent[above]!);
    const total = integral[above]! - ((atTop + equivalent[above]!) / 2) * (wanted - pressure[above]!) - integral[k]!;
    if (total > best) {
      best = total;
      bestBottom = pressure[k]!;
    }
  }
  if (Number.isNaN(bestBottom)) {
    const depth = hectopascals(FED_DEPTH);
    return { start: null, why: `Humidity reaches through less than ${depth} below ${metres(FED_CEILING)}.` };
  }
  return found(mixed(sounding, bestBottom, bestBottom - FED_DEPTH, bestBottom - FED_DEPTH / 2));
}

/** Air of a layer mixed by pressure-weighted means of potential temperature and mixing ratio. */
function mixed(sounding: Sounding, bottom: number, top: number, startPressure: number): ParcelStart {
  const edges = [bottom];
  for (let k = 0; k < sounding.moistCount; k++) {
    const pressure = sounding.pressure[k]!;
    if (pressure < bottom && pressure > top) edges.push(pressure);
  }
  edges.push(top);
  let theta = 0;
  let ratio = 0;
  let from = layerAir(sounding, bottom);
  for (let edge = 1; edge < edges.length; edge++) {
    const below = edges[edge - 1]!;
    const depth = below - edges[edge]!;
    // Wide layers are cut: mixing ratio bends between levels whose dew point is linear.
    const cuts = Math.max(1, Math.ceil(depth / 500));
    for (let cut = 1; cut <= cuts; cut++) {
      const to = layerAir(sounding, cut === cuts ? edges[edge]! : below - (depth * cut) / cuts);
      theta += ((from.theta + to.theta) / 2) * (depth / cuts);
      ratio += ((from.ratio + to.ratio) / 2) * (depth / cuts);
      from = to;
    }
  }
  theta /= bottom - top;
  return {
    pressure: startPressure,
    temperature: theta * Math.pow(startPressure / 100_000, KAPPA),
    mixingRatio: ratio / (bottom - top),
  };
}

function layerAir(sounding: Sounding, pressure: number): { theta: number; ratio: number } {
  const lnPressure = Math.log(pressure);
  const dewPoint = atLnPressure(sounding, sounding.dewPoint, lnPressure);
  const temperature = atLnPressure(sounding, sounding.temperature, lnPressure);
  return {
    theta: potentialTemperature(temperature, pressure),
    ratio: mixingRatioOfVapour(saturationVapourPressure(dewPoint), pressure),
  };
}

function mixingRatioOfVapour(vapourPressure: number, pressure: number): number {
  return mixingRatioOf(specificHumidityOfVapour(vapourPressure, pressure));
}
