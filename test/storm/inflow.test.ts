import { describe, expect, it } from 'vitest';
import { stormOf } from '../../src/storm/index.ts';
import { airLevels, EVENING, MIDNIGHT, profileOf, upTo } from './soundings.ts';

const inflow = (report: typeof EVENING, lowest = 0) => stormOf(profileOf(airLevels(report, lowest))).inflow;

describe('inflow', () => {
  it('is rooted at the surface in the evening', () => {
    const found = inflow(EVENING);
    expect(found.kind).toBe('surface-based');
    expect(found.bottom).toBe(0);
    expect(found.stableLayer).toBeNull();
  });

  it('is elevated above the stable layer by night', () => {
    const found = inflow(MIDNIGHT);
    expect(found.kind).toBe('elevated');
    expect(found.stableLayer!.bottom).toBe(0);
    expect(found.stableLayer!.top).toBe(found.bottom);
    expect(found.stableLayer!.strength).toBeGreaterThan(2);
    expect(found.stableLayer!.bruntVaisala).toBeGreaterThan(0.01);
    expect(found.why).toMatch(/-250/);
  });

  it('is none in stable, dry air', () => {
    const found = inflow({ ...EVENING, dewPointC: EVENING.temperatureC.map((t) => t - 40) });
    expect(found.kind).toBe('none');
    expect(found.bottom).toBeNaN();
  });

  it('is not told where data end too low or the surface is missing', () => {
    expect(inflow(upTo(MIDNIGHT, 800)).kind).toBe('not-assessable');
    const noSurface = inflow(EVENING, 300);
    expect(noSurface.kind).toBe('not-assessable');
    expect(noSurface.why).toMatch(/surface is missing/);
  });
});
