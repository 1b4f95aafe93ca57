// Profiles as a CF netCDF file: discrete sampling geometry `timeSeriesProfile` (CF-1.11, chapter 9, appendix H.5), as a
// grid where all profiles share their heights, ragged where they do not.

import { DuskveerError } from '../../air/index.ts';
import { concatBlocks, INSTRUMENTS, MARKS, type ProfileBlock, type Station } from '../../profile/index.ts';
import { encodeClassic, type OutAttribute, type OutVariable } from './encode-classic.ts';
import { OUT_QUANTITIES } from './quantities.ts';

/** What the netCDF library writes where nothing was written. */
const FILL = 9.969209968386869e36;
const FILL_FLOAT = { _FillValue: Float32Array.of(FILL) };
const FILL_DOUBLE = { _FillValue: Float64Array.of(FILL) };

/** How the profiles lie: names of the dimensions that station, profile and level variables have. */
interface Shape {
  readonly station: readonly string[];
  readonly profile: readonly string[];
  readonly level: readonly string[];
  readonly height: readonly string[];
  readonly coordinates: string;
}

const GRID: Shape = {
  station: [],
  profile: ['time'],
  level: ['time', 'height'],
  height: ['height'],
  coordinates: 'latitude longitude station_id',
};
const RAGGED: Shape = {
  station: ['station'],
  profile: ['profile'],
  level: ['obs'],
  height: ['obs'],
  coordinates: 'time latitude longitude height',
};

/**
 * Bytes of a netCDF classic file holding all profiles of the blocks, with stations, marks and averaging periods.
 * Notes and names of sources stay behind.
 * @param about what the file says of itself: global attributes such as title and comment
 * @throws DuskveerError `ingest/nothing-to-write` without a profile
 */
export function writeNetcdf(blocks: readonly ProfileBlock[], about: Readonly<Record<string, string>> = {}): Uint8Array {
  const block = concatBlocks(blocks);
  if (block.profileCount === 0) throw nothingToWrite();
  const isGrid = sharesHeights(block);
  const shape = isGrid ? GRID : RAGGED;
  const letters = { station_id: longest(block, 'id'), station_name: longest(block, 'name') };
  const levels = block.offsets[1]! - block.offsets[0]!;
  const dimensions: Record<string, number> = isGrid
    ? { time: block.profileCount, height: levels }
    : { station: block.stations.length, profile: block.profileCount, obs: block.heightAgl.length };
  return encodeClassic({
    dimensions: { ...dimensions, bound: 2, ...lettersDimensions(letters) },
    attributes: {
      Conventions: 'CF-1.11',
      featureType: 'timeSeriesProfile',
      title: 'Wind profiles',
      source: instrumentsOf(block),
      ...about,
    },
    variables: [
      ...stationVariables(block, shape, letters),
      ...profileVariables(block, shape, isGrid),
      ...levelVariables(block, shape, isGrid ? levels : block.heightAgl.length),
    ],
  });
}

function nothingToWrite(): DuskveerError {
  return new DuskveerError({
    code: 'ingest/nothing-to-write',
    what: 'There is no profile to write.',
    mend: 'Choose files or a time span that hold profiles.',
    where: {},
  });
}

/** One station, times in order, and the same ascending heights at each: a grid says the same in less. */
function sharesHeights({ stations, profileCount, offsets, heightAgl, timeMs }: ProfileBlock): boolean {
  const levels = offsets[1]! - offsets[0]!;
  if (stations.length !== 1 || levels === 0) return false;
  for (let k = 1; k < levels; k++) if (!(heightAgl[k]! > heightAgl[k - 1]!)) return false;
  if (Number.isNaN(heightAgl[0]!)) return false;
  for (let index = 1; index < profileCount; index++) {
    const start = offsets[index]!;
    if (offsets[index + 1]! - start !== levels || !(timeMs[index]! > timeMs[index - 1]!)) return false;
    for (let k = 0; k < levels; k++) if (heightAgl[start + k] !== heightAgl[k]) return false;
  }
  return true;
}

function longest({ stations }: ProfileBlock, key: 'id' | 'name'): number {
  return Math.max(1, ...stations.map((station) => new TextEncoder().encode(station[key]).length));
}

const lettersDimensions = (letters: Record<string, number>): Record<string, number> =>
  Object.fromEntries(Object.entries(letters).map(([name, length]) => [`${name}_letters`, length]));

function instrumentsOf({ instrumentIndex }: ProfileBlock): string {
  return [...new Set(instrumentIndex)].map((index) => INSTRUMENTS[index]!.replace('-', ' ')).join(', ');
}

