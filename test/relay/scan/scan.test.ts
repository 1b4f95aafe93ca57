import { chmodSync, mkdtempSync, readdirSync, readFileSync, rmSync, truncateSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { parquetReadObjects } from 'hyparquet';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { duskveer } from '../command-line.ts';
import { killMidway, resultBytes } from './kill-midway.ts';
import { dayName, dayTable, writeDays } from './made-files.ts';

const folder = mkdtempSync(join(tmpdir(), 'duskveer-scan-'));
afterAll(() => rmSync(folder, { recursive: true }));

const days = join(folder, 'days');
const OPTIONS = ['--criteria', 'whiteman-1997', '--hub', '110', '--diameter', '120'];
const scan = (out: string, ...more: string[]): ReturnType<typeof duskveer> =>
  duskveer(['scan', days, '--out', join(folder, out), ...OPTIONS, ...more]);

const bytesOf = (out: string): Record<string, string> => resultBytes(join(folder, out));

const csv = (out: string, table: string): Record<string, string>[] => {
  const [heading, ...lines] = readFileSync(join(folder, out, `${table}.csv`), 'utf8')
    .trimEnd()
    .split('\n');
  const names = heading!.split(',');
  return lines.map((line) => Object.fromEntries(line.split(',').map((value, k) => [names[k]!, value])));
};

beforeAll(async () => {
  writeDays(days, 8);
  expect(await scan('whole', '--workers', '1')).toMatchObject({ code: 0 });
}, 120_000);

describe('scan', () => {
  it('writes a row a profile, a night and a jet, doubled profiles once', () => {
    const profiles = csv('whole', 'profiles');
    expect(profiles).toHaveLength(8 * 144 + 1);
    expect(new Set(profiles.map(({ time }) => time)).size).toBe(profiles.length);
    const withJet = profiles.filter(({ status }) => status === 'jet');
    expect(withJet.length).toBeGreaterThan(200);
    expect(csv('whole', 'jets')).toHaveLength(withJet.length);
    const nights = csv('whole', 'nights');
    expect(nights.map(({ night }) => night)).toEqual(
      [28, 1, 2, 3, 4, 5, 6, 7, 8].map((day) => `2023-0${day === 28 ? 2 : 3}-${String(day).padStart(2, '0')}`),
    );
    expect(nights[3]).toMatchObject({ station: 'north-plain', profiles: '144', assessable: '144', kind: 'night' });
  });

  it('tells what every column means', () => {
    const about = JSON.parse(readFileSync(join(folder, 'whole/columns.json'), 'utf8')) as {
      tables: Record<string, { name: string; meaning: string }[]>;
    };
    for (const table of ['profiles', 'jets', 'nights', 'problems']) {
      const heading = readFileSync(join(folder, `whole/${table}.csv`), 'utf8').split('\n', 1)[0];
      expect(about.tables[table]!.map(({ name }) => name).join(',')).toBe(heading);
      for (const { meaning } of about.tables[table]!) expect(meaning).not.toBe('');
    }
  });

  it('writes the same into Parquet, as another reader reads it', async () => {
    for (const table of ['profiles', 'jets', 'nights', 'problems']) {
      const bytes = readFileSync(join(folder, `whole/${table}.parquet`));
      const file = bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.length);
      const rows = (await parquetReadObjects({ file })) as Record<string, unknown>[];
      const expected = csv('whole', table);
      expect(rows).toHaveLength(expected.length);
      rows.forEach((row, k) => {
        for (const [name, value] of Object.entries(row)) expect(inCsv(value, expected[k]![name]!), name).toBe(true);
      });
    }
  });

  it('comes to the same bytes with more threads', async () => {
    expect(await scan('threads', '--workers', '3')).toMatchObject({ code: 0 });
    expect(bytesOf('threads')).toEqual(bytesOf('whole'));
  });

  it('goes on where it was killed and comes to the same bytes', async () => {
    const args = ['scan', days, '--out', join(folder, 'killed'), ...OPTIONS, '--workers', '1'];
    expect(await killMidway(args, join(folder, 'killed'), 2)).toBeLessThan(8);
    const parts = join(folder, 'killed/parts');
    // As if the journal had been cut in the middle of a line, and a part in the middle of its bytes.
    writeFileSync(join(parts, 'journal.jsonl'), '{"part":"torn', { flag: 'a' });
    const { code, err } = await scan('killed', '--workers', '2');
    expect(code).toBe(0);
    expect(err).toMatch(/8 files, [1-7] of them to read/);
    expect(bytesOf('killed')).toEqual(bytesOf('whole'));
  });

  it('reads nothing again when nothing changed, and only what did', async () => {
    const again = await scan('threads');
    expect(again.err).toContain('8 files, 0 of them to read');
    writeFileSync(join(days, `${dayName(3)}.csv`), dayTable(3, 144, 1));
    try {
      expect((await scan('threads')).err).toContain('8 files, 1 of them to read');
      expect(bytesOf('threads')).not.toEqual(bytesOf('whole'));
    } finally {
      writeFileSync(join(days, `${dayName(3)}.csv`), dayTable(3, 144));
    }
    const other = await duskveer(['scan', days, '--out', join(folder, 'threads'), '--criteria', 'baas-2009']);
    expect(other.err).toMatch(/8 files to read/);
    expect(csv('threads', 'profiles')[0]).not.toHaveProperty('hub_110_m_diameter_120_m_rews_mps');
  });

  it('makes a damaged part again', async () => {
    await scan('damaged');
    const [part] = readdirSync(join(folder, 'damaged/parts')).filter((name) => name.endsWith('.part'));
    const path = join(folder, 'damaged/parts', part!);
    const before = bytesOf('damaged');
    const spoiled = readFileSync(path);
    spoiled[spoiled.length >> 1]! ^= 255;
    writeFileSync(path, spoiled);
    expect((await scan('damaged')).code).toBe(0);
    expect(bytesOf('damaged')).toEqual(before);
    truncateSync(path, 100);
    expect((await scan('damaged')).code).toBe(0);
    expect(bytesOf('damaged')).toEqual(before);
  });

  it('lists what cannot be read, goes on, and says so by its exit code', async () => {
    const mixed = join(folder, 'mixed');
    writeDays(mixed, 2, 24);
    writeFileSync(join(mixed, 'README.txt'), 'Not a table.');
    expect(await duskveer(['scan', mixed, '--out', join(mixed, 'out')])).toMatchObject({ code: 0 });
    writeFileSync(join(mixed, 'broken.nc'), Buffer.concat([Buffer.from('CDF\u0001'), Buffer.alloc(40, 255)]));
    const missing = join(folder, 'missing.csv');
    const ran = await duskveer(['scan', mixed, missing, '--out', join(mixed, 'out')]);
    expect(ran.code).toBe(3);
    expect(ran.lines()[0]).toMatchObject({ files: 4, unread: 2, profiles: 49 });
    const problems = csv('mixed/out', 'problems');
    expect(problems.map(({ file }) => file!.slice(folder.length))).toEqual([
      '/missing.csv',
      '/mixed/README.txt',
      '/mixed/broken.nc',
    ]);
    expect(problems.map((row) => Object.values(row).at(-1))).toEqual(['yes', 'no', 'yes']);
    // Asked again, it tells the same without reading again.
    expect((await duskveer(['scan', mixed, missing, '--out', join(mixed, 'out')])).code).toBe(3);
  });

  it.skipIf(process.getuid?.() === 0)('tries again what could not be reached', async () => {
    const locked = join(folder, 'locked');
    writeDays(locked, 1, 24);
    const path = join(locked, `${dayName(0)}.csv`);
    chmodSync(path, 0);
    expect((await duskveer(['scan', locked, '--out', join(folder, 'locked-out')])).code).toBe(3);
    chmodSync(path, 0o644);
    expect((await duskveer(['scan', locked, '--out', join(folder, 'locked-out')])).code).toBe(0);
  });

  it('ends in good order when it finds nothing', async () => {
    const ran = await duskveer(['scan', join(folder, 'nothing'), '--out', join(folder, 'empty')]);
    expect(ran.code).toBe(3);
    expect(ran.lines()[0]).toMatchObject({ files: 0, unread: 1, profiles: 0, nights: 0 });
    expect(csv('empty', 'profiles')).toHaveLength(0);
  });

  it.each([
    [['scan', 'x'], '--out'],
    [['scan', '--out', 'y'], 'at least one file'],
    [['scan', '-', '--out', 'y'], 'stdin'],
    [['scan', 'x', '--out', 'y', '--workers', '0'], '--workers'],
    [['scan', 'x', '--out', 'y', '--workers', '1.5'], 'whole number'],
    [['scan', 'x', '--out', 'y', '--criteria', 'best'], 'There are no criteria named best'],
    [['scan', 'x', '--out', 'y', '--hub', '100'], 'go together'],
    [['scan', 'x', '--out', fileURLToPath(import.meta.url)], 'cannot be made'],
  ])('called wrongly with %j, says how', async (args, words) => {
    const { code, out, err } = await duskveer(args);
    expect([code, out]).toEqual([2, '']);
    expect(err).toContain(words);
  });
});

/** Whether a value out of Parquet is what the CSV says: 32-bit numbers and times to the digits written. */
function inCsv(value: unknown, text: string): boolean {
  if (value === null || value === undefined) return text === '';
  if (value instanceof Date) return value.getTime() === Date.parse(text);
  if (typeof value === 'boolean') return text === (value ? 'yes' : 'no');
  if (typeof value === 'number') return Math.abs(value - Number(text)) <= 0.051 && text !== '';
  return value === text;
}
