// Made scans of the kinds that instruments write.

import { describe, expect, it } from 'vitest';
import { MARK, profileAt, type Profile } from '../../../src/profile/index.ts';
import { buildClassic, type FileParts, type VariableParts } from '../netcdf/build-classic.ts';
import { readBytes } from '../netcdf/read-bytes.ts';

interface Ray {
  azimuth: number;
  elevation: number;
  timeS: number;
}

const GATES = 10;
const RADIANS = Math.PI / 180;

/** Eastward 10 m/s a kilometre of height, northward 5, sinking 0.2. */
function velocity({ azimuth, elevation }: Ray, range: number): number {
  const height = (range * Math.sin(elevation * RADIANS)) / 1000;
  const along = 10 * height * Math.sin(azimuth * RADIANS) + 5 * Math.cos(azimuth * RADIANS);
  return along * Math.cos(elevation * RADIANS) - 0.2 * Math.sin(elevation * RADIANS);
}

const cone = (beams: number, elevation: number, startS: number, first = 0): Ray[] =>
  Array.from({ length: beams }, (_, k) => ({
    azimuth: (first + (360 * k) / beams) % 360,
    elevation,
    timeS: startS + k,
  }));

function scan(rays: Ray[], change: (variables: Record<string, VariableParts>) => void = () => undefined): FileParts {
  const f4 = (dimensions: string[], data: number[], attributes: VariableParts['attributes']): VariableParts => ({
    type: 'f4',
    dimensions,
    data,
    attributes,
  });
  const ranges = Array.from({ length: GATES }, (_, k) => 150 + 100 * k);
  const variables: Record<string, VariableParts> = {
    time: {
      type: 'f8',
      dimensions: ['time'],
      data: rays.map(({ timeS }) => timeS),
      attributes: { units: 'seconds since 2024-06-01' },
    },
    range: f4(['range'], ranges, { units: 'meters', standard_name: 'projection_range_coordinate' }),
    azimuth: f4(
      ['time'],
      rays.map(({ azimuth }) => azimuth),
      { units: 'degrees', standard_name: 'ray_azimuth_angle' },
    ),
    elevation: f4(
      ['time'],
      rays.map(({ elevation }) => elevation),
      { units: 'degrees', standard_name: 'ray_elevation_angle' },
    ),
    VEL: f4(
      ['time', 'range'],
      rays.flatMap((ray) => ranges.map((range) => velocity(ray, range))),
      {
        units: 'm/s',
        standard_name: 'radial_velocity_of_scatterers_away_from_instrument',
      },
    ),
    SNR: f4(
      ['time', 'range'],
      rays.flatMap(() => ranges.map(() => 5)),
      { units: 'dB' },
    ),
  };
  change(variables);
  return {
    dimensions: { time: rays.length, range: GATES, sweep: 2, letters: 4 },
    attributes: { title: 'Doppler lidar' },
    variables,
  };
}

async function read(parts: FileParts): Promise<{ profiles: Profile[]; codes: string[] }> {
  const { blocks, problems } = await readBytes('scan.nc', buildClassic(parts));
  const profiles = blocks.flatMap((block) =>
    Array.from({ length: block.profileCount }, (_, index) => profileAt(block, index)),
  );
  return { profiles, codes: problems.map(({ code }) => code) };
}

function expectWind(profile: Profile): void {
  for (let k = 0; k < profile.levelCount; k++) {
    const u = (10 * profile.heightAgl[k]!) / 1000;
    expect(profile.speed[k]!).toBeCloseTo(Math.hypot(u, 5), 4);
    expect(profile.direction[k]!).toBeCloseTo(180 + Math.atan2(u, 5) / RADIANS, 3);
    expect(profile.verticalSpeed![k]!).toBeCloseTo(-0.2, 4);
  }
}

describe('rays of unequal length', () => {
  /** The scan with its gates strung together; every third ray has four gates fewer. */
  const strung = (change: (starts: number[], counts: number[]) => void = () => undefined): FileParts => {
    const rays = cone(36, 60, 0);
    const even = scan(rays);
    const variables = even.variables!;
    const counts = rays.map((_, k) => (k % 3 === 0 ? GATES - 4 : GATES));
    const starts = counts.map((_, k) => counts.slice(0, k).reduce((sum, count) => sum + count, 0));
    const points = counts.reduce((sum, count) => sum + count, 0);
    const take = ({ data, ...rest }: VariableParts): VariableParts => ({
      ...rest,
      dimensions: ['n_points'],
      data: counts.flatMap((count, k) => (data as number[]).slice(k * GATES, k * GATES + count)),
    });
    change(starts, counts);
    const index = (data: number[]): VariableParts => ({ type: 'i4', dimensions: ['time'], data });
    return {
      ...even,
      dimensions: { ...even.dimensions, n_points: points },
      variables: {
        ...variables,
        VEL: take(variables.VEL!),
        SNR: take(variables.SNR!),
        ray_start_index: index(starts),
        ray_n_gates: index(counts),
      },
    };
  };

  it('give the winds of even ones, from fewer beams where some end', async () => {
    const { profiles, codes } = await read(strung());
    expect(codes).toEqual([]);
    expect(profiles).toHaveLength(1);
    expect(profiles[0]!.levelCount).toBe(GATES);
    expectWind(profiles[0]!);
  });

  it('are refused where beginnings and lengths do not fit', async () => {
    for (const change of [
      (starts: number[]) => (starts[5] = 100_000),
      (starts: number[]) => (starts[5] = -1),
      (_: number[], counts: number[]) => (counts[5] = GATES + 1),
    ]) {
      expect((await read(strung(change))).codes).toContain('ingest/scan-rays');
    }
  });
});

