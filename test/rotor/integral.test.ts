import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cubeMean, discQuadrature, windOnDisc, type Disc } from '../../src/rotor/index.ts';
import { profileOf } from '../support/profiles.ts';

/** Adaptive Simpson in the angle, begun anew at each level: another rule than the one under test. */
function byAdaptiveQuadrature(disc: Disc, heights: readonly number[], values: readonly number[]): number {
  const radius = disc.rotorDiameter / 2;
  const valueAt = (height: number): number => {
    if (height <= heights[0]!) return values[0]!;
    if (height >= heights.at(-1)!) return values.at(-1)!;
    let k = 0;
    while (heights[k + 1]! < height) k++;
    return values[k]! + ((values[k + 1]! - values[k]!) * (height - heights[k]!)) / (heights[k + 1]! - heights[k]!);
  };
  const density = (angle: number): number =>
    (valueAt(disc.hubHeight + radius * Math.sin(angle)) ** 3 * 2 * Math.cos(angle) ** 2) / Math.PI;
  const simpson = (a: number, fa: number, fm: number, b: number, fb: number): number =>
    ((b - a) / 6) * (fa + 4 * fm + fb);
  const refine = (
    a: number,
    fa: number,
    fm: number,
    b: number,
    fb: number,
    tolerance: number,
    depth: number,
  ): number => {
    const m = (a + b) / 2;
    const [fl, fr] = [density((a + m) / 2), density((m + b) / 2)];
    const [whole, halves] = [simpson(a, fa, fm, b, fb), simpson(a, fa, fl, m, fm) + simpson(m, fm, fr, b, fb)];
    if (depth === 0 || Math.abs(halves - whole) < 15 * tolerance) return halves + (halves - whole) / 15;
    return refine(a, fa, fl, m, fm, tolerance / 2, depth - 1) + refine(m, fm, fr, b, fb, tolerance / 2, depth - 1);
  };
  const angles = heights
    .map((height) => (height - disc.hubHeight) / radius)
    .filter((sine) => Math.abs(sine) < 1)
    .map(Math.asin);
  const ends = [-Math.PI / 2, ...angles, Math.PI / 2];
  let sum = 0;
  for (let k = 1; k < ends.length; k++) {
    const [a, b] = [ends[k - 1]!, ends[k]!];
    sum += refine(a, density(a), density((a + b) / 2), b, density(b), 1e-11, 30);
  }
  return Math.cbrt(sum);
}

const disc = { hubHeight: 110, rotorDiameter: 130 };

describe('the integral form', () => {
  it('is exact to 1e-9 against adaptive quadrature (property)', () => {
    const level = fc.record({
      height: fc.double({ min: 1, max: 400, noNaN: true }),
      value: fc.double({ min: 0.5, max: 30, noNaN: true }),
    });
    const levels = fc.uniqueArray(level, { minLength: 1, maxLength: 12, selector: (at) => at.height });
    fc.assert(
      fc.property(levels, (unsorted) => {
        const sorted = unsorted.sort((a, b) => a.height - b.height);
        const heights = sorted.map((at) => at.height);
        const values = sorted.map((at) => at.value);
        const got = cubeMean(discQuadrature(disc, heights, heights.length), (k) => values[k]!);
        expect(Math.abs(got / byAdaptiveQuadrature(disc, heights, values) - 1)).toBeLessThan(1e-9);
      }),
      { numRuns: 60 },
    );
  });

  it('agrees with the closed form of a linear wind: mean of (a + b y)^3 is a^3 + 3 a b^2 R^2/4', () => {
    const value = (height: number): number => 9 + 0.04 * (height - 110);
    const heights = [20, 60, 140, 200];
    const got = cubeMean(discQuadrature(disc, heights, 4), (k) => value(heights[k]!));
    expect(got).toBeCloseTo(Math.cbrt(9 ** 3 + (3 * 9 * 0.04 ** 2 * 65 ** 2) / 4), 12);
  });

  it('shares out the whole disc (property)', () => {
    const heights = fc.uniqueArray(fc.double({ min: 1, max: 400, noNaN: true }), { minLength: 1, maxLength: 20 });
    fc.assert(
      fc.property(heights, (unsorted) => {
        const { share } = discQuadrature(
          disc,
          unsorted.sort((a, b) => a - b),
          unsorted.length,
        );
        expect(share.reduce((sum, part) => sum + part, 0)).toBeCloseTo(1, 12);
      }),
    );
  });

  it('tells where coarse levels make the two forms differ', () => {
    const fine = Array.from({ length: 60 }, (_, k) => 10 + 5 * k);
    const jet = (z: number): number => 14 - Math.abs(z - 110) / 10;
    expect(windOnDisc(profileOf({ heightAgl: fine, speed: fine.map(jet) }), disc).formsDiffer).toBe(false);
    const coarse = [50, 110, 170];
    const wind = windOnDisc(profileOf({ heightAgl: coarse, speed: coarse.map(jet) }), disc);
    expect(wind.formsDiffer).toBe(true);
    expect(wind.integralSpeed).toBeLessThan(wind.equivalentSpeed);
  });

  it('gives the same with directions that do not turn', () => {
    const heights = [40, 80, 120, 160, 200];
    const wind = windOnDisc(
      profileOf({ heightAgl: heights, speed: [6, 8, 9, 9, 8], direction: heights.map(() => 250) }),
      disc,
    );
    expect(wind.integralSpeedVeer).toBeCloseTo(wind.integralSpeed, 9);
  });
});
