// What storms would get of the air at a moment: the newest wind joined with the air that may serve it, how old and how far
// each is, the storm numbers, and the columns to draw them from.

import { distanceBetween } from '../air/index.ts';
import type { JetFinding } from '../jet/index.ts';
import { moistureOf, OLDEST_HUMIDITY_S } from '../moisture/index.ts';
import type { Instrument, Profile } from '../profile/index.ts';
import {
  assessStorm,
  atLnPressure,
  deepSounding,
  fineEnvironment,
  joinWindAndAir,
  parcelTrace,
  type Hodograph,
  type JetWind,
  type OtherIngredients,
  type ParcelName,
  type Sounding,
  type StormNumbers,
  type Trace,
} from '../storm/index.ts';
import type { AirSources } from './air-sources.ts';
import type { FeedName } from './feed-name.ts';

export interface InflowQuestion {
  /** Key of the feed whose wind is taken. */
  readonly feed: string;
  /** Criteria set by name; the site's unless told. */
  readonly criteria?: string;
  /** s; temperature and humidity measured longer before the wind are not used. */
  readonly oldestAirS?: number;
}

/** Where temperature and humidity came from. */
export interface AirUse {
  readonly station: string;
  readonly name: string;
  readonly instrument: Instrument;
  readonly timeMs: number;
  /** s before the moment looked at */
  readonly ageS: number;
  /** m between the stations; 0 for the wind's own, NaN where a position is not known. */
  readonly distance: number;
}

/** A parcel's way up with the height of each point, m above the ground of the wind's station. */
export interface DrawnTrace extends Trace {
  readonly name: ParcelName;
  readonly heightAgl: Float64Array;
}

/** The air that was lifted. Columns ascend; heights above the ground of the wind's station. */
export interface AirColumns {
  readonly heightAgl: Float64Array;
  /** Pa */
  readonly pressure: Float64Array;
  /** K */
  readonly temperature: Float64Array;
  /** K; NaN where the air counts as dry */
  readonly dewPoint: Float64Array;
}

export interface InflowState {
  readonly atMs: number;
  readonly feed: FeedName;
  /** When the wind was measured, and how long before the moment looked at. */
  readonly windMs: number;
  readonly windAgeS: number;
  /** m above ground: where the wind's own levels end. */
  readonly windTop: number;
  /** null where there is none, as `airWhy` says */
  readonly air: AirUse | null;
  readonly airWhy: string;
  readonly storm: StormNumbers;
  readonly jet: JetWind | null;
  /** What the ingredients need of other rooms. */
  readonly others: OtherIngredients;
  /** Wind by height, above `windTop` that of `storm.windAloft`. */
  readonly hodograph: Hodograph;
  readonly columns: AirColumns;
  readonly traces: readonly DrawnTrace[];
}

/** No number may be had of so old a wind. */
export interface NoInflow {
  readonly atMs: number;
  readonly feed: FeedName;
  readonly why: string;
}

/** Wind of an instrument that measures all the time is not taken for that of now beyond this age, s; a sounding's as its air. */
const OLDEST_WIND_S = 3 * 3600;

export interface InflowSources {
  readonly feed: FeedName;
  /** The newest profile of the feed, screened. */
  readonly wind: Profile;
  readonly finding: JetFinding;
  readonly sources: AirSources;
  readonly oldestAirS?: number | undefined;
}

/** Why a wind is too old to speak of now; empty when it is not. */
export function windTooOld(wind: Profile, atMs: number): string {
  const ageS = (atMs - wind.timeMs) / 1000;
  const oldestS = wind.instrument === 'radiosonde' ? OLDEST_HUMIDITY_S : OLDEST_WIND_S;
  if (ageS <= oldestS) return '';
  return `The last wind of ${wind.station.name} is ${hours(ageS)} old; more than ${hours(oldestS)} is not used.`;
}

/** The inflow at a moment. */
export function inflowState(atMs: number, { feed, wind, finding, sources, oldestAirS }: InflowSources): InflowState {
  const joined = joinWindAndAir(wind, sources.nearest(wind), oldestAirS === undefined ? {} : { oldestS: oldestAirS });
  const { air } = joined;
  const aloft = deepSounding(wind, sources.for(wind), oldestAirS ?? OLDEST_HUMIDITY_S);
  const jet = finding.jets[0];
  const { numbers, hodograph, sounding } = assessStorm(wind, {
    ...(air === null ? { noAir: joined.why } : { air }),
    ...(aloft === undefined ? {} : { aloft }),
    ...(jet === undefined ? {} : { jet }),
  });
  const raise = air === null ? 0 : air.station.elevation - wind.station.elevation;
  return {
    atMs,
    feed,
    windMs: wind.timeMs,
    windAgeS: (atMs - wind.timeMs) / 1000,
    windTop: numbers.windAloft?.above ?? hodograph.heightAgl[hodograph.count - 1] ?? NaN,
    air: air === null ? null : airUse(air, wind, atMs),
    airWhy: joined.why,
    storm: numbers,
    jet: jet ?? null,
    others: othersOf(wind, air, finding),
    hodograph: {
      count: hodograph.count,
      heightAgl: hodograph.heightAgl.slice(0, hodograph.count),
      u: hodograph.u.slice(0, hodograph.count),
      v: hodograph.v.slice(0, hodograph.count),
    },
    ...drawn(sounding, numbers, Number.isNaN(raise) ? 0 : raise),
  };
}

function airUse(air: Profile, wind: Profile, atMs: number): AirUse {
  return {
    station: air.station.id,
    name: air.station.name,
    instrument: air.instrument,
    timeMs: air.timeMs,
    ageS: (atMs - air.timeMs) / 1000,
    distance: air === wind ? 0 : distanceBetween(air.station, wind.station),
  };
}

function othersOf(wind: Profile, air: Profile | null, finding: JetFinding): OtherIngredients {
  const [jet] = finding.jets;
  const moisture = moistureOf(wind, { humidity: air === null || air === wind ? [] : [air] });
  const capital = (text: string): string => `${text.charAt(0).toUpperCase()}${text.slice(1)}.`;
  return {
    jetSpeed: jet === undefined ? { value: NaN, why: finding.why } : { value: jet.noseSpeed, why: '' },
    transport: {
      value: moisture.transport.size,
      why: Number.isNaN(moisture.transport.size) ? capital(moisture.why) : '',
    },
  };
}

function drawn(sounding: Sounding, numbers: StormNumbers, raise: number): Pick<InflowState, 'columns' | 'traces'> {
  const up = (heights: Float64Array): Float64Array => heights.map((height) => height + raise);
  const columns = {
    heightAgl: up(sounding.heightAgl.slice(0, sounding.count)),
    pressure: sounding.pressure.slice(0, sounding.count),
    temperature: sounding.temperature.slice(0, sounding.count),
    dewPoint: sounding.dewPoint.slice(0, sounding.count),
  };
  if (sounding.noAir !== '') return { columns, traces: [] };
  const environment = fineEnvironment(sounding);
  const traces = numbers.parcels.flatMap(({ name, start }) => {
    if (start === null) return [];
    const trace = parcelTrace(environment, start);
    const heightAgl = trace.pressure.map(
      (pressure) => atLnPressure(sounding, sounding.heightAgl, Math.log(pressure)) + raise,
    );
    return [{ name, ...trace, heightAgl }];
  });
  return { columns, traces };
}

function hours(seconds: number): string {
  return `${(seconds / 3600).toFixed(1)} h`;
}
