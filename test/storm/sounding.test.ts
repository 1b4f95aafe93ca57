import { describe, expect, it } from 'vitest';
import { specificHumidityOfDewPoint } from '../../src/air/index.ts';
import { MARK } from '../../src/profile/index.ts';
import { soundingOf, stormOf } from '../../src/storm/index.ts';
import { airLevels, EVENING, PLAINS, profileOf, upTo } from './soundings.ts';

const evening = airLevels(EVENING);
const withColumn = (
  name: 'specificHumidity' | 'temperature' | 'pressure',
  change: (value: number, k: number) => number,
) => profileOf({ ...evening, [name]: Array.from(evening[name]!, change) });
const parcel = (profile: ReturnType<typeof profileOf>, name: string) =>
  stormOf(profile).parcels.find((one) => one.name === name)!;

describe('soundingOf with bad input', () => {
  it('says what is missing altogether', () => {
    const wind = profileOf({ heightAgl: [10, 100], u: [1, 2], v: [1, 2] });
    expect(soundingOf(wind).noAir).toMatch(/no temperature/);
    const nowhere = { ...PLAINS, elevation: NaN };
    expect(soundingOf(profileOf({ ...evening, pressure: undefined }, nowhere)).noAir).toMatch(/no elevation/);
    expect(soundingOf(profileOf({ ...evening, specificHumidity: undefined })).noAir).toMatch(/no humidity/);
    expect(soundingOf(withColumn('specificHumidity', (q, k) => (k === 0 ? q : NaN))).noAir).toMatch(/one level/);
    expect(soundingOf(withColumn('temperature', (t, k) => (k === 3 ? t : NaN))).noAir).toMatch(/Fewer than two/);
  });

  it('passes over rejected levels and pressures that do not fall', () => {
    const mark = Array.from(evening.heightAgl, (_, k) => (k === 2 ? MARK['air-impossible'] : 0));
    const pressure = Array.from(evening.pressure!, (p, k) => (k === 5 ? p + 10_000 : p));
    expect(soundingOf(profileOf({ ...evening, mark, pressure })).count).toBe(EVENING.pressureHpa.length - 2);
  });

  it('joins a short humidity gap linear in ln p and says so', () => {
    const profile = withColumn('specificHumidity', (q, k) => (k === 4 ? NaN : q));
    const sounding = soundingOf(profile);
    const share = Math.log(900 / 850) / Math.log(900 / 800);
    expect(sounding.dewPoint[4]! - 273.15).toBeCloseTo(16.5 + share * (6 - 16.5), 2);
    expect(sounding.notes.join()).toMatch(/joined over up to 100 hPa/);
  });

  it('ends where humidity ends low down, and takes the air as dry where it ends high up', () => {
    const low = soundingOf(withColumn('specificHumidity', (q, k) => (k > 7 ? NaN : q)));
    expect(low.count).toBe(8);
    expect(low.notes.join()).toMatch(/Humidity ends at 700 hPa; nothing is reckoned above/);
    const high = soundingOf(withColumn('specificHumidity', (q, k) => (k > 10 ? NaN : q)));
    expect(high.count).toBe(EVENING.pressureHpa.length);
    expect(high.notes.join()).toMatch(/counts as dry/);
    const whole = parcel(profileOf(evening), 'surface-based');
    const dry = parcel(
      withColumn('specificHumidity', (q, k) => (k > 10 ? NaN : q)),
      'surface-based',
    );
    expect(Math.abs(dry.cape - whole.cape)).toBeLessThan(20);
  });

  it('does not join over more than 200 hPa of nothing', () => {
    const kept = [0, 1, 2, 3, 4, 5, 6, 7, 11, 12, 13];
    const pick = (column: ArrayLike<number>): number[] => kept.map((k) => column[k]!);
    const sounding = soundingOf(
      profileOf({
        heightAgl: pick(evening.heightAgl),
        pressure: pick(evening.pressure!),
        temperature: pick(evening.temperature!),
        specificHumidity: pick(evening.specificHumidity!),
      }),
    );
    expect(sounding.count).toBe(8);
    expect(sounding.notes.join()).toMatch(/Nothing was measured between 700 hPa and 300 hPa/);
  });

  it('takes a dew point a little above the temperature as saturation, and leaves out one far above', () => {
    const above = (excess: number) =>
      withColumn('specificHumidity', (q, k) =>
        k === 2 ? specificHumidityOfDewPoint(25 + excess + 273.15, 92_500) : q,
      );
    const little = soundingOf(above(0.5));
    expect(little.dewPoint[2]).toBeCloseTo(25 + 273.15, 3);
    expect(little.notes.join()).toMatch(/One level had a dew point above the temperature/);
    const far = soundingOf(above(5));
    expect(far.dewPoint[2]! - 273.15).toBeCloseTo(17.5, 1);
    expect(far.notes.join()).toMatch(/left out/);
  });

  it('warns of a superadiabatic lowest metre and still computes', () => {
    const levels = {
      heightAgl: [0, ...Array.from(evening.heightAgl, (height) => height + 1)],
      pressure: [96_011, ...Array.from(evening.pressure!)],
      temperature: [273.15 + 36, ...Array.from(evening.temperature!)],
      specificHumidity: [evening.specificHumidity![0]!, ...Array.from(evening.specificHumidity!)],
    };
    const storm = stormOf(profileOf(levels));
    expect(storm.notes.join()).toMatch(/warmer than air brought down/);
    expect(storm.parcels[0]!.cape).toBeGreaterThan(storm.parcels[1]!.cape);
    expect(storm.parcels.every((one) => Number.isFinite(one.cape))).toBe(true);
    expect(soundingOf(profileOf(evening)).notes).toEqual([]);
  });

  it('lifts nothing from a surface that lies below the first level', () => {
    const profile = profileOf(airLevels(EVENING, 300));
    expect(parcel(profile, 'surface-based').why).toMatch(/300 m above ground; the surface is missing/);
    expect(parcel(profile, 'mixed-layer').cape).toBeNaN();
    expect(parcel(profile, 'most-unstable').cape).toBeGreaterThan(0);
    expect(stormOf(profile).status).toBe('partly');
  });

  it('works pressure up from the station’s elevation where none was measured, and says so', () => {
    const measured = stormOf(profileOf(evening));
    const worked = stormOf(profileOf({ ...evening, pressure: undefined }));
    expect(worked.notes.join()).toMatch(/standard atmosphere’s at the station’s elevation, 400 m/);
    // US Standard Atmosphere 1976 at 400 m: 966.1 hPa; the report begins at 960.
    expect(soundingOf(profileOf({ ...evening, pressure: undefined })).pressure[0]! / 100).toBeCloseTo(966.1, 0);
    worked.parcels.forEach((one, k) => {
      expect(one.lclHeight).toBeCloseTo(measured.parcels[k]!.lclHeight, -2);
      expect(Math.abs(one.cape / measured.parcels[k]!.cape - 1)).toBeLessThan(0.05);
    });
    expect(stormOf(profileOf({ ...evening, pressure: undefined })).clusters.cloudLayer.why).toMatch(/No level has/);
  });

  it('keeps energies within a twentieth when weather has moved the surface pressure by 2 %', () => {
    const cape = (factor: number): number => {
      const one = Array.from(evening.pressure!, (p, k) => (k === 0 ? p * factor : NaN));
      return stormOf(profileOf({ ...evening, pressure: one })).parcels[2]!.cape;
    };
    for (const factor of [0.98, 1.02]) expect(Math.abs(cape(factor) / cape(1) - 1)).toBeLessThan(0.05);
  });

  it('takes a layer without any vapour as dry, not as missing', () => {
    const profile = withColumn('specificHumidity', (q, k) => (k === 6 || k === 7 ? 0 : q));
    const sounding = soundingOf(profile);
    expect(sounding.notes.join()).toMatch(/2 levels without any vapour/);
    expect(sounding.dewPoint[6]! - 273.15).toBeLessThan(-60);
    expect(stormOf(profile).parcels.every((one) => Number.isFinite(one.cape))).toBe(true);
  });

  it('begins where humidity begins', () => {
    const profile = withColumn('specificHumidity', (q, k) => (k < 2 ? NaN : q));
    expect(soundingOf(profile).notes.join()).toMatch(/Humidity begins/);
    expect(parcel(profile, 'surface-based').why).toMatch(/surface is missing/);
  });

  it('gives what it can of a sounding that ends at 700 hPa', () => {
    const air = airLevels(upTo(EVENING, 700));
    const storm = stormOf(
      profileOf({ ...air, u: Array.from(air.heightAgl, () => 8), v: Array.from(air.heightAgl, () => 9) }),
    );
    const surface = storm.parcels[0]!;
    expect(surface.lclPressure).toBeGreaterThan(70_000);
    // Free only above 700 hPa, or not at all: that cannot be known.
    expect(surface.cape === 0).toBe(false);
    expect(surface.why).toMatch(/700 hPa/);
    expect(storm.clusters.cloudLayer.why).toMatch(/end at 700 hPa; 500 hPa is needed/);
  });

  it('is not assessable without anything', () => {
    const storm = stormOf(profileOf({ heightAgl: [] }));
    expect(storm.status).toBe('not-assessable');
    expect(storm.why).not.toBe('');
    expect(storm.parcels).toHaveLength(4);
  });
});
