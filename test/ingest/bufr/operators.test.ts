// Table C operators, replication and compression, each on a small report written bit by bit from the tables.

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DOUBTING, MARK, type Profile } from '../../../src/profile/index.ts';
import { BitWriter, message, type MessageParts } from '../../support/bufr-writer.ts';
import { readBytes } from './support.ts';
import { HEADER, header, level1, LEVELS, report, wind, WIND } from './templates.ts';

async function only(parts: Omit<MessageParts, 'data'> & { data: BitWriter }): Promise<Profile> {
  const { profiles, problems } = await readBytes('x', message(parts));
  expect(problems).toEqual([]);
  expect(profiles).toHaveLength(1);
  return profiles[0]!;
}

const start = (): BitWriter => header(new BitWriter());
const marked = (profile: Profile, mark: keyof typeof MARK): boolean[] =>
  [...profile.mark].map((bits) => (bits & MARK[mark]) !== 0);

describe('operators', () => {
  it('2 01 and 2 02 change width and scale of numbers only, until cancelled', async () => {
    const descriptors = [
      ...HEADER,
      '201132',
      '202129',
      '008042',
      '007007',
      '011001',
      '011002',
      '201000',
      '202000',
      '012101',
    ];
    const data = start().coded(18, 2048).value(320.5, 1, -1000, 21).value(200.5, 1, 0, 13).value(6.54, 2, 0, 16);
    const profile = await only({ descriptors, data: data.value(281.25, 2, 0, 16) });
    expect(profile.heightAgl[0]).toBeCloseTo(200.5, 4);
    expect(profile.direction[0]).toBeCloseTo(200.5, 4);
    expect(profile.speed[0]).toBeCloseTo(6.54, 5);
    expect(profile.temperature![0]).toBeCloseTo(281.25, 4);
  });

  it('2 07 scales reference values too', async () => {
    // Y = 1: one decimal more, reference ten times, floor((10 + 2) / 3) = 4 bits more.
    const data = start().value(320.5, 1, -10_000, 21).value(200, 1, 0, 13).value(6.54, 2, 0, 16);
    const profile = await only({ descriptors: [...HEADER, '207001', '007007', '011001', '011002', '207000'], data });
    expect(profile.heightAgl[0]).toBeCloseTo(200.5, 4);
    expect(profile.speed[0]).toBeCloseTo(6.54, 5);
  });

  it('2 03 gives new reference values, also negative ones, and takes them back', async () => {
    const descriptors = [
      ...HEADER,
      '203012',
      '007007',
      '203255',
      '007007',
      '011001',
      '011002',
      '203000',
      '007007',
      '011002',
    ];
    const data = start().coded(12, 2048 + 500);
    data.value(320, 0, -500, 17).value(200, 0, 0, 9).value(6.5, 1, 0, 12);
    const profile = await only({ descriptors, data: data.value(420, 0, -1000, 17).value(7.5, 1, 0, 12) });
    expect([...profile.heightAgl]).toEqual([200, 300]);
    expect([...profile.speed]).toEqual([6.5, 7.5]);
  });

  it('2 04 puts associated fields before values; their meaning decides', async () => {
    const descriptors = [
      ...HEADER,
      '107000',
      '031001',
      '007007',
      '204002',
      '031021',
      '011001',
      '011002',
      '204000',
      '012101',
    ];
    const data = start().coded(8, 4);
    for (const [k, quality] of [0, 1, 2, 3].entries()) {
      data.value(220 + 100 * k, 0, -1000, 17).coded(6, 2);
      data
        .coded(2, 0)
        .value(200, 0, 0, 9)
        .coded(2, quality)
        .value(6 + k, 1, 0, 12)
        .value(280, 2, 0, 16);
    }
    const profile = await only({ descriptors, data });
    expect([...profile.speed]).toEqual([6, 7, 8, 9]);
    expect(marked(profile, 'source-doubts')).toEqual([false, true, true, false]);
    expect(marked(profile, 'source-rejects')).toEqual([false, false, false, true]);
  });

  it('2 05 text, 2 06 local elements and 2 08 longer texts are passed over or read', async () => {
    const descriptors = ['208004', '001011', '208000', ...HEADER.slice(2), '205003', '206011', '011250', ...WIND];
    const whole = header(new BitWriter());
    const data = new BitWriter().text('GULL', 4);
    // The header without its station number, 17 bits.
    const bits = [...whole.bytes()]
      .map((byte) => byte.toString(2).padStart(8, '0'))
      .join('')
      .slice(17, whole.length);
    for (const bit of bits) data.coded(1, Number(bit));
    const profile = await only({ descriptors, data: wind(data.text('abc', 3).coded(11, 77)) });
    expect(profile.station.id).toBe('GULL');
    expect(profile.levelCount).toBe(4);
  });

  it('2 21 announces elements without data', async () => {
    const descriptors = [...HEADER, '221003', '007007', '011001', '011002', '007007', '011001', '011002'];
    const data = start().value(220, 0, -1000, 17);
    const profile = await only({ descriptors, data: level1(data, { height: 320, direction: 10, speed: 5 }) });
    expect([...profile.heightAgl]).toEqual([100, 200]);
    expect(profile.speed[0]).toBeNaN();
    expect(profile.speed[1]).toBe(5);
  });
});

