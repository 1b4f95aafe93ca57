// What elements mean: stations, times, instruments, heights, humidity, marks, in templates spelled out by the tests.

import { describe, expect, it } from 'vitest';
import { dewPointOf, saturationVapourPressure } from '../../../src/air/index.ts';
import { MARK, type Profile } from '../../../src/profile/index.ts';
import { PLAIN_SITE, type Site } from '../../../src/site/index.ts';
import { BitWriter, joined, message, type MessageParts } from '../../support/bufr-writer.ts';
import { readBytes } from './support.ts';
import { HEADER, header, report, WIND } from './templates.ts';

async function read(
  parts: Omit<MessageParts, 'data'> & { data: BitWriter },
  site: Site = PLAIN_SITE,
): Promise<Profile[]> {
  const { profiles, problems } = await readBytes('x', message(parts), { site });
  expect(problems).toEqual([]);
  return profiles;
}

const start = (): BitWriter => header(new BitWriter());

/** Identification and launch as 3 01 150, 3 01 111, 3 01 113, 3 01 114 have them. */
function sonde(bits: BitWriter, { second = 33, release = 122, ground = 120.4 } = {}): BitWriter {
  bits.value(0, 0, 0, 4).value(20_000, 0, 0, 16).value(7, 0, 0, 16).text('HERON', 16);
  bits.value(99, 0, 0, 7).value(321, 0, 0, 10).text('', 9).value(77, 0, 0, 8).coded(4, null).coded(7, null).coded(4, 7);
  bits.value(18, 0, 0, 5).value(2031, 0, 0, 12).value(10, 0, 0, 4).value(4, 0, 0, 6);
  bits.value(23, 0, 0, 5).value(16, 0, 0, 6).value(second, 0, 0, 6);
  bits.value(47.25, 5, -9_000_000, 25).value(3.5, 5, -18_000_000, 26);
  return bits.value(ground, 1, -4000, 17).value(null, 1, -4000, 17).value(release, 0, -1000, 17).coded(4, null);
}
const SONDE = ['301150', '301111', '301113', '301114'];

interface Ptu {
  time: number;
  significance: number;
  pressure: number | null;
  height: number | null;
  temperature: number | null;
  dewPoint: number | null;
  direction: number | null;
  speed: number | null;
}

/** One level of 3 03 054. */
function ptu(bits: BitWriter, level: Ptu): BitWriter {
  bits.value(level.time, 0, -8192, 15).coded(18, level.significance).value(level.pressure, -1, 0, 14);
  bits.value(level.height, 0, -1000, 17).value(0, 5, -9_000_000, 25).value(0, 5, -18_000_000, 26);
  bits.value(level.temperature, 2, 0, 16).value(level.dewPoint, 2, 0, 16);
  return bits.value(level.direction, 0, 0, 9).value(level.speed, 1, 0, 12);
}

const SURFACE = 1 << 17;
const ASCENT: Ptu[] = [
  {
    time: 0,
    significance: 0,
    pressure: 101_000,
    height: 20,
    temperature: null,
    dewPoint: null,
    direction: null,
    speed: null,
  },
  {
    time: 0,
    significance: SURFACE,
    pressure: 99_800,
    height: 122,
    temperature: 284.5,
    dewPoint: 281.2,
    direction: 150,
    speed: 2.1,
  },
  {
    time: 60,
    significance: 0,
    pressure: 96_200,
    height: null,
    temperature: 286,
    dewPoint: 279,
    direction: 190,
    speed: 14.2,
  },
  {
    time: 120,
    significance: 0,
    pressure: 93_000,
    height: 718,
    temperature: 284,
    dewPoint: 276,
    direction: 200,
    speed: 9,
  },
];

