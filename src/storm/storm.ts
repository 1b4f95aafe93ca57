// All a forecaster asks of one profile about storms: energy, inflow, shear, helicity, motion, each with its reason where
// it cannot be had.

import type { Profile } from '../profile/index.ts';
import { advectionByLayers } from './advection.ts';
import { effectiveShear, inflowHelicity } from './effective.ts';
import { standardHeight } from '../air/index.ts';
import { airLevelsOf, type AirLevels } from './air-levels.ts';
import { continueAir, continueWind, type AloftSource } from './aloft.ts';
import { figure, metres, noVector, vectorFigure, type VectorFigure } from './figure.ts';
import { hodographOf, windAt, type Hodograph } from './hodograph.ts';
import { inflowOf, type Inflow } from './inflow.ts';
import { jetInflow, jetOf, type JetWind } from './jet-wind.ts';
import { CLOUD_LEVELS, clusterMotion, stormMotion, type StormMotion } from './motion.ts';
import type { Mover, StormNumbers } from './numbers.ts';
import { liftParcels } from './parcel.ts';
import { heightsOfPressures } from './pressure-height.ts';
import { reasonsOf } from './reasons.ts';
import { atLnPressure, noSounding, soundingOf, type Sounding } from './sounding.ts';
import { equivalentTemperatures, parcelStarts } from './start.ts';
import { bulkShear, helicity } from './wind-layers.ts';

/** A lowest wind level above this height, m above ground, is told. */
const WIND_NEAR_GROUND = 50;

export interface StormOptions {
  /** Where temperature and humidity come from; the profile itself when left out. */
  readonly air?: Profile;
  /** Why there is no air to go with the wind: then nothing is lifted, and this is told. */
  readonly noAir?: string;
  /** A sounding that goes on above the tops of wind and air. */
  readonly aloft?: Profile;
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
  return assessStorm(profile, options).numbers;
}

/** The numbers with the columns they were reckoned from, for drawing and for trying other motions. */
export interface StormAssessment {
  readonly numbers: StormNumbers;
  /** Wind by height, continued aloft where that was asked for. */
  readonly hodograph: Hodograph;
  /** The air that parcels rose through, heights above its own station's ground. */
  readonly sounding: Sounding;
}

/** The same as `stormOf`, with the columns. */
export function assessStorm(profile: Profile, options: StormOptions = {}): StormAssessment {
  const air = options.air ?? profile;
  const airAloft = continueAir(
    air,
    options.noAir === undefined || options.noAir === '' ? soundingOf(air) : noSounding(options.noAir),
    options.aloft,
  );
  const windAloft = continueWind(profile, hodographOf(profile), options.aloft);
  const sounding = airAloft.column;
  const hodograph = windAloft.column;
  const parcels = liftParcels(sounding, parcelStarts(sounding, equivalentTemperatures(sounding)));
  const inflow = inflowOf(sounding);
  const motion = stormMotion(hodograph);
  const prevailing = prevailingAt(profile.station.latitude);
  const { mover, vector } = moverOf(prevailing, motion, options.motion);
  const jet = jetOf(hodograph, options.jet);

  const numbers = {
    parcels,
    inflow,
    shear: {
      to1km: bulkShear(hodograph, 1000),
      to3km: bulkShear(hodograph, 3000),
      to6km: bulkShear(hodograph, 6000),
      effective: effectiveShear(hodograph, inflow, parcels),
    },
    ...relativeTo(vector, { hodograph, inflow, jet: options.jet }),
    mover,
    prevailing,
    motion,
    clusters: {
      ...clusterMotion(cloudWinds(hodograph, profile, air, sounding), jet.wind),
      jet: jet.wind,
      jetFrom: jet.from,
    },
    advection: advectionByLayers(hodograph, sounding, profile.station.latitude),
  };
  const reasons = reasonsOf(numbers);
  const nothing = hodograph.count === 0 && sounding.noAir !== '';
  return {
    hodograph,
    sounding,
    numbers: {
      status: nothing ? 'not-assessable' : reasons.wanting ? 'partly' : 'assessed',
      why: [reasons.why, windAloft.why].filter((why) => why !== '').join(' '),
      notes: [
        ...notesOf(sounding, hodograph, airAloft.from, windAloft.from),
        ...(standsOnStandard(airLevelsOf(air), sounding) && numbers.clusters.cloudLayer.why === ''
          ? ['No pressure is known: cloud-layer winds stand at the heights of the standard atmosphere.']
          : []),
      ],
      airFrom: { station: air.station.id, timeMs: air.timeMs, ageS: (profile.timeMs - air.timeMs) / 1000 },
      windAloft: windAloft.from,
      airAloft: airAloft.from,
      ...numbers,
    },
  };
}

/** What helicity and inflow are reckoned from, whatever the motion. */
export interface RelativeWind {
  readonly hodograph: Hodograph;
  readonly inflow: Inflow;
  readonly jet: JetWind | undefined;
}

/** Helicity and inflow for a storm that moves so: fast enough to follow a hand that drags the motion. */
export function relativeTo(
  motion: VectorFigure,
  { hodograph, inflow, jet }: RelativeWind,
): Pick<StormNumbers, 'helicity' | 'jetInflow'> {
  return {
    helicity: {
      to1km: helicity(hodograph, 1000, motion),
      to3km: helicity(hodograph, 3000, motion),
      effective: Number.isNaN(inflow.bottom) ? figure(NaN, inflow.why) : inflowHelicity(hodograph, inflow, motion),
    },
    jetInflow: jetInflow(hodograph, jet, motion),
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

function cloudWinds(hodograph: Hodograph, wind: Profile, air: Profile, sounding: Sounding): VectorFigure[] {
  // Heights above the one station's ground become heights above the other's where both elevations are known.
  const shift = air.station.elevation - wind.station.elevation;
  const measured = airLevelsOf(air);
  // Above the air's own top the sounding that continues it knows the heights.
  const known = heightsOfPressures(measured, CLOUD_LEVELS);
  return CLOUD_LEVELS.map((pressure, k) => {
    const own = known[k]!;
    if (standsOnStandard(measured, sounding)) {
      const height = standardHeight(pressure) - wind.station.elevation;
      return Number.isNaN(height) ? noVector(own.why) : windAt(hodograph, height);
    }
    const height = own.why === '' ? own.value : atLnPressure(sounding, sounding.heightAgl, Math.log(pressure));
    return Number.isNaN(height) ? noVector(own.why) : windAt(hodograph, height + (Number.isNaN(shift) ? 0 : shift));
  });
}

/** Without any pressure the standard atmosphere says where its surfaces lie: within some 150 m in the lower troposphere. */
function standsOnStandard({ pressure }: AirLevels, { count }: Sounding): boolean {
  return pressure === null && count === 0;
}

function notesOf(
  sounding: Sounding,
  hodograph: Hodograph,
  airAloft: AloftSource | null,
  windAloft: AloftSource | null,
): string[] {
  const notes = [...sounding.notes];
  const lowest = hodograph.heightAgl[0] ?? 0;
  if (hodograph.count > 0 && lowest > WIND_NEAR_GROUND) {
    notes.push(`Shear and helicity reckon from the lowest wind level, ${metres(lowest)} above ground.`);
  }
  const told = (what: string, { above, name, ageS }: AloftSource): string =>
    `${what} above ${metres(above)} come${what === 'Wind' ? 's' : ''} from ${name}, ${(ageS / 3600).toFixed(1)} h older.`;
  if (airAloft !== null) notes.push(told('Temperature and humidity', airAloft));
  if (windAloft !== null) notes.push(told('Wind', windAloft));
  return notes;
}
