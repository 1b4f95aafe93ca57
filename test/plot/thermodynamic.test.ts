import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { equivalentPotentialTemperature, saturationVapourPressure } from '../../src/air/index.ts';
import {
  carriedDown,
  carriedUp,
  dryAdiabat,
  LEAN,
  mixingRatioLine,
  pressureAt,
  pseudoadiabat,
  thermodynamicPoint,
  thermodynamicValue,
  type Frame,
} from '../../src/plot/index.ts';

const frame: Frame = { left: 60, top: 20, width: 500, height: 400, xLow: 285, xHigh: 325, yLow: 0, yHigh: 5000 };
/** An isothermal atmosphere of 280 K: pressure falls by exp(-g z / (Rd T)). */
const SCALE = (287.05 * 280) / 9.80665;
const heightAgl = Float64Array.from({ length: 60 }, (_, k) => 100 * k);
const columns = { heightAgl, pressure: heightAgl.map((z) => 100_000 * Math.exp(-z / SCALE)) };

describe('the diagram’s projection', () => {
  it('comes back to the temperature and height that it was given (property)', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 190, max: 330, noNaN: true }),
        fc.double({ min: 0, max: 5000, noNaN: true }),
        (temperature, height) => {
          expect(carriedUp(carriedDown(temperature, height), height)).toBeCloseTo(temperature, 9);
          const [back, up] = thermodynamicValue(frame, ...thermodynamicPoint(frame, temperature, height));
          expect(back).toBeCloseTo(temperature, 6);
          expect(up).toBeCloseTo(height, 6);
        },
      ),
    );
  });

  it('stands dry-neutral air upright and leans an inversion to the right', () => {
    // g/cp with cp = 3.5 Rd: 9.80665 / 1004.675 = 9.761 K/km.
    expect(1000 * LEAN).toBeCloseTo(9.761, 3);
    const [x0] = thermodynamicPoint(frame, 300, 0);
    expect(thermodynamicPoint(frame, 300 - 9.761, 1000)[0]).toBeCloseTo(x0, 2);
    expect(thermodynamicPoint(frame, 303, 100)[0]).toBeGreaterThan(x0);
    // A kelvin is equally wide at every height, so that area tells energy.
    const wide = (height: number): number =>
      thermodynamicPoint(frame, 281, height)[0] - thermodynamicPoint(frame, 280, height)[0];
    expect(wide(0)).toBeCloseTo(wide(5000), 9);
    expect(wide(0)).toBeCloseTo(500 / 40, 9);
  });
});

describe('pressureAt', () => {
  it('is exact where the logarithm is linear, goes down to the ground and not above the data', () => {
    expect(pressureAt(columns, 1234)).toBeCloseTo(100_000 * Math.exp(-1234 / SCALE), 3);
    const lifted = { heightAgl: [50, 150], pressure: [99_000, 98_000] };
    expect(pressureAt(lifted, 0)).toBeCloseTo(99_000 * Math.sqrt(99 / 98), 6);
    expect(pressureAt(columns, 6000)).toBeNaN();
    expect(pressureAt({ heightAgl: [], pressure: [] }, 0)).toBeNaN();
  });
});

describe('the thin lines', () => {
  const heights = Float64Array.from({ length: 41 }, (_, k) => 125 * k);

  it('keep potential temperature, mixing ratio and equivalent potential temperature', () => {
    const dry = dryAdiabat(columns, 300, heights);
    // At 500 hPa air of 300 K is at 300 (1/2)^(2/7) = 246.10 K.
    const at500 = SCALE * Math.log(2);
    expect(dryAdiabat(columns, 300, Float64Array.of(at500)).temperature[0]).toBeCloseTo(246.1, 1);
    expect(dry.temperature[0]).toBeCloseTo(300, 6);
    // Saturation at 10 g/kg and 1000 hPa: e = 0.01 * 1000 / 0.632 = 15.82 hPa, by Bolton’s eq. 10 at 13.85 °C.
    expect(mixingRatioLine(columns, 0.01, heights).temperature[0]! - 273.15).toBeCloseTo(13.85, 1);
    // Saturated air that rains out keeps its equivalent potential temperature (Bolton 1980, eq. 39).
    const moist = pseudoadiabat(columns, 293.15, Float64Array.of(0, at500)).temperature;
    const equivalent = (temperature: number, pressure: number): number => {
      const vapour = saturationVapourPressure(temperature);
      const ratio = (0.6219935 * vapour) / (pressure - vapour);
      return equivalentPotentialTemperature(temperature, pressure, vapour, ratio, temperature);
    };
    expect(moist[0]).toBeCloseTo(293.15, 3);
    expect(equivalent(moist[1]!, 50_000)).toBeCloseTo(equivalent(293.15, 100_000), 1);
  });

  it('order themselves: dry air cools fastest, cloud slower, the dew point slowest', () => {
    const start = 290;
    const dry = dryAdiabat(columns, start, heights).temperature;
    const moist = pseudoadiabat(columns, start, heights).temperature;
    for (let k = 1; k < heights.length; k++) {
      expect(dry[k]! - dry[k - 1]!).toBeLessThan(moist[k]! - moist[k - 1]!);
      expect(moist[k]! - moist[k - 1]!).toBeLessThan(0);
    }
  });

  it('end where the pressure is no longer known', () => {
    const short = { heightAgl: [0, 1000], pressure: [100_000, 89_000] };
    const line = pseudoadiabat(short, 290, heights).temperature;
    expect(Number.isNaN(line[8]!)).toBe(false);
    expect(line[9]).toBeNaN();
  });
});
