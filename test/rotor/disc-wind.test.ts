import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DuskveerError } from '../../src/air/index.ts';
import { windOnDisc, type DiscWind } from '../../src/rotor/index.ts';
import { profileOf } from '../support/profiles.ts';

const disc = { hubHeight: 100, rotorDiameter: 120 };
const HEIGHTS = [40, 60, 80, 100, 120, 140, 160];
const NUMBERS = [
  'hubSpeed',
  'hubDirection',
  'equivalentSpeed',
  'equivalentSpeedVeer',
  'shearExponent',
  'veer',
] as const;

const speeds = fc.array(fc.double({ min: 0.5, max: 35, noNaN: true }), { minLength: 7, maxLength: 7 });
/** Directions that turn by less than half a circle over the disc, so that the short way round is the way it went. */
const directions = fc
  .tuple(fc.integer({ min: 0, max: 359 }), fc.array(fc.integer({ min: -12, max: 12 }), { minLength: 7, maxLength: 7 }))
  .map(([start, turns]) => turns.map((_, k) => (start + turns.slice(0, k).reduce((a, b) => a + b, 0) + 720) % 360));

const onDisc = (speed: number[], direction: number[]): DiscWind =>
  windOnDisc(profileOf({ heightAgl: HEIGHTS, speed, direction }), disc);

describe('windOnDisc', () => {
  it('gives a uniform wind as itself (property)', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.1, max: 40, noNaN: true }),
        fc.integer({ min: 0, max: 359 }),
        (speed, direction) => {
          const wind = onDisc(Array<number>(7).fill(speed), Array<number>(7).fill(direction));
          expect(wind.hubSpeed).toBeCloseTo(speed, 5);
          expect(wind.equivalentSpeed).toBeCloseTo(speed, 5);
          expect(wind.equivalentSpeedVeer).toBeCloseTo(speed, 5);
          expect(wind.shearExponent).toBeCloseTo(0, 9);
          expect(wind.veer).toBeCloseTo(0, 9);
        },
      ),
    );
  });

  it('gives a mirrored profile the mirrored veer (property)', () => {
    fc.assert(
      fc.property(speeds, directions, (speed, direction) => {
        const wind = onDisc(speed, direction);
        const mirrored = onDisc(
          speed,
          direction.map((value) => (360 - value) % 360),
        );
        expect(mirrored.veer).toBeCloseTo(-wind.veer, 4);
        expect(mirrored.equivalentSpeedVeer).toBeCloseTo(wind.equivalentSpeedVeer, 5);
      }),
    );
  });

  it('keeps speed, shear and veer when all winds turn by 90 degrees (property)', () => {
    fc.assert(
      fc.property(speeds, directions, (speed, direction) => {
        const wind = onDisc(speed, direction);
        const turned = onDisc(
          speed,
          direction.map((value) => (value + 90) % 360),
        );
        expect(turned.veer).toBeCloseTo(wind.veer, 4);
        expect(turned.equivalentSpeedVeer).toBeCloseTo(wind.equivalentSpeedVeer, 5);
        expect(turned.shearExponent).toBe(wind.shearExponent);
      }),
    );
  });

  it('never gives more with veer than without (property)', () => {
    fc.assert(
      fc.property(speeds, directions, (speed, direction) => {
        const wind = onDisc(speed, direction);
        expect(wind.equivalentSpeedVeer).toBeLessThanOrEqual(wind.equivalentSpeed + 1e-9);
      }),
    );
  });

  it('reads a turn through north as the short way round', () => {
    const wind = onDisc(Array<number>(7).fill(10), [345, 350, 355, 0, 5, 10, 15]);
    expect(wind.veer).toBeCloseTo(30, 9);
    expect(wind.veerPer100M).toBeCloseTo(25, 9);
    expect(wind.hubDirection % 360).toBeCloseTo(0, 9);
  });

  it('finds the exponent of an exact power law', () => {
    const wind = windOnDisc(profileOf({ heightAgl: HEIGHTS, speed: HEIGHTS.map((z) => 8 * (z / 100) ** 0.2) }), disc);
    expect(wind.shearExponent).toBeCloseTo(0.2, 6);
    expect(wind.hubDirection).toBeNaN();
    expect(wind.equivalentSpeedVeer).toBeNaN();
  });

  it('leaves a calm level out of the shear and keeps it in the disc', () => {
    const speed = HEIGHTS.map((z) => (z === 60 ? 0 : 8 * (z / 100) ** 0.2));
    const wind = onDisc(speed, Array<number>(7).fill(200));
    expect(wind.shearExponent).toBeCloseTo(0.2, 6);
    expect(wind.equivalentSpeed).toBeLessThan(8);
  });

  it('is calm in calm air, without a direction', () => {
    const wind = onDisc(Array<number>(7).fill(0), Array<number>(7).fill(NaN));
    expect(wind.status).toBe('ok');
    expect([wind.hubSpeed, wind.equivalentSpeed, wind.equivalentSpeedVeer]).toEqual([0, 0, 0]);
    expect([wind.hubDirection, wind.veer, wind.shearExponent]).toEqual([NaN, NaN, NaN]);
  });

  it.each([
    ['all missing', { heightAgl: HEIGHTS, speed: HEIGHTS.map(() => NaN) }, 'no usable wind level', 0],
    ['no levels', { heightAgl: [] }, 'no usable wind level', 0],
    ['one level', { heightAgl: [100], speed: [8], direction: [10] }, 'rotor only 0 % covered', 0],
    ['wholly below', { heightAgl: [10, 20, 39], speed: [3, 4, 5] }, 'the rotor lies outside the data', 0],
    ['wholly above', { heightAgl: [161, 200, 300], speed: [3, 4, 5] }, 'the rotor lies outside the data', 0],
    ['half', { heightAgl: [40, 70, 100], speed: [3, 4, 5] }, 'rotor only 50 % covered', 0.5],
    [
      'two slices',
      { heightAgl: [0, 100, 220], speed: [3, 4, 5] },
      'only 2 of the levels reach into the rotor, three are needed',
      1,
    ],
  ])('says why it cannot: %s', (_, levels, why, coverage) => {
    const wind = windOnDisc(profileOf(levels), disc);
    expect(wind.status).toBe('not-assessable');
    expect(wind.why).toBe(why);
    expect(wind.coverage).toBeCloseTo(coverage, 9);
    for (const name of NUMBERS) expect(wind[name], name).toBeNaN();
  });

  it('says whether the nose lies in the disc', () => {
    const profile = profileOf({ heightAgl: HEIGHTS, speed: HEIGHTS });
    expect(windOnDisc(profile, disc, { nose: 160 }).noseInRotor).toBe(true);
    expect(windOnDisc(profile, disc, { nose: 161 }).noseInRotor).toBe(false);
    expect(windOnDisc(profile, disc).noseInRotor).toBeNull();
  });

  it.each([
    [{ hubHeight: 100, rotorDiameter: 0 }],
    [{ hubHeight: 50, rotorDiameter: 120 }],
    [{ hubHeight: NaN, rotorDiameter: 120 }],
  ])('refuses what is no disc: %o', (bad) => {
    expect(() => windOnDisc(profileOf({ heightAgl: [] }), bad)).toThrow(DuskveerError);
  });
});
