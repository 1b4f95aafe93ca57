import { describe, expect, it } from 'vitest';
import { assessStorm, deepSounding, parcelTrace, fineEnvironment, soundingOf, stormOf } from '../../src/storm/index.ts';
import { airLevels, EVENING, MIDNIGHT, PLAINS, profileOf, upTo } from './soundings.ts';

const HOUR = 3_600_000;
const air = airLevels(MIDNIGHT);
const westerly = (heights: ArrayLike<number>, speed: number) => ({
  heightAgl: Array.from(heights),
  u: Array.from(heights, () => speed),
  v: Array.from(heights, (z) => z / 1000),
});
const sounding = (timeMs: number, station = PLAINS) =>
  profileOf({ ...air, ...westerly(air.heightAgl, 20) }, station, timeMs);
const profiler = (timeMs: number) =>
  profileOf(westerly([100, 500, 1000, 2000, 3000], 10), { ...PLAINS, id: 'profiler' }, timeMs);

describe('what is taken from a sounding above an instrument’s top', () => {
  it('continues the wind, so that storm and cluster motion can be told, and says from where', () => {
    const wind = profiler(7 * HOUR);
    const alone = stormOf(wind, { air: sounding(5 * HOUR) });
    expect(alone.shear.to6km.why).toMatch(/6000 m are needed/);
    expect(alone.windAloft).toBeNull();
    const aloft = sounding(5 * HOUR);
    const { numbers, hodograph } = assessStorm(wind, { air: aloft, aloft });
    expect(numbers.windAloft).toMatchObject({ station: 'plains', ageS: 2 * 3600, above: 3000 });
    expect(numbers.notes.join()).toMatch(/Wind above 3000 m comes from Plains, 2.0 h older/);
    // From 10 m/s below to 20 above, and 1 m/s of v for every km: 5.9 in v from 100 m to 6 km.
    expect(numbers.shear.to6km.value).toBeCloseTo(Math.hypot(10, 5.9), 4);
    expect(numbers.shear.to1km.value).toBeCloseTo(0.9, 4);
    expect(hodograph.heightAgl[5]!).toBeGreaterThan(3000);
    expect(Number.isFinite(numbers.clusters.downwind.u)).toBe(true);
  });

  it('heeds that the two stations stand at different heights', () => {
    const high = { ...PLAINS, elevation: 900 };
    const { hodograph } = assessStorm(profiler(0), { aloft: sounding(0, high) });
    const first = Array.from(air.heightAgl).find((z) => z + 500 > 3000)!;
    expect(hodograph.heightAgl[5]).toBeCloseTo(first + 500, 2);
  });

  it('does not use wind older than six hours, and says so', () => {
    const storm = stormOf(profiler(8 * HOUR), { air: sounding(0), aloft: sounding(0) });
    expect(storm.windAloft).toBeNull();
    expect(storm.why).toMatch(/last measured 8.0 h before; more than 6 h is not used/);
    expect(storm.parcels[2]!.cape).toBeGreaterThan(0);
  });

  it('continues air that ends too low for energies, and leaves deep air alone', () => {
    const low = profileOf({ ...airLevels(upTo(MIDNIGHT, 700)) }, { ...PLAINS, id: 'radiometer' }, 2 * HOUR);
    expect(stormOf(low).parcels[3]!.why).not.toBe('');
    const storm = stormOf(low, { aloft: sounding(0) });
    expect(storm.airAloft).toMatchObject({ station: 'plains', ageS: 7200 });
    expect(storm.notes.join()).toMatch(/Temperature and humidity above \d+ m come from Plains/);
    // The same air below and above: the same numbers as of the whole sounding.
    const whole = stormOf(sounding(0));
    expect(storm.parcels[3]!.cape).toBeCloseTo(whole.parcels[3]!.cape, 6);
    expect(storm.parcels[3]!.elHeight).toBeCloseTo(whole.parcels[3]!.elHeight, 3);
    expect(stormOf(sounding(0), { aloft: sounding(-HOUR) }).airAloft).toBeNull();
  });

  it('finds the newest sounding that is deep, young and not later', () => {
    const shallow = profileOf(airLevels(upTo(EVENING, 700)), PLAINS, 3 * HOUR);
    const wind = profiler(4 * HOUR);
    const found = deepSounding(wind, [sounding(0), sounding(2 * HOUR), shallow, sounding(5 * HOUR)], 12 * 3600);
    expect(found!.timeMs).toBe(2 * HOUR);
    expect(deepSounding(profiler(20 * HOUR), [sounding(0)], 12 * 3600)).toBeUndefined();
  });
});

describe('wind without any pressure', () => {
  const heights = [100, 1500, 3000, 6000, 9500];
  it('has its cloud-layer wind at the heights of the standard atmosphere, and says so', () => {
    const storm = stormOf(profileOf(westerly(heights, 12)));
    expect(storm.clusters.cloudLayer.u).toBeCloseTo(12, 5);
    // US Standard Atmosphere 1976: 850, 700, 500, 300 hPa at 1457, 3012, 5574, 9164 m; the station stands at 400 m.
    expect(storm.clusters.cloudLayer.v).toBeCloseTo((1.457 + 3.012 + 5.574 + 9.164) / 4 - 0.4, 2);
    expect(storm.notes.join()).toMatch(/heights of the standard atmosphere/);
  });
});

describe('noAir', () => {
  it('is told in place of the profile’s own lack', () => {
    const storm = stormOf(profiler(0), { noAir: 'The last temperature and humidity are 14.0 h old.' });
    expect(storm.parcels.every(({ why }) => why.includes('14.0 h old'))).toBe(true);
    expect(storm.inflow.kind).toBe('not-assessable');
    expect(storm.status).toBe('partly');
  });
});

describe('parcelTrace', () => {
  it('encloses the energies that the parcel is told to have', () => {
    const one = soundingOf(sounding(0));
    const { start, cape, lclPressure, cin, negativeAboveLfc } = stormOf(sounding(0)).parcels[3]!;
    const trace = parcelTrace(fineEnvironment(one), start!);
    expect(trace.pressure[0]).toBeCloseTo(start!.pressure, 3);
    expect(Array.from(trace.pressure).some((p) => Math.abs(p - lclPressure) < 1e-3)).toBe(true);
    // Rd times the sum of all areas between the two virtual temperatures over -ln p, up to where the last is positive.
    let last = trace.pressure.length - 1;
    while (trace.virtualTemperature[last]! < trace.surroundings[last]!) last--;
    let area = 0;
    for (let k = 1; k <= last; k++) {
      const excess = (j: number): number => trace.virtualTemperature[j]! - trace.surroundings[j]!;
      area += ((excess(k) + excess(k - 1)) / 2) * Math.log(trace.pressure[k - 1]! / trace.pressure[k]!);
    }
    expect(Math.abs(287.05 * area - (cape + cin + negativeAboveLfc))).toBeLessThan(10);
  });
});
