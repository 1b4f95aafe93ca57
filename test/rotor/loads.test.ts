import { describe, expect, it } from 'vitest';
import {
  timeInBands,
  timeInState,
  watchLoads,
  windAtHeight,
  windOnDisc,
  type LoadState,
} from '../../src/rotor/index.ts';
import type { LevelInput } from '../../src/profile/index.ts';
import { profileOf } from '../support/profiles.ts';

const disc = { hubHeight: 100, rotorDiameter: 120 };
const HEIGHTS = [10, 40, 70, 100, 130, 160, 200];
const site = {
  designShear: 0.2,
  limits: [{ name: 'crane work', kind: 'lifting', height: 80, speed: 9 } as const],
};
const states = (levels: LevelInput, nose = NaN, over = site): Record<string, LoadState> => {
  const profile = profileOf(levels);
  return Object.fromEntries(
    watchLoads(windOnDisc(profile, disc, { nose }), profile, over).map((state) => [state.name, state]),
  );
};
const powerLaw = (exponent: number): number[] => HEIGHTS.map((z) => 9 * (z / 100) ** exponent);

describe('watchLoads', () => {
  it('holds shear against the design value and names its standard', () => {
    const steep = states({ heightAgl: HEIGHTS, speed: powerLaw(0.3) })['shear-over-design']!;
    expect(steep).toMatchObject({ on: true, limit: 0.2, source: 'IEC 61400-1, normal wind profile on land' });
    expect(steep.words).toBe('shear exponent 0.30, design assumes 0.2');
    expect(states({ heightAgl: HEIGHTS, speed: powerLaw(0.15) })['shear-over-design']!.on).toBe(false);
    const offshore = states({ heightAgl: HEIGHTS, speed: powerLaw(0.15) }, NaN, { ...site, designShear: 0.14 });
    expect(offshore['shear-over-design']).toMatchObject({
      on: true,
      source: 'IEC 61400-3-1, normal wind profile offshore',
    });
    expect(states({ heightAgl: [], speed: [] }, NaN, { ...site, designShear: 0.1 })['shear-over-design']!.source).toBe(
      'site file',
    );
  });

  it('holds veer and backing', () => {
    const turning = (per100M: number): LevelInput => ({
      heightAgl: HEIGHTS,
      speed: powerLaw(0.1),
      direction: HEIGHTS.map((z) => 200 + (per100M * z) / 100),
    });
    expect(states(turning(12))['veer-strong']).toMatchObject({
      on: true,
      words: 'wind veers 12.0° per 100 m over the disc',
    });
    expect(states(turning(-12))['veer-strong']).toMatchObject({
      on: true,
      words: 'wind backs 12.0° per 100 m over the disc',
    });
    expect(states(turning(5))['veer-strong']!.on).toBe(false);
  });

  it('sees the nose in the disc and the falling speed above it', () => {
    const jet = { heightAgl: HEIGHTS, speed: HEIGHTS.map((z) => 12 - Math.abs(z - 110) / 15) };
    expect(states(jet, 110)['nose-in-rotor']!.on).toBe(true);
    expect(states(jet, 110)['speed-falls-above-nose']!.on).toBe(true);
    expect(states(jet)['speed-falls-above-nose']!.on).toBe(false);
    expect(states(jet, 190)['nose-in-rotor']!.on).toBe(false);
  });

  it("looks at the site's limits at the heights they name", () => {
    const speed = HEIGHTS.map((z) => z / 10);
    expect(states({ heightAgl: HEIGHTS, speed })['limit/crane work']).toMatchObject({
      on: false,
      words: '8.0 m/s at 80 m, crane work stops above 9 m/s',
    });
    expect(states({ heightAgl: HEIGHTS, speed: HEIGHTS.map(() => 9.1) })['limit/crane work']!.on).toBe(true);
  });

  it('says what cannot be told', () => {
    const none = states({ heightAgl: [10, 20], speed: [3, 4] });
    expect(none['shear-over-design']).toMatchObject({ on: null });
    expect(none['shear-over-design']!.words).toContain('not assessable: the rotor lies outside the data');
    expect(none['limit/crane work']!.words).toBe('not assessable: no wind at 80 m');
  });
});

describe('windAtHeight', () => {
  it('interpolates the vector, and the speed alone without directions', () => {
    const profile = profileOf({ heightAgl: [50, 100], speed: [10, 10], direction: [350, 10] });
    expect(windAtHeight(profile, 75).direction % 360).toBeCloseTo(0, 4);
    expect(windAtHeight(profile, 75).speed).toBeCloseTo(10 * Math.cos(Math.PI / 18), 5);
    expect(windAtHeight(profile, 100)).toEqual({ speed: 10, direction: 10 });
    expect(windAtHeight(profile, 101).speed).toBeNaN();
    expect(windAtHeight(profile, 49).speed).toBeNaN();
    expect(windAtHeight(profileOf({ heightAgl: [50, 100], speed: [4, 8] }), 75).speed).toBe(6);
  });
});

describe('time in state and in bands', () => {
  const minutes = (...at: number[]): number[] => at.map((minute) => minute * 60_000);

  it('counts each sample for the time since the one before, a gap for nothing', () => {
    const timeMs = minutes(0, 10, 20, 30, 200, 210);
    const spent = timeInState(timeMs, [false, true, true, false, true, true]);
    expect(spent).toEqual({ totalS: 2400, longestS: 1200, sinceMs: 190 * 60_000, unknownS: 0 });
  });

  it('starts a new spell after a gap or an unknown', () => {
    expect(timeInState(minutes(0, 10, 20, 200), [false, true, true, true])).toMatchObject({ longestS: 1200 });
    expect(timeInState(minutes(0, 10, 20, 30), [true, null, true, true])).toEqual({
      totalS: 1800,
      longestS: 1200,
      sinceMs: 600_000,
      unknownS: 600,
    });
  });

  it('has nothing of nothing', () => {
    expect(timeInState([], [])).toEqual({ totalS: 0, longestS: 0, sinceMs: NaN, unknownS: 0 });
  });

  it('sorts into bands, edges to the band above', () => {
    const bands = timeInBands(minutes(0, 10, 20, 30, 40), [0.05, 0.1, 0.25, NaN, 0.4], [0.1, 0.2]);
    expect([...bands.seconds]).toEqual([600, 600, 1200]);
    expect(bands.unknownS).toBe(600);
  });
});
