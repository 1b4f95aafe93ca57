import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  farmOutput,
  fitFarmFactor,
  keepsTurning,
  ratedPower,
  typeOutput,
  windOnDisc,
  type DiscWind,
} from '../../src/rotor/index.ts';
import type { TurbineType } from '../../src/site/index.ts';
import { profileOf } from '../support/profiles.ts';

const turbine: TurbineType = {
  name: 'Heron 130',
  count: 4,
  hubHeight: 110,
  rotorDiameter: 130,
  powerCurve: { speed: [3, 6, 12, 25], powerKw: [0, 400, 3000, 3000], airDensity: 1.225 },
  cutIn: 3,
  rated: 12,
  cutOut: 25,
  restart: 22,
  groundElevation: NaN,
};
const HEIGHTS = [30, 60, 90, 120, 150, 180];
const windOf = (speed: number, more: object = {}): DiscWind =>
  windOnDisc(profileOf({ heightAgl: HEIGHTS, speed: HEIGHTS.map(() => speed), ...more }), turbine);

describe('keepsTurning', () => {
  it('stops above cut-out and starts again only below restart', () => {
    const speeds = [20, 25, 25.1, 24, 22, 21.9, 24, 26];
    let turning = true;
    const went = speeds.map((speed) => (turning = keepsTurning(turbine, turning, speed)));
    expect(went).toEqual([true, true, false, false, false, true, true, false]);
  });

  it('has no memory where no restart speed is stated, and takes the end of the curve for cut-out', () => {
    const plain = { ...turbine, cutOut: NaN, restart: NaN };
    expect(keepsTurning(plain, false, 25)).toBe(true);
    expect(keepsTurning(plain, true, 25.1)).toBe(false);
  });

  it('stays as it was when the wind is not known', () => {
    expect(keepsTurning(turbine, false, NaN)).toBe(false);
    expect(keepsTurning(turbine, true, NaN)).toBe(true);
  });
});

describe('typeOutput', () => {
  it('reads the curve with the wind at hub and with the equivalent wind', () => {
    const { hubKw, equivalentKw, state } = typeOutput(turbine, [windOf(9), windOf(2), windOf(12)]);
    expect(hubKw[0]).toBeCloseTo(1700, 3);
    expect(equivalentKw[0]).toBeCloseTo(1700, 3);
    expect([...hubKw].slice(1)).toEqual([0, 3000]);
    expect(state).toEqual(['turning', 'below-cut-in', 'turning']);
  });

  it('yields more in denser air', () => {
    const air = (temperature: number): object => ({
      temperature: HEIGHTS.map(() => temperature),
      pressure: HEIGHTS.map(() => 101_325),
    });
    const [cold, warm] = typeOutput(turbine, [windOf(9, air(258)), windOf(9, air(308))]).hubKw;
    expect(cold).toBeGreaterThan(1700);
    expect(warm).toBeLessThan(1700);
  });

  it('stops in high wind and remembers it', () => {
    const { hubKw, state } = typeOutput(turbine, [windOf(24), windOf(26), windOf(23), windOf(21)]);
    expect([...hubKw]).toEqual([3000, 0, 0, 3000]);
    expect(state).toEqual(['turning', 'stopped-high-wind', 'stopped-high-wind', 'turning']);
  });

  it('is missing where the wind is, or the curve', () => {
    const outside = windOnDisc(profileOf({ heightAgl: [10, 20], speed: [3, 4] }), turbine);
    expect(typeOutput(turbine, [outside]).hubKw[0]).toBeNaN();
    expect(typeOutput({ ...turbine, powerCurve: null }, [windOf(9)]).state).toEqual(['not-assessable']);
  });
});

describe('farmOutput', () => {
  it('adds up counts and carries the factor', () => {
    const small = { ...turbine, name: 'Wren 60', count: 2 };
    const winds = [windOf(9)];
    const farm = farmOutput([typeOutput(turbine, winds), typeOutput(small, winds)], 0.9);
    expect(farm.hubKw[0]).toBeCloseTo(6 * 1700 * 0.9, 2);
    expect(farm.ratedKw).toBe(6 * 3000);
    expect(farm.differenceKw[0]).toBeCloseTo(0, 3);
    expect(farm.about).toContain('Wakes, availability and curtailment are not in it');
  });

  it('tells what the shape of the profile adds or takes', () => {
    const nose = windOnDisc(
      profileOf({ heightAgl: HEIGHTS, speed: HEIGHTS.map((z) => 11 - Math.abs(z - 110) / 20) }),
      turbine,
    );
    const { differenceKw } = farmOutput([typeOutput(turbine, [nose])]);
    expect(differenceKw[0]).toBeLessThan(-500);
  });

  it('leaves out types of which none stands, and says why a farm has no output', () => {
    const none = { ...turbine, count: 0, powerCurve: null };
    const winds = [windOf(9)];
    expect(farmOutput([typeOutput(turbine, winds), typeOutput(none, winds)]).hubKw[0]).toBeCloseTo(4 * 1700, 2);
    expect(farmOutput([typeOutput(none, winds)]).why).toBe('the site has no turbines');
    const bare = { ...turbine, powerCurve: null };
    expect(farmOutput([typeOutput(bare, winds)]).why).toBe('no power curve for Heron 130');
    expect(ratedPower(bare)).toBeNaN();
  });
});

describe('fitFarmFactor', () => {
  it('finds the factor behind a scaled output, missing values or not (property)', () => {
    const power = fc.double({ min: 100, max: 12_000, noNaN: true });
    fc.assert(
      fc.property(
        fc.array(power, { minLength: 20, maxLength: 60 }),
        fc.double({ min: 0.5, max: 1, noNaN: true }),
        (kw, f) => {
          const actual = kw.map((value, k) => (k % 7 === 3 ? NaN : value * f));
          const fit = fitFarmFactor(kw, actual);
          expect(fit.factor).toBeCloseTo(f, 9);
          expect(fit.uncertainty).toBeLessThan(1e-6);
        },
      ),
    );
  });

  it('says why it cannot', () => {
    expect(fitFarmFactor([1, 2], [1, 2]).why).toBe('only 2 times with both outputs, 12 are needed');
    const zeros = Array<number>(20).fill(0);
    expect(fitFarmFactor(zeros, zeros).why).toBe('the reckoned output is zero throughout');
  });
});