/** The level section of four levels with its replication factor: 1 + 12 elements. */
const ELEMENTS = 13;

function confidences(data: BitWriter, of: (element: number) => number | null): BitWriter {
  for (let e = 0; e < ELEMENTS; e++) data.coded(7, of(e));
  return data;
}

describe('values about values', () => {
  const bitmap = (data: BitWriter, present: (element: number) => boolean): BitWriter => {
    for (let e = 0; e < ELEMENTS; e++) data.coded(1, present(e) ? 0 : 1);
    return data;
  };

  it('2 22 with a bit-map: low confidence doubts the level of the value it speaks of', async () => {
    const descriptors = [...HEADER, ...WIND, '222000', '101013', '031031', '001031', '001032', '101013', '033007'];
    const data = bitmap(report(), () => true)
      .coded(16, 98)
      .coded(8, 1);
    // Element 6 is the speed of the second level: 1 factor, then three a level.
    const profile = await only({ descriptors, data: confidences(data, (e) => (e === 6 ? 20 : 70)) });
    expect(marked(profile, 'source-doubts')).toEqual([false, true, false, false]);
  });

  it('values that are not present take no confidence', async () => {
    const descriptors = [...HEADER, ...WIND, '222000', '101013', '031031', '101000', '031002', '033007'];
    const present = (e: number): boolean => e === 3 || e === 12;
    const data = bitmap(report(), present).coded(16, 2).coded(7, 70).coded(7, 10);
    const profile = await only({ descriptors, data });
    expect(marked(profile, 'source-doubts')).toEqual([false, false, false, true]);
  });

  it('2 36 defines a bit-map, 2 37 uses it again, 2 35 forgets what it relates to', async () => {
    const descriptors = [
      ...[...HEADER, ...WIND],
      ...['222000', '236000', '101013', '031031', '101013', '033007'],
      ...['222000', '237000', '101013', '033007', '237255'],
      ...['235000', '222000', '101002', '031031', '101002', '033007'],
    ];
    const data = confidences(
      bitmap(report(), () => true),
      () => 70,
    );
    confidences(data, (e) => (e === 9 ? 15 : 70));
    // The last two elements before are themselves confidences: doubting them doubts no level.
    const profile = await only({ descriptors, data: data.coded(2, 0).coded(7, 10).coded(7, 10) });
    expect(marked(profile, 'source-doubts')).toEqual([false, false, true, false]);
  });

  it('2 23 substitutes a wind: the first value stays and is rejected; statistics and old values are passed over', async () => {
    const descriptors = [
      ...[...HEADER, ...WIND],
      ...['223000', '236000', '101013', '031031', '101001', '223255'],
      ...['224000', '237000', '008023', '101001', '224255'],
      ...['225000', '237000', '008024', '101001', '225255'],
      ...['232000', '237000', '101001', '232255'],
    ];
    const data = bitmap(report(), (e) => e === 3);
    data.value(9.9, 1, 0, 12).coded(6, 4).value(6, 1, 0, 12).coded(6, 2).coded(13, 5000).value(6.4, 1, 0, 12);
    const profile = await only({ descriptors, data });
    expect(profile.speed[0]).toBeCloseTo(6.5, 5);
    expect(marked(profile, 'source-rejects')).toEqual([true, false, false, false]);
  });

  it('a bit-map longer than the data, and more values than it announces, are damage', async () => {
    const descriptors = [...HEADER, ...WIND, '222000', '101255', '031031', '101001', '033007'];
    const data = report();
    for (let k = 0; k < 255; k++) data.coded(1, 0);
    const long = await readBytes('x', message({ descriptors, data: data.coded(7, 70) }));
    expect(long.problems.map(({ code }) => code)).toEqual(['ingest/bufr-damaged']);
    const more = [...HEADER, ...WIND, '223000', '101013', '031031', '101002', '223255'];
    const short = await readBytes(
      'x',
      message({ descriptors: more, data: bitmap(report(), (e) => e === 3).coded(24, 0) }),
    );
    expect(short.problems.map(({ code }) => code)).toEqual(['ingest/bufr-damaged']);
  });
});

