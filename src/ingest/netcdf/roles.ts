// Which variable is the wind speed, which the height: by CF standard name, then by the names in common use.

import { parseUnit, type ParsedUnit, type Quantity } from '../../air/index.ts';
import { textOf, type Dataset, type Variable } from './dataset.ts';

export type Role =
  | 'speed'
  | 'direction'
  | 'u'
  | 'v'
  | 'verticalSpeed'
  | 'pressure'
  | 'temperature'
  | 'dewPoint'
  | 'relativeHumidity'
  | 'specificHumidity'
  | 'mixingRatio'
  | 'signal'
  | 'speedUncertainty'
  | 'consensus'
  | 'spectralWidth'
  | 'height';

interface Meaning {
  /** CF standard names, in order of preference; a modifier behind a stroke. */
  readonly standardNames: string;
  /** Names in common use, lower case, in order of preference. */
  readonly names: string;
  readonly quantities: readonly Quantity[];
  /** What the long name says where neither name tells. */
  readonly longName?: RegExp;
}

const MEANINGS: Readonly<Record<Role, Meaning>> = {
  speed: {
    standardNames: 'wind_speed',
    names:
      'wind_speed windspeed wspd wind_spd wspeed ws speed ff horizontal_wind_speed horizontal_windspeed velocity_horizontal',
    quantities: ['speed'],
  },
  direction: {
    standardNames: 'wind_from_direction wind_to_direction',
    names:
      'wind_from_direction wind_direction winddirection wind_dir winddir wdir deg dir direction wd dd horizontal_wind_direction',
    quantities: ['angle'],
  },
  u: {
    standardNames: 'eastward_wind',
    names: 'u uwind u_wind wind_u u_component eastward_wind zonal_wind ua u_wind_component ucomp',
    quantities: ['speed'],
  },
  v: {
    standardNames: 'northward_wind',
    names: 'v vwind v_wind wind_v v_component northward_wind meridional_wind va v_wind_component vcomp',
    quantities: ['speed'],
  },
  verticalSpeed: {
    standardNames: 'upward_air_velocity downward_air_velocity',
    names:
      'w wwind w_wind wind_w vertical_wind vertical_velocity w_component vertical_wind_speed upward_air_velocity wcomp',
    quantities: ['speed'],
  },
  pressure: {
    standardNames: 'air_pressure',
    names: 'pres pressure air_pressure press p bar_pres atmospheric_pressure plev',
    quantities: ['pressure'],
  },
  temperature: {
    standardNames: 'air_temperature',
    names: 'tdry temperature air_temperature temp ta t dry_bulb_temperature',
    quantities: ['temperature'],
  },
  dewPoint: {
    standardNames: 'dew_point_temperature',
    names: 'dp dewpoint dew_point dew_point_temperature dewpoint_temperature td tdew dpt',
    quantities: ['temperature'],
  },
  relativeHumidity: {
    standardNames: 'relative_humidity',
    names: 'rh relative_humidity hur humidity relhum rel_hum',
    quantities: ['fraction'],
  },
  specificHumidity: {
    standardNames: 'specific_humidity',
    names: 'q specific_humidity hus sphum shum qv',
    quantities: ['humidity-ratio', 'fraction'],
  },
  mixingRatio: {
    standardNames: 'humidity_mixing_ratio',
    names: 'mixing_ratio mr wvmr humidity_mixing_ratio water_vapor_mixing_ratio water_vapour_mixing_ratio mixr',
    quantities: ['humidity-ratio', 'fraction'],
  },
  signal: {
    standardNames: '',
    names: 'snr signal_to_noise_ratio signal_noise_ratio cnr carrier_to_noise_ratio signal signal_intensity intensity',
    quantities: [],
  },
  speedUncertainty: {
    standardNames: 'wind_speed|standard_error',
    names: 'wind_speed_uncertainty speed_uncertainty wspd_uncertainty',
    quantities: ['speed'],
  },
  consensus: {
    standardNames: '',
    names: 'consensus consensus_fraction consensus_percent consensus_percentage wind_consensus horizontal_consensus',
    quantities: ['fraction'],
    longName: /\bconsensus\b(?!.*\b(?:number|count|flag|window|minimum|threshold)\b)/iu,
  },
  spectralWidth: {
    standardNames: '',
    names: 'spectral_width spectrum_width doppler_spectral_width doppler_spectrum_width spectralwidth spectrumwidth',
    quantities: ['speed'],
    longName: /\bspectr(?:al|um) width\b/iu,
  },
  height: {
    standardNames:
      'height height_above_ground_level altitude height_above_mean_sea_level geopotential_height height_above_geopotential_datum height_above_reference_ellipsoid geopotential',
    names:
      'height_agl height_above_ground height heights hgt z alt altitude height_amsl height_asl geopotential_height gph geopotential level_height elevation_above_ground range gate_height',
    quantities: ['length', 'geopotential'],
  },
};

