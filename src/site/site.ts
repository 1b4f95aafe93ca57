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
  /** IANA time-zone name of the times in files that state no zone. */
  readonly fileTimeZone: string;
  /** Sets of three or more stations, by identifier, between which divergence is computed. */
  readonly neighbours: readonly (readonly string[])[];
  /** Where moist air comes from, by station. */
  readonly upstream: readonly Upstream[];
  readonly migration: readonly MigrationHeading[];
  readonly limits: readonly WorkLimit[];
  readonly ramps: readonly RampDefinition[];
  /** Shear exponent that the turbines' design assumes: 0.2 on land (IEC 61400-1), 0.14 offshore (IEC 61400-3-1). */
  readonly designShear: number;
  /** What the farm yields of the sum of its turbines' curves; 1 where it has not been fitted. */
  readonly farmFactor: number;
  /** What stands below and above the measured heights of a disc: nothing, or the power law through the lowest heights. */
  readonly continuation: 'none' | 'power-law';
  /** Geostrophic wind where somebody states it; null where it is estimated or unknown. */
  readonly geostrophicWind: { readonly speed: number; readonly direction: number } | null;
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
  /** m/s; NaN where not stated, as the three below. Turns from here on. */
  readonly cutIn: number;
  /** m/s, full power from here on. */
  readonly rated: number;
  /** m/s, stops above this. */
  readonly cutOut: number;
  /** m/s, starts again below this. */
  readonly restart: number;
  /** m above sea level: ground under this group; NaN where it stands at the station's height. */
  readonly groundElevation: number;
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

/** Stations from which the air comes to a station when the jet blows, the nearest first. */
export interface Upstream {
  readonly station: string;
  readonly from: readonly string[];
}

/** The way birds fly over the site in some months. */
export interface MigrationHeading {
  /** degrees toward which they fly; wind that they feign comes from the opposite */
  readonly toward: number;
  /** degrees either side that still count */
  readonly spread: number;
  /** 1 to 12 */
  readonly months: readonly number[];
}

/** Wind above which a kind of work stops, by the site's own rules. */
export interface WorkLimit {
  readonly name: string;
  readonly kind: 'lifting' | 'climbing' | 'blade-work' | 'other';
  /** m above ground at which the wind counts */
  readonly height: number;
  /** m/s */
  readonly speed: number;
}

/** A change of output that counts as a ramp. */
export interface RampDefinition {
  readonly name: string;
  /** At least this share of the farm's capacity, 0 to 1 … */
  readonly share: number;
  /** … within this time, s. */
  readonly withinS: number;
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
  fileTimeZone: 'UTC',
  neighbours: [],
  upstream: [],
  migration: [],
  limits: [],
  ramps: [],
  designShear: 0.2,
  farmFactor: 1,
  continuation: 'none',
  geostrophicWind: null,
};

/** The site's record of a station, by identifier or alias, without regard to case. */
export function siteStation(site: Site, id: string): SiteStation | undefined {
  const wanted = id.trim().toLowerCase();
  return site.stations.find(
    (station) => station.id.toLowerCase() === wanted || station.aliases.some((alias) => alias.toLowerCase() === wanted),
  );
}
