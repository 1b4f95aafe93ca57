// The file form of a site, as its JSON Schema allows it, and how it becomes the inside form.

import { fromJsonNumber } from '../air/index.ts';
import type { Instrument } from '../profile/index.ts';
import {
  PLAIN_SITE,
  type OwnCriteria,
  type RampDefinition,
  type Site,
  type TerrainAxis,
  type WorkLimit,
} from './site.ts';

/** A file that has passed the schema: keys not required may be absent. */
export interface SiteFile {
  name: string;
  about?: string;
  time_zone?: string;
  file_time_zone?: string;
  stations?: StationEntry[];
  turbines?: TurbineEntry[];
  terrain_axes?: {
    name: string;
    kind: TerrainAxis['kind'];
    bearing_deg: number;
    crest_height_m: number;
    stations?: string[];
  }[];
  criteria?: string | CriteriaEntry;
  units?: Partial<Site['units']>;
  columns?: Record<string, string>;
  neighbours?: string[][];
  upstream?: { station: string; from: string[] }[];
  migration?: { toward_deg: number; spread_deg?: number; months: number[] }[];
  limits?: { name: string; kind?: WorkLimit['kind']; height_m: number; speed_mps: number }[];
  ramps?: { name: string; share: number; within_minutes: number }[];
  design_shear_exponent?: number;
  farm_factor?: number;
  continuation?: Site['continuation'];
  geostrophic_wind?: { speed_mps: number; direction_deg: number };
}

interface StationEntry {
  id: string;
  name?: string;
  latitude_deg?: number;
  longitude_deg?: number;
  elevation_m?: number;
  instrument?: Instrument;
  aliases?: string[];
  speed_uncertainty_mps?: number;
}

interface TurbineEntry {
  name: string;
  count?: number;
  hub_height_m: number;
  rotor_diameter_m: number;
  ground_elevation_m?: number;
  power_curve?: { air_density_kg_per_m3?: number; speed_mps: number[]; power_kw: number[] };
  cut_in_mps?: number;
  rated_mps?: number;
  cut_out_mps?: number;
  restart_mps?: number;
}

interface CriteriaEntry {
  name: string;
  ceiling_m: number;
  nose_ceiling_m?: number;
  candidates?: OwnCriteria['candidates'];
  falloff_to?: OwnCriteria['falloffTo'];
  ending_rise_mps?: number | 'uncertainty';
  categories: { speed_mps: number; falloff_mps: number }[];
  ratio_above?: number;
  rise_below_mps?: number;
}

/** Air density for which power curves are given unless they say otherwise (IEC 61400-12-1). */
const CURVE_DENSITY = 1.225;
/** Degrees either side of a migration heading; common practice, without source. */
const HEADING_SPREAD = 45;

/** The site that a valid file describes; what it leaves out is as in `PLAIN_SITE`, numbers not given are NaN. */
export function siteOfFile(file: SiteFile): Site {
  return {
    name: file.name,
    about: file.about ?? '',
    timeZone: file.time_zone ?? PLAIN_SITE.timeZone,
    fileTimeZone: file.file_time_zone ?? PLAIN_SITE.fileTimeZone,
    stations: (file.stations ?? []).map(stationOf),
    turbines: (file.turbines ?? []).map(turbineOf),
    terrainAxes: (file.terrain_axes ?? []).map((axis) => ({
      name: axis.name,
      kind: axis.kind,
      bearing: axis.bearing_deg % 360,
      crestHeight: axis.crest_height_m,
      stations: axis.stations ?? [],
    })),
    criteria: typeof file.criteria === 'object' ? criteriaOf(file.criteria) : (file.criteria ?? PLAIN_SITE.criteria),
    units: { ...PLAIN_SITE.units, ...file.units },
    columns: file.columns ?? {},
    neighbours: file.neighbours ?? [],
    upstream: file.upstream ?? [],
    migration: (file.migration ?? []).map((heading) => ({
      toward: heading.toward_deg % 360,
      spread: heading.spread_deg ?? HEADING_SPREAD,
      months: heading.months,
    })),
    limits: (file.limits ?? []).map(({ name, kind, height_m, speed_mps }) => ({
      name,
      kind: kind ?? 'other',
      height: height_m,
      speed: speed_mps,
    })),
    ramps: (file.ramps ?? []).map(({ name, share, within_minutes }): RampDefinition => ({
      name,
      share,
      withinS: within_minutes * 60,
    })),
    designShear: file.design_shear_exponent ?? PLAIN_SITE.designShear,
    farmFactor: file.farm_factor ?? PLAIN_SITE.farmFactor,
    continuation: file.continuation ?? PLAIN_SITE.continuation,
    geostrophicWind:
      file.geostrophic_wind === undefined
        ? null
        : { speed: file.geostrophic_wind.speed_mps, direction: file.geostrophic_wind.direction_deg % 360 },
  };
}

function stationOf(entry: StationEntry): Site['stations'][number] {
  const longitude = fromJsonNumber(entry.longitude_deg);
  return {
    id: entry.id,
    name: entry.name ?? entry.id,
    latitude: fromJsonNumber(entry.latitude_deg),
    longitude: longitude > 180 ? longitude - 360 : longitude,
    elevation: fromJsonNumber(entry.elevation_m),
    instrument: entry.instrument ?? 'unknown',
    aliases: entry.aliases ?? [],
    speedUncertainty: fromJsonNumber(entry.speed_uncertainty_mps),
  };
}

function turbineOf(entry: TurbineEntry): Site['turbines'][number] {
  const curve = entry.power_curve;
  return {
    name: entry.name,
    count: entry.count ?? 1,
    hubHeight: entry.hub_height_m,
    rotorDiameter: entry.rotor_diameter_m,
    powerCurve:
      curve === undefined
        ? null
        : { speed: curve.speed_mps, powerKw: curve.power_kw, airDensity: curve.air_density_kg_per_m3 ?? CURVE_DENSITY },
    cutIn: fromJsonNumber(entry.cut_in_mps),
    rated: fromJsonNumber(entry.rated_mps),
    cutOut: fromJsonNumber(entry.cut_out_mps),
    restart: fromJsonNumber(entry.restart_mps),
    groundElevation: fromJsonNumber(entry.ground_elevation_m),
  };
}

function criteriaOf(entry: CriteriaEntry): OwnCriteria {
  return {
    name: entry.name,
    ceiling: entry.ceiling_m,
    noseCeiling: entry.nose_ceiling_m ?? entry.ceiling_m,
    candidates: entry.candidates ?? 'every-maximum',
    falloffTo: entry.falloff_to ?? 'risen-minimum',
    endingRise: entry.ending_rise_mps ?? 'uncertainty',
    categories: entry.categories.map(({ speed_mps, falloff_mps }) => ({ speed: speed_mps, falloff: falloff_mps })),
    ratioAbove: entry.ratio_above ?? 1,
    riseBelow: entry.rise_below_mps ?? 0,
  };
}
