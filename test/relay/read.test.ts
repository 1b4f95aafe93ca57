import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { demo, duskveer } from './command-line.ts';

const folder = mkdtempSync(join(tmpdir(), 'duskveer-read-'));
afterAll(() => rmSync(folder, { recursive: true }));

const LIDAR = demo('plains/larkmoor-lidar.nc');
interface ReadLine {
  readonly station: string;
  readonly time: string;
  readonly levels: Record<string, (number | null | string)[]>;
}

describe('read', () => {
  it('prints a line a profile with the keys of the contract', async () => {
    const ran = await duskveer(['read', LIDAR]);
    expect(ran).toMatchObject({ code: 0, err: '' });
    const lines = ran.lines();
    // 41 hours of ten minutes, less 5 and 9 in the two outages (demo-profiles/README.md).
    expect(lines).toHaveLength(41 * 6 + 1 - 5 - 9);
    const first = lines[0] as unknown as ReadLine;
    expect(Object.keys(first)).toEqual(
      'station name lat lon elevation_m time period_s instrument source levels notes'.split(' '),
    );
    expect(first).toMatchObject({
      station: 'larkmoor-lidar',
      lat: 38.2,
      lon: -99.4,
      elevation_m: 640,
      time: '2024-05-21T21:00:00Z',
      period_s: 600,
      instrument: 'lidar',
      source: LIDAR,
    });
    expect(Object.keys(first.levels).join(' ')).toBe(
      'height_agl_m height_amsl_m pressure_pa speed_mps direction_deg vertical_speed_mps temperature_k dewpoint_k mark',
    );
    for (const column of Object.values(first.levels)) expect(column).toHaveLength(57);
    expect(first.levels.height_agl_m!.slice(0, 3)).toEqual([30, 50, 70]);
    expect(first.levels.height_amsl_m![0]).toBe(670);
    // The highest gates have no echo: missing is null, in a column that is otherwise there.
    expect(first.levels.speed_mps).toContain(null);
    expect(first.levels.speed_mps).toContainEqual(expect.any(Number));
  });

  it('reads stdin as it reads a file', async () => {
    const [piped, named] = await Promise.all([duskveer(['read', '-'], readFileSync(LIDAR)), duskveer(['read', LIDAR])]);
    expect(piped.code).toBe(0);
    expect(piped.out.replaceAll('"source":"stdin"', `"source":"${LIDAR}"`)).toBe(named.out);
  });

  it('reads what can be read, says what cannot, and exits with 3', async () => {
    const broken = join(folder, 'broken.nc');
    writeFileSync(broken, readFileSync(LIDAR).subarray(0, 300));
    const ran = await duskveer(['read', join(folder, 'missing.nc'), broken, LIDAR]);
    expect(ran.code).toBe(3);
    expect(ran.lines().length).toBeGreaterThan(200);
    expect(ran.err).toContain(`${join(folder, 'missing.nc')}: There is no such file or folder.`);
    expect(ran.err).toContain(broken);
  });

  it('places stations by the list that is named, and says which of its rows it cannot use', async () => {
    const bulletin = 'TTAA 15121 10999 99995 14656 18005 00088 ///// ///// 92745 10620 19511 85455 06850 20514=';
    const list = join(folder, 'stations.csv');
    writeFileSync(list, 'identifier,name,latitude,longitude,elevation_ft\n10999,Fenmoor,52.5,8.25,1000\n');
    const placed = await duskveer(['read', '-', '--stations', list], bulletin);
    expect(placed).toMatchObject({ code: 0, err: '' });
    // 1000 ft are 304.8 m.
    const place = { station: '10999', name: 'Fenmoor', lat: 52.5, lon: 8.25, elevation_m: 304.8 };
    expect(placed.lines()).toMatchObject([place]);

    writeFileSync(list, 'identifier,name,latitude,longitude\n10999,Fenmoor,north,8.25\n10998,Highfen,52,8\n');
    const partly = await duskveer(['read', '-', '--stations', list], bulletin);
    expect(partly.code).toBe(3);
    expect(partly.err).toContain(`${list}, line 2`);
    expect(partly.lines()).toMatchObject([{ station: '10999', lat: null }]);

    const none = await duskveer(['jets', LIDAR, '--stations', LIDAR]);
    expect(none.code).toBe(2);
    expect(none.err).toContain('no list of stations');
  });

  it('takes all files of a folder and passes over those that are no data', async () => {
    const night = join(folder, 'night');
    mkdirSync(join(night, 'deeper'), { recursive: true });
    writeFileSync(join(night, 'notes.md'), '# Notes\n');
    writeFileSync(join(night, '.hidden'), 'x');
    writeFileSync(join(night, 'deeper/lidar.nc'), readFileSync(LIDAR));
    const ran = await duskveer(['read', night]);
    expect(ran.code).toBe(0);
    expect(ran.lines().length).toBeGreaterThan(200);
    expect(ran.err).toContain('notes.md: passed over');
    expect(ran.err).not.toContain('hidden');
  });

  it.each(['csv', 'netcdf', 'coveragejson'])('what leaves as %s comes in again as it was', async (format) => {
    const file = join(folder, `lidar.${format}`);
    expect(await duskveer(['read', LIDAR, '--to', format, '--out', file])).toMatchObject({ code: 0, out: '', err: '' });
    const [before, after] = await Promise.all([duskveer(['read', LIDAR]), duskveer(['read', file])]);
    const winds = (ran: typeof before): unknown[] =>
      (ran.lines() as unknown as ReadLine[]).map(({ station, time, levels }) => [
        station,
        time,
        levels.height_agl_m,
        levels.speed_mps,
        levels.direction_deg,
        levels.temperature_k,
      ]);
    expect(winds(after)).toEqual(winds(before));
  });

  it('says when the file cannot be written, and which formats there are', async () => {
    const out = join(folder, 'nowhere/lidar.csv');
    const failed = await duskveer(['read', LIDAR, '--to', 'csv', '--out', out]);
    expect(failed.code).toBe(1);
    expect(failed.err).toContain('The output could not be written');
    const unknown = await duskveer(['read', LIDAR, '--to', 'stone']);
    expect(unknown.code).toBe(2);
    expect(unknown.err).toContain('Known: csv, netcdf, coveragejson.');
  });

  it('called without a path, or with an unknown option, exits with 2 and says how', async () => {
    expect(await duskveer(['read'])).toMatchObject({ code: 2, out: '' });
    const { code, err } = await duskveer(['read', '--fast', LIDAR]);
    expect(code).toBe(2);
    expect(err).toContain('There is no option --fast.');
    expect(err).toContain('duskveer read --help');
  });

  it('ends quietly when whoever reads the output has had enough', async () => {
    const launcher = new URL('../../src/relay/duskveer.mjs', import.meta.url).pathname;
    const child = spawn(process.execPath, [launcher, 'read', ...new Array<string>(40).fill(LIDAR)]);
    let err = '';
    child.stderr.on('data', (piece: Buffer) => (err += piece.toString()));
    await once(child.stdout, 'data');
    child.stdout.destroy();
    expect(await once(child, 'close')).toEqual([0, null]);
    expect(err.replace(/^Building .*\n/, '')).toBe('');
  });
});
