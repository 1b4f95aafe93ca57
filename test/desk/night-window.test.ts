import { describe, expect, it } from 'vitest';
import { nightOf } from '../../src/air/index.ts';
import { nightWindow } from '../../src/desk/night-window.ts';
import { unplacedStation } from '../../src/profile/index.ts';

const HOUR = 3_600_000;
const noon = Date.UTC(2024, 4, 21, 12);
const plains = { id: 'a', name: 'a', latitude: 38, longitude: 0, elevation: 600 };

describe('nightWindow', () => {
  it('runs from before sunset to after sunrise, the same all night', () => {
    const late = nightWindow(noon + 14 * HOUR, plains, []);
    const { sunsetMs, sunriseMs } = nightOf(noon + 14 * HOUR, 38, 0);
    expect(late.startMs).toBe(sunsetMs - 2.5 * HOUR);
    expect(late.endMs).toBe(sunriseMs + 1.5 * HOUR);
    expect(nightWindow(noon + 10 * HOUR, plains, [])).toEqual(late);
  });

  it('always holds the moment looked at', () => {
    for (let hour = 0; hour < 24; hour++) {
      const atMs = noon + hour * HOUR;
      for (const station of [plains, { ...plains, latitude: 80 }, { ...plains, latitude: -90 }, unplacedStation('x')]) {
        const { startMs, endMs } = nightWindow(atMs, station, [atMs - HOUR]);
        expect(startMs <= atMs && atMs <= endMs, `${hour} h at ${station.latitude}`).toBe(true);
      }
    }
  });

  it('without a position looks back a day at most, as far as there are data', () => {
    const times = [noon - 30 * HOUR, noon - 20 * HOUR, noon];
    expect(nightWindow(noon, unplacedStation('x'), times).startMs).toBe(noon - 20 * HOUR);
    expect(nightWindow(noon, unplacedStation('x'), times).night.kind).toBe('unknown');
  });
});
