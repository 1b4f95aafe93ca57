import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { EPSILON, GAS_CONSTANT_DRY, HEAT_CAPACITY_DRY, saturationVapourPressure } from '../../src/air/index.ts';
import { fineEnvironment, liftParcel, parcelTemperatures, soundingOf, stormOf } from '../../src/storm/index.ts';
import { airLevels, EVENING, MIDNIGHT, profileOf, upTo } from './soundings.ts';

const sounding = soundingOf(profileOf(airLevels(EVENING)));

/** Steps dT/dln p of the pseudoadiabat by lapse rate, with Bolton's (1980) eq. 2 for the latent heat: another route. */
function byLapseRate(temperature: number, fromPa: number, toPa: number): number {
  const steps = 4000;
  const step = Math.log(toPa / fromPa) / steps;
  const slope = (t: number, lnPressure: number): number => {
    const vapour = saturationVapourPressure(t);
    const ratio = (EPSILON * vapour) / (Math.exp(lnPressure) - vapour);
    const latent = 2.501e6 - 2370 * (t - 273.15);
    return (
      (GAS_CONSTANT_DRY * t + latent * ratio) /
      (HEAT_CAPACITY_DRY + (latent * latent * ratio * EPSILON) / (GAS_CONSTANT_DRY * t * t))
    );
  };
  let t = temperature;
  for (let k = 0; k < steps; k++) {
    const at = Math.log(fromPa) + k * step;
    const half = t + (step / 2) * slope(t, at);
    t += step * slope(half, at + step / 2);
  }
  return t;
}

describe('parcelTemperatures', () => {
  it('follows the dry adiabat to the condensation level', () => {
    const start = { pressure: 100_000, temperature: 300, mixingRatio: 0.005 };
    const [at, above, below] = parcelTemperatures(start, [100_000, 90_000]).map((value) => value);
    expect(at).toBeCloseTo(300, 9);
    expect(above).toBeCloseTo(300 * 0.9 ** (2 / 7), 9);
    expect(below).toBeUndefined();
    expect(parcelTemperatures(start, [101_000])[0]).toBeNaN();
  });

  it.each([
    [295, 100_000, 50_000],
    [285, 90_000, 50_000],
    [300, 100_000, 30_000],
    [270, 80_000, 40_000],
  ])('agrees above it with the lapse-rate pseudoadiabat within 0.6 K (%d K from %d to %d Pa)', (t, from, to) => {
    const vapour = saturationVapourPressure(t);
    const start = { pressure: from, temperature: t, mixingRatio: (EPSILON * vapour) / (from - vapour) };
    const got = parcelTemperatures(start, [to])[0]!;
    expect(Math.abs(got - byLapseRate(t, from, to))).toBeLessThan(0.6);
  });
});

describe('liftParcel', () => {
  it('finds neither energy nor inhibition in air that is its own pseudoadiabat and dry adiabat', () => {
    // A dry, dry-adiabatic layer lifted through itself.
    const pressureHpa = [1000, 900, 800, 700];
    const temperatureC = pressureHpa.map((p) => 300 * (p / 1000) ** (2 / 7) - 273.15);
    const dry = soundingOf(profileOf(airLevels({ pressureHpa, temperatureC, dewPointC: [-60, -61.2, -62.4, -63.9] })));
    const ascent = liftParcel(fineEnvironment(dry), { pressure: 100_000, temperature: 300, mixingRatio: 1e-5 });
    expect(ascent.cape).toBe(0);
    expect(ascent.cin).toBeNaN();
  });

  it('keeps order: start, LCL, LFC, EL; CAPE up and CIN down to zero with warmth (property)', () => {
    const environment = fineEnvironment(sounding);
    fc.assert(
      fc.property(
        fc.double({ min: 290, max: 306, noNaN: true }),
        fc.double({ min: 0.004, max: 0.02, noNaN: true }),
        (temperature, mixingRatio) => {
          const start = { pressure: 96_000, temperature, mixingRatio };
          const ascent = liftParcel(environment, start);
          expect(ascent.lclPressure).toBeLessThanOrEqual(96_000.001);
          expect(ascent.cape).toBeGreaterThanOrEqual(0);
          if (Number.isNaN(ascent.lfcPressure)) return;
          expect(ascent.lfcPressure).toBeLessThanOrEqual(ascent.lclPressure + 1e-6);
          expect(ascent.elPressure).toBeLessThan(ascent.lfcPressure);
          expect(ascent.cin).toBeLessThanOrEqual(0);
          expect(ascent.negativeAboveLfc).toBeLessThanOrEqual(0);
          const warmer = liftParcel(environment, { ...start, temperature: temperature + 0.5 });
          expect(warmer.cape).toBeGreaterThan(ascent.cape);
          expect(warmer.cin).toBeGreaterThanOrEqual(ascent.cin);
        },
      ),
      { numRuns: 50 },
    );
  });

  it('returns NaN for air that is not known', () => {
    const ascent = liftParcel(fineEnvironment(sounding), { pressure: 96_000, temperature: NaN, mixingRatio: 0.01 });
    expect(ascent.cape).toBeNaN();
    expect(ascent.lclPressure).toBeNaN();
  });
});