describe('soundings', () => {
  const ascent = (): BitWriter => ASCENT.reduce(ptu, sonde(new BitWriter()).coded(16, ASCENT.length));
  const descriptors = [...SONDE, '101000', '031002', '303054', '101000', '031001', '303051'];
  /** One wind shear group of 3 03 051. */
  const shear = (bits: BitWriter): BitWriter =>
    bits
      .coded(8, 1)
      .value(60, 0, -8192, 15)
      .coded(18, 2048)
      .value(96_200, -1, 0, 14)
      .coded(25, null)
      .coded(26, null)
      .value(12, 1, 0, 12)
      .coded(12, null);

  it('station, WIGOS identifier, launch time, levels; shear is no level', async () => {
    const [profile] = await read({ descriptors, data: shear(ascent()) });
    expect(profile!.station).toEqual({
      id: '99321',
      name: '0-20000-7-HERON',
      latitude: 47.25,
      longitude: 3.5,
      elevation: 120.4,
    });
    expect(profile!.instrument).toBe('radiosonde');
    expect(profile!.timeMs).toBe(Date.UTC(2031, 9, 4, 23, 16, 33));
    expect(profile!.levelCount).toBe(4);
    expect([...profile!.pressure!]).toEqual([101_000, 99_800, 96_200, 93_000]);
    const dewPoints = [1, 2, 3].map((k) => dewPointOf(profile!.specificHumidity![k]!, profile!.pressure![k]!));
    [281.2, 279, 276].forEach((want, k) => expect(dewPoints[k]).toBeCloseTo(want, 3));
  });

  it('below ground is marked; a height left out is worked out from the pressure', async () => {
    const [profile] = await read({ descriptors, data: shear(ascent()) });
    expect((profile!.mark[0]! & MARK['below-ground']) !== 0).toBe(true);
    expect(profile!.mark[1]).toBe(0);
    expect((profile!.mark[2]! & MARK['height-worked-out']) !== 0).toBe(true);
    // Hypsometric: 29.27 m/K x 285.6 K x ln(998/962) above the surface, 1.6 m above the station's ground.
    expect(Math.abs(profile!.heightAgl[2]! - 309)).toBeLessThan(6);
  });

  it('a station of the site file is found by its WIGOS identifier, and is where the site says', async () => {
    const station = {
      id: 'Heron Moss',
      name: 'Heron Moss',
      latitude: 47.2,
      longitude: 3.6,
      elevation: 100,
      instrument: 'radiosonde',
      aliases: ['0-20000-7-HERON'],
      speedUncertainty: NaN,
    } as const;
    const [profile] = await read({ descriptors, data: shear(ascent()) }, { ...PLAIN_SITE, stations: [station] });
    expect(profile!.station).toMatchObject({ id: 'Heron Moss', elevation: 100 });
    expect(profile!.heightAgl[1]).toBe(22);
  });

  it('descents come out ascending, dropsondes as such, pilot balloons without temperature', async () => {
    const down = [...ASCENT].reverse().reduce(ptu, sonde(new BitWriter()).coded(16, ASCENT.length));
    const [descent] = await read({ descriptors: descriptors.slice(0, -3), data: down });
    const heights = [...descent!.heightAgl];
    expect(heights).toEqual([...heights].sort((a, b) => a - b));
    expect((descent!.mark[0]! & MARK['out-of-order']) !== 0).toBe(true);

    const drop = new BitWriter().text('TERN7', 8).value(77, 0, 0, 8).coded(4, null).coded(7, null).coded(4, 7);
    drop.value(18, 0, 0, 5).value(2031, 0, 0, 12).value(10, 0, 0, 4).value(4, 0, 0, 6);
    drop
      .value(23, 0, 0, 5)
      .value(16, 0, 0, 6)
      .value(0, 0, 0, 6)
      .value(47, 5, -9_000_000, 25)
      .value(3, 5, -18_000_000, 26);
    drop.coded(17, null).coded(17, null).value(4000, 0, -1000, 17).coded(4, null).coded(16, 1);
    const [dropped] = await read({
      descriptors: ['301112', '301113', '301114', '101000', '031002', '303054'],
      data: ptu(drop, ASCENT[1]!),
    });
    expect([dropped!.instrument, dropped!.station.id]).toEqual(['dropsonde', 'TERN7']);
    expect(dropped!.station.elevation).toBe(122);
    expect(dropped!.notes.join()).toContain('no station height');

    const pilot = sonde(new BitWriter()).coded(16, 1).value(30, 0, -8192, 15).coded(18, 2048).value(420, 0, -1000, 17);
    pilot.coded(25, null).coded(26, null).value(180, 0, 0, 9).value(7, 1, 0, 12);
    const [balloon] = await read({ descriptors: [...SONDE, '101000', '031002', '303052'], data: pilot });
    expect(balloon!.instrument).toBe('pilot-balloon');
    expect(balloon!.heightAgl[0]).toBeCloseTo(299.6, 3);
  });

  it('relative humidity and mixing ratio serve where there is no dew point', async () => {
    const bits = start().coded(8, 2);
    for (const [pressure, humidity] of [
      [95_000, 60],
      [90_000, 40],
    ] as const) {
      bits
        .value(pressure, -1, 0, 14)
        .value(285, 1, 0, 12)
        .value(humidity, 0, 0, 7)
        .value(180, 0, 0, 9)
        .value(5, 1, 0, 12);
    }
    const [profile] = await read({
      descriptors: [...HEADER, '105000', '031001', '007004', '012001', '013003', '011001', '011002'],
      data: bits,
    });
    const vapour = 0.6 * saturationVapourPressure(285);
    const k = [...profile!.pressure!].indexOf(95_000);
    expect(profile!.specificHumidity![k]).toBeCloseTo((0.622 * vapour) / (95_000 - 0.378 * vapour), 5);
  });
});

