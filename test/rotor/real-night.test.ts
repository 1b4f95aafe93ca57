// The real night's shear, veer and hub wind, against numbers that two separate programs agreed on.

import { describe, expect, it } from 'vitest';
import { windOnDisc } from '../../src/rotor/index.ts';
import { readSharedJson, sharedIsHere } from '../support/shared.ts';
import { profileOf } from '../support/profiles.ts';
import { nightLevels, type NightSource } from './support.ts';

interface NightRotor {
  readonly alpha: number;
  readonly speed100: number;
  readonly direction100: number;
  readonly veer40to160: number;
}

interface NightTime {
  readonly time: string;
  readonly rotorAllLevels: NightRotor;
  readonly rotorTowerOnly: NightRotor;
}

describe.skipIf(!sharedIsHere)('the real night, disc from 40 to 160 m', () => {
  const disc = { hubHeight: 100, rotorDiameter: 120 };
  const everySource: readonly NightSource[] = ['tower', 'low-mode', 'high-mode'];
  it.each([
    ['rotorAllLevels', everySource],
    ['rotorTowerOnly', ['tower'] as const],
  ] as const)('%s', (key, sources) => {
    const { times } = readSharedJson('real/expected/night-numbers.json') as { times: NightTime[] };
    const levels = nightLevels(sources);
    expect(times).toHaveLength(73);
    for (const { time, [key]: want } of times) {
      const wind = windOnDisc(profileOf(levels.get(time.replace('T', ' ').replace('Z', ''))!), disc);
      // Half a unit of the last digit shown, and what 32-bit levels cost.
      expect(Math.abs(wind.shearExponent - want.alpha), time).toBeLessThan(0.5e-4 + 1e-6);
      expect(Math.abs(wind.hubSpeed - want.speed100), time).toBeLessThan(0.5e-3 + 1e-5);
      expect(Math.abs(wind.hubDirection - want.direction100), time).toBeLessThan(0.5e-2 + 1e-4);
      expect(Math.abs(wind.veer - want.veer40to160), time).toBeLessThan(0.5e-2 + 1e-4);
      expect(wind.veerPer100M, time).toBeCloseTo(wind.veer / 1.2, 9);
    }
  });
});
