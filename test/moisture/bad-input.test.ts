import { describe, expect, it } from 'vitest';
import { specificHumidityOfDewPoint } from '../../src/air/index.ts';
import { moistureOf, type MoistureNumbers } from '../../src/moisture/index.ts';
import type { LevelInput } from '../../src/profile/index.ts';
import { profileOf } from '../support/profiles.ts';

const HEIGHTS = Array.from({ length: 61 }, (_, k) => 10 + 100 * k);
const humidity = HEIGHTS.map((z) => 0.012 * Math.exp(-z / 2500));
const pressure = HEIGHTS.map((z) => 97_000 * Math.exp(-z / 8500));
const temperature = HEIGHTS.map((z) => 298 - 0.0065 * z);

function numbersOf(change: Partial<Record<keyof LevelInput, number[]>> = {}): MoistureNumbers {
  const levels = {
    heightAgl: HEIGHTS,
    speed: HEIGHTS.map(() => 15),
    direction: HEIGHTS.map(() => 180),
    pressure,
    temperature,
    specificHumidity: humidity,
    ...change,
  };
  return moistureOf(profileOf(levels));
}
const sound = numbersOf();
const finite = ({ transport, below3Km, precipitableWater }: MoistureNumbers): boolean =>
  [transport.size, below3Km.size, precipitableWater].every((value) => Number.isFinite(value));

describe('bad input', () => {
  it('is told of nothing where there is nothing wrong', () => {
    expect(sound).toMatchObject({ status: 'ok', notes: [] });
  });

  it('takes a dry layer as dry: nothing is carried there, and theta-e is that of dry air', () => {
    const dry = numbersOf({ specificHumidity: humidity.map((q, k) => (HEIGHTS[k]! > 3100 ? 0 : q)) });
    expect(dry.status).toBe('ok');
    expect(finite(dry)).toBe(true);
    expect(dry.below3Km.size).toBeCloseTo(sound.below3Km.size, 6);
    expect(dry.transport.size).toBeLessThan(sound.transport.size);
    // Poisson's equation, 0.2854 after Bolton.
    expect(dry.thetaE.value.at(-1)!).toBeCloseTo(temperature.at(-1)! * (100_000 / pressure.at(-1)!) ** 0.2854, 1);
  });

  it('bridges a missing layer and says where', () => {
    const gap = numbersOf({
      specificHumidity: humidity.map((q, k) => (HEIGHTS[k]! > 1000 && HEIGHTS[k]! < 2000 ? NaN : q)),
    });
    expect(gap.notes).toEqual(['no values between 910 and 2010 m, taken as linear']);
    // Linear instead of exponential over 1.1 km of a scale of 2.5 km: a few per cent more, never less.
    expect(gap.below3Km.size / sound.below3Km.size).toBeGreaterThan(1);
    expect(gap.below3Km.size / sound.below3Km.size).toBeLessThan(1.03);
  });

  it('leaves out humidity whose dew point is above the temperature, and says so', () => {
    const wrong = humidity.map((q, k) =>
      k >= 5 && k <= 7 ? specificHumidityOfDewPoint(temperature[k]! + 4, pressure[k]!) : q,
    );
    const left = numbersOf({ specificHumidity: wrong });
    expect(left.notes).toEqual(['3 levels’ humidity left out, their dew point is above the temperature']);
    expect(left.below3Km.size / sound.below3Km.size).toBeCloseTo(1, 2);
    // Saturated to the last tenth of a degree is no contradiction.
    const fog = humidity.map((q, k) => (k < 3 ? specificHumidityOfDewPoint(temperature[k]! + 0.1, pressure[k]!) : q));
    expect(numbersOf({ specificHumidity: fog }).notes).toEqual([]);
  });

  it('counts nothing between the surface and a first level above it, and says so', () => {
    const high = HEIGHTS.map((_, k) => k).filter((k) => HEIGHTS[k]! > 400);
    const pick = (values: readonly number[]): number[] => high.map((k) => values[k]!);
    const lifted = numbersOf({
      heightAgl: pick(HEIGHTS),
      speed: high.map(() => 15),
      direction: high.map(() => 180),
      pressure: pick(pressure),
      temperature: pick(temperature),
      specificHumidity: pick(humidity),
    });
    expect(lifted.notes).toEqual(['the lowest level with all values is at 410 m, nothing below it is counted']);
    expect(lifted.transport.size).toBeLessThan(sound.transport.size);
  });

  it('gives what a sounding that ends at 700 hPa can give, and says where it ends', () => {
    const low = pressure.findIndex((value) => value < 70_000);
    const short = numbersOf(
      Object.fromEntries(
        Object.entries({
          heightAgl: HEIGHTS,
          speed: HEIGHTS.map(() => 15),
          direction: HEIGHTS.map(() => 180),
          pressure,
          temperature,
          specificHumidity: humidity,
        }).map(([name, values]) => [name, values.slice(0, low)]),
      ),
    );
    expect(short.status).toBe('ok');
    // 8500 ln(97/70) = 2773 m; the last level below it stands at 2710 m.
    expect(short.below3Km.reaches).toBe(2710);
    expect(short.notes).toEqual(['data end at 2710 m, below 3 km']);
    expect(short.instability.slope).toBeLessThan(0);
  });

  it('says why where humidity stands at one level, or wind nowhere', () => {
    const one = numbersOf({ specificHumidity: humidity.map((q, k) => (k === 3 ? q : NaN)) });
    expect(one).toMatchObject({ status: 'not-assessable', why: 'humidity at a single level only' });
    expect(numbersOf({ speed: HEIGHTS.map(() => NaN) })).toMatchObject({ status: 'not-assessable', why: 'no wind' });
  });
});
