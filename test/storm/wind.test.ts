import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  bulkShear,
  clusterMotion,
  helicity,
  hodographOf,
  meanWind,
  stormMotion,
  windAt,
} from '../../src/storm/index.ts';
import { MARK } from '../../src/profile/index.ts';
import { profileOf } from './soundings.ts';

const vector = (u: number, v: number) => ({ u, v, why: '' });

describe('hodograph', () => {
  it('leaves out rejected levels and those without direction, keeps calm ones', () => {
    const hodograph = hodographOf(
      profileOf({
        heightAgl: [10, 100, 200, 300],
        speed: [0, 5, 6, 7],
        direction: [NaN, NaN, 90, 90],
        mark: [0, 0, MARK['low-signal'], 0],
      }),
    );
    expect([...hodograph.heightAgl].slice(0, hodograph.count)).toEqual([10, 300]);
    expect(windAt(hodograph, 155).u).toBeCloseTo(-3.5, 5);
  });

  it('does not reach beyond its data, and says so', () => {
    const hodograph = hodographOf(profileOf({ heightAgl: [10, 1000], u: [1, 2], v: [0, 0] }));
    expect(windAt(hodograph, 1001).why).toMatch(/from 10 m to 1000 m/);
    expect(meanWind(hodograph, 5, 500).why).not.toBe('');
    expect(meanWind(hodograph, 10, 1000).u).toBeCloseTo(1.5, 6);
    expect(windAt(hodographOf(profileOf({ heightAgl: [] })), 10).why).toMatch(/No level/);
  });
});

describe('helicity', () => {
  // The area swept: a half circle of radius 10 m/s about the storm gives twice half of pi r^2.
  it('is pi r squared for a half circle', () => {
    const heights = Array.from({ length: 301 }, (_, k) => k * 10);
    const angle = (z: number): number => Math.PI * (1 - z / 3000);
    const circle = hodographOf(
      profileOf({
        heightAgl: heights,
        u: heights.map((z) => 10 * Math.cos(angle(z))),
        v: heights.map((z) => 10 * Math.sin(angle(z))),
      }),
    );
    expect(helicity(circle, 3000, vector(0, 0)).value).toBeCloseTo(Math.PI * 100, 1);
    expect(bulkShear(circle, 3000).value).toBeCloseTo(20, 4);
  });

  const levels = fc.array(fc.tuple(fc.integer({ min: -20, max: 20 }), fc.integer({ min: -20, max: 20 })), {
    minLength: 4,
    maxLength: 12,
  });
  const hodographFrom = (winds: readonly (readonly [number, number])[], turn = 1, shift = 0) =>
    hodographOf(
      profileOf({
        heightAgl: winds.map((_, k) => (k * 7000) / (winds.length - 1)),
        u: winds.map(([u]) => u + shift),
        v: winds.map(([, v]) => turn * v + shift),
      }),
    );

  it('changes sign in the mirror, and not with a wind added to everything (property)', () => {
    fc.assert(
      fc.property(levels, (winds) => {
        const plain = helicity(hodographFrom(winds), 3000, vector(3, 4)).value;
        expect(helicity(hodographFrom(winds, -1), 3000, vector(3, -4)).value).toBeCloseTo(-plain, 2);
        expect(helicity(hodographFrom(winds, 1, 5), 3000, vector(8, 9)).value).toBeCloseTo(plain, 2);
      }),
    );
  });

  it('says what is missing', () => {
    const short = hodographOf(profileOf({ heightAgl: [10, 2000], u: [1, 2], v: [0, 5] }));
    expect(helicity(short, 3000, vector(0, 0)).why).toMatch(/end at 2000 m above ground; 3000 m are needed/);
    const high = hodographOf(profileOf({ heightAgl: [400, 4000], u: [1, 2], v: [0, 5] }));
    expect(bulkShear(high, 3000).why).toMatch(/near the ground is missing/);
  });
});

describe('stormMotion', () => {
  it('puts the movers 7.5 m/s to the right and left of the shear', () => {
    const westerly = hodographOf(profileOf({ heightAgl: [0, 6000], u: [0, 30], v: [5, 5] }));
    const { mean, right, left } = stormMotion(westerly);
    for (const [motion, v] of [
      [mean, 5],
      [right, -2.5],
      [left, 12.5],
    ] as const) {
      expect(motion.u).toBeCloseTo(15, 4);
      expect(motion.v).toBeCloseTo(v, 4);
    }
  });

  it('is missing below 6 km', () => {
    const { mean, right } = stormMotion(hodographOf(profileOf({ heightAgl: [0, 5900], u: [0, 30], v: [5, 5] })));
    expect(mean.why).toMatch(/6000 m/);
    expect(right.u).toBeNaN();
  });
});

describe('clusterMotion', () => {
  it('gives the cloud layer without a jet', () => {
    const cloud = [vector(10, 0), vector(20, 4)];
    const motion = clusterMotion(cloud, { u: NaN, v: NaN, why: 'no jet' });
    expect([motion.cloudLayer.u, motion.cloudLayer.v]).toEqual([15, 2]);
    expect(motion.upwind.why).toBe('no jet');
  });

  it('gives nothing without one of the levels', () => {
    const motion = clusterMotion([vector(1, 1), { u: NaN, v: NaN, why: 'too low' }], vector(0, 10));
    expect(motion.cloudLayer.why).toBe('too low');
    expect(motion.downwind.u).toBeNaN();
  });
});