describe('parcels', () => {
  it('reports the bound when buoyant at the top of data', () => {
    const { parcels } = stormOf(profileOf(airLevels(upTo(EVENING, 300))));
    expect(parcels[0]).toMatchObject({ name: 'surface-based', positiveAtTop: true });
    expect(parcels[0]!.elHeight).toBeGreaterThan(8000);
    expect(parcels[0]!.why).toMatch(/lower bound/);
  });

  it('lifts the jet-fed parcel from the moist layer aloft by night, where energy is', () => {
    const { parcels } = stormOf(profileOf(airLevels(MIDNIGHT)));
    const surface = parcels[0]!;
    const fed = parcels[3]!;
    expect(fed.name).toBe('jet-fed');
    expect(fed.startHeight).toBeGreaterThan(300);
    expect(fed.startHeight).toBeLessThan(1500);
    expect(surface.cape).toBe(0);
    expect(surface.why).toMatch(/no LFC/);
    expect(fed.cape).toBeGreaterThan(500);
    expect(fed.liftToLfc).toBeCloseTo(fed.lfcHeight - fed.startHeight, 9);
  });
});

// Weisman & Klemp (1982, Mon. Wea. Rev. 110, 504-520): analytic sounding; for 14 g/kg they give a buoyant energy of
// about 2200 J/kg (from memory; their parcels rise without the virtual correction, hence the wide bounds).
describe('the analytic sounding of Weisman & Klemp', () => {
  it('has about 2200 J/kg with 14 g/kg', () => {
    const theta = (z: number): number =>
      z <= 12_000 ? 300 + 43 * (z / 12_000) ** 1.25 : 343 * Math.exp((9.81 * (z - 12_000)) / (1004.675 * 213));
    const humidity = (z: number): number => (z <= 12_000 ? 1 - 0.75 * (z / 12_000) ** 1.25 : 0.25);
    const levels = {
      heightAgl: [] as number[],
      pressure: [] as number[],
      temperature: [] as number[],
      specificHumidity: [] as number[],
    };
    let exner = 1;
    for (let z = 0; z <= 16_000; z += 100) {
      if (z > 0) exner -= (9.81 * 100) / (1004.675 * ((theta(z) + theta(z - 100)) / 2) * 1.008);
      const pressure = 100_000 * exner ** 3.5;
      const temperature = theta(z) * exner;
      const vapour = humidity(z) * saturationVapourPressure(temperature);
      const ratio = Math.min(0.014, (EPSILON * vapour) / (pressure - vapour));
      levels.heightAgl.push(z);
      levels.pressure.push(pressure);
      levels.temperature.push(temperature);
      levels.specificHumidity.push(ratio / (1 + ratio));
    }
    const { parcels } = stormOf(profileOf(levels));
    expect(parcels[1]!.cape).toBeGreaterThan(1800);
    expect(parcels[1]!.cape).toBeLessThan(2600);
  });
});