describe('conical scans', () => {
  it('finds each turn of a beam that goes round and round', async () => {
    const rays = [...cone(36, 60, 0, 350.3), ...cone(36, 60, 36, 350.4), ...cone(36, 60, 72, 350.2)];
    const { profiles, codes } = await read(scan(rays));
    expect(codes).toEqual([]);
    expect(profiles.map(({ timeMs }) => (timeMs - Date.UTC(2024, 5, 1)) / 1000)).toEqual([35, 71, 107]);
    profiles.forEach(expectWind);
    expect(profiles[0]!.levelCount).toBe(GATES);
    expect(profiles[0]!.notes[0]).toBe('winds from 36 beams at 60 degrees elevation');
    expect(profiles[0]!.mark[0]! & MARK.clutter).not.toBe(0);
    expect(profiles[0]!.mark[3]).toBe(0);
  });

  it('tells the cones of a volume apart, and beams in turn with a vertical one', async () => {
    const volume = await read(scan([...cone(30, 20, 0), ...cone(30, 45, 40), ...cone(30, 70, 80)]));
    expect(volume.profiles).toHaveLength(3);
    volume.profiles.forEach(expectWind);
    const turn = (startS: number): Ray[] =>
      [0, 90, 180, 270, 0].map((azimuth, k) => ({ azimuth, elevation: k === 4 ? 90 : 75, timeS: startS + 5 * k }));
    const inTurn = await read(scan([...turn(0), ...turn(25), ...turn(50)]));
    expect(inTurn.profiles).toHaveLength(3);
    // The vertical beam's gates lie higher than the slanting ones', which the sheared wind of this test does not mind.
    for (const profile of inTurn.profiles) expect(profile.speed[4]).toBeGreaterThan(5);
  });

  it('takes the sweeps of the CF/Radial convention, and passes over those that are no cone', async () => {
    const section = Array.from({ length: 20 }, (_, k): Ray => ({ azimuth: 30, elevation: 2 + 4 * k, timeS: 40 + k }));
    const { profiles, codes } = await read(
      scan([...cone(36, 30, 0), ...section], (variables) => {
        variables.sweep_start_ray_index = { type: 'i4', dimensions: ['sweep'], data: [0, 36] };
        variables.sweep_end_ray_index = { type: 'i4', dimensions: ['sweep'], data: [35, 55] };
        variables.sweep_mode = { type: 'text', dimensions: ['sweep', 'letters'], data: 'ppi\0rhi\0' };
      }),
    );
    expect(profiles).toHaveLength(1);
    expectWind(profiles[0]!);
    expect(codes).toEqual(['ingest/scan-no-cone']);
  });

  it('passes over a stare and a narrow sector', async () => {
    const stare = Array.from({ length: 20 }, (_, k): Ray => ({ azimuth: 30, elevation: 90, timeS: k }));
    const { profiles, codes } = await read(scan(stare));
    expect(profiles).toEqual([]);
    expect(codes).toEqual(['ingest/scan-no-cone']);
  });

  it('turns velocities counted toward the instrument, and angles from the zenith', async () => {
    const { profiles } = await read(
      scan(cone(12, 60, 0), (variables) => {
        variables.VEL!.attributes!.standard_name = 'radial_velocity_of_scatterers_toward_instrument';
        variables.VEL!.data = Array.from(variables.VEL!.data as number[], (value) => -value);
        variables.zenith = {
          ...variables.elevation!,
          data: Array.from(variables.elevation!.data as number[], (value) => 90 - value),
          attributes: { units: 'degree', standard_name: 'sensor_zenith_angle' },
        };
        delete variables.elevation;
      }),
    );
    expectWind(profiles[0]!);
  });

  it('leaves out beams too weak to carry wind, and marks what rests on few', async () => {
    const { profiles } = await read(
      scan(cone(8, 60, 0), (variables) => {
        const signal = variables.SNR!.data as number[];
        const speed = variables.VEL!.data as number[];
        for (let ray = 0; ray < 8; ray++) {
          // Gate 5: three beams of noise; gate 6: all noise.
          if (ray < 3) signal[ray * GATES + 5] = -25;
          signal[ray * GATES + 6] = -25;
          if (ray < 3) speed[ray * GATES + 5] = 17 - 9 * ray;
        }
      }),
    );
    const [profile] = profiles;
    expect(profile!.speed[5]).toBeCloseTo(Math.hypot(10 * profile!.heightAgl[5]! * 1e-3, 5), 3);
    expect(profile!.mark[5]! & MARK['few-beams']).not.toBe(0);
    expect(profile!.speed[6]).toBeNaN();
    expect(profile!.mark[6]! & MARK['low-signal']).not.toBe(0);
  });

  it('without a signal rejects what does not fit a cone', async () => {
    const { profiles } = await read(
      scan(cone(16, 60, 0), (variables) => {
        delete variables.SNR;
        const speed = variables.VEL!.data as number[];
        for (let ray = 0; ray < 16; ray++) speed[ray * GATES + 4] = ((ray * 7919) % 41) - 20;
      }),
    );
    expect(profiles[0]!.mark[4]! & MARK['low-signal']).not.toBe(0);
    expect(profiles[0]!.mark[5]! & MARK['low-signal']).toBe(0);
    expect(profiles[0]!.notes).toContain('no signal in the file: winds are screened by the fit alone');
  });
});
