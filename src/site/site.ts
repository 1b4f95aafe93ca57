// What the user tells the house once about a place: stations, turbines, terrain, criteria, units. Inside form, SI.
// The file form (keys with units, JSON Schema) is in `read-site.ts`.

import type { Instrument, Station } from '../profile/index.ts';

export interface Site {
  readonly name: string;
  /** A sentence for people; the demo says here that all is invented. */
  readonly about: string;
  /** IANA time-zone name of the site's clock. */
  readonly timeZone: string;
  readonly stations: readonly SiteStation[];
  readonly turbines: readonly TurbineType[];
  readonly terrainAxes: readonly TerrainAxis[];
  /** Criteria set by name, or one of the site's own. */
  readonly criteria: string | OwnCriteria;
  readonly units: DisplayUnits;
  readonly columns: ColumnMapping;
}

/** A station of the site; what it says wins over what a file says, so that a file without a position still opens. */
export interface SiteStation extends Station {
  readonly instrument: Instrument;
  /** Other names under which files speak of this station (WMO number, call sign). */
  readonly aliases: readonly string[];
  /** Standard uncertainty of a level's speed, m/s; NaN when not stated. */
  readonly speedUncertainty: number;
}

export interface TurbineType {
  readonly name: string;
  readonly count: number;
  /** m above ground */
  readonly hubHeight: number;
  /** m */
  readonly rotorDiameter: number;
  readonly powerCurve: PowerCurve | null;
}

export interface PowerCurve {
  /** m/s, ascending */
  readonly speed: readonly number[];
  /** kW, same length */
  readonly powerKw: readonly number[];
  /** kg/m3 the curve was made for */
  readonly airDensity: number;
}

/** A line in the terrain that steers the wind: a mountain barrier or a valley. */
export interface TerrainAxis {
  readonly name: string;
  readonly kind: 'barrier' | 'valley';
  /** degrees: along a barrier, barrier on the left looking this way; down a valley, toward its mouth */
  readonly bearing: number;
  /** m above the station: crest of the barrier or of the valley's sides */
  readonly crestHeight: number;
  /** Identifiers of the stations it bears on. */
  readonly stations: readonly string[];
}

/** A criteria set of the site's own; the meaning of each entry is told in `jet/criteria.ts`. */
export interface OwnCriteria {
  readonly name: string;
  /** m above ground; levels above it are not looked at, neither for noses nor for minima */
  readonly ceiling: number;
  /** m above ground; noses are sought up to here, at most the ceiling */
  readonly noseCeiling: number;
  readonly candidates: 'every-maximum' | 'lowest-maximum' | 'strongest';
  readonly falloffTo: 'first-minimum' | 'layer-minimum' | 'risen-minimum';
  /**
   * m/s; a smaller rise does not end the fall-off when `falloffTo` is `risen-minimum`. `uncertainty` takes for each pair
   * of levels the rise that their uncertainty alone could show.
   */
  readonly endingRise: number | 'uncertainty';
  /** m/s, weakest first: category i needs both */
  readonly categories: readonly { readonly speed: number; readonly falloff: number }[];
  /** nose speed at least this many times the minimum above; 1 asks nothing */
  readonly ratioAbove: number;
  /** m/s that the speed must fall toward the ground; 0 asks nothing */
  readonly riseBelow: number;
}

export interface DisplayUnits {
  readonly speed: 'm/s' | 'kt' | 'km/h' | 'mph';
  readonly height: 'm' | 'ft';
}

/** Headings of the user's own tables, by our column name; the readers' own recognition serves for what is not listed. */
export type ColumnMapping = Readonly<Record<string, string>>;

/** The site used where none was given: no stations, no turbines, UTC, the house's own criteria. */
export const PLAIN_SITE: Site = {
  name: 'No site file',
  about: '',
  timeZone: 'UTC',
  stations: [],
  turbines: [],
  terrainAxes: [],
  criteria: 'duskveer',
  units: { speed: 'm/s', height: 'm' },
  columns: {},
};

/** The site's record of a station, by identifier or alias, without regard to case. */
export function siteStation(site: Site, id: string): SiteStation | undefined {
  const wanted = id.trim().toLowerCase();
  return site.stations.find(
    (station) => station.id.toLowerCase() === wanted || station.aliases.some((alias) => alias.toLowerCase() === wanted),
  );
}
