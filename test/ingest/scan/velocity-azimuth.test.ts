import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fitCone, type Beams } from '../../../src/ingest/scan/velocity-azimuth.ts';

const radial = (u: number, v: number, w: number, azimuth: number, elevation: number): number => {
  const [a, e] = [(azimuth * Math.PI) / 180, (elevation * Math.PI) / 180];
  return (u * Math.sin(a) + v * Math.cos(a)) * Math.cos(e) + w * Math.sin(e);
};

function beamsOf(
  azimuths: readonly number[],
  elevation: number | readonly number[],
  wind: [number, number, number],
): Beams {
  const elevations = azimuths.map((_, k) => (typeof elevation === 'number' ? elevation : elevation[k]!));
  return {
    count: azimuths.length,
    azimuth: Float64Array.from(azimuths),
    elevation: Float64Array.from(elevations),
    velocity: Float64Array.from(azimuths, (azimuth, k) => radial(...wind, azimuth, elevations[k]!)),
  };
}

const circle = (beams: number): number[] => Array.from({ length: beams }, (_, k) => (360 * k) / beams);

describe('fitCone', () => {
  it('gives back the wind the beams were made of, from any part of the circle (property)', () => {
    const component = fc.double({ min: -40, max: 40, noNaN: true });
    fc.assert(
      fc.property(
        component,
        component,
        fc.double({ min: -5, max: 5, noNaN: true }),
        fc.integer({ min: 5, max: 80 }),
        fc.integer({ min: 4, max: 40 }),
        fc.integer({ min: 120, max: 360 }),
        (u, v, w, elevation, count, sector) => {
          const azimuths = Array.from({ length: count }, (_, k) => 300 + (sector * k) / count);
          const fit = fitCone(beamsOf(azimuths, elevation, [u, v, w]));
          expect(fit).not.toBeNull();
          expect(Math.hypot(fit!.u - u, fit!.v - v, fit!.w - w)).toBeLessThan(1e-6);
          expect(fit!.standardError).toBeLessThan(1e-6);
        },
      ),
    );
  });

  it('takes four slanting beams and a vertical one', () => {
    const fit = fitCone(beamsOf([0, 90, 180, 270, 0], [75, 75, 75, 75, 90], [-7, 3, 0.4]));
    expect(fit!.u).toBeCloseTo(-7, 10);
    expect(fit!.w).toBeCloseTo(0.4, 10);
  });

  it.each([
    // Condition numbers by a singular value decomposition of the scaled directions, computed apart (NumPy).
    [360, 1],
    [180, 4.367819803930814],
    [120, 11.272966302205475],
    [90, 21.154233483012778],
  ])('says how well a sector of %d degrees tells the components apart', (sector, condition) => {
    const azimuths = Array.from({ length: 72 }, (_, k) => (sector * k) / 72);
    expect(fitCone(beamsOf(azimuths, 60, [1, 2, 0]))!.condition).toBeCloseTo(condition, 6);
  });

  it('refuses three beams, a narrow sector, a line and a stare', () => {
    expect(fitCone(beamsOf([0, 120, 240], 60, [1, 1, 0]))).toBeNull();
    expect(fitCone(beamsOf([0, 10, 20, 30, 40], 60, [1, 1, 0]))).toBeNull();
    expect(fitCone(beamsOf([90, 90, 90, 90], [10, 20, 30, 40], [1, 1, 0]))).toBeNull();
    expect(fitCone(beamsOf([0, 0, 0, 0], 90, [1, 1, 0]))).toBeNull();
  });

  it('gives the uncertainty that scatter of the beams leaves in the speed', () => {
    // Eight beams at 60 degrees: sd of a component is s / (cos 60 sqrt(8/2)) = s, and the residual of the alternating
    // pattern +e, -e is all scatter: s = e sqrt(8/5).
    const beams = beamsOf(circle(8), 60, [10, 0, 0]);
    for (let k = 0; k < 8; k++) beams.velocity[k]! += k % 2 === 0 ? 0.1 : -0.1;
    const fit = fitCone(beams)!;
    expect(fit.rmsResidual).toBeCloseTo(0.1, 10);
    expect(fit.standardError).toBeCloseTo(0.1 * Math.sqrt(8 / 5), 10);
    expect(fit.speedUncertainty).toBeCloseTo(0.1 * Math.sqrt(8 / 5), 10);
  });

  it('trusts no beam more than its resolution allows', () => {
    expect(fitCone(beamsOf(circle(8), 60, [10, 0, 0]), 0.5)!.speedUncertainty).toBeCloseTo(0.5, 10);
  });
});
