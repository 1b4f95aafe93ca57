// The real night's 73 times, as two independent programs read them.

import { describe, expect, it } from 'vitest';
import { CRITERIA, findJets } from '../../src/jet/index.ts';
import { readShared, readSharedJson, sharedIsHere } from '../support/shared.ts';
import { profileOf } from './support.ts';

interface Minimum {
  height: number;
  speed: number;
  fallOff: number;
  isTop: boolean;
  category: number | null;
}
interface NightTime {
  time: string;
  jet: {
    noseHeight: number;
    noseSpeed: number;
    noseDirection: number;
    firstMinimum: Minimum;
    layerMinimum: Minimum;
  };
  localMaximum: {
    adjacentFound: boolean;
    adjacentLowest: {
      height: number;
      speed: number;
      direction: number;
      excessBelow: number;
      excessAbove: number;
    } | null;
  };
}

/** height, speed, direction by time, out of the table's fixed columns. */
function nightLevels(): Map<string, { heightAgl: number[]; speed: number[]; direction: number[] }> {
  const times = new Map<string, { heightAgl: number[]; speed: number[]; direction: number[] }>();
  const lines = new TextDecoder().decode(readShared('real/night/combined_radar_data_qc.csv')).trim().split('\n');
  for (const line of lines.slice(1)) {
    const [datetime, height, , , speed, direction] = line.split(',');
    const time = `${datetime!.replace(' ', 'T')}Z`;
    const levels = times.get(time) ?? { heightAgl: [], speed: [], direction: [] };
    levels.heightAgl.push(Number(height));
    levels.speed.push(Number(speed));
    levels.direction.push(Number(direction));
    times.set(time, levels);
  }
  return times;
}

describe.skipIf(!sharedIsHere)('the real night', () => {
  const levels = sharedIsHere ? nightLevels() : new Map<string, never>();
  const expected = sharedIsHere
    ? (readSharedJson('real/expected/night-numbers.json') as { times: NightTime[] }).times
    : [];
  const half = (decimals: number): number => 0.5 * 10 ** -decimals + 5e-6;

  it.each([
    ['whiteman-1997-strongest', 'firstMinimum'],
    ['whiteman-1997-layer', 'layerMinimum'],
  ] as const)('agrees by %s with %s', (name, key) => {
    expect(expected).toHaveLength(73);
    for (const { time, jet: want } of expected) {
      const jet = findJets(profileOf(levels.get(time)!), CRITERIA[name], { memberPairs: 1 }).jets[0];
      expect(jet?.category ?? null, time).toBe(want[key].category);
      if (jet === undefined) continue;
      expect(Math.abs(jet.noseHeight - want.noseHeight), time).toBeLessThan(half(1));
      expect(Math.abs(jet.noseSpeed - want.noseSpeed), time).toBeLessThan(half(2));
      expect(Math.abs(jet.noseDirection - want.noseDirection), time).toBeLessThan(half(1));
      expect(Math.abs(jet.minimumHeight - want[key].height), time).toBeLessThan(half(1));
      expect(Math.abs(jet.falloff - want[key].fallOff), time).toBeLessThan(half(2));
    }
  });

  // The night's numbers know no point added at the ceiling, the criteria do: it can only deepen the fall-off.
  it.each([
    ['up to the ceiling', 1500],
    ['of the whole profile', Infinity],
  ])('agrees by andreas-2000 with the lowest maximum between its neighbouring minima, levels %s', (_, top) => {
    for (const { time, localMaximum: want } of expected) {
      const all = levels.get(time)!;
      const count = all.heightAgl.filter((height) => height <= top).length;
      const profile = profileOf({
        heightAgl: all.heightAgl.slice(0, count),
        speed: all.speed.slice(0, count),
        direction: all.direction.slice(0, count),
      });
      const jet = findJets(profile, CRITERIA['andreas-2000'], { memberPairs: 1 }).jets[0];
      expect(jet !== undefined, time).toBe(want.adjacentFound);
      if (jet === undefined) continue;
      const lowest = want.adjacentLowest!;
      // At 10:50 the levels at 481 and 536 m read 16.299999999999994 and 16.3 m/s: equal as 32-bit floats, and within the
      // tolerance that the night's numbers state. The lowest of equals is the nose.
      const height = time === '2013-11-09T10:50:00Z' ? 481 : lowest.height;
      expect(Math.abs(jet.noseHeight - height), time).toBeLessThan(half(1));
      expect(Math.abs(jet.noseSpeed - lowest.speed), time).toBeLessThan(half(2));
      expect(Math.abs(jet.rise - lowest.excessBelow), time).toBeLessThan(half(2));
      if (top === 1500) expect(Math.abs(jet.falloff - lowest.excessAbove), time).toBeLessThan(half(2));
      else expect(jet.falloff, time).toBeGreaterThan(lowest.excessAbove - half(2));
    }
  });
});
