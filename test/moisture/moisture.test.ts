import { describe, expect, it } from 'vitest';
import { GAS_CONSTANT_DRY, GRAVITY } from '../../src/air/index.ts';
import { moistureOf } from '../../src/moisture/index.ts';
import { unplacedStation } from '../../src/profile/index.ts';
import { profileOf } from '../support/profiles.ts';

const HEIGHTS = [0, 250, 500, 1000, 1500, 2000, 3000, 4000];
const sounding = {
  heightAgl: HEIGHTS,
  speed: [5, 12, 18, 14, 10, 9, 12, 15],
  direction: [170, 180, 190, 200, 210, 220, 230, 240],
  pressure: HEIGHTS.map((z) => 97_000 * Math.exp(-z / 8500)),
  temperature: HEIGHTS.map((z) => 300 - 0.007 * z),
  specificHumidity: [0.015, 0.0145, 0.014, 0.012, 0.009, 0.005, 0.003, 0.002],
};
const here = { ...unplacedStation('here'), elevation: 300 };

describe('moistureOf', () => {
  it('gives every number of a full sounding', () => {
    const numbers = moistureOf(profileOf(sounding, here), { jetLayer: { bottom: 250, top: 1000 } });
    expect(numbers).toMatchObject({ status: 'ok', why: '', humidityFrom: 'here', humidityAgeS: 0, notes: [] });
    expect(numbers.transport.size).toBeGreaterThan(numbers.below3Km.size);
    expect(numbers.below3Km.size).toBeGreaterThan(numbers.inJet.size);
    expect(numbers.below3Km.reaches).toBe(3000);
    expect(numbers.flux.heightAgl).toHaveLength(HEIGHTS.length);
    expect(numbers.thetaE.value[0]).toBeGreaterThan(340);
  });

  it('agrees between the pressure and the height form on hydrostatic air within 1 %', () => {
    // Isothermal air: p = p0 exp(-z g/(Rd T)) makes rho dz = -dp/g, but for the vapour's 0.6 %.
    const heights = Array.from({ length: 61 }, (_, k) => 50 * k);
    const temperature = 290;
    const scale = (GAS_CONSTANT_DRY * temperature) / GRAVITY;
    const profile = profileOf({
      heightAgl: heights,
      speed: heights.map(() => 12),
      direction: heights.map(() => 200),
      pressure: heights.map((z) => 98_000 * Math.exp(-z / scale)),
      temperature: heights.map(() => temperature),
      specificHumidity: heights.map((z) => 0.012 * Math.exp(-z / 2000)),
    });
    const { transport, below3Km } = moistureOf(profile);
    expect(Math.abs(transport.size / below3Km.size - 1)).toBeLessThan(0.01);
  });

  it('follows pressure limits', () => {
    const all = moistureOf(profileOf(sounding));
    const part = moistureOf(profileOf(sounding), { bottomPressure: 95_000, topPressure: 85_000 });
    expect(part.transport.size).toBeLessThan(all.transport.size);
    expect(part.precipitableWater).toBeLessThan(all.precipitableWater);
    expect(part.below3Km).toEqual(all.below3Km);
  });

  it('works pressure up from the ground where none is measured, and says so', () => {
    const { pressure, ...without } = sounding;
    const measured = moistureOf(profileOf(sounding, here));
    const given = moistureOf(profileOf(without, here), { surfacePressure: pressure[0]! });
    expect(given.notes).toEqual(['pressure worked up from the surface pressure']);
    expect(Math.abs(given.below3Km.size / measured.below3Km.size - 1)).toBeLessThan(0.03);
    const standard = moistureOf(profileOf(without, here));
    expect(standard.notes).toEqual(['pressure worked up from the standard surface pressure of the station']);
    expect(moistureOf(profileOf(without)).notes[0]).toContain('no elevation');
  });

  it('fills pressure between and beyond measured levels as hydrostatic balance asks', () => {
    const pressure = sounding.pressure.map((value, k) => (k === 1 || k === 5 ? value : NaN));
    const filled = moistureOf(profileOf({ ...sounding, pressure }, here));
    const measured = moistureOf(profileOf(sounding, here));
    expect(Math.abs(filled.precipitableWater / measured.precipitableWater - 1)).toBeLessThan(0.02);
  });

  it('finds the top of the moist layer and potential instability', () => {
    const numbers = moistureOf(profileOf(sounding, here));
    // Half of 15 g/kg is reached between 9 g/kg at 1500 m and 5 g/kg at 2000 m.
    expect(numbers.moistTop).toBeCloseTo(1500 + (500 * 1.5) / 4, 1);
    expect(numbers.instability.slope).toBeLessThan(0);
    expect(numbers.instability.leastHeight).toBeGreaterThan(numbers.instability.greatestHeight);
  });

  it.each([
    ['no humidity', { ...sounding, specificHumidity: undefined }],
    ['no humidity', { ...sounding, specificHumidity: HEIGHTS.map(() => NaN) }],
    ['no wind', { ...sounding, speed: HEIGHTS.map(() => NaN), direction: HEIGHTS.map(() => NaN) }],
    ['neither pressure nor temperature', { ...sounding, pressure: undefined, temperature: undefined }],
    ['no humidity', { heightAgl: [] }],
    [
      'humidity at a single level only',
      { heightAgl: [10], speed: [5], direction: [5], pressure: [1e5], specificHumidity: [0.01] },
    ],
  ])('says why it cannot: %s', (why, levels) => {
    const numbers = moistureOf(profileOf(levels));
    expect(numbers.status).toBe('not-assessable');
    expect(numbers.why).toContain(why);
    expect(numbers.transport.size).toBeNaN();
  });

  it('still gives precipitable water where only the wind is missing', () => {
    const numbers = moistureOf(profileOf({ ...sounding, speed: HEIGHTS.map(() => NaN) }));
    expect(numbers.precipitableWater).toBeGreaterThan(20);
  });
});
