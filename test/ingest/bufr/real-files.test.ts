// Every message of the real files against what an independent decoder read from them.

import { describe, expect, it } from 'vitest';
import { dewPointOf } from '../../../src/air/index.ts';
import { DOUBTING, MARK, type Profile } from '../../../src/profile/index.ts';
import { readShared, readSharedJson, sharedIsHere } from '../../support/shared.ts';
import { readBytes } from './support.ts';

interface ExpectedMessage {
  message: number;
  offset: number;
  stationId: string;
  wigosId?: string;
  latitude: number;
  longitude: number;
  elevationM: number | null;
  validTime: string;
  kind: string;
  averagingMinutes?: number | null;
  levels: number;
  levelsWithWind: number;
  levelsWithWindAndHeight: number;
  maxWindBelow3000M: { speed: number; heightAboveStationM: number; direction: number } | null;
  columns?: string[];
  data?: (number | null)[][];
}

const read = (path: string): ReturnType<typeof readBytes> => readBytes(path, readShared(`real/bufr/${path}`));

const INSTRUMENT: Record<string, string> = {
  'wind profiler': 'wind-profiler',
  radiosonde: 'radiosonde',
  pilot: 'pilot-balloon',
};

type Row = (column: string) => number;

/** The level of the profile that a row of the table speaks of; `-1` when there is none. Each level is used once. */
function levelOf(profile: Profile, row: Row, used: Set<number>, elevation: number): number {
  const close = (a: number, b: number, within: number): boolean =>
    Number.isNaN(a) === Number.isNaN(b) && (Number.isNaN(a) || Math.abs(a - b) <= within);
  for (let k = 0; k < profile.levelCount; k++) {
    if (used.has(k)) continue;
    const given = (profile.mark[k]! & MARK['height-worked-out']) === 0 ? profile.heightAgl[k]! : NaN;
    if (
      close(given + elevation, row('heightM'), 0.06) &&
      close(profile.pressure?.[k] ?? NaN, row('pressurePa'), 0.6) &&
      close(profile.speed[k]!, row('windSpeed'), 0.006) &&
      close(profile.direction[k]!, row('windDirection'), 0.06) &&
      close(profile.temperature?.[k] ?? NaN, row('temperatureK'), 0.006)
    ) {
      return k;
    }
  }
  return -1;
}

describe.skipIf(!sharedIsHere)('real BUFR messages', () => {
  const files = [
    'profiler_european',
    'b002_95',
    'b006_96',
    'pilo_91-part1',
    'temp_small',
    'temp-part1',
    'temp_102',
    'IUSD40_OKLI',
    'IUSK73_AMMC_182300',
    'temp_hires',
  ];

  it.each(files)('%s', async (file) => {
    const { messages } = readSharedJson(`real/expected/bufr/${file}.json`) as { messages: ExpectedMessage[] };
    const { profiles, problems } = await read(`${file}.bufr`);
    expect(problems).toEqual([]);
    expect(profiles).toHaveLength(messages.length);
    messages.forEach((want, index) => {
      const got = profiles[index]!;
      const label = `${file}, message ${want.message}`;
      expect(got.station.id, label).toBe(want.stationId);
      if (want.wigosId !== undefined) expect(got.station.name, label).toBe(want.wigosId);
      expect(got.station.latitude, label).toBeCloseTo(want.latitude, 4);
      expect(got.station.longitude, label).toBeCloseTo(want.longitude, 4);
      if (want.elevationM !== null) expect(got.station.elevation, label).toBeCloseTo(want.elevationM, 5);
      expect(new Date(got.timeMs).toISOString().replace('.000', ''), label).toBe(want.validTime);
      expect(got.instrument, label).toBe(INSTRUMENT[want.kind]);
      if (typeof want.averagingMinutes === 'number') expect(got.periodS).toBe(Math.abs(want.averagingMinutes) * 60);
      expect(got.levelCount, label).toBe(want.levels);

      const windLevels = [...got.speed.keys()].filter((k) => !Number.isNaN(got.speed[k]!));
      expect(windLevels.length, label).toBe(want.levelsWithWind);
      const placed = windLevels.filter(
        (k) => !Number.isNaN(got.heightAgl[k]!) && (got.mark[k]! & MARK['height-worked-out']) === 0,
      );
      expect(placed.length, label).toBe(want.levelsWithWindAndHeight);
      if (want.maxWindBelow3000M !== null) {
        const low = placed.filter((k) => got.heightAgl[k]! <= 3000);
        const fastest = low.reduce((best, k) => (got.speed[k]! > got.speed[best]! ? k : best), low[0]!);
        expect(got.speed[fastest]!, label).toBeCloseTo(want.maxWindBelow3000M.speed, 1);
        expect(Math.abs(got.heightAgl[fastest]! - want.maxWindBelow3000M.heightAboveStationM), label).toBeLessThan(0.1);
      }

      const used = new Set<number>();
      for (const cells of want.data ?? []) {
        const row: Row = (column) => cells[want.columns!.indexOf(column)] ?? NaN;
        const k = levelOf(got, row, used, want.elevationM ?? 0);
        expect(k, `${label}: no level like ${JSON.stringify(cells)}`).toBeGreaterThanOrEqual(0);
        used.add(k);
        if (!Number.isNaN(row('dewpointK'))) {
          const dewPoint = dewPointOf(got.specificHumidity![k]!, got.pressure![k]!);
          expect(Math.abs(dewPoint - row('dewpointK')), label).toBeLessThan(0.006);
        }
        if (!Number.isNaN(row('w'))) expect(got.verticalSpeed![k], label).toBeCloseTo(row('w'), 3);
        if (!Number.isNaN(row('signalToNoiseDb'))) expect(got.signal![k], label).toBe(row('signalToNoiseDb'));
        const confidences = ['confPressure', 'confHeight', 'confSpeed', 'confDirection'].map(row);
        const doubted = (got.mark[k]! & (DOUBTING | MARK['source-rejects'])) !== 0;
        if (want.columns!.includes('confHeight')) expect(doubted, label).toBe(confidences.some((c) => c < 50));
      }
    });
  });

  it('names messages of other kinds, counts them and passes them over', async () => {
    const { files: wanted } = readSharedJson('real/expected/bufr/other-kinds.json') as {
      files: { file: string; messageCount: number }[];
    };
    for (const { file, messageCount } of wanted) {
      const { profiles, problems, formats } = await read(`other-kinds/${file}`);
      expect(formats, file).toEqual(new Set(['bufr']));
      expect(profiles, file).toEqual([]);
      expect(problems, file).toHaveLength(1);
      expect(problems[0], file).toMatchObject({ code: 'ingest/bufr-other-kind', mild: true });
      expect(problems[0]!.what, file).toMatch(new RegExp(`^${messageCount} message`));
    }
  });

  it('survives invalid messages and says of each what it is', async () => {
    const several = await read('invalid/multi_invalid_messages.bufr');
    expect(several.profiles).toEqual([]);
    expect(several.problems.map(({ where }) => [where.record, where.byte])).toEqual([
      [1, 0],
      [2, 522],
      [3, 616],
    ]);
    const one = await read('invalid/contrived.bufr');
    expect(one.profiles).toEqual([]);
    expect(one.problems).toHaveLength(1);
    expect(one.problems[0]!.what).toContain('without a profile');
  });
});
