import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  advectionBetweenHeights,
  advectionBetweenPressures,
  airDensity,
  bruntVaisalaFrequency,
  bruntVaisalaSquared,
  bulkRichardson,
  coriolisParameter,
  dewPointOf,
  froudeNumber,
  GRAVITY,
  hypsometricHeights,
  inertialPeriodS,
  lclPressure,
  powerLawSpeed,
  saturationOverIce,
  shearExponent,
  specificHumidityOfDewPoint,
  standardAtmosphere,
} from '../../src/air/index.ts';

describe('Coriolis', () => {
  it('has no period on the equator and none for no latitude', () => {
    expect(coriolisParameter(0)).toBe(0);
    expect(inertialPeriodS(0)).toBeNaN();
    expect(inertialPeriodS(NaN)).toBeNaN();
  });
});

describe('humidity', () => {
  it('goes from dew point to specific humidity and back (property)', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 220, max: 310, noNaN: true }),
        fc.double({ min: 30_000, max: 105_000, noNaN: true }),
        (dewPoint, pressure) => {
          expect(dewPointOf(specificHumidityOfDewPoint(dewPoint, pressure), pressure)).toBeCloseTo(dewPoint, 8);
        },
      ),
    );
  });

  it('makes air lighter the moister it is', () => {
    expect(airDensity(300, 100_000, 0.02)).toBeLessThan(airDensity(300, 100_000, 0));
    expect(airDensity(300, 100_000, NaN)).toBeNaN();
  });

  it('knows no ice above freezing', () => {
    expect(saturationOverIce(274)).toBeNaN();
  });

  it('never puts the condensation level below the start', () => {
    expect(lclPressure(290, 95_000, 290.1)).toBe(95_000);
    expect(lclPressure(290, 95_000, NaN)).toBeNaN();
  });
});

describe('hypsometric heights', () => {
  it('joins the levels around a missing one', () => {
    const heights = hypsometricHeights([1e5, 9.5e4, 9e4], [280, NaN, 280], [NaN, NaN, NaN], 100);
    expect(heights[0]).toBe(100);
    expect(heights[1]).toBeNaN();
    // Isothermal: R T / g times the logarithm.
    expect(heights[2]).toBeCloseTo(100 + ((287.05 * 280) / GRAVITY) * Math.log(10 / 9), 6);
  });
});

describe('standard atmosphere', () => {
  it('ends at the tropopause', () => {
    expect(standardAtmosphere(11_500).pressure).toBeNaN();
    expect(standardAtmosphere(NaN).density).toBeNaN();
  });
});

describe('stability', () => {
  const level = (height: number, virtualPotentialTemperature: number, u = 0) => ({
    height,
    virtualPotentialTemperature,
    u,
    v: 0,
  });

  it('is not defined downward, without shear, or without an obstacle', () => {
    expect(bruntVaisalaSquared(level(100, 290), level(100, 291))).toBeNaN();
    expect(bruntVaisalaFrequency(level(10, 291), level(100, 290))).toBeNaN();
    expect(bulkRichardson(level(10, 290), level(100, 291))).toBeNaN();
    expect(froudeNumber(10, NaN, 100)).toBeNaN();
  });

  it('has N squared of g / theta times the gradient', () => {
    const squared = bruntVaisalaSquared(level(0, 299.5), level(100, 300.5));
    expect(squared).toBeCloseTo((GRAVITY / 300) * 0.01, 12);
    // Richardson number: N squared over the square of the shear, here 0.1 per second.
    expect(bulkRichardson(level(0, 299.5), level(100, 300.5, 10))).toBeCloseTo(squared / 0.01, 10);
  });
});

describe('advection by turning', () => {
  const low = { speed: 10, direction: 180, height: 100, pressure: 95_000 };
  const high = { speed: 14, direction: 215, height: 900, pressure: 86_000 };

  it('changes sign with the hemisphere and with the sense of turning (property)', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 360 }), fc.integer({ min: 1, max: 89 }), (turn, latitude) => {
        const turned = (wind: typeof low) => ({ ...wind, direction: wind.direction + turn });
        const options = { latitude, meanTemperature: 285 };
        const warming = advectionBetweenHeights(turned(low), turned(high), options);
        expect(warming).toBeGreaterThan(0);
        expect(advectionBetweenHeights(turned(low), turned(high), { ...options, latitude: -latitude })).toBeCloseTo(
          -warming,
          12,
        );
      }),
    );
  });

  it('agrees between its two forms within a percent when the layer fits its temperature', () => {
    // Thickness of the layer by the hypsometric equation at 285 K.
    const upper = { ...high, height: low.height + ((287.05 * 285) / GRAVITY) * Math.log(low.pressure / high.pressure) };
    const byHeight = advectionBetweenHeights(low, upper, { latitude: 40, meanTemperature: 285 });
    expect(advectionBetweenPressures(low, upper, { latitude: 40 })).toBeCloseTo(byHeight, 12);
  });

  it('lets calm have no say and missing stay missing', () => {
    const calm = { ...low, speed: 0, direction: NaN };
    expect(advectionBetweenHeights(calm, high, { latitude: 40, meanTemperature: 285 })).toBe(0);
    expect(advectionBetweenHeights({ ...low, speed: NaN }, high, { latitude: 40, meanTemperature: 285 })).toBeNaN();
    expect(advectionBetweenPressures(high, low, { latitude: 40 })).toBeNaN();
  });
});

describe('shear exponent', () => {
  it('finds the law it was given (property)', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -0.5, max: 1, noNaN: true }),
        fc.double({ min: 2, max: 20, noNaN: true }),
        (exponent, at100) => {
          const heights = [40, NaN, 80, 120, 200];
          const law = shearExponent(
            heights,
            heights.map((height) => at100 * (height / 100) ** exponent),
          );
          expect(law.exponent).toBeCloseTo(exponent, 9);
          expect(powerLawSpeed(law, 100)).toBeCloseTo(at100, 9);
          expect(law.used).toBe(4);
        },
      ),
    );
  });

  it('is not computable from one height, however often measured', () => {
    expect(shearExponent([80, 80, 80], [5, 6, 7])).toMatchObject({ exponent: NaN, used: 3 });
    expect(shearExponent([], [])).toMatchObject({ exponent: NaN, used: 0 });
    expect(shearExponent([-10, 0, 50], [5, 5, 5]).used).toBe(1);
  });
});
