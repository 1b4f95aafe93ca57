// All a forecaster asks of one profile about storms: energy, inflow, shear, helicity, motion, each with its reason where
// it cannot be had.

import type { Profile } from '../profile/index.ts';
import { advectionByLayers } from './advection.ts';
import { effectiveShear, inflowHelicity } from './effective.ts';
import { figure, metres, noVector, vectorFigure, type VectorFigure } from './figure.ts';
import { hodographOf, windAt, type Hodograph } from './hodograph.ts';
import { inflowOf } from './inflow.ts';
import { jetInflow, jetOf, type JetWind } from './jet-wind.ts';
import { CLOUD_LEVELS, clusterMotion, stormMotion, type StormMotion } from './motion.ts';
import type { Mover, StormNumbers } from './numbers.ts';
import { liftParcels } from './parcel.ts';
import { heightsOfPressures } from './pressure-height.ts';
import { reasonsOf } from './reasons.ts';
import { soundingOf, type Sounding } from './sounding.ts';
import { equivalentTemperatures, parcelStarts } from './start.ts';
import { bulkShear, helicity } from './wind-layers.ts';

/** A lowest wind level above this height, m above ground, is told. */
const WIND_NEAR_GROUND = 50;

export interface StormOptions {
  /** Where temperature and humidity come from; the profile itself when left out. */
  readonly air?: Profile;
  /** Storm motion set by hand, m/s eastward and northward: used for helicity and inflow in place of the mover. */
  readonly motion?: { readonly u: number; readonly v: number };
  /** The jet; without one the strongest wind below 1500 m stands for it in the cluster vectors, as Corfidi has it. */
  readonly jet?: JetWind;
}

/**
 * Storm numbers of one profile.
 * @param profile the wind; also temperature and humidity unless `options.air` gives another profile
 */
export function stormOf(profile: Profile, options: StormOptions = {}): StormNumbers {
  const air = options.air ?? profile;
  const sounding = soundingOf(air);
  const hodograph = hodographOf(profile);
  const parcels = liftParcels(sounding, parcelStarts(sounding, equivalentTemperatures(sounding)));
  const inflow = inflowOf(sounding);
  const motion = stormMotion(hodograph);
  const prevailing = prevailingAt(profile.station.latitude);
  const { mover, vector } = moverOf(prevailing, motion, options.motion);
  const jet = jetOf(hodograph, options.jet);
  const inflowWhy = Number.isNaN(inflow.bottom) ? inflow.why : '';

  const numbers = {
    parcels,
    inflow,
    shear: {
      to1km: bulkShear(hodograph, 1000),
      to3km: bulkShear(hodograph, 3000),
      to6km: bulkShear(hodograph, 6000),
      effective: effectiveShear(hodograph, inflow, parcels),
    },
    helicity: {
      mover,
      prevailing,
      to1km: helicity(hodograph, 1000, vector),
      to3km: helicity(hodograph, 3000, vector),
      effective: inflowWhy === '' ? inflowHelicity(hodograph, inflow, vector) : figure(NaN, inflowWhy),
    },
    motion,
    clusters: {
      ...clusterMotion(cloudWinds(hodograph, profile, air), jet.wind),
      jet: jet.wind,
      jetFrom: jet.from,
    },
    jetInflow: jetInflow(hodograph, options.jet, vector),
    advection: advectionByLayers(hodograph, sounding, profile.station.latitude),
  };
  const reasons = reasonsOf(numbers);
  const nothing = hodograph.count === 0 && sounding.noAir !== '';
  return {
    status: nothing ? 'not-assessable' : reasons.wanting ? 'partly' : 'assessed',
    why: reasons.why,
    notes: notesOf(sounding, hodograph),
    airFrom: { station: air.station.id, timeMs: air.timeMs, ageS: (profile.timeMs - air.timeMs) / 1000 },
    ...numbers,
  };
}

/** Right of the shear in the north, left of it in the south. */
function prevailingAt(latitude: number): 'right' | 'left' | 'unknown' {
  if (Number.isNaN(latitude)) return 'unknown';
  return latitude >= 0 ? 'right' : 'left';
}

function moverOf(
  prevailing: 'right' | 'left' | 'unknown',
  motion: StormMotion,
  given: { u: number; v: number } | undefined,
): { mover: Mover; vector: VectorFigure } {
  if (given !== undefined) return { mover: 'given', vector: vectorFigure(given.u, given.v) };
  if (prevailing !== 'unknown') return { mover: prevailing, vector: motion[prevailing] };
  const why = 'The station has no position, so it is not known whether right- or left-movers prevail.';
  return { mover: 'unknown', vector: noVector(why) };
}

function cloudWinds(hodograph: Hodograph, wind: Profile, air: Profile): VectorFigure[] {
  // Heights above the one station's ground become heights above the other's where both elevations are known.
  const shift = air.station.elevation - wind.station.elevation;
  return heightsOfPressures(air, CLOUD_LEVELS).map(({ value, why }) =>
    why === '' ? windAt(hodograph, value + (Number.isNaN(shift) ? 0 : shift)) : noVector(why),
  );
}

function notesOf(sounding: Sounding, hodograph: Hodograph): string[] {
  const lowest = hodograph.heightAgl[0] ?? 0;
  if (hodograph.count === 0 || lowest <= WIND_NEAR_GROUND) return [...sounding.notes];
  return [...sounding.notes, `Shear and helicity reckon from the lowest wind level, ${metres(lowest)} above ground.`];
}
