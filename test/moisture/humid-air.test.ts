import { describe, expect, it } from 'vitest';
import { humidityUncertainty, moistureOf } from '../../src/moisture/index.ts';
import {
  BlockBuilder,
  profileAt,
  type Instrument,
  type LevelInput,
  type Profile,
  type Station,
} from '../../src/profile/index.ts';

const HOUR = 3_600_000;
const NOW = Date.UTC(2031, 6, 15, 5, 0);
const station = (id: string, longitude: number, elevation = 300): Station => ({
  id,
  name: `Place ${id}`,
  latitude: 40,
  longitude,
  elevation,
});
const profile = (at: Station, instrument: Instrument, timeMs: number, levels: LevelInput): Profile => {
  const builder = new BlockBuilder();
  builder.add({ station: at, source: 'test', instrument, timeMs, levels });
  return profileAt(builder.finish(), 0);
};

const GATES = Array.from({ length: 30 }, (_, k) => 100 + 100 * k);
const wind = profile(station('PRO', 0), 'wind-profiler', NOW, {
  heightAgl: GATES,
  speed: GATES.map(() => 15),
  direction: GATES.map(() => 180),
});
const HEIGHTS = Array.from({ length: 41 }, (_, k) => 100 * k);
const sounding = (id: string, longitude: number, ageH: number, elevation = 300): Profile =>
  profile(station(id, longitude, elevation), 'radiosonde', NOW - ageH * HOUR, {
    heightAgl: HEIGHTS,
    speed: HEIGHTS.map(() => 5),
    direction: HEIGHTS.map(() => 90),
    pressure: HEIGHTS.map((z) => 97_000 * Math.exp(-(z + elevation - 300) / 8500)),
    temperature: HEIGHTS.map((z) => 298 - 0.0065 * (z + elevation - 300)),
    specificHumidity: HEIGHTS.map((z) => 0.014 * Math.exp(-(z + elevation - 300) / 2500)),
  });

describe('wind without humidity', () => {
  it('uses the humidity of a named station, with its own wind, and says whose, how old and how far', () => {
    const numbers = moistureOf(wind, { humidity: [sounding('SON', 0.5, 5)] });
    expect(numbers).toMatchObject({ status: 'ok', humidityFrom: 'SON', humidityAgeS: 5 * 3600 });
    // Half a degree at 40 N: 111.195 km x cos 40 / 2.
    expect(numbers.humidityDistance / 1000).toBeCloseTo(42.59, 1);
    expect(numbers.transport.direction).toBeCloseTo(180, 6);
    expect(numbers.transport.north).toBeCloseTo(15 * numbers.precipitableWater, 3);
    expect(numbers.notes[0]).toBe('humidity of SON, 300 min old, 43 km away: ±13 %');
  });

  it('widens its uncertainty with age and distance', () => {
    const relative = (ageH: number, longitude: number): number =>
      moistureOf(wind, { humidity: [sounding('SON', longitude, ageH)] }).humidityUncertainty;
    expect(relative(2, 0.5)).toBeGreaterThan(relative(1, 0.5));
    expect(relative(1, 1)).toBeGreaterThan(relative(1, 0.5));
    expect(humidityUncertainty(0, 0)).toBe(0.05);
    expect(humidityUncertainty(0, NaN)).toBe(humidityUncertainty(0, 100_000));
  });

  it('takes the least uncertain of several, and none from the future', () => {
    const choose = (...humidity: Profile[]): string => moistureOf(wind, { humidity }).humidityFrom;
    expect(choose(sounding('OLD', 0, 12), sounding('NEW', 0, 1))).toBe('NEW');
    expect(choose(sounding('FAR', 5, 0), sounding('NEAR', 0, 1))).toBe('NEAR');
    expect(choose(sounding('LATER', 0, -1), sounding('EARLIER', 0, 3))).toBe('EARLIER');
  });

  it('is not assessable past the stated age, and says since when', () => {
    const numbers = moistureOf(wind, { humidity: [sounding('SON', 0, 5)], oldestHumidityS: 4 * 3600 });
    expect(numbers).toMatchObject({
      status: 'not-assessable',
      why: 'no humidity since 2031-07-15 00:00 UTC (Place SON)',
      humidityFrom: '',
    });
    expect(numbers.transport.size).toBeNaN();
    expect(numbers.humidityAgeS).toBeNaN();
  });

  it('lays it on by height above sea level', () => {
    const level = moistureOf(wind, { humidity: [sounding('SON', 0, 0, 300)] });
    const higher = moistureOf(wind, { humidity: [sounding('HILL', 0, 0, 350)] });
    expect(higher.precipitableWater / level.precipitableWater).toBeCloseTo(1, 2);
  });

  it('makes nothing up above the top of what was borrowed', () => {
    const mast = profile(station('MAST', 0), 'mast', NOW - HOUR, {
      heightAgl: [2, 150],
      temperature: [290, 289],
      pressure: [97_000, 95_300],
      specificHumidity: [0.012, 0.011],
    });
    const numbers = moistureOf(wind, { humidity: [mast] });
    expect([...numbers.flux.heightAgl]).toEqual([100]);
    expect(numbers.status).toBe('not-assessable');
  });

  it("prefers the profile's own humidity", () => {
    const own = sounding('OWN', 0, 0);
    expect(moistureOf(own, { humidity: [sounding('SON', 0, 0)] })).toMatchObject({
      humidityFrom: 'OWN',
      humidityAgeS: 0,
      humidityUncertainty: 0.05,
    });
  });
});
