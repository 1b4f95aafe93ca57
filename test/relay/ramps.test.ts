import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { demo, duskveer } from './command-line.ts';

const folder = mkdtempSync(join(tmpdir(), 'duskveer-ramps-'));
afterAll(() => rmSync(folder, { recursive: true }));
const LIDAR = demo('valley/quill-lidar.nc');

describe('ramps', () => {
  it('tells how the valley jet took the farm up and let it down', async () => {
    const ran = await duskveer(['ramps', '--site', demo('valley/site.json'), LIDAR]);
    expect(ran).toMatchObject({ code: 0, err: '' });
    const [up, down] = ran.lines();
    expect(Object.keys(up!).join(' ')).toBe('station turbine definition start end change_kw change_share cause words');
    // The demo's README: the jet from two hours after sunset (07:54 UTC) to an hour after sunrise (17:48 UTC).
    expect(up).toMatchObject({ station: 'quill-lidar', turbine: 'Dotterel 120' });
    expect(up!.change_share).toBeGreaterThan(0.5);
    expect(Date.parse(up!.start as string)).toBeGreaterThan(Date.parse('2024-02-09T07:54:00Z'));
    expect(down!.change_kw).toBeLessThan(0);
    expect(down!.cause).toBe('jet-decay');
  });

  it('needs turbines with a power curve', async () => {
    expect(await duskveer(['ramps', LIDAR])).toMatchObject({ code: 2 });
    const { code, err } = await duskveer(['ramps', '--site', demo('storm/site.json'), LIDAR]);
    expect(code).toBe(2);
    expect(err).toContain('no turbine with a power curve');
  });
});

describe('--site', () => {
  it('names line, key and mend of everything that is wrong in the file', async () => {
    const site = join(folder, 'site.json');
    writeFileSync(site, '{\n  "name": "x",\n  "turbine": [],\n  "stations": [{ "id": 3 }]\n}\n');
    const { code, out, err } = await duskveer(['rotor', '--site', site, LIDAR]);
    expect(code).toBe(2);
    expect(out).toBe('');
    expect(err).toContain(`${site}, line 3, turbine: `);
    expect(err).toContain(`${site}, line 4, stations[0].id: `);
  });

  it('says when the file is not there', async () => {
    const { code, err } = await duskveer(['read', '--site', join(folder, 'none.json'), LIDAR]);
    expect(code).toBe(2);
    expect(err).toContain('There is no such file or folder.');
  });

  it('gives rotor its turbine types, with power', async () => {
    const ran = await duskveer(['rotor', '--site', demo('plains/site.json'), demo('plains/larkmoor-lidar.nc')]);
    const lines = ran.lines().filter((line) => line.time === '2024-05-22T08:40:00Z');
    expect(lines.map((line) => line.turbine)).toEqual(['Plover 140', 'Curlew 164']);
    // Some 10 and 11 m/s at the hubs, on the steep part of both curves; the nose in the discs takes from what the hub promises.
    for (const line of lines) expect(line.power_equivalent_kw).toBeLessThan(line.power_kw as number);
    expect(lines[0]!.power_kw).toBeGreaterThan(2640);
    expect(lines[0]!.power_kw).toBeLessThan(3920);
  });
});
