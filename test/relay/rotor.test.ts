import { describe, expect, it } from 'vitest';
import { demo, duskveer } from './command-line.ts';

const LIDAR = demo('plains/larkmoor-lidar.nc');

describe('rotor', () => {
  it('prints a line a profile with the keys of the contract', async () => {
    const ran = await duskveer(['rotor', '--hub', '105', '--diameter', '140', LIDAR]);
    expect(ran).toMatchObject({ code: 0, err: '' });
    const line = ran.lines().find((candidate) => candidate.time === '2024-05-22T08:40:00Z')!;
    expect(Object.keys(line).join(' ')).toBe(
      'station time turbine status why coverage hub_speed_mps hub_direction_deg rews_mps rews_veer_mps shear_exponent ' +
        'veer_deg nose_in_rotor air_density_kg_per_m3 power_kw power_equivalent_kw',
    );
    // Lowest gate 30 m, lower tip 35 m: the disc is covered whole; the nose has come down into it (demo-profiles/README.md).
    expect(line).toMatchObject({ status: 'ok', why: '', coverage: 1, nose_in_rotor: true, power_kw: null });
    const before = ran.lines().find((candidate) => candidate.time === '2024-05-22T06:00:00Z')!;
    expect(before).toMatchObject({ status: 'ok', nose_in_rotor: false });
    expect(line.veer_deg).toEqual(expect.any(Number));
  });

  it('does not guess where the levels do not cover the disc', async () => {
    const ran = await duskveer(['rotor', '--hub', '105', '--diameter', '140', demo('storm/ashwillow.nc')]);
    const [line] = ran.lines();
    expect(line).toMatchObject({ status: 'not-assessable', rews_mps: null, shear_exponent: null });
    expect(line!.why).toMatch(/covered/);
  });

  it.each([
    [['--hub', '100'], 'go together'],
    [[], 'It needs a disc'],
    [['--hub', '40', '--diameter', '120'], 'more than the hub height'],
    [['--hub', 'tall', '--diameter', '120'], '--hub needs a number'],
  ])('called with %j says what is wrong', async (options, words) => {
    const { code, err } = await duskveer(['rotor', ...options, LIDAR]);
    expect(code).toBe(2);
    expect(err).toContain(words);
  });
});
