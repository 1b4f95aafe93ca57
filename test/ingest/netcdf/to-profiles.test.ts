// Made files of every layout that is read, and what each must give.

import { describe, expect, it } from 'vitest';
import { relativeHumidityOf, specificHumidityOfDewPoint } from '../../../src/air/index.ts';
import { MARK, profileAt, type Profile } from '../../../src/profile/index.ts';
import { PLAIN_SITE, type Site } from '../../../src/site/index.ts';
import { buildClassic, type FileParts, type VariableParts } from './build-classic.ts';
import { readBytes } from './read-bytes.ts';

const HOURS = 'hours since 2024-06-01 00:00:00';
const T0 = Date.UTC(2024, 5, 1);
const HOUR = 3_600_000;

const floats = (dimensions: string[], data: number[], attributes: VariableParts['attributes'] = {}): VariableParts => ({
  type: 'f4',
  dimensions,
  data,
  attributes,
});
const doubles = (
  dimensions: string[],
  data: number[],
  attributes: VariableParts['attributes'] = {},
): VariableParts => ({
  type: 'f8',
  dimensions,
  data,
  attributes,
});

/** A grid of two times and three heights; parts may be replaced. */
function grid(variables: Record<string, VariableParts> = {}, rest: Partial<FileParts> = {}): FileParts {
  return {
    dimensions: { time: 2, height: 3, two: 2, four: 4 },
    ...rest,
    variables: {
      time: doubles(['time'], [1, 2], { units: HOURS, standard_name: 'time' }),
      height: floats(['height'], [40, 80, 120], { units: 'm', standard_name: 'height' }),
      wind_speed: floats(['time', 'height'], [1, 2, 3, 4, 5, 6], { units: 'm s-1', standard_name: 'wind_speed' }),
      wind_direction: floats(['time', 'height'], [10, 20, 30, 40, 50, 60], {
        units: 'degree',
        standard_name: 'wind_from_direction',
      }),
      ...variables,
    },
  };
}

async function read(parts: FileParts, site: Site = PLAIN_SITE) {
  const { blocks, problems } = await readBytes('made.nc', buildClassic(parts), { site });
  const profiles: Profile[] = blocks.flatMap((block) =>
    Array.from({ length: block.profileCount }, (_, index) => profileAt(block, index)),
  );
  return { profiles, problems, codes: problems.map(({ code }) => code) };
}

