import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
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

describe('rotor with several instruments of one place', () => {
  it('joins mast and lidar, says so, and tells each time once', async () => {
    const site = demo('plains/site.json');
    const ran = await duskveer(['rotor', '--site', site, LIDAR, demo('plains/larkmoor-mast.csv')]);
    expect(ran.code).toBe(0);
    expect(ran.err).toContain('larkmoor-lidar: mast up to 120 m, lidar above');
    const at = ran.lines().filter((line) => line.time === '2024-05-22T09:00:00Z');
    expect(at.map((line) => [line.station, line.turbine])).toEqual([
      ['larkmoor-lidar', 'Plover 140'],
      ['larkmoor-lidar', 'Curlew 164'],
    ]);
    // The lidar is out from 04:20 to 05:00 UTC (demo-profiles/README.md): the mast speaks alone, and not for the whole disc.
    const out = ran.lines().filter((line) => line.time === '2024-05-22T04:30:00Z');
    expect(out[0]).toMatchObject({ station: 'larkmoor-mast', status: 'not-assessable' });
    const times = ran.lines().map((line) => line.time as string);
    expect(times).toEqual([...times].sort());
  });

  it('remembers a stop in high wind from one profile to the next, in time order whatever the file’s', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'duskveer-rotor-'));
    const site = join(folder, 'site.json');
    const turbine = {
      name: 'A',
      hub_height_m: 100,
      rotor_diameter_m: 120,
      cut_out_mps: 25,
      restart_mps: 20,
      power_curve: { speed_mps: [3, 12, 25], power_kw: [0, 3000, 3000] },
    };
    writeFileSync(site, JSON.stringify({ name: 'x', turbines: [turbine] }));
    const rows = [18, 22, 26, 24].flatMap((speed, k) =>
      [40, 70, 100, 130, 160].map((z) => `2024-01-01T0${3 - k}:00:00Z,${z},${speed},270`),
    );
    const file = join(folder, 'wind.csv');
    writeFileSync(file, ['time,height_agl_m,speed_mps,direction_deg', ...rows].join('\n'));
    const ran = await duskveer(['rotor', '--site', site, '--screens', 'gross', file]);
    // In time 24, 26, 22, 18 m/s: it stops above 25 and starts again below 20.
    expect(ran.lines().map((line) => line.power_kw)).toEqual([3000, 0, 0, 3000]);
    rmSync(folder, { recursive: true });
  });
});
