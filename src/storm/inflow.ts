// From which layer does a storm draw its air: is it rooted at the surface, or elevated above a stable layer? Effective
// inflow layer after Thompson et al. (2007, Wea. Forecasting 22, 102-115): the lowest unbroken run of levels whose
// parcels have CAPE of at least 100 J/kg and CIN no stronger than -250 J/kg.

import { bruntVaisalaFrequency, potentialTemperature, saturationVapourPressure } from '../air/index.ts';
import { liftParcel } from './ascent.ts';
import { coarseEnvironment, virtualOfVapour } from './environment.ts';
import { hectopascals } from './figure.ts';
import type { Sounding } from './sounding.ts';
import { startAtLevel } from './start.ts';

export const INFLOW_CAPE = 100;
export const INFLOW_CIN = -250;
/** Depth above the lowest level that is searched, Pa. */
const SEARCHED = 30_000;
/** Levels closer than this, Pa, are not tried one by one: 40 m decide nothing. */
const APART = 500;

export type InflowKind = 'surface-based' | 'elevated' | 'none' | 'not-assessable';

/** Air between the ground and the inflow that resists lifting. */
export interface StableLayer {
  /** m above ground */
  readonly bottom: number;
  /** m above ground */
  readonly top: number;
  /** K, rise of virtual potential temperature through the layer */
  readonly strength: number;
  /** 1/s; NaN when the layer is not stable as a whole */
  readonly bruntVaisala: number;
}

export interface Inflow {
  readonly kind: InflowKind;
  /** m above ground; NaN without an inflow layer */
  readonly bottom: number;
  /** m above ground */
  readonly top: number;
  /** What lies below an elevated inflow; null when it is not elevated. */
  readonly stableLayer: StableLayer | null;
  /** In words, why the kind is what it is. */
  readonly why: string;
}

/** Finds the effective inflow layer. */
export function inflowOf(sounding: Sounding): Inflow {
  if (sounding.noAir !== '') return noInflow('not-assessable', sounding.noAir);
  const environment = coarseEnvironment(sounding);
  const bottomPressure = sounding.pressure[0]!;
  let bottom = -1;
  let top = -1;
  let lastTried = Infinity;
  for (let k = 0; k < sounding.moistCount; k++) {
    const pressure = sounding.pressure[k]!;
    if (bottomPressure - pressure > SEARCHED) break;
    if (lastTried - pressure < APART) continue;
    lastTried = pressure;
    const ascent = liftParcel(
      environment,
      startAtLevel(sounding, k),
      (cape, cin) => cape >= INFLOW_CAPE || cin < INFLOW_CIN,
    );
    const feeds = ascent.cape >= INFLOW_CAPE && ascent.cin >= INFLOW_CIN;
    if (feeds && bottom < 0) bottom = k;
    if (feeds) top = k;
    else if (bottom >= 0) break;
  }
  if (bottom < 0) return noInflow(...noneFound(sounding));
  const layer = { bottom: sounding.heightAgl[bottom]!, top: sounding.heightAgl[top]! };
  if (bottom === 0) {
    return sounding.noSurface === ''
      ? {
          kind: 'surface-based',
          ...layer,
          stableLayer: null,
          why: 'Air lifted from the lowest level can feed a storm.',
        }
      : { kind: 'not-assessable', ...layer, stableLayer: null, why: sounding.noSurface };
  }
  return {
    kind: 'elevated',
    ...layer,
    stableLayer: stableLayerBelow(sounding, bottom),
    why: `No air below the inflow layer has CAPE of ${INFLOW_CAPE} J/kg with CIN above ${INFLOW_CIN} J/kg.`,
  };
}

function noneFound(sounding: Sounding): [InflowKind, string] {
  const top = sounding.pressure[sounding.count - 1]!;
  if (top > 50_000) {
    return ['not-assessable', `Data end at ${hectopascals(top)}, too low to know what parcels reach above it.`];
  }
  return ['none', `No parcel has CAPE of ${INFLOW_CAPE} J/kg with CIN above ${INFLOW_CIN} J/kg.`];
}

function stableLayerBelow(sounding: Sounding, level: number): StableLayer {
  const at = (k: number): { height: number; virtualPotentialTemperature: number } => {
    const pressure = sounding.pressure[k]!;
    const vapour = saturationVapourPressure(sounding.dewPoint[k]!);
    const virtual = virtualOfVapour(sounding.temperature[k]!, pressure, vapour);
    return { height: sounding.heightAgl[k]!, virtualPotentialTemperature: potentialTemperature(virtual, pressure) };
  };
  const lower = at(0);
  const upper = at(level);
  return {
    bottom: lower.height,
    top: upper.height,
    strength: upper.virtualPotentialTemperature - lower.virtualPotentialTemperature,
    bruntVaisala: bruntVaisalaFrequency(lower, upper),
  };
}

function noInflow(kind: InflowKind, why: string): Inflow {
  return { kind, bottom: NaN, top: NaN, stableLayer: null, why };
}