function stationVariables(block: ProfileBlock, shape: Shape, letters: Record<string, number>): OutVariable[] {
  const { stations } = block;
  const numbers = (
    name: string,
    key: 'latitude' | 'longitude' | 'elevation',
    attributes: Record<string, OutAttribute>,
  ): OutVariable => ({
    name,
    dimensions: shape.station,
    attributes: { ...attributes, ...FILL_DOUBLE },
    data: filled(Float64Array.from(stations, (station) => station[key])),
  });
  const text = (
    name: string,
    key: keyof Pick<Station, 'id' | 'name'>,
    attributes: Record<string, string>,
  ): OutVariable => {
    const length = letters[name]!;
    const data = new Uint8Array(length * stations.length);
    stations.forEach((station, place) => data.set(new TextEncoder().encode(station[key]), place * length));
    return { name, dimensions: [...shape.station, `${name}_letters`], attributes, data };
  };
  return [
    text('station_id', 'id', { cf_role: 'timeseries_id', long_name: 'station identifier' }),
    text('station_name', 'name', { long_name: 'station name' }),
    numbers('latitude', 'latitude', { standard_name: 'latitude', units: 'degrees_north' }),
    numbers('longitude', 'longitude', { standard_name: 'longitude', units: 'degrees_east' }),
    numbers('station_elevation', 'elevation', {
      standard_name: 'surface_altitude',
      long_name: 'ground above mean sea level',
      units: 'm',
    }),
  ];
}

function profileVariables(block: ProfileBlock, shape: Shape, isGrid: boolean): OutVariable[] {
  const { profileCount, timeMs, periodS, offsets } = block;
  const column = (
    name: string,
    data: Int32Array | Int8Array | Float64Array,
    attributes: Record<string, OutAttribute>,
  ): OutVariable => ({ name, dimensions: shape.profile, attributes, data });
  const hasBounds = periodS.every((period) => period > 0);
  const variables = [
    column(
      'time',
      Float64Array.from(timeMs, (time) => time / 1000),
      {
        standard_name: 'time',
        long_name: 'end of the averaging period, or launch',
        units: 'seconds since 1970-01-01 00:00:00 UTC',
        calendar: 'standard',
        axis: 'T',
        ...(hasBounds ? { bounds: 'time_bounds' } : {}),
      },
    ),
    column('instrument', Int8Array.from(block.instrumentIndex), {
      long_name: 'kind of instrument',
      flag_values: Int8Array.from(INSTRUMENTS, (_, index) => index),
      flag_meanings: INSTRUMENTS.map((name) => name.replaceAll('-', '_')).join(' '),
    }),
  ];
  if (hasBounds) {
    const data = new Float64Array(2 * profileCount);
    for (let index = 0; index < profileCount; index++) {
      data[2 * index] = timeMs[index]! / 1000 - periodS[index]!;
      data[2 * index + 1] = timeMs[index]! / 1000;
    }
    variables.push({ name: 'time_bounds', dimensions: [...shape.profile, 'bound'], attributes: {}, data });
  } else if (periodS.some((period) => !Number.isNaN(period))) {
    variables.push(
      column('averaging_period', filled(Float64Array.from(periodS)), {
        long_name: 'averaging period before the time given, 0 for a momentary value',
        units: 's',
        ...FILL_DOUBLE,
      }),
    );
  }
  if (block.revision.some((revision) => revision !== 0)) {
    variables.push(
      column('revision', Int32Array.from(block.revision), {
        long_name: 'number of the correction, 0 for the first issue',
      }),
    );
  }
  if (!isGrid) {
    variables.push(
      column(
        'profile',
        Int32Array.from({ length: profileCount }, (_, index) => index + 1),
        {
          cf_role: 'profile_id',
          long_name: 'number of the profile',
        },
      ),
      column('station_index', Int32Array.from(block.stationIndex), {
        long_name: 'which station the profile belongs to',
        instance_dimension: 'station',
      }),
      column(
        'levels',
        Int32Array.from({ length: profileCount }, (_, index) => offsets[index + 1]! - offsets[index]!),
        {
          long_name: 'number of levels of the profile',
          sample_dimension: 'obs',
        },
      ),
    );
  }
  return variables;
}

function levelVariables(block: ProfileBlock, shape: Shape, heights: number): OutVariable[] {
  const variables: OutVariable[] = [
    {
      name: 'height',
      dimensions: shape.height,
      attributes: {
        standard_name: 'height',
        long_name: 'height above ground',
        units: 'm',
        positive: 'up',
        axis: 'Z',
        ...(shape === GRID ? {} : FILL_FLOAT),
      },
      data: filled(block.heightAgl.slice(0, heights)),
    },
  ];
  const hasMarks = block.mark.some((bits) => bits !== 0);
  for (const { column, name, standardName, units, title } of OUT_QUANTITIES) {
    const values = block[column];
    if (values === null) continue;
    variables.push({
      name,
      dimensions: shape.level,
      attributes: {
        ...(standardName === '' ? {} : { standard_name: standardName }),
        long_name: title,
        ...(units === '' ? {} : { units }),
        coordinates: shape.coordinates,
        ...(hasMarks ? { ancillary_variables: 'quality_mark' } : {}),
        ...FILL_FLOAT,
      },
      data: filled(values.slice()),
    });
  }
  if (hasMarks) {
    variables.push({
      name: 'quality_mark',
      dimensions: shape.level,
      attributes: {
        standard_name: 'quality_flag',
        long_name: 'what is known against a level',
        coordinates: shape.coordinates,
        flag_masks: Int32Array.from(MARKS, ({ bit }) => bit),
        flag_meanings: MARKS.map(({ name }) => name.replaceAll('-', '_')).join(' '),
      },
      data: Int32Array.from(block.mark),
    });
  }
  return variables;
}

/** The same array with fills for what is missing. */
function filled<T extends Float32Array | Float64Array>(values: T): T {
  for (let k = 0; k < values.length; k++) if (Number.isNaN(values[k]!)) values[k] = FILL;
  return values;
}
