import { describe, expect, it } from 'vitest';
import { Desk } from '../../src/desk/index.ts';
import { BlockBuilder, type ProfileBlock } from '../../src/profile/index.ts';
import { PLAIN_SITE, type Site } from '../../src/site/index.ts';

const HOUR = 3_600_000;
const START = Date.UTC(2024, 0, 31, 22);
const station = { id: 'plain', name: 'Plain', latitude: 38, longitude: 0, elevation: 600 };
const feed = 'plain/lidar';

/** Two turbines that yield 100 kW for each m/s up to 2 MW. */
const site: Site = {
  ...PLAIN_SITE,
  turbines: [
    {
      name: 'Invented',
      count: 2,
      hubHeight: 100,
      rotorDiameter: 120,
      powerCurve: { speed: [0, 20, 25], powerKw: [0, 2000, 2000], airDensity: 1.225 },
      cutIn: 0,
      rated: 20,
      cutOut: 22,
      restart: 18,
      groundElevation: NaN,
    },
  ],
};

/** An hour each of these uniform winds. */
function record(speeds: readonly number[], stepMs = HOUR): ProfileBlock {
  const builder = new BlockBuilder();
  const heights = Array.from({ length: 12 }, (_, k) => 20 + 20 * k);
  speeds.forEach((speed, k) =>
    builder.add({
      station,
      source: 'a',
      instrument: 'lidar',
      timeMs: START + k * stepMs,
      periodS: stepMs / 1000,
      levels: { heightAgl: heights, speed: heights.map(() => speed), direction: heights.map(() => 200) },
    }),
  );
  return builder.finish();
}

describe('the farm over a record', () => {
  it('sums energy by day, with hours that stand for themselves', () => {
    const desk = new Desk(site);
    desk.accept(record([5, 5, 5, 10, 10, 10]));
    const found = desk.farmRecord(feed, START + 5 * HOUR)!;
    expect([...found.hubKw]).toEqual([1000, 1000, 1000, 2000, 2000, 2000]);
    expect(found.sumsBy).toBe('day');
    // 22 and 23 UTC and midnight, which ends the day, then three hours of the next.
    expect(found.sums.map(({ startMs, hours }) => [new Date(startMs).toISOString().slice(0, 10), hours])).toEqual([
      ['2024-01-31', 3],
      ['2024-02-01', 3],
    ]);
    expect(found.sums[0]!.equivalentMwh).toBeCloseTo(3, 6);
    expect(found.sums[1]!.hubMwh).toBeCloseTo(6, 6);
    expect(found.sums[1]!.actualMwh).toBeNaN();
  });

  it('sums a long record by month and remembers a stop in high wind', () => {
    const desk = new Desk(site);
    desk.accept(record([5, 23, 19, 17, 5], 20 * 24 * HOUR));
    const found = desk.farmRecord(feed, Infinity)!;
    expect(found.sumsBy).toBe('month');
    // Stopped at 23 m/s, it waits for less than 18.
    expect([...found.hubKw]).toEqual([1000, 0, 0, 3400, 1000]);
  });

  it('looks at nothing later than the moment', () => {
    const desk = new Desk(site);
    desk.accept(record([5, 5, 10]));
    expect(desk.farmRecord(feed, START + 1.5 * HOUR)!.timeMs).toHaveLength(2);
    expect(desk.farmRecord('elsewhere/lidar', START)).toBeNull();
  });
});

describe('a farm’s actual output', () => {
  const STEP = 600_000;
  const speeds = Array.from({ length: 30 }, (_, k) => 5 + 0.2 * k);
  const times = Float64Array.from(speeds, (_, k) => START + k * STEP);
  const reported = (share: number): Float64Array => Float64Array.from(speeds, (speed) => 200 * speed * share);

  it('stands beside what is reckoned, and gives the factor between them with what it rests on', () => {
    const desk = new Desk(site);
    desk.accept(record(speeds, STEP));
    desk.acceptOutput('farm.csv', times, reported(0.9));
    const { actual, output } = desk.night(START + 29 * STEP, { feed })!.farm;
    expect(actual!.sources).toEqual(['farm.csv']);
    expect(actual!.powerKw.at(-1)).toBeCloseTo(0.9 * output.equivalentKw.at(-1)!, 3);
    expect(actual!.fit).toMatchObject({ used: 30, why: '' });
    expect(actual!.fit.factor).toBeCloseTo(0.9, 4);
    expect(actual!.fit.uncertainty).toBeLessThan(1e-4);
    expect(desk.farmRecord(feed, Infinity)!.sums.reduce((sum, { actualMwh }) => sum + actualMwh, 0)).toBeGreaterThan(0);
  });

  it('fits the same factor whatever factor the site reckons with already', () => {
    const desk = new Desk({ ...site, farmFactor: 0.8 });
    desk.accept(record(speeds, STEP));
    desk.acceptOutput('farm.csv', times, reported(0.9));
    expect(desk.night(START + 29 * STEP, { feed })!.farm.actual!.fit.factor).toBeCloseTo(0.9, 4);
  });

  it('says why there is no factor out of a few times, and nothing where no output is open', () => {
    const desk = new Desk(site);
    desk.accept(record(speeds, STEP));
    expect(desk.night(START + 5 * STEP, { feed })!.farm.actual).toBeNull();
    desk.acceptOutput('farm.csv', times, reported(0.9));
    expect(desk.night(START + 5 * STEP, { feed })!.farm.actual!.fit.why).toContain('only 6 times');
  });

  it('ends the same whichever of two files came first', () => {
    const night = (order: readonly string[]) => {
      const desk = new Desk(site);
      desk.accept(record(speeds, STEP));
      for (const name of order) desk.acceptOutput(name, times, reported(name === 'a.csv' ? 0.5 : 0.9));
      return desk.night(START + 29 * STEP, { feed })!.farm.actual!;
    };
    expect(night(['a.csv', 'b.csv'])).toEqual(night(['b.csv', 'a.csv']));
    expect(night(['a.csv', 'b.csv']).fit.factor).toBeCloseTo(0.9, 4);
  });
});
