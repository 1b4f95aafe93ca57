import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { DeskService } from '../../src/board/worker/desk-service.ts';
import type { ArchiveProgress, OpenFile } from '../../src/board/worker/protocol.ts';
import { duskveer } from '../relay/command-line.ts';
import { writeDays } from '../relay/scan/made-files.ts';

const folder = mkdtempSync(join(tmpdir(), 'duskveer-archive-'));
const DAYS = 6;
const HUB = { hubHeight: 110, rotorDiameter: 120 };
const silent = (): void => undefined;

beforeAll(async () => {
  writeDays(join(folder, 'days'), DAYS);
  const args = ['scan', join(folder, 'days'), '--out', join(folder, 'out'), '--criteria', 'whiteman-1997'];
  expect(await duskveer([...args, '--hub', '110', '--diameter', '120'])).toMatchObject({ code: 0 });
}, 120_000);
afterAll(() => rmSync(folder, { recursive: true }));

const table = (name: string): OpenFile => ({ name, blob: new Blob([readFileSync(join(folder, 'out', name))]) });
const CSV = ['profiles.csv', 'nights.csv', 'columns.json'];

describe('tables of a scan on the page', () => {
  it('come to the same as the profiles they were made of', async () => {
    const service = new DeskService();
    service.open({ file: null, disc: HUB });
    const days = Array.from({ length: DAYS }, (_, day) => {
      const name = `plain-00${day}.csv`;
      return { name, blob: new Blob([readFileSync(join(folder, 'days', name))]) };
    });
    await service.read(1, days, silent);
    const [feed] = service.feeds();
    const told: ArchiveProgress[] = [];
    const open = await service.archive(2, feed!.key, 'whiteman-1997', (progress) => told.push(progress));
    const tables = await service.archiveTables(3, CSV.map(table), (progress) => told.push(progress));
    expect(tables.problems).toEqual([]);
    const [a, b] = [open.views[0]!, tables.views[0]!];
    expect([b.key, b.criteria, b.longitude]).toEqual([a.key, 'whiteman-1997', -100.2]);
    expect(b.figures[0]!.assessable).toBe(DAYS * 144 + 1);
    for (const name of ['profiles', 'assessable', 'jets', 'nights', 'nightsWithJet', 'byMonthHour'] as const) {
      expect(b.figures[0]![name], name).toEqual(a.figures[0]![name]);
    }
    expect(b.nights.map(({ night, jets }) => [night, jets])).toEqual(a.nights.map(({ night, jets }) => [night, jets]));
    // From noon to noon: a night lies in two of the files that hold a day each.
    expect(b.nights[1]!.files.map((path) => path.slice(-13))).toEqual(['plain-000.csv', 'plain-001.csv']);
    expect(told.at(-1)).toEqual({ share: 1, current: 'profiles.csv' });
  });

  it('are the same as Parquet, and a table dropped as both counts once', async () => {
    const service = new DeskService();
    const read = async (...names: string[]): Promise<unknown> =>
      (await service.archiveTables(1, names.map(table), silent)).views[0]!.figures[0]!.byMonthHour;
    const csv = await read(...CSV);
    expect(await read('profiles.parquet', 'nights.parquet')).toEqual(csv);
    expect(await read('profiles.parquet', 'profiles.csv', 'nights.csv', 'nights.parquet', 'jets.csv')).toEqual(csv);
  });

  it('are told from files of profiles', async () => {
    const service = new DeskService();
    const names = ['profiles.csv', 'jets.csv', 'nights.csv', 'problems.csv', 'columns.json', 'nights.parquet'];
    expect(await service.areArchiveFiles(names.map(table))).toEqual(names.map(() => true));
    const others = ['{"stations": []}', 'time,height_agl_m,speed_mps', 'PAR1', '', '{'].map((text) => ({
      name: 'x',
      blob: new Blob([text]),
    }));
    expect(await service.areArchiveFiles(others)).toEqual(others.map(() => false));
  });

  it('are read as far as they go, with a word on what is broken', async () => {
    const service = new DeskService();
    const whole = readFileSync(join(folder, 'out/profiles.csv'), 'utf8');
    const cut = { name: 'profiles.csv', blob: new Blob([whole.slice(0, whole.length / 2)]) };
    const report = await service.archiveTables(1, [cut], silent);
    expect(report.problems).toMatchObject([{ code: 'board/table-rows-broken', where: { source: 'profiles.csv' } }]);
    expect(report.problems[0]!.what).toContain('A row of profiles.csv is cut short');
    expect(report.views[0]!.figures[0]!.profiles).toBeGreaterThan(300);

    const bytes = readFileSync(join(folder, 'out/profiles.parquet'));
    bytes.fill(255, 200, 2000);
    const spoiled = { name: 'profiles.parquet', blob: new Blob([bytes]) };
    const broken = await service.archiveTables(1, [spoiled, table('nights.csv')], silent);
    expect(broken.problems).toMatchObject([{ code: 'board/table-unreadable' }]);
    expect(broken.views[0]!.nights.length).toBeGreaterThan(3);
  });

  it('keeps a name with a comma, quotes and a line end whole', async () => {
    const service = new DeskService();
    const nights = readFileSync(join(folder, 'out/nights.csv'), 'utf8');
    const [heading, ...lines] = nights.trimEnd().split('\n');
    const at = heading!.split(',').indexOf('station_name');
    const named = lines.map((line) => {
      const cells = line.split(',');
      cells[at] = '"North ""old"", upper\nplain"';
      return cells.join(',');
    });
    // Long enough for several pieces, most of whose ends stand in a name.
    const many = Array.from({ length: 2000 }, () => named).flat();
    const report = await service.archiveTables(
      1,
      [{ name: 'nights.csv', blob: new Blob([`${[heading, ...many].join('\n')}\n`]) }],
      silent,
    );
    expect(report.problems).toEqual([]);
    expect(report.views).toHaveLength(1);
    expect(report.views[0]).toMatchObject({ stationName: 'North "old", upper\nplain' });
    expect(report.views[0]!.nights).toHaveLength(lines.length);
  });

  it('stop when told to', async () => {
    const service = new DeskService();
    let told = 0;
    const reading = service.archiveTables(7, CSV.map(table), () => {
      told++;
      service.cancel(7);
    });
    expect(await reading).toEqual({ views: [], problems: [], cancelled: true });
    expect(told).toBe(1);
  });

  it('of no feed there is nothing to say', async () => {
    const service = new DeskService();
    service.open({ file: null, disc: HUB });
    expect(await service.archive(1, 'nobody/lidar', '', silent)).toEqual({ views: [], problems: [], cancelled: false });
  });
});
