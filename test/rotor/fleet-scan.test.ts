import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { gatherWind, windColumn } from '../../src/profile/index.ts';
import { FleetScan, windOnDisc } from '../../src/rotor/index.ts';
import { profileOf } from '../support/profiles.ts';

const DISCS = [
  { hubHeight: 80, rotorDiameter: 90 },
  { hubHeight: 110, rotorDiameter: 130 },
  { hubHeight: 150, rotorDiameter: 220 },
];

describe('FleetScan', () => {
  it('remembers nothing from profile to profile but the heights (property)', () => {
    const level = fc.record({
      height: fc.integer({ min: 0, max: 400 }),
      speed: fc.oneof({ weight: 9, arbitrary: fc.double({ min: 0, max: 30, noNaN: true }) }, fc.constant(NaN)),
      direction: fc.oneof({ weight: 9, arbitrary: fc.integer({ min: 0, max: 360 }) }, fc.constant(NaN)),
    });
    const profile = fc.array(level, { maxLength: 40 });
    fc.assert(
      fc.property(fc.array(profile, { minLength: 1, maxLength: 6 }), (profiles) => {
        const scan = new FleetScan(DISCS);
        const column = windColumn(1);
        for (const levels of profiles) {
          const one = profileOf({
            heightAgl: levels.map((at) => at.height),
            speed: levels.map((at) => at.speed),
            direction: levels.map((at) => at.direction),
          });
          const fleet = scan.scan(gatherWind(one, column));
          DISCS.forEach((disc, k) => {
            const alone = windOnDisc(one, disc);
            expect(fleet.plans[k]!.why).toBe(alone.why);
            expect(fleet.coverage[k]).toBe(alone.coverage);
            expect(fleet.equivalentSpeedVeer[k]).toBe(alone.equivalentSpeedVeer);
            expect(fleet.shearExponent[k]).toBe(alone.shearExponent);
            expect(fleet.veer[k]).toBe(alone.veer);
          });
        }
      }),
    );
  });

  it('shares the whole disc among the levels (property)', () => {
    const heights = fc.uniqueArray(fc.integer({ min: 0, max: 500 }), { minLength: 1, maxLength: 60 });
    fc.assert(
      fc.property(heights, (unsorted) => {
        const heightAgl = unsorted.sort((a, b) => a - b);
        const column = gatherWind(profileOf({ heightAgl, speed: heightAgl }), windColumn());
        for (const plan of new FleetScan(DISCS).scan(column).plans) {
          expect(plan.share.reduce((sum, share) => sum + share, 0)).toBeCloseTo(1, 12);
        }
      }),
    );
  });
});
