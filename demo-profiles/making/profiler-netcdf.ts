// A profiler's record as a CF netCDF file (classic format, so that every reader opens it without further libraries).

import type { ProfilerRecord } from './profiler.ts';
import { classicNetcdf, type NetcdfVariable } from './classic-netcdf.ts';

export interface ProfilerPlace {
  readonly station: string;
  readonly title: string;
  readonly instrument: string;
  readonly latitude: number;
  readonly longitude: number;
  /** m above sea level */
  readonly elevation: number;
  readonly periodS: number;
}

const FILL = -9999;

export function profilerNetcdf(record: ProfilerRecord, place: ProfilerPlace): Uint8Array {
  const field = (name: string, values: number[], attributes: Record<string, string>): NetcdfVariable => ({
    name,
    dimensions: ['time', 'height'],
    type: 'float',
    attributes: { ...attributes, coordinates: 'latitude longitude altitude', _FillValue: FILL },
    values: values.map((value) => (Number.isNaN(value) ? FILL : value)),
  });
  const scalar = (name: string, value: number, attributes: Record<string, string>): NetcdfVariable => ({
    name,
    dimensions: [],
    type: 'double',
    attributes,
    values: [value],
  });
  const seconds = record.timesMs.map((ms) => ms / 1000);
  return classicNetcdf({
    dimensions: {
      time: record.timesMs.length,
      height: record.gates.length,
      bounds: 2,
      name_length: place.station.length,
    },
    attributes: {
      Conventions: 'CF-1.10',
      featureType: 'timeSeriesProfile',
      title: place.title,
      comment: 'All of it is invented: place, instrument and weather. Made by demo-profiles/generate.ts.',
      instrument: place.instrument,
    },
    variables: [
      {
        name: 'station_name',
        dimensions: ['name_length'],
        type: 'char',
        attributes: { cf_role: 'timeseries_id', long_name: 'station name' },
        values: place.station,
      },
      scalar('latitude', place.latitude, { standard_name: 'latitude', units: 'degrees_north' }),
      scalar('longitude', place.longitude, { standard_name: 'longitude', units: 'degrees_east' }),
      scalar('altitude', place.elevation, { standard_name: 'surface_altitude', units: 'm' }),
      {
        name: 'time',
        dimensions: ['time'],
        type: 'double',
        attributes: {
          standard_name: 'time',
          units: 'seconds since 1970-01-01 00:00:00 +00:00',
          calendar: 'standard',
          axis: 'T',
          bounds: 'time_bounds',
          comment: 'end of the averaging period',
        },
        values: seconds,
      },
      {
        name: 'time_bounds',
        dimensions: ['time', 'bounds'],
        type: 'double',
        attributes: {},
        values: seconds.flatMap((end) => [end - place.periodS, end]),
      },
      {
        name: 'height',
        dimensions: ['height'],
        type: 'float',
        attributes: {
          standard_name: 'height',
          units: 'm',
          positive: 'up',
          axis: 'Z',
          long_name: 'height above ground',
        },
        values: [...record.gates],
      },
      field('wind_speed', record.speed, {
        standard_name: 'wind_speed',
        units: 'm s-1',
        ancillary_variables: 'wind_quality',
      }),
      field('wind_from_direction', record.direction, {
        standard_name: 'wind_from_direction',
        units: 'degree',
        ancillary_variables: 'wind_quality',
      }),
      field('upward_air_velocity', record.verticalSpeed, { standard_name: 'upward_air_velocity', units: 'm s-1' }),
      field('signal_to_noise_ratio', record.signal, { long_name: 'signal to noise ratio', units: 'dB' }),
      {
        name: 'wind_quality',
        dimensions: ['time', 'height'],
        type: 'byte',
        attributes: {
          standard_name: 'quality_flag',
          long_name: "the instrument's own judgement of the wind",
          flag_values: { type: 'byte', values: [0, 1] },
          flag_meanings: 'good doubtful',
        },
        values: record.quality,
      },
      ...(record.temperature.length === 0
        ? []
        : [
            field('air_pressure', record.pressure, { standard_name: 'air_pressure', units: 'Pa' }),
            field('air_temperature', record.temperature, { standard_name: 'air_temperature', units: 'K' }),
            field('specific_humidity', record.specificHumidity, { standard_name: 'specific_humidity', units: '1' }),
          ]),
    ],
  });
}
