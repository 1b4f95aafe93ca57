import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { threadThrough } from '../../src/jet/thread.ts';

const HOUR_MS = 3600_000;

describe('threadThrough', () => {
  it('weighs two points as the arithmetic has it', () => {
    // x1, x2 minimise (x1 - 0)^2/1 + (x2 - 3)^2/1 + (x2 - x1)^2/1: 2 x1 - x2 = 0, 2 x2 - x1 = 3, so x = 1 and 2;
    // the inverse of [[2, -1], [-1, 2]] has 2/3 on its diagonal.
    const { value, spread } = threadThrough([0, HOUR_MS], [0, 3], [1, 1], 1);
    expect(value[0]).toBeCloseTo(1, 9);
    expect(value[1]).toBeCloseTo(2, 9);
    expect(spread[0]).toBeCloseTo(Math.sqrt(2 / 3), 9);
    expect(spread[1]).toBeCloseTo(Math.sqrt(2 / 3), 9);
  });

  it('goes past a stray point', () => {
    const value = Array.from({ length: 11 }, (_, k) => (k === 5 ? 900 : 300));
    const times = value.map((_, k) => (k * HOUR_MS) / 6);
    const thread = threadThrough(
      times,
      value,
      value.map(() => 20),
      80,
    );
    expect(Math.abs(thread.value[5]! - 300)).toBeLessThan(25);
  });

  it('keeps a constant, follows a shift and stays between the extremes (property)', () => {
    const series = fc.array(fc.integer({ min: -50, max: 50 }), { minLength: 1, maxLength: 30 });
    fc.assert(
      fc.property(series, fc.integer({ min: -100, max: 100 }), (value, shift) => {
        const times = value.map((_, k) => k * HOUR_MS);
        const spread = value.map((_, k) => 1 + (k % 3));
        const plain = threadThrough(times, value, spread, 2);
        const moved = threadThrough(
          times,
          value.map((one) => one + shift),
          spread,
          2,
        );
        plain.value.forEach((one, k) => {
          expect(moved.value[k]).toBeCloseTo(one + shift, 6);
          expect(one).toBeGreaterThanOrEqual(Math.min(...value) - 1e-9);
          expect(one).toBeLessThanOrEqual(Math.max(...value) + 1e-9);
          expect(plain.spread[k]).toBeGreaterThan(0);
        });
      }),
    );
  });
});