describe('wind profilers', () => {
  it('components, vertical speed, signal, uncertainty, quality of the sender', async () => {
    const bits = start().coded(4, 6).value(2, 0, 0, 5).value(-30, 0, -2048, 12).coded(8, 3);
    for (const [k, suspicion] of [0, 1, 3].entries()) {
      bits
        .value(220 + 100 * k, 0, -1000, 17)
        .value(3, 1, -4096, 13)
        .value(0.5, 1, -4096, 13);
      bits.value(4, 1, -4096, 13).value(0.5, 1, -4096, 13).coded(2, suspicion);
      bits.value(-1.25, 2, -4096, 13).coded(2, 1).value(-12, 0, -32, 8);
    }
    const [profile] = await read({
      descriptors: [
        ...HEADER,
        '002003',
        '008021',
        '004025',
        '109000',
        '031001',
        '007007',
        '011003',
        '011110',
        '011004',
        '011111',
        '033002',
        '011006',
        '033002',
        '021030',
      ],
      data: bits,
    });
    expect([profile!.instrument, profile!.periodS]).toEqual(['wind-profiler', 1800]);
    expect(profile!.speed[0]).toBe(5);
    expect(profile!.direction[0]).toBeCloseTo(216.87, 2);
    expect(profile!.verticalSpeed![0]).toBe(-1.25);
    expect(profile!.signal![0]).toBe(-12);
    expect(profile!.speedUncertainty![0]).toBeCloseTo(0.5, 5);
    expect([...profile!.mark].map((bit) => (bit & MARK['source-doubts']) !== 0)).toEqual([false, true, false]);
  });

  it('consensus, as a share of the most that agree, and spectral width', async () => {
    const bits = start().coded(8, 3);
    for (const [k, agreeing] of [8, 10, 4].entries()) {
      bits.value(220 + 100 * k, 0, -1000, 17).coded(16, agreeing);
      bits.value(3, 1, -4096, 13).value(4, 1, -4096, 13);
      bits.coded(16, 2).value(1.5, 1, 0, 8);
    }
    const [profile] = await read({
      descriptors: [...HEADER, '106000', '031001', '007007', '008022', '011003', '011004', '008022', '021017'],
      data: bits,
    });
    // The count before the wind is the wind's.
    expect([...profile!.consensus!].map((share) => Number(share.toFixed(3)))).toEqual([0.8, 1, 0.4]);
    expect([...profile!.spectralWidth!]).toEqual([1.5, 1.5, 1.5]);
  });

  it('levels spelled out one after the other, heights above the station, tests of the sender', async () => {
    const levels = [
      [100, 0],
      [350, 8],
      [600, 2],
    ] as const;
    const bits = start();
    for (const [height, tests] of levels)
      bits.value(height, 0, 0, 15).coded(4, tests).value(3, 1, -4096, 13).value(-4, 1, -4096, 13);
    const [profile] = await read({
      descriptors: [...HEADER, ...levels.flatMap(() => ['007006', '025034', '011003', '011004'])],
      data: bits,
    });
    expect([...profile!.heightAgl]).toEqual([100, 350, 600]);
    expect(profile!.instrument).toBe('wind-profiler');
    expect((profile!.mark[1]! & MARK['source-rejects']) !== 0).toBe(true);
    expect((profile!.mark[2]! & MARK['source-doubts']) !== 0).toBe(true);
  });

  it('reports of two modes become one profile, in which the finer gates count where both reach', async () => {
    const mode = (gates: number[], speed: number): Uint8Array => {
      const bits = start().coded(4, 6).coded(8, gates.length);
      for (const gate of gates) bits.value(gate, 0, -1000, 17).value(200, 0, 0, 9).value(speed, 1, 0, 12);
      return message({
        descriptors: [...HEADER, '002003', '103000', '031001', '007007', '011001', '011002'],
        data: bits,
      });
    };
    const low = mode([220, 320, 420, 520], 8);
    const high = mode([470, 770, 1070], 12);
    for (const order of [
      [low, high],
      [high, low],
    ]) {
      const { profiles, problems } = await readBytes('x', joined(...order));
      expect(problems).toEqual([]);
      expect(profiles).toHaveLength(1);
      expect([...profiles[0]!.heightAgl]).toEqual([100, 200, 300, 350, 400, 650, 950]);
      expect([...profiles[0]!.speed]).toEqual([8, 8, 8, 12, 8, 12, 12]);
      expect([...profiles[0]!.mark].map((bits) => (bits & MARK.doubled) !== 0).indexOf(true)).toBe(3);
      expect([...profiles[0]!.mark].map((bits) => (bits & MARK.doubled) !== 0).lastIndexOf(true)).toBe(3);
      expect(profiles[0]!.notes.join(' ')).toContain('several modes');
    }
    // The same report twice stays two reports: the screens keep the better one.
    expect((await readBytes('x', joined(low, low))).profiles).toHaveLength(2);
  });

  it('two times in the header are a period; a time after levels begins another profile', async () => {
    const time = (bits: BitWriter, minute: number): BitWriter =>
      bits.value(2031, 0, 0, 12).value(10, 0, 0, 4).value(4, 0, 0, 6).value(20, 0, 0, 5).value(minute, 0, 0, 6);
    const bits = new BitWriter().value(99, 0, 0, 7).value(321, 0, 0, 10);
    time(bits, 0);
    time(bits, 30).value(120, 0, -400, 15).coded(8, 1).value(220, 0, -1000, 17).value(5, 1, 0, 12);
    time(bits, 40).coded(8, 1).value(220, 0, -1000, 17).value(6, 1, 0, 12);
    const level = ['102000', '031001', '007007', '011002'];
    const profiles = await read({
      descriptors: ['001001', '001002', '301014', '007001', ...level, '301011', '301012', ...level],
      data: bits,
    });
    expect(profiles.map(({ timeMs }) => new Date(timeMs).getUTCMinutes())).toEqual([30, 40]);
    expect(profiles[0]!.periodS).toBe(1800);
    expect(profiles.map(({ speed }) => speed[0])).toEqual([5, 6]);
  });
});

