import fc from 'fast-check';
import suncalc from 'suncalc';
import { describe, expect, it } from 'vitest';
import { lightSpans, nightOf } from '../../src/air/index.ts';

const at = (text: string): number => Date.parse(text);
const MINUTE = 60_000;
const HOUR = 60 * MINUTE;

describe('nightOf', () => {
  it('gives one night to evening, midnight and forenoon, the next one to the afternoon', () => {
    const evening = nightOf(at('2026-06-10T23:00Z'), 52, 8);
    expect(nightOf(at('2026-06-10T14:00Z'), 52, 8)).toEqual(evening);
    expect(nightOf(at('2026-06-11T10:00Z'), 52, 8)).toEqual(evening);
    expect(nightOf(at('2026-06-11T13:00Z'), 52, 8).sunsetMs).toBeGreaterThan(evening.sunriseMs);
    expect(evening.kind).toBe('night');
  });

  it('puts the four events in their order', () => {
    const night = nightOf(at('2026-03-01T02:00Z'), 40, -100);
    const order = [night.sunsetMs, night.civilDuskMs, night.civilDawnMs, night.sunriseMs];
    expect(order).toEqual([...order].sort((a, b) => a - b));
  });

  it('has about 12 hours 7 minutes of day on the equator at equinox (refraction and the half disc lengthen it)', () => {
    const night = nightOf(at('2026-03-20T23:00Z'), 0, 0);
    expect(Math.abs(night.sunriseMs - night.sunsetMs - (12 * HOUR - 6.7 * MINUTE))).toBeLessThan(MINUTE);
  });

  it('knows polar day and polar night', () => {
    expect(nightOf(at('2026-06-21T00:00Z'), 70, 25).kind).toBe('polar-day');
    const polarNight = nightOf(at('2026-12-21T00:00Z'), 75, 25);
    expect(polarNight.kind).toBe('polar-night');
    expect(polarNight.sunsetMs).toBeNaN();
    expect(polarNight.endMs - polarNight.startMs).toBeGreaterThan(23.9 * HOUR);
    expect(nightOf(at('2026-12-21T00:00Z'), -75, 25).kind).toBe('polar-day');
    expect(nightOf(at('2026-12-21T00:00Z'), 90, 0).kind).toBe('polar-night');
  });

  it('says that a station without a position has no known night', () => {
    const night = nightOf(at('2026-06-21T00:00Z'), NaN, 25);
    expect(night.kind).toBe('unknown');
    expect(night.sunsetMs).toBeNaN();
    expect(night.why).toMatch(/position/);
    expect(nightOf(NaN, 50, 5).kind).toBe('unknown');
    expect(nightOf(0, 100, 5).kind).toBe('unknown');
  });

  // The second opinion uses a low-precision solar position and takes each day's declination at one moment, so it
  // drifts from a full ephemeris by a minute or two, more where the sun meets the horizon at a flat angle.
  it.each([
    ['2026-01-15', 51.5, 7.5],
    ['2026-04-20', 36.6, -97.5],
    ['2026-10-05', -33.9, 18.4],
    ['2026-07-01', 0.5, 101],
  ])('agrees with a second program within three minutes (%s at %d, %d)', (date, latitude, longitude) => {
    const noon = at(`${date}T12:00Z`) - (longitude / 15) * HOUR;
    const other = suncalc.getTimes(new Date(noon), latitude, longitude);
    const next = suncalc.getTimes(new Date(noon + 24 * HOUR), latitude, longitude);
    const night = nightOf(noon + 6 * HOUR, latitude, longitude);
    expect(Math.abs(night.sunsetMs - other.sunset.getTime())).toBeLessThan(3 * MINUTE);
    expect(Math.abs(night.sunriseMs - next.sunrise.getTime())).toBeLessThan(3 * MINUTE);
    expect(Math.abs(night.civilDuskMs - other.dusk.getTime())).toBeLessThan(3 * MINUTE);
    expect(Math.abs(night.civilDawnMs - next.dawn.getTime())).toBeLessThan(3 * MINUTE);
  });

  it('partitions time: a moment lies between the noons of its own night only (property)', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 365 * 24 }),
        fc.integer({ min: -60, max: 60 }),
        fc.integer({ min: -180, max: 180 }),
        (hour, latitude, longitude) => {
          const timeMs = at('2026-01-01T00:00Z') + hour * HOUR;
          const night = nightOf(timeMs, latitude, longitude);
          expect(night.kind).toBe('night');
          expect(timeMs).toBeGreaterThan(night.startMs - 12 * HOUR);
          expect(timeMs).toBeLessThan(night.endMs + 12 * HOUR);
          expect(nightOf((night.startMs + night.endMs) / 2, latitude, longitude)).toEqual(night);
        },
      ),
      { numRuns: 60 },
    );
  });
});

describe('lightSpans', () => {
  const lights = (from: string, to: string, latitude: number, longitude: number) =>
    lightSpans(at(from), at(to), latitude, longitude).map((span) => span.light);

  it('runs through day, dusk, night, dusk and day', () => {
    expect(lights('2026-05-01T12:00Z', '2026-05-02T12:00Z', 50, 8)).toEqual(['day', 'dusk', 'night', 'dusk', 'day']);
  });

  it('has dusk all night in a white night and nothing but day in polar day', () => {
    expect(lights('2026-06-21T10:00Z', '2026-06-22T10:00Z', 63, 10)).toEqual(['day', 'dusk', 'day']);
    expect(lights('2026-06-21T10:00Z', '2026-06-24T10:00Z', 75, 10)).toEqual(['day']);
  });

  it('has dusk around noon in the edge of polar night, and none in its depth', () => {
    expect(lights('2026-12-20T23:00Z', '2026-12-21T23:00Z', 70, 20)).toEqual(['night', 'dusk', 'night']);
    expect(lights('2026-12-20T23:00Z', '2026-12-21T23:00Z', 85, 20)).toEqual(['night']);
  });

  it('joins without gap or overlap and covers what was asked (property)', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 360 * 24 }),
        fc.integer({ min: 1, max: 100 }),
        fc.integer({ min: -90, max: 90 }),
        (hour, length, latitude) => {
          const start = at('2026-01-01T00:00Z') + hour * HOUR;
          const end = start + length * HOUR;
          const spans = lightSpans(start, end, latitude, -70);
          expect(spans[0]!.startMs).toBe(start);
          expect(spans.at(-1)!.endMs).toBe(end);
          for (let k = 1; k < spans.length; k++) {
            expect(spans[k]!.startMs).toBe(spans[k - 1]!.endMs);
            expect(spans[k]!.light).not.toBe(spans[k - 1]!.light);
          }
        },
      ),
      { numRuns: 60 },
    );
  });

  it('is empty for no time and unknown for no place', () => {
    expect(lightSpans(5, 5, 50, 8)).toEqual([]);
    expect(lightSpans(0, NaN, 50, 8)).toEqual([]);
    expect(lightSpans(0, 10, NaN, 8)).toEqual([{ startMs: 0, endMs: 10, light: 'unknown' }]);
  });
});