describe('grids of times and heights', () => {
  it('reads times, heights and winds', async () => {
    const { profiles, problems } = await read(grid());
    expect(problems).toEqual([]);
    expect(profiles.map(({ timeMs }) => timeMs)).toEqual([T0 + HOUR, T0 + 2 * HOUR]);
    expect([...profiles[1]!.heightAgl]).toEqual([40, 80, 120]);
    expect([...profiles[1]!.speed]).toEqual([4, 5, 6]);
    expect([...profiles[1]!.direction]).toEqual([40, 50, 60]);
    expect(profiles[0]!.station.id).toBe('made');
    expect(profiles[0]!.notes).toEqual([]);
  });

  it('reads them with height first, and with heights from the top down', async () => {
    const { profiles } = await read(
      grid({
        height: floats(['height'], [120, 80, 40], { units: 'm', standard_name: 'height' }),
        wind_speed: floats(['height', 'time'], [3, 6, 2, 5, 1, 4], { units: 'm s-1' }),
        wind_direction: floats(['height', 'time'], [30, 60, 20, 50, 10, 40], { units: 'degree' }),
      }),
    );
    expect([...profiles[1]!.heightAgl]).toEqual([40, 80, 120]);
    expect([...profiles[1]!.speed]).toEqual([4, 5, 6]);
    expect([...profiles[0]!.direction]).toEqual([10, 20, 30]);
    expect([...profiles[0]!.mark]).toEqual([0, 0, 0]);
  });

  it('takes the end of the averaging period from the bounds of time', async () => {
    const { profiles } = await read(
      grid({
        time: doubles(['time'], [1, 2], { units: HOURS, bounds: 'time_bounds' }),
        time_bounds: doubles(['time', 'two'], [0.5, 1.5, 1.5, 2.5]),
      }),
    );
    expect(profiles.map(({ timeMs }) => timeMs)).toEqual([T0 + 1.5 * HOUR, T0 + 2.5 * HOUR]);
    expect(profiles[0]!.periodS).toBe(3600);
  });

  it('makes heights above ground of heights above sea level, by the file or the site', async () => {
    const sea = floats(['height'], [340, 380, 420], { units: 'm', standard_name: 'altitude' });
    const ground = { station_altitude: floats([], [300], { units: 'm', standard_name: 'surface_altitude' }) };
    const inFile = await read(grid({ height: sea, ...ground }));
    expect([...inFile.profiles[0]!.heightAgl]).toEqual([40, 80, 120]);
    expect(inFile.profiles[0]!.station.elevation).toBe(300);

    const unknown = await read(grid({ height: sea }));
    expect(unknown.codes).toEqual(['ingest/no-elevation']);
    expect([...unknown.profiles[0]!.heightAgl]).toEqual([NaN, NaN, NaN]);
    expect(unknown.profiles[0]!.mark[0]).toBe(MARK['no-height']);

    const station = {
      id: 'hill',
      name: 'Hill',
      latitude: 50,
      longitude: 8,
      elevation: 320,
      instrument: 'lidar' as const,
      aliases: [],
      speedUncertainty: NaN,
    };
    const bySite = await read(grid({ height: sea, ...ground }), {
      ...PLAIN_SITE,
      stations: [station] as unknown as Site['stations'],
    });
    expect([...bySite.profiles[0]!.heightAgl]).toEqual([20, 60, 100]);
    expect(bySite.profiles[0]!.station).toMatchObject({ id: 'hill', latitude: 50 });
  });

  it('turns knots, feet, Celsius, hectopascals and per cent into the units used inside', async () => {
    const { profiles } = await read(
      grid({
        height: floats(['height'], [100, 200, 300], { units: 'ft', long_name: 'Height above ground' }),
        wind_speed: floats(['time', 'height'], [10, 10, 10, 10, 10, 10], { units: 'knots' }),
        air_temperature: floats(['time', 'height'], [20, 19, 18, 17, 16, 15], { units: 'degC' }),
        pressure: floats(['time', 'height'], [1000, 990, 980, 1000, 990, 980], { units: 'hPa' }),
        rh: floats(['time', 'height'], [50, 50, 50, 50, 50, 50], { units: '%' }),
      }),
    );
    const [first] = profiles;
    expect(first!.heightAgl[0]).toBeCloseTo(30.48, 4);
    expect(first!.speed[0]).toBeCloseTo(5.14444, 4);
    expect(first!.temperature![0]).toBeCloseTo(293.15, 4);
    expect(first!.pressure![1]).toBeCloseTo(99_000, 1);
    expect(relativeHumidityOf(first!.specificHumidity![0]!, 293.15, 100_000)).toBeCloseTo(0.5, 5);
  });

  it('takes humidity from the mixing ratio, from the dew point, and with an assumed pressure where none is given', async () => {
    const mixing = await read(grid({ mr: floats(['time', 'height'], [10, 10, 10, 10, 10, 10], { units: 'g kg-1' }) }));
    expect(mixing.profiles[0]!.specificHumidity![0]).toBeCloseTo(0.01 / 1.01, 7);
    const dew = await read(grid({ td: floats(['time', 'height'], [280, 280, 280, 280, 280, 280], { units: 'K' }) }));
    // Pressure at 40 m of the US Standard Atmosphere 1976, by its own formula: 100845 Pa.
    expect(dew.profiles[0]!.specificHumidity![0]).toBeCloseTo(specificHumidityOfDewPoint(280, 100_845), 6);
    expect(dew.profiles[0]!.notes[0]).toContain('standard atmosphere');
  });

  it('unpacks, and takes fills, defaults and what lies outside the valid range as missing', async () => {
    const { profiles } = await read(
      grid({
        wind_speed: {
          type: 'i2',
          dimensions: ['time', 'height'],
          data: [100, 200, -1, -32767, 5000, 300],
          attributes: { units: 'm s-1', scale_factor: [0.1], add_offset: [1], missing_value: [-1], valid_max: [4000] },
        },
      }),
    );
    expect([...profiles[0]!.speed].map((x) => Math.round(x * 1e4) / 1e4)).toEqual([11, 21, NaN]);
    expect([...profiles[1]!.speed].map((x) => Math.round(x * 1e4) / 1e4)).toEqual([NaN, NaN, 31]);
  });

  it('takes undeclared fills as missing and tells so', async () => {
    const { profiles } = await read(
      grid({ wind_speed: floats(['time', 'height'], [1, 1e30, -9999, 4, 5, 6], { units: 'm s-1' }) }),
    );
    expect([...profiles[0]!.speed]).toEqual([1, NaN, NaN]);
    expect(profiles[0]!.notes).toEqual(['wind_speed: 1e+30, -9999 taken as missing, though the file does not say so']);
  });

  it('never takes raw, unscreened or quality variables for the wind', async () => {
    const { codes, problems } = await read(
      grid({
        wind_speed: floats(['time', 'height'], [1, 2, 3, 4, 5, 6], {
          units: 'm s-1',
          long_name: 'Non-screened wind speed',
        }),
        wind_speed_raw: floats(['time', 'height'], [1, 2, 3, 4, 5, 6], { units: 'm s-1' }),
        qc_wind_speed: floats(['time', 'height'], [1, 2, 3, 4, 5, 6], { units: '1' }),
      }),
    );
    expect(codes).toEqual(['ingest/netcdf-no-profiles']);
    expect(problems[0]!.what).toContain('No wind was found');
  });

  it('turns a direction the wind blows to, and a downward speed', async () => {
    const { profiles } = await read(
      grid({
        wind_direction: floats(['time', 'height'], [190, 200, 350, 0, 90, 180], {
          units: 'degrees',
          standard_name: 'wind_to_direction',
        }),
        fall: floats(['time', 'height'], [1, 2, 3, 4, 5, 6], {
          units: 'm s-1',
          standard_name: 'downward_air_velocity',
        }),
      }),
    );
    expect([...profiles[0]!.direction]).toEqual([10, 20, 170]);
    expect([...profiles[0]!.verticalSpeed!]).toEqual([-1, -2, -3]);
  });

  it('reads consensus and spectral width by name or by what the long name says', async () => {
    const { profiles, codes } = await read(
      grid({
        spectral_width: floats(['time', 'height'], [50, 60, 70, 80, 90, 100], { units: 'cm/s' }),
        c_h: floats(['time', 'height'], [90, 80, 70, 60, 50, 40], { long_name: 'Consensus of the horizontal wind' }),
        n_h: floats(['time', 'height'], [9, 8, 7, 6, 5, 4], { long_name: 'Consensus number of beams' }),
      }),
    );
    expect(codes).toEqual([]);
    expect(profiles[1]!.spectralWidth![2]).toBeCloseTo(1, 6);
    expect(profiles[1]!.consensus![2]).toBeCloseTo(0.4, 6);
    expect((await read(grid())).profiles[0]!).toMatchObject({ consensus: null, spectralWidth: null });
  });

  it('names the variables of a file without wind, the unit it could not use, and a calendar that is not real', async () => {
    const unit = await read(
      grid({ wind_speed: floats(['time', 'height'], [1, 2, 3, 4, 5, 6], { units: 'furlongs per fortnight' }) }),
    );
    expect(unit.problems[0]!.what).toContain('wind_speed was passed over for its unit "furlongs per fortnight"');
    const calendar = await read(grid({ time: doubles(['time'], [1, 2], { units: HOURS, calendar: '360_day' }) }));
    expect(calendar.problems.map(({ what }) => what).join()).toContain('360_day');
  });

  it('reads several stations of one length, each with its own place', async () => {
    const { profiles } = await read({
      dimensions: { station: 2, time: 1, z: 2, letters: 3 },
      variables: {
        name: {
          type: 'text',
          dimensions: ['station', 'letters'],
          data: 'eiaber',
          attributes: { cf_role: 'timeseries_id' },
        },
        lat: doubles(['station'], [50, 51], { units: 'degrees_north' }),
        lon: doubles(['station'], [8, 9], { units: 'degrees_east' }),
        alt: floats(['station'], [100, 200], { units: 'm', standard_name: 'surface_altitude' }),
        time: doubles(['time'], [1], { units: HOURS }),
        z: floats(['z'], [300, 400], { units: 'm', standard_name: 'altitude', positive: 'up' }),
        u: floats(['station', 'time', 'z'], [3, 0, -3, 1], { units: 'm/s', standard_name: 'eastward_wind' }),
        v: floats(['station', 'time', 'z'], [4, -2, -4, 1], { units: 'm/s', standard_name: 'northward_wind' }),
      },
    });
    expect(profiles.map(({ station }) => station.id)).toEqual(['eia', 'ber']);
    expect([...profiles[0]!.heightAgl]).toEqual([200, 300]);
    expect([...profiles[1]!.heightAgl]).toEqual([100, 200]);
    expect([...profiles[0]!.speed]).toEqual([5, 2]);
    expect(profiles[0]!.direction[0]).toBeCloseTo(216.8699, 3);
    expect(profiles[0]!.direction[1]).toBeCloseTo(0, 6);
  });
});

