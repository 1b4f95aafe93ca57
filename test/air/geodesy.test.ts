import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bearingTo, distanceBetween } from '../../src/air/index.ts';

describe('distance and bearing', () => {
  it('gives a degree of a great circle as 111.195 km: 2 pi 6371 km/360', () => {
    expect(distanceBetween({ latitude: 0, longitude: 179.5 }, { latitude: 0, longitude: -179.5 })).toBeCloseTo(
      111_194.93,
      1,
    );
    expect(distanceBetween({ latitude: 10, longitude: 5 }, { latitude: 11, longitude: 5 })).toBeCloseTo(111_194.93, 1);
  });

  it('points along meridian and equator, and across the date line', () => {
    const here = { latitude: 0, longitude: 180 };
    expect(bearingTo(here, { latitude: 1, longitude: 180 })).toBeCloseTo(0, 9);
    expect(bearingTo(here, { latitude: 0, longitude: -179 })).toBeCloseTo(90, 9);
    expect(bearingTo(here, { latitude: -1, longitude: 180 })).toBeCloseTo(180, 9);
    expect(bearingTo(here, { latitude: 0, longitude: 179 })).toBeCloseTo(270, 9);
  });

  it('is as far back as there (property)', () => {
    const place = fc.record({
      latitude: fc.double({ min: -80, max: 80, noNaN: true }),
      longitude: fc.double({ min: -180, max: 180, noNaN: true }),
    });
    fc.assert(
      fc.property(place, place, (a, b) => {
        expect(distanceBetween(a, b)).toBeCloseTo(distanceBetween(b, a), 3);
      }),
    );
  });

  it('does not know the way to an unknown place', () => {
    const nowhere = { latitude: NaN, longitude: 0 };
    expect(distanceBetween(nowhere, { latitude: 0, longitude: 0 })).toBeNaN();
    expect(bearingTo(nowhere, { latitude: 0, longitude: 0 })).toBeNaN();
  });
});
