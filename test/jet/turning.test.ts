import { describe, expect, it } from 'vitest';
import { coriolisParameter } from '../../src/air/index.ts';
import { oscillatingWind, turningAt } from '../../src/jet/index.ts';
import { profileOf } from './support.ts';

const HOUR_MS = 3600_000;

/** Hours of winds every 20 minutes at 100 and 300 m, turning at so many times the inertial rate. */
const nightOf = (latitude: number, times: number, hours: number) =>
  Array.from({ length: 3 * hours }, (_, k) => {
    const oscillation = {
      equilibriumU: 9,
      equilibriumV: 2,
      departureU: -4,
      departureV: 1,
      turning: times * coriolisParameter(latitude),
    };
    const { u, v } = oscillatingWind(oscillation, 1200 * k);
    return profileOf({ heightAgl: [100, 200, 300], u: [u, u, u], v: [v, v, v] }, 1200_000 * k);
  });
const options = (latitude: number) => ({ latitude, sinceMs: 0, geostrophicSpeed: 10 });

describe('turningAt', () => {
  it('finds the inertial rate, clockwise in the north and the other way in the south', () => {
    // 15.041 degrees an hour times twice the sine of the latitude: 21.27 at 45 degrees.
    const [north] = turningAt(nightOf(45, 1, 9), [150], options(45));
    expect(north).toMatchObject({ status: 'told', verdict: 'inertial' });
    expect(north!.inertialRate).toBeCloseTo(21.27, 2);
    expect(north!.measuredRate).toBeCloseTo(21.27, 0);
    expect(north!.fit.equilibriumU).toBeCloseTo(9, 4);
    const [south] = turningAt(nightOf(-45, 1, 9), [150], options(-45));
    expect(south!.measuredRate).toBeCloseTo(-21.27, 0);
    expect(south!.verdict).toBe('inertial');
  });

  it('tells slower, faster and opposite', () => {
    const verdict = (times: number) => turningAt(nightOf(45, times, 10), [200], options(45))[0]!.verdict;
    expect(verdict(0.5)).toBe('slower');
    expect(verdict(1.6)).toBe('faster');
    expect(verdict(-1)).toBe('opposite');
  });

  it('is honest near the equator, on short records and without data', () => {
    expect(turningAt(nightOf(3, 1, 10), [200], options(3))[0]!.why).toContain('too little to be told');
    expect(turningAt(nightOf(45, 1, 1), [200], options(45))[0]!.why).toContain('Only 3 winds');
    expect(turningAt(nightOf(45, 1, 9), [500], options(45))[0]!.why).toContain('Only 0 winds');
    expect(turningAt(nightOf(45, 1, 9), [200], options(NaN))[0]!.why).toContain('latitude');
    expect(turningAt(nightOf(45, 0, 9), [200], options(45))[0]!.why).toContain('hardly changed');
  });

  it('counts winds since dusk only and holds the last against the geostrophic', () => {
    const night = nightOf(45, 1, 9);
    const [late] = turningAt(night, [200], { ...options(45), sinceMs: 4 * HOUR_MS });
    expect(late!.fit.used).toBe(15);
    const last = night.at(-1)!;
    expect(late!.supergeostrophic).toBeCloseTo(last.speed[1]! / 10, 5);
  });
});
