// What vapour one profile carries, with the reason where it cannot be said.

import type { Profile } from '../profile/index.ts';
import type { AirColumn } from './air-column.ts';
import { humidAir, type HumidityOptions, type HumidityUse } from './humid-air.ts';
import { moistLayerTop, potentialInstability, thetaEProfile, type PotentialInstability } from './instability.ts';
import {
  fluxOf,
  NO_TRANSPORT,
  precipitableWater,
  transportByHeight,
  transportByPressure,
  type Transport,
} from './transport.ts';

export interface MoistureOptions extends HumidityOptions {
  /** Pa; limits of the layer of `transport` and `precipitableWater`, cut to the data; absent: all of the data. */
  readonly bottomPressure?: number | undefined;
  readonly topPressure?: number | undefined;
  /** Bounds of the jet's layer, m above ground. */
  readonly jetLayer?: { readonly bottom: number; readonly top: number } | undefined;
}

/** Numbers are NaN where they could not be had. */
export interface MoistureNumbers {
  readonly status: 'ok' | 'not-assessable';
  /** Empty when ok, else the reason: `no humidity`. */
  readonly why: string;
  /** Station whose humidity was used; empty where there was none. */
  readonly humidityFrom: string;
  /** Its age against the wind, s, and the distance to its station, m; 0 for the profile's own. */
  readonly humidityAgeS: number;
  readonly humidityDistance: number;
  /** Standard uncertainty of the humidity, and so of every number that is proportional to it, as a share. */
  readonly humidityUncertainty: number;
  /** kg/m2 of the layer */
  readonly precipitableWater: number;
  /** Pressure form over the layer, kg/(m s). */
  readonly transport: Transport;
  /** Height form over all that was measured, kg/(m s): the same integral by another way. */
  readonly transportInHeight: Transport;
  /** Height form from the lowest level to 3 km above ground or the top of data, which `reaches` gives in m. */
  readonly below3Km: Transport & { readonly reaches: number };
  /** Height form within the jet's layer. */
  readonly inJet: Transport;
  /** kg/(m2 s) at the levels where it is known. */
  readonly flux: { readonly heightAgl: Float64Array; readonly east: Float64Array; readonly north: Float64Array };
  /** Top of the moist layer, m above ground. */
  readonly moistTop: number;
  /** K at the levels where it is known. */
  readonly thetaE: { readonly heightAgl: Float64Array; readonly value: Float64Array };
  readonly instability: PotentialInstability;
  /** What limits the numbers, in words. */
  readonly notes: readonly string[];
}

/** m above ground */
const THREE_KILOMETRES = 3000;

/**
 * Moisture numbers of a profile: with its own humidity where it has some at two levels or more, else with the least
 * uncertain of `options.humidity`. Past the stated age the numbers are not assessable.
 * @example moistureOf(profile, { jetLayer: jet.core, humidity: soundings }).transport.size
 */
export function moistureOf(profile: Profile, options: MoistureOptions = {}): MoistureNumbers {
  const { air, use, why: dry } = humidAir(profile, options);
  const why = dry === '' ? whyNot(air) : dry;
  const limits = { bottom: options.bottomPressure, top: options.topPressure };
  const transport = transportByPressure(air, limits);
  const below3Km = transportByHeight(air, { top: THREE_KILOMETRES });
  const inJet = options.jetLayer === undefined ? NO_TRANSPORT : transportByHeight(air, options.jetLayer);
  const notAssessable = why !== '' || Number.isNaN(transport.size);
  const thetaE = thetaEProfile(air);
  return {
    status: notAssessable ? 'not-assessable' : 'ok',
    why: why !== '' || !notAssessable ? why : 'fewer than two levels of the layer have humidity, wind and pressure',
    humidityFrom: use.id,
    humidityAgeS: use.ageS,
    humidityDistance: use.distance,
    humidityUncertainty: use.uncertainty,
    precipitableWater: precipitableWater(air, limits),
    transport,
    transportInHeight: transportByHeight(air),
    below3Km,
    inJet,
    flux: fluxProfile(air),
    moistTop: moistLayerTop(air.heightAgl, air.specificHumidity),
    thetaE: known(air.heightAgl, thetaE),
    instability: potentialInstability(air.heightAgl, thetaE),
    notes: notes(air, below3Km.reaches, use),
  };
}