describe('profiles of differing length', () => {
  const common = {
    lat: doubles(['profile'], [50, 51], { units: 'degrees_north', standard_name: 'latitude' }),
    lon: doubles(['profile'], [8, 9], { units: 'degrees_east', standard_name: 'longitude' }),
    time: doubles(['profile'], [1, 2], { units: HOURS, standard_name: 'time' }),
  };

  it('reads them one after the other (contiguous ragged)', async () => {
    const { profiles, problems } = await read({
      attributes: { featureType: 'profile' },
      dimensions: { profile: 2, obs: 5 },
      variables: {
        ...common,
        rows: { type: 'i4', dimensions: ['profile'], data: [2, 3], attributes: { sample_dimension: 'obs' } },
        z: floats(['obs'], [10, 20, 10, 30, 20], { units: 'm', standard_name: 'height' }),
        ws: floats(['obs'], [1, 2, 3, 5, 4], { units: 'm s-1', standard_name: 'wind_speed' }),
      },
    });
    expect(problems).toEqual([]);
    expect(profiles.map(({ timeMs }) => timeMs)).toEqual([T0 + HOUR, T0 + 2 * HOUR]);
    expect([...profiles[0]!.speed]).toEqual([1, 2]);
    expect([...profiles[1]!.speed]).toEqual([3, 4, 5]);
    expect([...profiles[1]!.heightAgl]).toEqual([10, 20, 30]);
    expect(profiles[1]!.mark[2]! & MARK['out-of-order']).toBeTruthy();
    expect(profiles[1]!.station.latitude).toBe(51);
  });

  it('reads them interleaved (indexed ragged), leaving out levels of no profile', async () => {
    const { profiles } = await read({
      dimensions: { profile: 2, obs: 5 },
      variables: {
        ...common,
        which: {
          type: 'i4',
          dimensions: ['obs'],
          data: [1, 0, 1, 0, 7],
          attributes: { instance_dimension: 'profile' },
        },
        z: floats(['obs'], [10, 10, 20, 20, 30], { units: 'm', standard_name: 'height' }),
        ws: floats(['obs'], [1, 2, 3, 4, 5], { units: 'm s-1', standard_name: 'wind_speed' }),
      },
    });
    expect([...profiles[0]!.speed]).toEqual([2, 4]);
    expect([...profiles[1]!.speed]).toEqual([1, 3]);
  });

  it('reads ascents of several stations, launch time and place from the first level', async () => {
    const { profiles } = await read({
      dimensions: { profile: 2, obs: 4, station: 2, letters: 2 },
      variables: {
        station_name: {
          type: 'text',
          dimensions: ['station', 'letters'],
          data: 'aabb',
          attributes: { cf_role: 'timeseries_id' },
        },
        lat: doubles(['station'], [50, 51], { units: 'degrees_north' }),
        where: { type: 'i4', dimensions: ['profile'], data: [1, 0], attributes: { instance_dimension: 'station' } },
        rows: { type: 'i4', dimensions: ['profile'], data: [2, 2], attributes: { sample_dimension: 'obs' } },
        time: doubles(['obs'], [1, 1.1, 2, 2.1], { units: HOURS }),
        alt: floats(['obs'], [100, 200, 50, 250], { units: 'm', standard_name: 'altitude' }),
        ws: floats(['obs'], [1, 2, 3, 4], { units: 'm s-1', standard_name: 'wind_speed' }),
      },
    });
    expect(profiles.map(({ station }) => station.id)).toEqual(['bb', 'aa']);
    expect(profiles.map(({ station }) => station.latitude)).toEqual([51, 50]);
    expect(profiles.map(({ timeMs }) => timeMs)).toEqual([T0 + HOUR, T0 + 2 * HOUR]);
    expect([...profiles[1]!.heightAgl]).toEqual([0, 200]);
    expect(profiles[0]!.instrument).toBe('radiosonde');
  });
});

