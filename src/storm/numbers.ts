// What a storm assessment holds.

import type { LayerAdvection } from './advection.ts';
import type { AloftSource } from './aloft.ts';
import type { Figure, VectorFigure } from './figure.ts';
import type { Inflow } from './inflow.ts';
import type { ClusterMotion, StormMotion } from './motion.ts';
import type { Parcel } from './parcel.ts';

export type Mover = 'right' | 'left' | 'given' | 'unknown';

export interface StormNumbers {
  /** `partly`: some numbers are missing or bounds, as `why` says. */
  readonly status: 'assessed' | 'partly' | 'not-assessable';
  /** All that is missing and why, in words; empty when nothing is. */
  readonly why: string;
  /** What was assumed on the way, in words. */
  readonly notes: readonly string[];
  /** The profile temperature and humidity came from, and how much older than the wind, s. */
  readonly airFrom: { readonly station: string; readonly timeMs: number; readonly ageS: number };
  /** Whose wind stands above the top of the profile's own; null where none does. */
  readonly windAloft: AloftSource | null;
  /** Whose temperature and humidity stand above the top of the air's own; null where none do. */
  readonly airAloft: AloftSource | null;
  /** Surface-based, mixed-layer, most-unstable, jet-fed, in this order. */
  readonly parcels: readonly Parcel[];
  readonly inflow: Inflow;
  /** Bulk shear, m/s, from the lowest level; `effective` from the inflow's bottom through half the storm's depth. */
  readonly shear: {
    readonly to1km: Figure;
    readonly to3km: Figure;
    readonly to6km: Figure;
    readonly effective: Figure;
  };
  /** For which motion helicity and inflow are told. */
  readonly mover: Mover;
  /** The mover that prevails in this hemisphere: left-movers thrive on negative helicity. */
  readonly prevailing: 'right' | 'left' | 'unknown';
  /** Storm-relative helicity, m2/s2, for `mover`; `effective` through the inflow layer. */
  readonly helicity: {
    readonly to1km: Figure;
    readonly to3km: Figure;
    readonly effective: Figure;
  };
  readonly motion: StormMotion;
  readonly clusters: ClusterMotion & { readonly jet: VectorFigure; readonly jetFrom: string };
  /** Mean wind of the jet's layer relative to the storm, m/s. */
  readonly jetInflow: VectorFigure;
  /** K/s, warming positive. The wind's turn is taken for that of the geostrophic wind, least true in the jet itself. */
  readonly advection: readonly LayerAdvection[];
}
