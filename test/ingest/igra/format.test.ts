import { gzipSync } from 'node:zlib';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { specificHumidityOfDewPoint, specificHumidityOfRelative } from '../../../src/air/index.ts';
import { bytesSource, readProfiles, type ReadOptions } from '../../../src/ingest/index.ts';
import { profileAt } from '../../../src/profile/index.ts';
import { PLAIN_SITE } from '../../../src/site/index.ts';
import { igraText, type IgraLevel, type IgraSounding } from '../../support/make-igra.ts';
import { readShared, readSharedJson, sharedIsHere } from '../../support/shared.ts';
import { bytesOf, pieces, readToEnd } from '../../support/sources.ts';

const NOTHING: IgraLevel = {
  major: 2,
  minor: 0,
  pressure: null,
  height: null,
  temperature: null,
  relative: null,
  depression: null,
  direction: null,
  speed: null,
};
const SOUNDING: IgraSounding = {
  id: 'XXM00010999',
  year: 2010,
  month: 6,
  day: 1,
  hour: 0,
  release: 2303,
  latitude: 52.5,
  longitude: -8.25,
  levels: [
    {
      ...NOTHING,
      major: 2,
      minor: 1,
      pressure: 99_500,
      height: 130,
      temperature: 146,
      depression: 60,
      direction: 180,
      speed: 51,
    },
    {
      ...NOTHING,
      major: 1,
      pressure: 92_500,
      height: 745,
      temperature: 106,
      relative: 875,
      direction: 195,
      speed: 110,
    },
    { ...NOTHING, pressure: 70_000, height: 3025, temperature: -11, depression: 130, direction: 210, speed: 180 },
    { ...NOTHING, major: 3, height: 1000, direction: 200, speed: 120 },
  ],
};

const read = (
  text: string | Uint8Array,
  options: Partial<ReadOptions> = {},
  length = 1 << 16,
): ReturnType<typeof readToEnd> =>
  readToEnd(readProfiles(pieces('a.txt', typeof text === 'string' ? bytesOf(text) : text, length), options));

describe.skipIf(!sharedIsHere)('the real archive file', () => {
  interface Expected {
    soundings: {
      stationId: string;
      latitude: number;
      longitude: number;
      elevationM: number;
      releaseTime: string;
      data?: (number | null)[][];
      maxWindBelow3000M?: { speed: number; heightAboveStationM: number; direction: number };
    }[];
  }

  it('gives every level of the independently decoded sounding', async () => {
    const { block, problems, formats } = await read(readShared('real/igra/USM00070026-data.txt'));
    expect(formats).toEqual(['igra']);
    // The file ends with a header that announces 147 levels and has none.
    expect(problems.map(({ code, where }) => [code, where.line])).toEqual([['ingest/igra-cut-short', 318]]);
    const { soundings } = readSharedJson('real/expected/igra/USM00070026-data.json') as Expected;
    expect(block.profileCount).toBe(2);
    expect([...block.timeMs]).toEqual(soundings.slice(0, 2).map(({ releaseTime }) => Date.parse(releaseTime)));
    const [first] = soundings;
    const profile = profileAt(block, 0);
    expect(profile.station).toMatchObject({
      id: first!.stationId,
      latitude: first!.latitude,
      longitude: first!.longitude,
      elevation: first!.elevationM,
    });
    expect(profile.levelCount).toBe(158);
    const winds = first!.maxWindBelow3000M!;
    let nose = 0;
    for (let k = 1; k < profile.levelCount && profile.heightAgl[k]! <= 3000; k++) {
      if (profile.speed[k]! > profile.speed[nose]!) nose = k;
    }
    expect(profile.speed[nose]).toBeCloseTo(winds.speed, 4);
    expect(profile.heightAgl[nose]).toBe(winds.heightAboveStationM);
    expect(profile.direction[nose]).toBe(winds.direction);

    const rows = first!.data!.map(([, , , pressure, height, temperature, dewPoint, relative, speed, direction]) => ({
      pressure: pressure!,
      height: height!,
      temperature: temperature!,
      dewPoint: dewPoint!,
      relative: relative!,
      speed: speed!,
      direction: direction!,
    }));
    rows.sort((a, b) => a.height - b.height);
    const near = (got: number, wanted: number | null, allowed: number, label: string): void => {
      if (wanted === null) expect(got, label).toBeNaN();
      else expect(Math.abs(got - wanted), label).toBeLessThanOrEqual(allowed);
    };
    rows.forEach((row, k) => {
      const label = `level ${k}`;
      near(profile.heightAgl[k]! + 12, row.height, 0.01, label);
      near(profile.pressure![k]!, row.pressure, 0.01, label);
      near(profile.temperature![k]!, row.temperature, 0.0001, label);
      near(profile.speed[k]!, row.speed, 0.0001, label);
      near(profile.direction[k]!, row.direction, 0.0001, label);
      const humidity = row.dewPoint === null ? null : specificHumidityOfDewPoint(row.dewPoint, row.pressure);
      near(profile.specificHumidity![k]!, humidity, 1e-6 * (humidity ?? 0), label);
    });
  });
});

