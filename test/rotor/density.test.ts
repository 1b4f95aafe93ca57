import { describe, expect, it } from 'vitest';
import { unplacedStation } from '../../src/profile/index.ts';
import { densityAt } from '../../src/rotor/index.ts';
import { profileOf } from '../support/profiles.ts';

const sea = { ...unplacedStation('sea'), elevation: 0 };

describe('densityAt', () => {
  it('gives the reference density of IEC 61400-12-1 for dry air at 15 degrees Celsius and 1013.25 hPa', () => {
    const profile = profileOf({ heightAgl: [0, 100], pressure: [101_325, 101_325], temperature: [288.15, 288.15] });
    expect(densityAt(profile, 0).airDensity).toBeCloseTo(1.225, 3);
    expect(densityAt(profile, 0).densityFrom).toBe('pressure and temperature, taken as dry');
  });

  it('carries the pressure up by itself: US Standard Atmosphere 1976 at 1000 m is 1.1117 kg/m3', () => {
    const profile = profileOf({ heightAgl: [950, 1000], pressure: [90_413, NaN], temperature: [281.98, 281.65] }, sea);
    expect(densityAt(profile, 1000).airDensity).toBeCloseTo(1.1117, 3);
  });

  it('takes the standard pressure where there is none, and says so', () => {
    const profile = profileOf({ heightAgl: [1000], temperature: [281.651] }, sea);
    const { airDensity, densityFrom } = densityAt(profile, 1000);
    expect(airDensity).toBeCloseTo(1.1117, 3);
    expect(densityFrom).toContain('standard atmosphere');
  });

  it('makes moist air lighter', () => {
    const levels = { heightAgl: [100], pressure: [1e5], temperature: [300] };
    const moist = densityAt(profileOf({ ...levels, specificHumidity: [0.02] }), 100).airDensity;
    // Tv = T (1 + (1/eps - 1) q): 1.2 % at 20 g/kg.
    expect(densityAt(profileOf(levels), 100).airDensity / moist).toBeCloseTo(1 + 0.6077 * 0.02, 4);
  });

  it.each([
    ['no temperature', { heightAgl: [100], pressure: [1e5] }, 'no temperature near the hub'],
    ['temperature far away', { heightAgl: [400], temperature: [280] }, 'no temperature near the hub'],
    ['no elevation', { heightAgl: [100], temperature: [280] }, 'no pressure, and the station has no elevation'],
  ])('says why it cannot: %s', (_, levels, why) => {
    const { airDensity, densityFrom } = densityAt(profileOf(levels), 100);
    expect(airDensity).toBeNaN();
    expect(densityFrom).toContain(why);
  });
});