describe('replication', () => {
  it('short, ordinary, extended and fixed', async () => {
    const tails: [string[], (data: BitWriter) => BitWriter, number][] = [
      [['103000', '031000', ...WIND.slice(2)], (data) => data.coded(1, 1), 1],
      [['103000', '031001', ...WIND.slice(2)], (data) => data.coded(8, 3), 3],
      [['103000', '031002', ...WIND.slice(2)], (data) => data.coded(16, 2), 2],
      [['103004', ...WIND.slice(2)], (data) => data, 4],
      [['103000', '031001', ...WIND.slice(2)], (data) => data.coded(8, 0), 0],
    ];
    for (const [tail, factor, count] of tails) {
      const data = factor(start());
      for (let k = 0; k < count; k++) level1(data, LEVELS[k]!);
      const profile = await only({ descriptors: [...HEADER, ...tail], data });
      expect(profile.levelCount).toBe(count);
      if (count === 0) expect(profile.notes).toEqual(['The report holds no level.']);
    }
  });

  it('data that stand once and are repeated', async () => {
    const descriptors = [...HEADER, '007007', '101000', '031011', '011002'];
    const data = start().value(220, 0, -1000, 17).coded(8, 3).value(6.5, 1, 0, 12);
    const { problems } = await readBytes('x', message({ descriptors, data }));
    expect(problems).toEqual([]);
  });
});

