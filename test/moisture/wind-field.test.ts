import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { windField, type FieldPoint } from '../../src/moisture/index.ts';

const PER_DEGREE = 6_371_000 * (Math.PI / 180);
type Places = readonly (readonly [latitude: number, longitude: number])[];
const STILL = { ux: 0, uy: 0, vx: 0, vy: 0 };
const FIVE: Places = [
  [45, 10],
  [45.5, 10.1],
  [45.4, 10.9],
  [44.9, 10.8],
  [45.2, 10.4],
];

/** Stations in a wind that is linear on their plane, gradients in 1/s. */
const linear = (places: Places, gradient: { ux: number; uy: number; vx: number; vy: number }): FieldPoint[] => {
  const meanLatitude = places.reduce((sum, [latitude]) => sum + latitude, 0) / places.length;
  return places.map(([latitude, longitude]) => {
    const x = PER_DEGREE * Math.cos((meanLatitude * Math.PI) / 180) * longitude;
    const y = PER_DEGREE * latitude;
    return {
      latitude,
      longitude,
      u: 5 + gradient.ux * x + gradient.uy * y,
      v: 3 + gradient.vx * x + gradient.vy * y,
      specificHumidity: 0.01,
      windUncertainty: 0.5,
      humidityUncertainty: 0,
    };
  });
};

describe('windField', () => {
  it('finds the gradients of a linear wind through any number of stations (property)', () => {
    const slope = fc.double({ min: -1e-4, max: 1e-4, noNaN: true });
    const gradients = fc.record({ ux: slope, uy: slope, vx: slope, vy: slope });
    fc.assert(
      fc.property(gradients, fc.integer({ min: 3, max: 5 }), (gradient, count) => {
        const field = windField(linear(FIVE.slice(0, count), gradient));
        expect(field.divergence).toBeCloseTo(gradient.ux + gradient.vy, 12);
        expect(field.vorticity).toBeCloseTo(gradient.vx - gradient.uy, 12);
        expect(field.moistureFluxDivergence).toBeCloseTo(0.01 * (gradient.ux + gradient.vy), 13);
        expect(field.residual).toBeCloseTo(0, 6);
      }),
    );
  });

  it('carries the wind uncertainty: on a right triangle with legs a, 2 s/a', () => {
    // du/dx = (u2 - u1)/a and dv/dy = (v3 - v1)/a: four independent errors s/a.
    const leg = 50_000 / PER_DEGREE;
    const corner: Places = [
      [0, 0],
      [0, leg],
      [leg, 0],
    ];
    const field = windField(linear(corner, STILL));
    expect(field.divergenceUncertainty).toBeCloseTo((2 * 0.5) / 50_000, 9);
    expect(field.vorticityUncertainty).toBeCloseTo(field.divergenceUncertainty, 9);
    expect(field.moistureFluxDivergenceUncertainty).toBeCloseTo(0.01 * field.divergenceUncertainty, 11);
  });

  it('widens with uncertain places where the wind changes from place to place', () => {
    const points = linear(FIVE.slice(0, 3), { ux: 1e-4, uy: 0, vx: 0, vy: 1e-4 });
    const drifting = points.map((point) => ({ ...point, positionUncertainty: 5000 }));
    // 5 km times 1e-4 per second is another 0.5 m/s.
    const ratio = windField(drifting).divergenceUncertainty / windField(points).divergenceUncertainty;
    expect(ratio).toBeCloseTo(Math.SQRT2, 6);
  });

  it('has no uncertainty where no station states one', () => {
    const points = linear(FIVE, STILL).map((point) => ({ ...point, windUncertainty: NaN }));
    expect(windField(points).divergenceUncertainty).toBeNaN();
  });

  it('leaves a windless station out where three others remain', () => {
    const points = linear(FIVE, { ux: 1e-5, uy: 0, vx: 0, vy: 2e-5 });
    const field = windField(points.map((point, k) => (k === 2 ? { ...point, u: NaN } : point)));
    expect(field.status).toBe('ok');
    // The plane's mean latitude moves with the stations used.
    expect(field.divergence).toBeCloseTo(3e-5, 7);
  });

  it.each<[string, Places]>([
    ['only 2 stations with a position', FIVE.slice(0, 2)],
    ['on one line', [45, 45.1, 45.2, 45.3].map((latitude) => [latitude, latitude - 35] as const)],
    ['on one line', [45, 45, 45].map((latitude) => [latitude, 10] as const)],
  ])('refuses stations %s', (why, places) => {
    const field = windField(linear(places, STILL));
    expect(field.status).toBe('not-assessable');
    expect(field.why).toContain(why);
    expect(field.divergence).toBeNaN();
  });
});
