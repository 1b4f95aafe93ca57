// The real night on the command line, against numbers computed by another program (real/README.md of the outside data).

import { describe, expect, it } from 'vitest';
import { readSharedJson, sharedIsHere, sharedPath } from '../support/shared.ts';
import { duskveer } from './command-line.ts';

interface Minimum {
  readonly fallOff: number;
  readonly category: number | null;
}
interface Rotor {
  readonly alpha: number | null;
  readonly speed100: number;
  readonly direction100: number;
  readonly veer40to160: number | null;
}
interface ExpectedTime {
  readonly time: string;
  readonly jet: {
    readonly noseHeight: number;
    readonly noseSpeed: number;
    readonly noseDirection: number;
    readonly firstMinimum: Minimum;
    readonly layerMinimum: Minimum;
  };
  readonly rotorAllLevels: Rotor;
}
interface JetLine {
  readonly time: string;
  readonly status: string;
  readonly jets: Record<string, number>[];
}

describe.skipIf(!sharedIsHere)('the real night', () => {
  const night = sharedIsHere ? sharedPath('real/night/combined_radar_data_qc.csv') : '';
  const expected = sharedIsHere
    ? (readSharedJson('real/expected/night-numbers.json') as { times: ExpectedTime[] }).times
    : [];

  it.each([
    ['whiteman-1997-strongest', 'firstMinimum'],
    ['whiteman-1997-layer', 'layerMinimum'],
  ] as const)('%s finds the same jets at every hour', async (criteria, minimum) => {
    const ran = await duskveer(['jets', '--criteria', criteria, night]);
    expect(ran).toMatchObject({ code: 0, err: '' });
    const lines = ran.lines() as unknown as JetLine[];
    expect(lines).toHaveLength(145);
    for (const { time, jet } of expected) {
      const line = lines.find((candidate) => candidate.time === time)!;
      const want = jet[minimum];
      expect(line.status, time).toBe(want.category === null ? 'no-jet' : 'jet');
      if (want.category === null) continue;
      const got = line.jets[0]!;
      expect(got.category, time).toBe(want.category);
      expect(got.nose_height_agl_m, time).toBeCloseTo(jet.noseHeight, 1);
      // Half a unit of the digits given, and what 32-bit floats cost.
      expect(Math.abs(got.nose_speed_mps! - jet.noseSpeed), time).toBeLessThan(0.0055);
      expect(Math.abs(got.nose_direction_deg! - jet.noseDirection), time).toBeLessThan(0.055);
      expect(Math.abs(got.falloff_mps! - want.fallOff), time).toBeLessThan(0.0055);
    }
  });

  it('the default criteria give a line for each profile', async () => {
    const ran = await duskveer(['jets', night]);
    const lines = ran.lines() as unknown as JetLine[];
    expect(lines).toHaveLength(145);
    expect(lines.filter((line) => line.status === 'jet').length).toBeGreaterThan(50);
  });

  it('the rotor numbers are the same at every hour', async () => {
    const lines = (await duskveer(['rotor', '--screens', 'gross', '--hub', '100', '--diameter', '120', night])).lines();
    expect(lines).toHaveLength(145);
    for (const { time, rotorAllLevels: want } of expected) {
      const line = lines.find((candidate) => candidate.time === time)!;
      expect(Math.abs((line.hub_speed_mps as number) - want.speed100), time).toBeLessThan(0.002);
      expect(Math.abs((line.hub_direction_deg as number) - want.direction100), time).toBeLessThan(0.02);
      if (want.alpha !== null) expect(Math.abs((line.shear_exponent as number) - want.alpha), time).toBeLessThan(2e-4);
      if (want.veer40to160 !== null)
        expect(Math.abs((line.veer_deg as number) - want.veer40to160), time).toBeLessThan(0.03);
    }
  });
});
