import { describe, expect, it } from 'vitest';
import { standardAtmosphere } from '../../src/air/index.ts';
import { withHeights } from '../../src/profile/index.ts';

/** Radius of the Earth in the standard atmosphere's tables, m. */
const RADIUS = 6_356_766;
/** The standard atmosphere at geopotential heights: pressure and temperature by its own formulas. */
const HEIGHTS = [0, 400, 900, 1500, 2600, 3000, 4200, 5600];
const AIR = HEIGHTS.map((height) => standardAtmosphere((RADIUS * height) / (RADIUS - height)));
const pressure = AIR.map((air) => air.pressure);
const temperature = AIR.map((air) => air.temperature);
/** Only the heights at these positions; the rest missing. */
const only = (...positions: number[]): number[] => HEIGHTS.map((height, k) => (positions.includes(k) ? height : NaN));

function expectHeights(got: ArrayLike<number>, within: number): void {
  HEIGHTS.forEach((height, k) => expect(Math.abs(got[k]! - height), `${height} m`).toBeLessThan(within));
}

describe('withHeights', () => {
  it('places levels between and beyond known heights as the standard atmosphere has them', () => {
    expectHeights(withHeights({ height: only(0, 7), pressure, temperature }), 1);
    expectHeights(withHeights({ height: only(3), pressure, temperature }), 5);
  });

  it('does well without temperatures between near heights, and places nothing beyond', () => {
    const got = withHeights({ height: only(1, 3, 5), pressure });
    expect(Math.abs(got[2]! - 900)).toBeLessThan(5);
    expect(Math.abs(got[4]! - 2600)).toBeLessThan(6);
    expect(got[0]).toBeNaN();
    expect(got[7]).toBeNaN();
  });

  it('keeps known heights, any order of levels, and leaves alone what has no pressure', () => {
    const order = [5, 0, 7, 2, 1, 6, 3, 4];
    const shuffled = (column: readonly number[]): number[] => order.map((k) => column[k]!);
    const got = withHeights({
      height: shuffled(only(0, 3, 7)),
      pressure: shuffled(pressure.map((p, k) => (k === 5 ? NaN : p))),
      temperature: shuffled(temperature),
    });
    order.forEach((k, at) => {
      if (k === 5) expect(got[at]).toBeNaN();
      else expect(Math.abs(got[at]! - HEIGHTS[k]!)).toBeLessThan(2);
    });
  });

  it('finds nothing where no height is known or heights fall with falling pressure', () => {
    expect([...withHeights({ height: [NaN, NaN], pressure: [1e5, 9e4], temperature: [280, 275] })]).toEqual([NaN, NaN]);
    const got = withHeights({ height: [500, NaN, 100], pressure: [1e5, 9e4, 8e4], temperature: [280, 275, 270] });
    expect(got[1]).toBeNaN();
  });
});