describe('reports that leave things out', () => {
  it('take the time of the message, and have no heights above ground without a station height', async () => {
    const bits = new BitWriter().value(99, 0, 0, 7).value(321, 0, 0, 10).coded(8, 1);
    bits.value(220, 0, -1000, 17).value(5, 1, 0, 12);
    const [profile] = await read({
      descriptors: ['001001', '001002', '102000', '031001', '007007', '011002'],
      data: bits,
    });
    expect(profile!.timeMs).toBe(Date.UTC(2031, 9, 4, 20, 10));
    expect(profile!.notes.join()).toContain('no time of its own');
    expect(profile!.heightAgl[0]).toBeNaN();
    expect((profile!.mark[0]! & MARK['no-height']) !== 0).toBe(true);
  });

  it('several reports in one message are several profiles', async () => {
    const bits = new BitWriter();
    for (const station of [321, 322, 323]) {
      for (const byte of bitsOf(report(10, station))) bits.coded(1, byte);
    }
    const profiles = await read({ descriptors: [...HEADER, ...WIND], data: bits, reports: 3 });
    expect(profiles.map(({ station }) => station.id)).toEqual(['99321', '99322', '99323']);
  });
});

function bitsOf(writer: BitWriter): number[] {
  return [...writer.bytes()]
    .flatMap((byte) => [7, 6, 5, 4, 3, 2, 1, 0].map((k) => (byte >> k) & 1))
    .slice(0, writer.length);
}
