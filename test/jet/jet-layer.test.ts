import { describe, expect, it } from 'vitest';
import { CRITERIA, findJets, jetLayer, thermalTurn } from '../../src/jet/index.ts';
import { profileOf } from './support.ts';

const heightAgl = [50, 100, 200, 300, 400, 500, 600, 800, 1000, 1300, 1600, 1900, 2200];
const speed = [6, 9, 14, 18, 14, 11, 9, 8, 8, 9, 9, 9, 9];
const direction = heightAgl.map(() => 180);

describe('jetLayer', () => {
  // Core at half the fall, 13 m/s: below at 180 m (9 to 14 over 100 m), above at 433.33 m (14 to 11 over 100 m).
  const profile = profileOf({
    heightAgl,
    speed,
    direction,
    temperature: heightAgl.map((z) => 290 - 0.0098 * z + 0.01 * z),
  });
  const [jet] = findJets(profile, CRITERIA['whiteman-1997']).jets;
  const layer = jetLayer(profile, jet!, [
    { hubHeight: 250, rotorDiameter: 120 },
    { hubHeight: 100, rotorDiameter: 100 },
    { hubHeight: 600, rotorDiameter: 100 },
  ]);

  it('tells thickness and shear between nose and bounds', () => {
    expect(layer.thickness).toBeCloseTo(433.333 - 180, 2);
    expect(layer.thicknessIsBound).toBe(false);
    expect(layer.below.shear).toBeCloseTo((18 - 13) / 120, 6);
    expect(layer.above.shear).toBeCloseTo((18 - 13) / 133.333, 5);
  });

  it('tells the Richardson number where temperature is known', () => {
    // About 0.01 K/m of potential temperature (g/cp is 0.00976): Ri = g/theta (dtheta/dz) / shear^2, theta near 292 K.
    const gradient = 0.01 - 0.0098 + 9.80665 / 1004.675;
    const expected = ((9.80665 / 292.4) * gradient) / layer.below.shear ** 2;
    expect(layer.below.richardson / expected).toBeCloseTo(1, 2);
    const dry = profileOf({ heightAgl, speed, direction });
    expect(jetLayer(dry, findJets(dry, CRITERIA['whiteman-1997']).jets[0]!).below.richardson).toBeNaN();
  });

  it('tells the nose against each rotor', () => {
    expect(layer.noseAgainstDiscs).toEqual(['in', 'above', 'below']);
  });
});

describe('thermalTurn', () => {
  // 5 degrees over each 300 m above 1000 m.
  const veering = profileOf({ heightAgl, speed, direction: heightAgl.map((z) => 200 + z / 60) });

  it('knows warm from cold in both hemispheres', () => {
    expect(thermalTurn(veering, 500, 45)).toMatchObject({ status: 'told', sense: 'warm' });
    expect(thermalTurn(veering, 500, -45)).toMatchObject({ status: 'told', sense: 'cold' });
    expect(thermalTurn(veering, 500, 45).words).toMatch(/^The wind veers by .* warmer air .* Friction/);
  });

  it('says why it cannot tell', () => {
    expect(thermalTurn(veering, 500, 3).why).toContain('equator');
    expect(thermalTurn(veering, 500, NaN).why).toContain('latitude');
    expect(thermalTurn(veering, 1900, 45).why).toContain('Winds end at 2200 m');
    const speedOnly = profileOf({ heightAgl, speed });
    expect(thermalTurn(speedOnly, 500, 45).why).toContain('Too few winds');
  });
});