describe('other ways of laying profiles down', () => {
  it('joins variables that carry their height in their names, whatever else they have', async () => {
    const common = { units: 'm s-1', standard_name: 'wind_speed' };
    const { profiles, problems } = await read({
      dimensions: { time: 2 },
      variables: {
        time: doubles(['time'], [1, 2], { units: HOURS }),
        ws_80m: floats(['time'], [8, 9], common),
        ws_40m: floats(['time'], [6, -9999], { ...common, missing_value: [-9999] }),
        ws_40m_std: floats(['time'], [1, 1], { units: 'm s-1' }),
        wd_80m: floats(['time'], [270, 280], { units: 'degree' }),
        temp_2m: floats(['time'], [10, 11], { units: 'degC' }),
        height_80: floats([], [80], { units: 'm', standard_name: 'height' }),
      },
    });
    expect(problems).toEqual([]);
    expect([...profiles[0]!.heightAgl]).toEqual([2, 40, 80]);
    expect([...profiles[0]!.speed]).toEqual([NaN, 6, 8]);
    expect([...profiles[1]!.speed]).toEqual([NaN, NaN, 9]);
    expect([...profiles[1]!.direction]).toEqual([NaN, NaN, 280]);
    expect(profiles[0]!.temperature![0]).toBeCloseTo(283.15, 3);
  });

  it('tells a table of times and heights in one long row from an ascent', async () => {
    const table = (height: number[]): FileParts => ({
      dimensions: { index: 6 },
      variables: {
        time: doubles(['index'], [1, 1, 1, 2, 2, 2], { units: HOURS }),
        height: floats(['index'], height, { units: 'm', standard_name: 'height' }),
        speed: floats(['index'], [1, 2, 3, 4, 5, 6], { units: 'm s-1' }),
      },
    });
    const many = await read(table([10, 20, 30, 10, 20, 40]));
    expect(many.profiles.map(({ timeMs }) => timeMs)).toEqual([T0 + HOUR, T0 + 2 * HOUR]);
    expect([...many.profiles[1]!.heightAgl]).toEqual([10, 20, 40]);
    expect([...many.profiles[1]!.speed]).toEqual([4, 5, 6]);
    const one = await read(table([10, 20, 30, 40, 50, 60]));
    expect(one.profiles).toHaveLength(1);
    expect(one.profiles[0]!.levelCount).toBe(6);
  });

  it('leaves out what only pads the shorter profiles of a grid', async () => {
    const { profiles } = await read({
      dimensions: { profile: 2, level: 3 },
      variables: {
        time: doubles(['profile'], [1, 2], { units: HOURS }),
        height: floats(['profile', 'level'], [10, 20, 30, 10, 1e30, 1e30], {
          units: 'm',
          _FillValue: Float32Array.of(1e30),
        }),
        speed: floats(['profile', 'level'], [1, 2, 3, 4, 1e30, 1e30], {
          units: 'm s-1',
          _FillValue: Float32Array.of(1e30),
        }),
      },
    });
    expect(profiles.map(({ levelCount }) => levelCount)).toEqual([3, 1]);
    expect([...profiles[1]!.speed]).toEqual([4]);
    expect(profiles[0]!.notes).toEqual(['height does not say what it is counted from: taken as above ground']);
  });

  it('guesses the unit of numbers without one by their range, and tells so', async () => {
    const { profiles } = await read(
      grid({
        wind_speed: floats(['time', 'height'], [1, 2, 3, 4, 5, 6]),
        temp: floats(['time', 'height'], [10, 11, 12, 13, 14, 15]),
        pres: floats(['time', 'height'], [1000, 995, 990, 1000, 995, 990]),
      }),
    );
    expect(profiles[0]!.temperature![0]).toBeCloseTo(283.15, 3);
    expect(profiles[0]!.pressure![0]).toBeCloseTo(100_000, 1);
    expect(profiles[0]!.notes).toEqual([
      'wind_speed has no unit: taken as speed m/s',
      'pres has no unit: taken as pressure hPa',
      'temp has no unit: taken as temperature °C',
    ]);
  });
});

describe('long files', () => {
  it('come in pieces that together hold every profile', async () => {
    const times = 3000;
    const gates = 500;
    const speed = Float32Array.from({ length: times * gates }, (_, k) => (k % 97) / 4);
    const { blocks } = await readBytes(
      'made.nc',
      buildClassic({
        dimensions: { time: times, height: gates },
        variables: {
          time: doubles(
            ['time'],
            Array.from({ length: times }, (_, k) => k / 6),
            { units: HOURS },
          ),
          height: floats(
            ['height'],
            Array.from({ length: gates }, (_, k) => 10 + k),
            { units: 'm', standard_name: 'height' },
          ),
          wind_speed: { type: 'f4', dimensions: ['time', 'height'], data: speed, attributes: { units: 'm s-1' } },
        },
      }),
    );
    expect(blocks.length).toBeGreaterThan(1);
    const all = blocks.flatMap((block) => [...block.speed]);
    expect(all.length).toBe(speed.length);
    expect(all.every((value, k) => value === speed[k])).toBe(true);
    expect(blocks.flatMap((block) => [...block.timeMs]).at(-1)).toBe(T0 + ((times - 1) / 6) * HOUR);
  });
});
