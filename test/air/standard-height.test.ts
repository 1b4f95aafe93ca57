import { describe, expect, it } from 'vitest';
import { standardAtmosphere, standardHeight } from '../../src/air/index.ts';

describe('standardHeight', () => {
  it.each([
    // US Standard Atmosphere 1976, table of geopotential height against pressure.
    [101_325, 0],
    [85_000, 1457.3],
    [50_000, 5574.4],
    [22_632.06, 11_000],
    [10_000, 16_179.7],
    [5474.889, 20_000],
    [868.0187, 32_000],
  ])('%d Pa lies at %d m', (pressure, height) => {
    expect(Math.abs(standardHeight(pressure) - height)).toBeLessThan(1);
  });

  it('undoes standardAtmosphere, and knows no height of what is no pressure', () => {
    for (const height of [-300, 0, 2500, 9000]) {
      const geopotential = (6_356_766 * height) / (6_356_766 + height);
      expect(standardHeight(standardAtmosphere(height).pressure)).toBeCloseTo(geopotential, 0);
    }
    for (const pressure of [NaN, 0, -5, 50]) expect(standardHeight(pressure)).toBeNaN();
  });
});
