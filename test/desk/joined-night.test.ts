import { describe, expect, it } from 'vitest';
import { Desk } from '../../src/desk/index.ts';
import {
  BlockBuilder,
  type Instrument,
  type LevelInput,
  type ProfileBlock,
  type Station,
} from '../../src/profile/index.ts';
import { PLAIN_SITE, type Site } from '../../src/site/index.ts';
import { sharedIsHere } from '../support/shared.ts';
import { nightLevels, type NightSource } from '../rotor/support.ts';

const START = Date.UTC(2024, 4, 21, 22);
const STEP = 600_000;
const mastPlace: Station = { id: 'mast', name: 'Mast', latitude: 38.2, longitude: -99.4, elevation: 640 };
const lidarPlace: Station = { ...mastPlace, id: 'lidar', name: 'Lidar', latitude: 38.203 };

const site: Site = {
  ...PLAIN_SITE,
  turbines: [
    {
      name: 'Invented',
      count: 1,
      hubHeight: 120,
      rotorDiameter: 150,
      powerCurve: null,
      cutIn: NaN,
      rated: NaN,
      cutOut: NaN,
      restart: NaN,
      groundElevation: NaN,
    },
  ],
};

function series(station: Station, instrument: Instrument, levels: (k: number) => LevelInput, count = 20): ProfileBlock {
  const builder = new BlockBuilder();
  for (let k = 0; k < count; k++) {
    builder.add({ station, source: station.id, instrument, timeMs: START + k * STEP, periodS: 600, levels: levels(k) });
  }
  return builder.finish();
}

const MAST = [20, 40, 60, 80, 100, 120];
const LIDAR = Array.from({ length: 20 }, (_, k) => 50 + 25 * k);
const wind = (heights: readonly number[], direction: number, more = 0): LevelInput => ({
  heightAgl: heights,
  speed: heights.map((z) => 6 + z / 40 + more),
  direction: heights.map(() => direction),
});

function desk(lidarDirection: number, lidarStation = lidarPlace, more = 0): Desk {
  const made = new Desk(site);
  made.accept(series(lidarStation, 'lidar', () => wind(LIDAR, lidarDirection, more)));
  made.accept(series(mastPlace, 'mast', () => wind(MAST, 200)));
  return made;
}
const END = START + 19 * STEP;

describe('instruments at one place', () => {
  it('are joined by height, the better one winning, whichever of them is looked at', () => {
    const both = desk(200);
    for (const feed of ['lidar/lidar', 'mast/mast']) {
      const night = both.night(END, { feed })!;
      expect(night.join!.parts.map(({ feed: { instrument }, bottom, top }) => [instrument, bottom, top])).toEqual([
        ['mast', 20, 120],
        ['lidar', 150, 525],
      ]);
      expect(night.discs[0]!.winds.at(-1)).toMatchObject({ status: 'ok', coverage: 1 });
      expect([...new Set(night.faces[0]!.slices.map((slice) => slice.instrument))]).toEqual(['mast', 'lidar']);
    }
  });

  it('show a steady difference of direction and do not read it as veer', () => {
    const night = desk(212).night(END, { feed: 'lidar/lidar' })!;
    const [found] = night.join!.disagreements;
    expect(found!.known.direction).toBeCloseTo(12, 3);
    expect(found!.known).toMatchObject({ steadyDirection: true, times: 20 });
    expect(night.discs[0]!.winds.at(-1)!.veer).toBeCloseTo(0, 3);
    expect(night.join!.words[0]).toContain('turned to fit, not read as veer');
  });

  it('that disagree by more than they can are told of, and neither is averaged into the other', () => {
    const night = desk(200, lidarPlace, 5).night(END, { feed: 'lidar/lidar' })!;
    const [found] = night.join!.disagreements;
    expect(found!.known).toMatchObject({ beyondUncertainty: true, steadySpeed: true, steadyDirection: false });
    // The hub stands on the mast's top: its speed is the mast's own, 6 + 120/40 m/s.
    expect(night.discs[0]!.winds.at(-1)!.hubSpeed).toBeCloseTo(9, 4);
  });

  it('stay apart when they stand apart or at different times', () => {
    expect(desk(200, { ...lidarPlace, latitude: 38.5 }).night(END, { feed: 'lidar/lidar' })!.join).toBeNull();
    const late = new Desk(site);
    late.accept(series(lidarPlace, 'lidar', () => wind(LIDAR, 200)));
    late.accept(series(mastPlace, 'mast', () => wind(MAST, 200), 5));
    const { join, discs } = late.night(END, { feed: 'lidar/lidar' })!;
    // Only the lidar measured at the end.
    expect(join!.parts.map(({ feed }) => feed.instrument)).toEqual(['lidar']);
    expect(discs[0]!.winds.at(-1)!.coverage).toBeLessThan(1);
  });

  it('end the same in whatever order they came', () => {
    const reversed = new Desk(site);
    reversed.accept(series(mastPlace, 'mast', () => wind(MAST, 200)));
    reversed.accept(series(lidarPlace, 'lidar', () => wind(LIDAR, 212)));
    const question = { feed: 'lidar/lidar' };
    expect(reversed.night(END, question)).toEqual(desk(212).night(END, question));
  });
});

describe.skipIf(!sharedIsHere)('the real night, mast and radar as two instruments of one place', () => {
  const place: Station = { id: 'mast', name: 'Mast', latitude: 33.6105, longitude: -102.0505, elevation: 1021 };
  const block = (station: Station, source: NightSource, instrument: Instrument): ProfileBlock => {
    const builder = new BlockBuilder();
    for (const [time, levels] of nightLevels([source])) {
      const timeMs = Date.parse(`${time.replace(' ', 'T')}Z`);
      builder.add({ station, source, instrument, timeMs, periodS: 600, levels });
    }
    return builder.finish();
  };

  it('measures the radar nine to eleven degrees beyond the mast and keeps it out of the veer', () => {
    const made = new Desk(site);
    made.accept(block(place, 'tower', 'mast'));
    made.accept(block({ ...place, id: 'radar' }, 'low-mode', 'radar'));
    const night = made.night(Date.UTC(2013, 10, 9, 8), { feed: 'radar/radar' })!;
    const [found] = night.join!.disagreements;
    expect([found!.better.instrument, found!.worse.instrument]).toEqual(['mast', 'radar']);
    expect(found!.known.steadyDirection).toBe(true);
    for (const { direction, count } of found!.known.byHeight) {
      if (count < 30) continue;
      expect(direction).toBeGreaterThan(8);
      expect(direction).toBeLessThan(12);
    }
    expect(night.join!.parts.map(({ feed }) => feed.instrument)).toEqual(['mast', 'radar']);
    expect(night.join!.words[0]).toContain('not read as veer');
  });
});
