// Halves, tips, continuation and uncertainty of the wind on a disc.

import { describe, expect, it } from 'vitest';
import { windOnDisc } from '../../src/rotor/index.ts';
import { profileOf } from '../support/profiles.ts';

const disc = { hubHeight: 100, rotorDiameter: 120 };
const HEIGHTS = [30, 50, 70, 90, 110, 130, 150, 170];
const powerLaw = (exponent: number) => HEIGHTS.map((z) => 8 * (z / 100) ** exponent);

describe('halves and tips', () => {
  it('gives one exponent throughout for a power law, but for the linear wind between levels', () => {
    const wind = windOnDisc(profileOf({ heightAgl: HEIGHTS, speed: powerLaw(0.3) }), disc);
    expect(wind.shearLower).toBeCloseTo(0.3, 2);
    expect(wind.shearUpper).toBeCloseTo(0.3, 2);
    expect(wind.bottom.speed).toBeCloseTo(8 * 0.4 ** 0.3, 1);
  });

  it('shows the nose at the hub as shear below and negative shear above', () => {
    const speed = HEIGHTS.map((z) => 12 - Math.abs(z - 100) / 20);
    const wind = windOnDisc(profileOf({ heightAgl: HEIGHTS, speed }), disc, { nose: 100 });
    expect(wind.shearLower).toBeGreaterThan(0.2);
    expect(wind.shearUpper).toBeLessThan(-0.2);
    expect(wind.noseInRotor).toBe(true);
  });

  it('raises the disc with the ground it stands on', () => {
    const profile = profileOf({ heightAgl: HEIGHTS.map((z) => 2 * z), speed: powerLaw(0.3) });
    const raised = windOnDisc(profile, disc, { groundOffset: 60, nose: 215 });
    const taller = windOnDisc(profile, { ...disc, hubHeight: 160 });
    expect(raised.hubSpeed).toBe(taller.hubSpeed);
    expect(raised.equivalentSpeed).toBe(taller.equivalentSpeed);
    expect(raised.disc).toEqual(disc);
    expect(raised.noseInRotor).toBe(true);
  });
});

describe('continuation by the power law', () => {
  const low = HEIGHTS.filter((z) => z <= 110);
  const part = profileOf({ heightAgl: low, speed: powerLaw(0.2).slice(0, low.length), direction: low.map(() => 240) });

  it('happens only where the site asks for it, and says how much of the disc rests on it', () => {
    const without = windOnDisc(part, disc);
    expect(without.status).toBe('not-assessable');
    expect(without.continuedShare).toBe(0);
    const wind = windOnDisc(part, disc, { continuation: 'power-law' });
    expect(wind.status).toBe('ok');
    expect(wind.coverage).toBeCloseTo(without.coverage, 12);
    expect(wind.continuedShare).toBeCloseTo(1 - without.coverage, 12);
    expect(wind.top.speed).toBeCloseTo(8 * 1.6 ** 0.2, 5);
    expect(wind.top.direction).toBeCloseTo(240, 9);
  });

  it('continues a power law as itself', () => {
    const whole = windOnDisc(profileOf({ heightAgl: HEIGHTS, speed: powerLaw(0.2) }), disc);
    const wind = windOnDisc(part, disc, { continuation: 'power-law' });
    expect(wind.equivalentSpeed).toBeCloseTo(whole.equivalentSpeed, 2);
    expect(wind.shearExponent).toBeCloseTo(0.2, 5);
  });

  it('is less sure of what is continued', () => {
    const whole = windOnDisc(profileOf({ heightAgl: HEIGHTS, speed: powerLaw(0.2) }), disc, { speedUncertainty: 0.2 });
    const wind = windOnDisc(part, disc, { continuation: 'power-law', speedUncertainty: 0.2 });
    expect(wind.uncertainty.equivalentSpeed).toBeGreaterThan(whole.uncertainty.equivalentSpeed);
  });

  it('leaves a covered disc alone and refuses with too little to stand on', () => {
    const whole = profileOf({ heightAgl: HEIGHTS, speed: powerLaw(0.2) });
    expect(windOnDisc(whole, disc, { continuation: 'power-law' })).toEqual(windOnDisc(whole, disc));
    // Below y/R = -1/6 and -5/6 of the hub lie 39.4 % and 4.0 % of the disc.
    const little = profileOf({ heightAgl: [50, 70, 90], speed: [7, 7.5, 8] });
    const wind = windOnDisc(little, disc, { continuation: 'power-law' });
    expect(wind.status).toBe('not-assessable');
    expect(wind.why).toBe('rotor only 35 % covered; too little of the rotor is measured to continue the wind');
  });
});

describe('uncertainty', () => {
  const profile = profileOf({ heightAgl: HEIGHTS, speed: HEIGHTS.map(() => 10), direction: HEIGHTS.map(() => 90) });

  it('follows from the levels: a uniform wind spreads as the root of the squared shares', () => {
    const { uncertainty, uncertaintyFrom } = windOnDisc(profile, disc, { speedUncertainty: 0.5 });
    // The hub lies halfway between two levels, the tips halfway between two each: 0.5/sqrt 2.
    expect(uncertainty.hubSpeed).toBeCloseTo(0.5 / Math.SQRT2, 9);
    expect(uncertainty.veer).toBeCloseTo(((0.5 / Math.SQRT2 / 10) * Math.SQRT2 * 180) / Math.PI, 9);
    expect(uncertainty.equivalentSpeed).toBeGreaterThan(0.5 / Math.sqrt(8));
    expect(uncertainty.equivalentSpeed).toBeLessThan(0.5 / Math.sqrt(4));
    expect(uncertaintyFrom).toBe('stated');
  });

  it('scales with what is stated, and says when it is assumed', () => {
    const one = windOnDisc(profile, disc, { speedUncertainty: 0.3 }).uncertainty;
    const two = windOnDisc(profile, disc, { speedUncertainty: 0.6 }).uncertainty;
    expect(two.shearExponent / one.shearExponent).toBeCloseTo(2, 9);
    expect(windOnDisc(profile, disc).uncertaintyFrom).toBe('assumed');
  });
});
