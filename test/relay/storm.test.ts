import { describe, expect, it } from 'vitest';
import { sharedIsHere, sharedPath } from '../support/shared.ts';
import { demo, duskveer } from './command-line.ts';

interface StormLine extends Record<string, unknown> {
  readonly parcels: Record<string, string | number | null>[];
}

describe('storm', () => {
  it('prints a line a profile with the keys of the contract, null where data end too low', async () => {
    const ran = await duskveer(['storm', demo('storm/dry-fork.nc')]);
    expect(ran).toMatchObject({ code: 0, err: '' });
    const line = ran.lines()[50] as StormLine;
    expect(Object.keys(line).join(' ')).toBe(
      'station time status why air_from air_age_s parcels shear_0_1km_mps shear_0_3km_mps shear_0_6km_mps srh_0_1km_m2_per_s2 ' +
        'srh_0_3km_m2_per_s2 motion clusters',
    );
    expect(line.parcels.map((parcel) => parcel.start)).toEqual([
      'surface-based',
      'mixed-layer',
      'most-unstable',
      'jet-fed',
    ]);
    expect(Object.keys(line.parcels[0]!).join(' ')).toBe(
      'start start_pressure_pa lcl_pressure_pa lfc_pressure_pa el_pressure_pa cape_j_per_kg cin_j_per_kg',
    );
    expect(line).toMatchObject({
      status: 'partly',
      shear_0_6km_mps: null,
      shear_0_1km_mps: expect.any(Number) as number,
    });
    expect(line.why).toContain('6000 m are needed');
  });

  it('joins the wind of the profiler with the air of the sounding beside it', async () => {
    const ran = await duskveer(['storm', demo('storm')]);
    const line = ran.lines().find(({ station, time }) => station === 'ashwillow' && time === '2024-06-28T06:30:00Z')!;
    // Launched at 05:30 from the same place; the neighbours' radiometers are newer but 120 km away.
    expect(line).toMatchObject({ air_from: 'ashwillow-sonde', air_age_s: 3600 });
    const parcels = (line as StormLine).parcels;
    expect(parcels.find((parcel) => parcel.start === 'most-unstable')!.cape_j_per_kg).toBeGreaterThan(500);
  });

  it('reckons helicity with the motion that is given', async () => {
    const helicity = async (...options: string[]): Promise<unknown> =>
      (await duskveer(['storm', ...options, demo('storm/dry-fork.nc')])).lines()[50]!.srh_0_1km_m2_per_s2;
    expect(await helicity()).toBeNull();
    expect(await helicity('--motion', '10,5')).toEqual(expect.any(Number));
    // A storm that moves westward: its first number begins like an option.
    expect(await helicity('--motion', '-3,5')).toEqual(await helicity('--motion=-3,5'));
  });

  it.each(['fast', '10,'])('refuses the motion "%s"', async (motion) => {
    const { code, err } = await duskveer(['storm', `--motion=${motion}`, demo('storm/dry-fork.nc')]);
    expect(code).toBe(2);
    expect(err).toContain('--motion needs two numbers');
  });

  it.skipIf(!sharedIsHere)('gives finite numbers for every whole real sounding', async () => {
    const ran = await duskveer(['storm', sharedPath('real/radiosonde-netcdf')]);
    expect(ran.code).toBe(0);
    const whole = ran.lines().filter((line) => line.status === 'ok') as StormLine[];
    expect(whole.length).toBeGreaterThan(5);
    for (const line of whole)
      for (const parcel of line.parcels) expect(parcel.cape_j_per_kg).toEqual(expect.any(Number));
  });
});
