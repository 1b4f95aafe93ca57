// The level columns as open formats name them: CF standard names with their canonical units (CF standard name table).

import type { ValueColumn } from '../../profile/index.ts';

export interface OutQuantity {
  readonly column: ValueColumn;
  /** Name of the variable or parameter. */
  readonly name: string;
  /** Empty where CF has none. */
  readonly standardName: string;
  /** In the spelling of UDUNITS; empty where the source states none. */
  readonly units: string;
  /** The same in UCUM, as OGC CoverageJSON asks. */
  readonly ucum: string;
  readonly title: string;
}

export const OUT_QUANTITIES: readonly OutQuantity[] = [
  {
    column: 'speed',
    name: 'wind_speed',
    standardName: 'wind_speed',
    units: 'm s-1',
    ucum: 'm/s',
    title: 'Wind speed',
  },
  {
    column: 'direction',
    name: 'wind_from_direction',
    standardName: 'wind_from_direction',
    units: 'degree',
    ucum: 'deg',
    title: 'Direction the wind comes from',
  },
  {
    column: 'verticalSpeed',
    name: 'upward_air_velocity',
    standardName: 'upward_air_velocity',
    units: 'm s-1',
    ucum: 'm/s',
    title: 'Upward air velocity',
  },
  {
    column: 'pressure',
    name: 'air_pressure',
    standardName: 'air_pressure',
    units: 'Pa',
    ucum: 'Pa',
    title: 'Air pressure',
  },
  {
    column: 'temperature',
    name: 'air_temperature',
    standardName: 'air_temperature',
    units: 'K',
    ucum: 'K',
    title: 'Air temperature',
  },
  {
    column: 'specificHumidity',
    name: 'specific_humidity',
    standardName: 'specific_humidity',
    units: '1',
    ucum: '1',
    title: 'Specific humidity',
  },
  {
    column: 'signal',
    name: 'signal',
    standardName: '',
    units: '',
    ucum: '1',
    title: 'Strength of the echo, as the source states it',
  },
  {
    column: 'speedUncertainty',
    name: 'wind_speed_uncertainty',
    standardName: 'wind_speed standard_error',
    units: 'm s-1',
    ucum: 'm/s',
    title: 'Standard uncertainty of the wind speed',
  },
  {
    column: 'consensus',
    name: 'consensus',
    standardName: '',
    units: '1',
    ucum: '1',
    title: 'Share of soundings in the consensus',
  },
  {
    column: 'spectralWidth',
    name: 'spectral_width',
    standardName: '',
    units: 'm s-1',
    ucum: 'm/s',
    title: 'Doppler spectral width',
  },
];
