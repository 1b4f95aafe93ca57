import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { timeTicks, valueTicks } from '../../src/plot/index.ts';

const at = (iso: string): number => Date.parse(iso);
const labels = (ticks: { label: string }[]): string[] => ticks.map((tick) => tick.label);

describe('valueTicks', () => {
  it('takes round numbers of the reader’s unit', () => {
    expect(labels(valueTicks(0, 1400, 7))).toEqual(['0', '200', '400', '600', '800', '1000', '1200', '1400']);
    const feet = valueTicks(0, 1400, 5, 1 / 0.3048);
    expect(labels(feet)).toEqual(['0', '1000', '2000', '3000', '4000']);
    expect(feet[1]!.at).toBeCloseTo(304.8, 9);
    expect(labels(valueTicks(-0.06, 0.06, 4, 100))).toEqual(['−5', '0', '5']);
    expect(labels(valueTicks(263.15, 303.15, 4, 1, -273.15))).toEqual(['−10', '0', '10', '20', '30']);
    expect(labels(valueTicks(0, 0.3, 3))).toEqual(['0.0', '0.1', '0.2', '0.3']);
  });

  it('is empty where there is no extent', () => {
    expect(valueTicks(5, 5, 4)).toEqual([]);
    expect(valueTicks(NaN, 5, 4)).toEqual([]);
  });

  it('keeps inside, ascending and within the room (property)', () => {
    const value = fc.double({ min: -1e4, max: 1e4, noNaN: true });
    fc.assert(
      fc.property(
        value,
        fc.double({ min: 0.01, max: 1e4, noNaN: true }),
        fc.integer({ min: 1, max: 20 }),
        (low, span, most) => {
          const ticks = valueTicks(low, low + span, most);
          expect(ticks.length).toBeLessThanOrEqual(most + 1);
          ticks.forEach((tick, k) => {
            expect(tick.at).toBeGreaterThanOrEqual(low - 1e-6 * span);
            expect(tick.at).toBeLessThanOrEqual(low + span * (1 + 1e-6));
            if (k > 0) expect(tick.at).toBeGreaterThan(ticks[k - 1]!.at);
          });
        },
      ),
    );
  });
});

describe('timeTicks', () => {
  it('stands on the site’s clock and tells midnight as a date', () => {
    const ticks = timeTicks(at('2024-11-08T21:30:00Z'), at('2024-11-09T09:30:00Z'), 7, 'America/Chicago');
    expect(labels(ticks)).toEqual(['16:00', '18:00', '20:00', '22:00', '9 Nov', '02:00']);
    expect(ticks[0]!.at).toBe(at('2024-11-08T22:00:00Z'));
  });

  it('knows half-hour zones', () => {
    const [first] = timeTicks(at('2024-03-01T00:00:00Z'), at('2024-03-01T12:00:00Z'), 12, 'Asia/Kolkata');
    expect(first).toEqual({ at: at('2024-03-01T00:30:00Z'), label: '06:00' });
  });

  it('keeps to round hours over both changes of the clock', () => {
    // In Berlin clocks go from 02:00 to 03:00 on 31 March 2024 at 01:00 UTC, and back on 27 October at 01:00 UTC.
    const spring = timeTicks(at('2024-03-30T22:00:00Z'), at('2024-03-31T04:00:00Z'), 8, 'Europe/Berlin');
    expect(labels(spring)).toEqual(['23:00', '31 Mar', '01:00', '03:00', '04:00', '05:00', '06:00']);
    const autumn = timeTicks(at('2024-10-26T21:00:00Z'), at('2024-10-27T06:00:00Z'), 6, 'Europe/Berlin');
    expect(labels(autumn)).toEqual(['27 Oct', '02:00', '04:00', '06:00']);
  });

  it('goes to days, months and years as the span grows', () => {
    const start = at('2023-12-20T00:00:00Z');
    expect(labels(timeTicks(start, at('2023-12-25T00:00:00Z'), 6, 'UTC'))[0]).toBe('20 Dec');
    expect(labels(timeTicks(start, at('2024-06-20T00:00:00Z'), 8, 'UTC'))).toEqual([
      '2024',
      'Feb',
      'Mar',
      'Apr',
      'May',
      'Jun',
    ]);
    expect(labels(timeTicks(start, at('2034-06-20T00:00:00Z'), 6, 'UTC'))).toContain('2030');
  });

  it('ascends and keeps inside in any zone (property)', () => {
    const zone = fc.constantFrom('UTC', 'Europe/Berlin', 'America/St_Johns', 'Australia/Lord_Howe', 'Pacific/Auckland');
    const start = fc.integer({ min: at('2020-01-01T00:00:00Z'), max: at('2026-01-01T00:00:00Z') });
    const span = fc.integer({ min: 600_000, max: 40 * 86_400_000 });
    fc.assert(
      fc.property(start, span, zone, fc.integer({ min: 2, max: 14 }), (from, length, timeZone, most) => {
        const ticks = timeTicks(from, from + length, most, timeZone);
        expect(ticks.length).toBeLessThanOrEqual(most + 2);
        ticks.forEach((tick, k) => {
          expect(tick.at).toBeGreaterThanOrEqual(from);
          expect(tick.at).toBeLessThanOrEqual(from + length);
          if (k > 0) expect(tick.at).toBeGreaterThan(ticks[k - 1]!.at);
        });
      }),
      { numRuns: 60 },
    );
  });
});