/** A variable in a role, with the unit it is in. */
export interface Finding {
  readonly variable: Variable;
  /** Null where the file states none. */
  readonly unit: ParsedUnit | null;
  /** Whether the CF standard name told, or only the name. */
  readonly byStandardName: boolean;
}

/** A variable that would serve but for its unit. */
export interface UnknownUnit {
  readonly variable: Variable;
  readonly role: Role;
  readonly units: string;
}

/**
 * All variables that can play the role, the most fitting first. Never among them: quality flags, and what the file
 * itself calls raw or not screened.
 * @param unknown gathers variables left out because of their unit
 */
export function candidates(dataset: Dataset, role: Role, unknown: UnknownUnit[] = []): Finding[] {
  const { standardNames, names, quantities, longName } = MEANINGS[role];
  const byStandard = standardNames.split(' ');
  const byName = names.split(' ');
  const found: { finding: Finding; rank: number }[] = [];
  for (const variable of dataset.variables.values()) {
    if (variable.type === 'text' || isUnfit(variable)) continue;
    const standardName = textOf(variable.attributes, 'standard_name').toLowerCase();
    const standardRank = standardName === '' ? -1 : byStandard.indexOf(standardName.replace(' ', '|'));
    const nameRank = byName.indexOf(variable.name.toLowerCase());
    // A standard name for something else outweighs a likely name.
    const byWords = longName?.test(textOf(variable.attributes, 'long_name')) === true && variable.dimensions.length > 0;
    const likelyRank = nameRank >= 0 ? 100 + nameRank : byWords ? 200 : -1;
    const rank = standardRank >= 0 ? standardRank : standardName === '' ? likelyRank : -1;
    if (rank < 0) continue;
    const units = textOf(variable.attributes, 'units');
    const unit = unitIn(units);
    if (quantities.length > 0 && unit !== null && !quantities.includes(unit.quantity)) {
      unknown.push({ variable, role, units });
      continue;
    }
    if (quantities.length > 0 && unit === null && units !== '') {
      unknown.push({ variable, role, units });
      continue;
    }
    found.push({ finding: { variable, unit, byStandardName: standardRank >= 0 }, rank });
  }
  // Stable: equals keep the file's order. More dimensions first: the profile rather than the value at the ground.
  found.sort(
    (a, b) =>
      Number(b.finding.byStandardName) - Number(a.finding.byStandardName) ||
      b.finding.variable.dimensions.length - a.finding.variable.dimensions.length ||
      a.rank - b.rank,
  );
  return found.map(({ finding }) => finding);
}

/** A unit text, also with the datum in it ("meters above Mean Sea Level"); null when unknown or not stated. */
export function unitIn(units: string): ParsedUnit | null {
  if (units === '') return null;
  return parseUnit(units) ?? parseUnit(units.replace(/\s+above\b.*$/iu, ''));
}

const STATISTIC = /:\s*(?:standard_deviation|variance|maximum|minimum|range)\b/u;

/** Quality flags, and what the file itself calls raw, not screened or a statistic. */
export function isUnfit(variable: Variable): boolean {
  const name = variable.name.toLowerCase();
  if (/^(?:qc|aqc|flag)_|_(?:qc|flag|raw|std|error|unscreened)$|^raw_/u.test(name)) return true;
  if (
    /\b(?:un|non-?|not )screened\b|\bunfiltered\b|\bquality[ -](?:check|flag|code|index|indicator|mask)/iu.test(
      textOf(variable.attributes, 'long_name'),
    )
  )
    return true;
  // Extremes and scatter over time carry the same standard name; over height or area they would not be profiles.
  return STATISTIC.test(textOf(variable.attributes, 'cell_methods'));
}
