import { describe, expect, it } from 'vitest';
import { meanOutputAt } from '../../src/rotor/index.ts';

describe('meanOutputAt', () => {
  const minutes = (...at: number[]): number[] => at.map((minute) => minute * 60_000);

  it('is the mean over the interval that ends at the time', () => {
    const series = { timeMs: minutes(1, 5, 10, 15, 20, 25, 30), powerKw: [1, 2, 3, 4, 5, NaN, 7] };
    expect([...meanOutputAt(minutes(10, 20, 30), series)]).toEqual([2, 4.5, 7]);
  });

  it('is missing where nothing was measured, and does not reach across a gap', () => {
    const series = { timeMs: minutes(10, 100), powerKw: [1, 2] };
    expect([...meanOutputAt(minutes(10, 20, 30, 150), series)]).toEqual([1, NaN, NaN, NaN]);
    expect([...meanOutputAt([], series)]).toEqual([]);
  });
});
