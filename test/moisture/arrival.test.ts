import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { arrivalOf, findSurges, scoreArrivals, type Arrival, type WayWind } from '../../src/moisture/index.ts';
import type { Station } from '../../src/profile/index.ts';

const NOW = Date.UTC(2031, 6, 15, 2, 0);
const PER_DEGREE = 6_371_000 * (Math.PI / 180);
const at = (id: string, latitude: number, longitude = 0): Station => ({
  id,
  name: id,
  latitude,
  longitude,
  elevation: 300,
});
const south = at('SOUTH', 0);
const middle = at('MIDDLE', 1);
const here = at('HERE', 2);
const wind = (station: Station, u: number, v: number, uncertainty = 1): WayWind => ({
  station,
  timeMs: NOW,
  u,
  v,
  uncertainty,
});
const hours = (ms: number): number => (ms - NOW) / 3_600_000;

describe('arrivalOf', () => {
  it('is distance over wind for a steady wind, bounds by the wind one standard deviation faster and slower', () => {
    const arrival = arrivalOf(south, here, [wind(south, 0, 15)], NOW);
    const distance = 2 * PER_DEGREE;
    expect(arrival.status).toBe('on-its-way');
    expect(hours(arrival.arrivesMs)).toBeCloseTo(distance / 15 / 3600, 9);
    expect(hours(arrival.earliestMs)).toBeCloseTo(distance / 16 / 3600, 9);
    expect(hours(arrival.latestMs)).toBeCloseTo(distance / 14 / 3600, 9);
    expect(arrival.missBy).toBeCloseTo(0, 3);
    expect(arrival.speed).toBeCloseTo(15, 9);
  });

  it('follows the change along the way where several stations measure: ln 2/(V2 - V1) times the distance', () => {
    const arrival = arrivalOf(south, here, [wind(here, 0, 20), wind(south, 0, 10)], NOW);
    expect(arrival.measuredAt).toEqual(['SOUTH', 'HERE']);
    expect(hours(arrival.arrivesMs)).toBeCloseTo((2 * PER_DEGREE * Math.LN2) / 10 / 3600, 6);
    const single = arrivalOf(south, here, [wind(south, 0, 15)], NOW);
    expect(arrival.latestMs - arrival.earliestMs).toBeGreaterThan(single.latestMs - single.earliestMs);
  });

  it('lies between what the fastest and the slowest wind alone would give (property)', () => {
    const speed = fc.double({ min: 4, max: 30, noNaN: true });
    fc.assert(
      fc.property(speed, speed, speed, (a, b, c) => {
        const all = arrivalOf(south, here, [wind(south, 0, a), wind(middle, 0, b), wind(here, 0, c)], NOW);
        const alone = (v: number): number => hours(arrivalOf(south, here, [wind(south, 0, v)], NOW).arrivesMs);
        expect(hours(all.arrivesMs)).toBeLessThanOrEqual(alone(Math.min(a, b, c)) + 1e-6);
        expect(hours(all.arrivesMs)).toBeGreaterThanOrEqual(alone(Math.max(a, b, c)) - 1e-6);
        expect(all.earliestMs).toBeLessThanOrEqual(all.arrivesMs);
        expect(all.latestMs).toBeGreaterThanOrEqual(all.arrivesMs);
      }),
    );
  });

  it('leaves out stations off the way', () => {
    const aside = at('ASIDE', 1, 1.5);
    expect(arrivalOf(south, here, [wind(south, 0, 15), wind(aside, 0, 3)], NOW).measuredAt).toEqual(['SOUTH']);
  });

  it('says by how much air blown askew misses, and when it passes by', () => {
    const askew = arrivalOf(south, here, [wind(south, 15 * Math.tan(Math.PI / 18), 15)], NOW);
    expect(askew.status).toBe('on-its-way');
    // To the right of the way north is east.
    expect(askew.missBy / (2 * PER_DEGREE)).toBeCloseTo(Math.tan(Math.PI / 18), 3);
    const past = arrivalOf(south, here, [wind(south, 15, 5)], NOW);
    expect(past).toMatchObject({ status: 'passes-by', why: 'the wind blows 72° off the way' });
    expect(arrivalOf(south, here, [wind(south, 0, -10)], NOW)).toMatchObject({ status: 'passes-by' });
  });

  it.each([
    ['the stations have no two positions', south, [wind(south, 0, 15)]],
    ['the stations have no two positions', at('LOST', NaN), [wind(south, 0, 15)]],
    ['no wind at the transport level on the way', here, []],
    ['no wind at the transport level on the way', here, [wind(south, NaN, NaN)]],
    ['the wind along the way is too weak', here, [wind(south, 0, 0.5)]],
  ])('says why it cannot: %s', (why, target, winds) => {
    const arrival = arrivalOf(south, target, winds, NOW);
    expect(arrival).toMatchObject({ status: 'not-assessable', why });
    expect(arrival.arrivesMs).toBeNaN();
  });

  it('has no latest time where the wind may as well stand still', () => {
    expect(arrivalOf(south, here, [wind(south, 0, 2, 3)], NOW).latestMs).toBe(Infinity);
  });
});

describe('findSurges and scoreArrivals', () => {
  const times = Array.from({ length: 25 }, (_, k) => NOW + k * 1_800_000);
  const rising = (from: number, to: number): number[] =>
    times.map((_, k) => 0.01 + 0.003 * Math.max(0, Math.min(1, (k - from) / (to - from))));

  it('dates a surge to the half of its rise', () => {
    const [surge, ...others] = findSurges(times, rising(8, 12));
    expect(others).toEqual([]);
    expect(surge!.timeMs).toBeCloseTo(times[10]!, 3);
    expect(surge!.rise).toBeCloseTo(0.003, 9);
  });

  it('passes over missing values and finds none in level or slowly rising air', () => {
    const gappy = rising(8, 12).map((value, k) => (k % 3 === 0 ? NaN : value));
    expect(findSurges(times, gappy)).toHaveLength(1);
    expect(
      findSurges(
        times,
        times.map(() => 0.01),
      ),
    ).toEqual([]);
    expect(findSurges(times, rising(0, 24), { rise: 0.001, withinS: 3600 })).toEqual([]);
    expect(findSurges([], [])).toEqual([]);
  });

  it('keeps score of what was told against what came', () => {
    const told = (hour: number, halfWidth = 1): Arrival => ({
      ...arrivalOf(south, here, [wind(south, 0, 15)], NOW),
      arrivesMs: NOW + hour * 3_600_000,
      earliestMs: NOW + (hour - halfWidth) * 3_600_000,
      latestMs: NOW + (hour + halfWidth) * 3_600_000,
    });
    const came = [2.5, 7, 20].map((hour) => ({ timeMs: NOW + hour * 3_600_000, rise: 0.002 }));
    const score = scoreArrivals([told(2), told(9, 1), told(14)], came, 3 * 3600);
    expect(score).toEqual({
      hits: 2,
      falseAlarms: 1,
      misses: 1,
      meanErrorS: (0.5 - 2) * 1800,
      meanAbsoluteErrorS: 2.5 * 1800,
      withinBounds: 0.5,
    });
    expect(scoreArrivals([], [], 3600)).toMatchObject({ hits: 0, falseAlarms: 0, misses: 0, withinBounds: NaN });
  });
});
