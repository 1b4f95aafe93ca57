import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { boundExtent, panExtent, zoomExtent, type SectionExtent } from '../../src/plot/index.ts';

const HOUR = 3_600_000;
const whole: SectionExtent = { startMs: 0, endMs: 24 * HOUR, bottom: 0, top: 3000 };
const limits = { whole };

describe('zoomExtent', () => {
  it('keeps the place under the cursor', () => {
    const got = zoomExtent(
      { startMs: 0, endMs: 8 * HOUR, bottom: 0, top: 800 },
      0.5,
      { timeMs: 2 * HOUR, height: 200 },
      'both',
      limits,
    );
    expect(got).toEqual({ startMs: HOUR, endMs: 5 * HOUR, bottom: 100, top: 500 });
  });

  it('changes one way only when told so', () => {
    const from = { startMs: 0, endMs: 8 * HOUR, bottom: 0, top: 800 };
    const about = { timeMs: 4 * HOUR, height: 400 };
    expect(zoomExtent(from, 0.5, about, 'time', limits)).toMatchObject({ bottom: 0, top: 800, startMs: 2 * HOUR });
    expect(zoomExtent(from, 0.5, about, 'height', limits)).toMatchObject({ startMs: 0, endMs: 8 * HOUR, bottom: 200 });
  });
});

describe('panExtent', () => {
  it('moves by shares and stops at the limits with the zoom it has', () => {
    const from = { startMs: 10 * HOUR, endMs: 14 * HOUR, bottom: 0, top: 800 };
    expect(panExtent(from, 0.5, 0, limits)).toMatchObject({ startMs: 12 * HOUR, endMs: 16 * HOUR });
    expect(panExtent(from, 5, -1, limits)).toEqual({ startMs: 20 * HOUR, endMs: 24 * HOUR, bottom: 0, top: 800 });
  });
});

describe('boundExtent', () => {
  it('always lies inside and is never less than the least (property)', () => {
    const time = fc.double({ min: -50 * HOUR, max: 80 * HOUR, noNaN: true });
    const height = fc.double({ min: -4000, max: 9000, noNaN: true });
    fc.assert(
      fc.property(time, time, height, height, (a, b, c, d) => {
        const extent = { startMs: Math.min(a, b), endMs: Math.max(a, b), bottom: Math.min(c, d), top: Math.max(c, d) };
        const got = boundExtent(extent, limits);
        expect(got.startMs).toBeGreaterThanOrEqual(0);
        expect(got.endMs).toBeLessThanOrEqual(24 * HOUR * (1 + 1e-12));
        expect(got.endMs - got.startMs).toBeGreaterThanOrEqual(600_000 - 1e-3);
        expect(got.bottom).toBeGreaterThanOrEqual(0);
        expect(got.top).toBeLessThanOrEqual(3000 + 1e-9);
        expect(got.top - got.bottom).toBeGreaterThanOrEqual(50 - 1e-9);
      }),
    );
  });
});