describe('compression', () => {
  /** A compressed number: the same for all, or least value and increments. */
  const same = (data: BitWriter, width: number, coded: number | null): BitWriter =>
    data.coded(width, coded).coded(6, 0);

  function columns(
    reports: readonly (readonly (number | null)[])[],
    widths: readonly number[],
    data: BitWriter,
  ): BitWriter {
    widths.forEach((width, e) => {
      const values = reports.map((one) => one[e]!);
      const known = values.filter((value): value is number => value !== null);
      if (known.length === 0) same(data, width, null);
      else if (known.length === values.length && new Set(known).size === 1) same(data, width, known[0]!);
      else {
        const least = Math.min(...known);
        const bits = Math.max(1, Math.ceil(Math.log2(Math.max(...known) - least + 2)));
        data.coded(width, least).coded(6, bits);
        for (const value of values) data.coded(bits, value === null ? null : value - least);
      }
    });
    return data;
  }

  it('reports side by side read as they were coded (property)', async () => {
    const widths = [17, 9, 12];
    const cell = (most: number): fc.Arbitrary<number | null> =>
      fc.option(fc.integer({ min: 0, max: most }), { freq: 5 });
    const one = fc.tuple(fc.integer({ min: 1000, max: 9000 }), cell(359), cell(900));
    const reports = fc
      .integer({ min: 1, max: 4 })
      .chain((count) =>
        fc.array(fc.array(one, { minLength: count, maxLength: count }), { minLength: 1, maxLength: 5 }),
      );
    await fc.assert(
      fc.asyncProperty(reports, async (levels) => {
        const count = levels[0]!.length;
        const head = [99, 321, 2031, 10, 4, 20, 10, 13_725_000, 18_350_000, 520];
        const headWidths = [7, 10, 12, 4, 6, 5, 6, 25, 26, 15];
        const data = columns(
          Array.from({ length: count }, () => head),
          headWidths,
          new BitWriter(),
        );
        same(data, 8, levels.length);
        for (const level of levels) columns(level, widths, data);
        const file = message({ descriptors: [...HEADER, ...WIND], data, compressed: true, reports: count });
        const { profiles, problems } = await readBytes('x', file);
        expect(problems).toEqual([]);
        expect(profiles).toHaveLength(count);
        profiles.forEach((profile, r) => {
          expect(profile.station.elevation).toBe(120);
          const got = [...profile.heightAgl.keys()].map((k) =>
            [profile.heightAgl[k]! + 120, profile.direction[k]!, Math.round(profile.speed[k]! * 10)].join(),
          );
          const want = levels.map((level) => {
            const [height, direction, speed] = level[r]!;
            return [height - 1000, direction ?? NaN, speed ?? NaN].join();
          });
          expect(got.sort()).toEqual(want.sort());
        });
      }),
      { numRuns: 60 },
    );
  });

  it('texts, associated fields and quality, each report its own', async () => {
    const descriptors = [
      ...['001011', ...HEADER.slice(2), '103001', '007007', '204001', '031021', '011002', '204000'].filter(
        (d) => d !== '103001',
      ),
      ...['222000', '101003', '031031', '101003', '033007'],
    ];
    const data = new BitWriter();
    data.coded(36, 0).coded(36, 0).coded(6, 4).text('GULL', 4).text('TERN', 4);
    columns(
      [1, 2].map(() => [2031, 10, 4, 20, 10, 13_725_000, 18_350_000, 520]),
      [12, 4, 6, 5, 6, 25, 26, 15],
      data,
    );
    same(data, 17, 1220);
    same(data, 6, 1);
    data.coded(1, 0).coded(6, 1).coded(1, 0).coded(1, 1);
    data.coded(12, 60).coded(6, 4).coded(4, 0).coded(4, 10);
    for (let e = 0; e < 3; e++) same(data, 1, 0);
    same(data, 7, 70);
    same(data, 7, 70);
    data.coded(7, 20).coded(6, 7).coded(7, 0).coded(7, 50);
    const { profiles, problems } = await readBytes('x', message({ descriptors, data, compressed: true, reports: 2 }));
    expect(problems).toEqual([]);
    expect(profiles.map(({ station }) => station.id)).toEqual(['GULL', 'TERN']);
    expect(profiles.map(({ speed }) => speed[0])).toEqual([6, 7]);
    // The first by its confidence of 20, the second by its associated field.
    expect(profiles.map(({ mark }) => (mark[0]! & DOUBTING) !== 0)).toEqual([true, true]);
  });

  it('counts that differ between the reports are damage', async () => {
    const data = new BitWriter();
    columns(
      [1, 2].map(() => [99, 321, 2031, 10, 4, 20, 10, 13_725_000, 18_350_000, 520]),
      [7, 10, 12, 4, 6, 5, 6, 25, 26, 15],
      data,
    );
    data.coded(8, 1).coded(6, 2).coded(2, 0).coded(2, 1);
    const { problems } = await readBytes(
      'x',
      message({
        descriptors: [...HEADER, ...WIND],
        data: data.coded(40, 0).coded(40, 0),
        compressed: true,
        reports: 2,
      }),
    );
    expect(problems.map(({ code }) => code)).toEqual(['ingest/bufr-damaged']);
  });
});