describe('IGRA version 2', () => {
  it('gives launch time, place, sorted levels, humidity of either kind', async () => {
    const { block, problems } = await read(igraText(SOUNDING));
    expect(problems).toEqual([]);
    const profile = profileAt(block, 0);
    expect(new Date(profile.timeMs).toISOString()).toBe('2010-05-31T23:03:00.000Z');
    expect(profile.station).toEqual({
      id: 'XXM00010999',
      name: 'XXM00010999',
      latitude: 52.5,
      longitude: -8.25,
      elevation: 130,
    });
    expect(profile.instrument).toBe('radiosonde');
    expect([...profile.heightAgl]).toEqual([0, 615, 870, 2895]);
    expect([...profile.speed].map((speed) => Math.round(speed * 10))).toEqual([51, 110, 120, 180]);
    expect(profile.specificHumidity![0]).toBeCloseTo(specificHumidityOfDewPoint(281.75, 99_500), 7);
    expect(profile.specificHumidity![1]).toBeCloseTo(specificHumidityOfRelative(0.875, 283.75, 92_500), 7);
    expect(profile.specificHumidity![2]).toBeNaN();
  });

  it.each([
    ['the day itself', 12, 1107, '2010-06-01T11:07:00.000Z'],
    ['the day before', 0, 2303, '2010-05-31T23:03:00.000Z'],
    ['the day after', 23, 15, '2010-06-02T00:15:00.000Z'],
    ['no release', 12, 9999, '2010-06-01T12:00:00.000Z'],
    ['no minutes of release', 12, 1199, '2010-06-01T11:00:00.000Z'],
    ['no hour', 99, 1107, '2010-06-01T11:07:00.000Z'],
  ])('time: %s', async (_, hour, release, expected) => {
    const { block } = await read(igraText({ ...SOUNDING, hour, release }));
    expect(new Date(block.timeMs[0]!).toISOString()).toBe(expected);
  });

  it('leaves out soundings without a time and says so', async () => {
    const { block, problems } = await read(igraText({ ...SOUNDING, hour: 99, release: 9999 }) + igraText(SOUNDING));
    expect(block.profileCount).toBe(1);
    expect(problems.map(({ code, where }) => [code, where.line])).toEqual([['ingest/igra-time', 1]]);
  });

  it('works out heights of pressure levels that have none, and the place by the WMO number', async () => {
    const levels = SOUNDING.levels.map((level) => (level.pressure === 92_500 ? { ...level, height: null } : level));
    const station = {
      id: 'fenmoor',
      name: 'Fenmoor',
      latitude: 52.6,
      longitude: 8,
      elevation: 125,
      instrument: 'radiosonde' as const,
      aliases: ['10999'],
      speedUncertainty: NaN,
    };
    const { block } = await read(igraText({ ...SOUNDING, levels }), { site: { ...PLAIN_SITE, stations: [station] } });
    const profile = profileAt(block, 0);
    expect(profile.station).toMatchObject({ id: 'fenmoor', latitude: 52.6, elevation: 125 });
    const k = [...profile.pressure!].indexOf(92_500);
    expect(profile.heightAgl[k]).toBeGreaterThan(590);
    expect(profile.heightAgl[k]).toBeLessThan(650);
  });

  it('takes removed values for missing and notes them; a balloon without a thermometer is a pilot balloon', async () => {
    const removed = { ...SOUNDING.levels[1]!, temperature: 'removed' as const };
    const { block } = await read(igraText({ ...SOUNDING, levels: [SOUNDING.levels[0]!, removed] }));
    expect(profileAt(block, 0).notes.join()).toContain("the archive's own checks removed");
    expect(profileAt(block, 0).temperature![1]).toBeNaN();
    expect(profileAt(block, 0).speed[1]).toBe(11);
    const winds = await read(igraText({ ...SOUNDING, levels: [SOUNDING.levels[3]!] }));
    expect(profileAt(winds.block, 0)).toMatchObject({ instrument: 'pilot-balloon' });
    expect(profileAt(winds.block, 0).notes.join()).toContain('taken to lie at sea level');
  });

  it('streams: the same in any pieces, gzipped, with either line end', async () => {
    const text = Array.from({ length: 40 }, (_, k) => igraText({ ...SOUNDING, day: 1 + (k % 28) })).join('');
    const whole = await read(text);
    expect(whole.block.profileCount).toBe(40);
    expect(await read(text, {}, 7)).toEqual(whole);
    expect(await read(text.replace(/\n/gu, '\r\n'), {}, 100)).toEqual(whole);
    const packed = await readToEnd(readProfiles(bytesSource('a.txt', gzipSync(text))));
    expect(packed).toEqual(whole);
  });

  it('hands long files out in several blocks and loses nothing between them', async () => {
    const levels = Array.from({ length: 500 }, (_, k) => ({ ...SOUNDING.levels[3]!, height: 100 + 10 * k, speed: k }));
    const one = bytesOf(igraText({ ...SOUNDING, levels }));
    const text = new Uint8Array(one.length * 230);
    for (let k = 0; k < 230; k++) text.set(one, k * one.length);
    let parts = 0;
    let profiles = 0;
    for await (const { block, problems } of readProfiles(pieces('a.txt', text, 65_536))) {
      expect(problems).toEqual([]);
      if (block.profileCount > 0) parts++;
      for (let index = 0; index < block.profileCount; index++) {
        const { speed, levelCount } = profileAt(block, index);
        if (levelCount !== 500 || speed[499] !== Math.fround(49.9)) throw new Error(`profile ${profiles + index}`);
      }
      profiles += block.profileCount;
    }
    expect(profiles).toBe(230);
    expect(parts).toBeGreaterThan(1);
  });

  it('passes over lines that are none and keeps the rest, however long they are', async () => {
    const text = `${igraText(SOUNDING)}what is this\n${'y'.repeat(300_000)}\n${igraText(SOUNDING)}`;
    for (const length of [1000, 1 << 20]) {
      const { block, problems } = await read(text, {}, length);
      expect(block.profileCount).toBe(2);
      expect(problems).toMatchObject([{ code: 'ingest/igra-line', where: { line: 6 } }]);
      expect(problems[0]!.what).toContain('2 lines');
    }
  });

  it('lets no exception out on spoiled bytes, and stays bounded without line ends (property)', async () => {
    const bytes = bytesOf(igraText(SOUNDING).repeat(3));
    const flips = fc.array(fc.tuple(fc.nat({ max: bytes.length - 1 }), fc.nat({ max: 255 })), { maxLength: 12 });
    await fc.assert(
      fc.asyncProperty(flips, fc.integer({ min: 1, max: bytes.length }), async (changes, length) => {
        const spoilt = bytes.slice(0, length);
        for (const [at, value] of changes) if (at < length) spoilt[at] = value;
        const { block } = await read(spoilt, {}, 64);
        expect(block.heightAgl.every((height) => Number.isNaN(height) || Math.abs(height) < 1e6)).toBe(true);
      }),
      { numRuns: 200 },
    );
    const piece = new Uint8Array(2 ** 20).fill(49);
    const endless = {
      name: 'endless',
      size: undefined,
      // eslint-disable-next-line @typescript-eslint/require-await -- nothing to wait for
      async *stream() {
        yield bytesOf(igraText(SOUNDING));
        for (let k = 0; k < 100; k++) yield piece;
      },
    };
    const { block, problems } = await readToEnd(readProfiles(endless));
    expect(block.profileCount).toBe(1);
    expect(problems.map(({ code }) => code)).toEqual(['ingest/igra-line']);
  });
});
