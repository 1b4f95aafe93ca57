import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { precipitableWater, transportByHeight, transportByPressure } from '../../src/moisture/index.ts';

interface Level {
  readonly pressure: number;
  readonly q: number;
  readonly u: number;
  readonly v: number;
}

const value = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });
const level: fc.Arbitrary<Level> = fc.record({
  pressure: fc.integer({ min: 30_000, max: 105_000 }),
  q: value(0, 0.02),
  u: value(-40, 40),
  v: value(-40, 40),
});
const columns = (levels: Level[]) => ({
  pressure: levels.map((at) => at.pressure),
  specificHumidity: levels.map((at) => at.q),
  u: levels.map((at) => at.u),
  v: levels.map((at) => at.v),
});
const profile = fc.uniqueArray(level, { minLength: 2, maxLength: 30, selector: (at) => at.pressure });

describe('transport', () => {
  it('adds up over the layers that a level divides (property)', () => {
    fc.assert(
      fc.property(profile, fc.nat(), (levels, pick) => {
        const all = columns(levels);
        const between = levels[pick % levels.length]!.pressure;
        const below = transportByPressure(all, { top: between }).east;
        const above = transportByPressure(all, { bottom: between }).east;
        const part = (size: number): number => (Number.isNaN(size) ? 0 : size);
        expect(part(below) + part(above)).toBeCloseTo(transportByPressure(all).east, 6);
      }),
    );
  });

  it('turns with the wind and does not care for the order of levels (property)', () => {
    fc.assert(
      fc.property(profile, (levels) => {
        const { east, north, size } = transportByPressure(columns(levels));
        const turned = transportByPressure(columns(levels.map((at) => ({ ...at, u: at.v, v: -at.u })).reverse()));
        expect(turned.east).toBeCloseTo(north, 6);
        expect(turned.north).toBeCloseTo(-east, 6);
        expect(turned.size).toBeCloseTo(size, 6);
      }),
    );
  });

  it('says from where the vapour comes', () => {
    const levels = { pressure: [1e5, 9e4], specificHumidity: [0.01, 0.01], u: [0, 0], v: [10, 10] };
    expect(transportByPressure(levels).direction).toBe(180);
  });

  it('has nothing to say of one level, of none, of all missing', () => {
    for (const q of [[0.01], [], [NaN, NaN, NaN]]) {
      const same = q.map(() => 9e4);
      const levels = { pressure: same, heightAgl: same, density: same, specificHumidity: q, u: same, v: same };
      expect(transportByPressure(levels).size).toBeNaN();
      expect(transportByHeight(levels).reaches).toBeNaN();
      expect(precipitableWater(levels)).toBeNaN();
    }
  });
});