function whyNot(air: AirColumn): string {
  if (!air.u.some((value) => Number.isFinite(value))) return 'no wind';
  if (!air.pressure.some((value) => value > 0)) return 'neither pressure nor temperature to work it out from';
  return '';
}

function notes(air: AirColumn, reaches: number, use: HumidityUse): string[] {
  const words: string[] = [];
  if (use.ageS > 0 || use.distance > 0) {
    const far = Number.isNaN(use.distance) ? 'at an unknown distance' : `${Math.round(use.distance / 1000)} km away`;
    words.push(
      `humidity of ${use.id}, ${Math.round(use.ageS / 60)} min old, ${far}: ±${Math.round(100 * use.uncertainty)} %`,
    );
  }
  if (air.pressureFrom !== '') words.push(air.pressureFrom);
  if (air.contradicted > 0) {
    words.push(`${air.contradicted} levels’ humidity left out, their dew point is above the temperature`);
  }
  const { lowest, gap } = coverageOf(air);
  if (lowest > LOWEST)
    words.push(`the lowest level with all values is at ${Math.round(lowest)} m, nothing below it is counted`);
  if (gap !== null)
    words.push(`no values between ${Math.round(gap.bottom)} and ${Math.round(gap.top)} m, taken as linear`);
  if (reaches < THREE_KILOMETRES) words.push(`data end at ${Math.round(reaches)} m, below 3 km`);
  return words;
}

/** A lowest level higher than this, m, leaves out air that matters. Our own choice. */
const LOWEST = 250;
/** So wide, m, is a gap where levels stand that lack a value; where none stand, as between main levels. Our own choice. */
const WIDE_LACKING = 500;
const WIDE_EMPTY = 1600;

/** Where the integrals begin, m above ground, and the widest wide gap below 6 km that they bridge. */
function coverageOf({ count, heightAgl, specificHumidity, u }: AirColumn): {
  lowest: number;
  gap: { bottom: number; top: number } | null;
} {
  let [lowest, before, widest, lacking] = [NaN, NaN, 0, false];
  let gap: { bottom: number; top: number } | null = null;
  for (let k = 0; k < count && !(before > 2 * THREE_KILOMETRES); k++) {
    if (Number.isNaN(specificHumidity[k]!) || Number.isNaN(u[k]!)) {
      lacking = true;
      continue;
    }
    const here = heightAgl[k]!;
    if (Number.isNaN(lowest)) lowest = here;
    if (here - before > Math.max(widest, lacking ? WIDE_LACKING : WIDE_EMPTY)) {
      widest = here - before;
      gap = { bottom: before, top: here };
    }
    before = here;
    lacking = false;
  }
  return { lowest, gap };
}

function fluxProfile(air: AirColumn): MoistureNumbers['flux'] {
  const east = air.u.map((u, k) => fluxOf(air.density[k]!, air.specificHumidity[k]!, u));
  const north = air.v.map((v, k) => fluxOf(air.density[k]!, air.specificHumidity[k]!, v));
  const keep = (_: number, k: number): boolean => Number.isFinite(east[k]!) && Number.isFinite(north[k]!);
  return { heightAgl: air.heightAgl.filter(keep), east: east.filter(keep), north: north.filter(keep) };
}

function known(heightAgl: Float64Array, value: Float64Array): { heightAgl: Float64Array; value: Float64Array } {
  const keep = (_: number, k: number): boolean => Number.isFinite(value[k]!);
  return { heightAgl: heightAgl.filter(keep), value: value.filter(keep) };
}
