// The real night's 73 times, as two independent programs read them.

import { beforeAll, describe, expect, it } from 'vitest';
import { bytesSource, readProfiles } from '../../src/ingest/index.ts';
import { CRITERIA, findJets, storyOf, trackJets } from '../../src/jet/index.ts';
import { profilesOf, type Profile } from '../../src/profile/index.ts';
import { readShared, readSharedJson, sharedIsHere } from '../support/shared.ts';
import { readToEnd } from '../support/sources.ts';

const HOUR_MS = 3600_000;

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

const file = 'real/night/combined_radar_data_qc.csv';

/** The night's profiles by time. */
async function nightProfiles(): Promise<Map<string, Profile>> {
  const { block } = await readToEnd(readProfiles(bytesSource(file, readShared(file))));
  return new Map([...profilesOf(block)].map((profile) => [new Date(profile.timeMs).toISOString(), profile]));
}

/** The profile's levels up to a height. */
function upTo(profile: Profile, top: number): Profile {
  const keep = profile.heightAgl.map((height) => (height <= top ? height : NaN));
  return { ...profile, heightAgl: keep };
}

describe.skipIf(!sharedIsHere)('the real night', () => {
  let profiles = new Map<string, Profile>();
  beforeAll(async () => {
    profiles = await nightProfiles();
  });
  const at = (time: string): Profile => profiles.get(new Date(time).toISOString())!;
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
      const jet = findJets(at(time), CRITERIA[name], { memberPairs: 1 }).jets[0];
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
      const jet = findJets(upTo(at(time), top), CRITERIA['andreas-2000'], { memberPairs: 1 }).jets[0];
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

  it("is told hour by hour: the jet of the night before to its end, the night's own from evening to morning", () => {
    const all = [...profiles.values()].sort((a, b) => a.timeMs - b.timeMs);
    const findings = all.map((profile) => ({
      stationId: 'tower',
      timeMs: profile.timeMs,
      finding: findJets(profile, CRITERIA.duskveer),
    }));
    const station = { ...all[0]!.station, latitude: 33.6105, longitude: -102.0505 };
    const stories = trackJets(findings).map((track) =>
      storyOf(
        track,
        { station, profiles: all, findings, axes: [], undisturbed: [], discs: [], geostrophicSpeed: NaN },
        { time: (timeMs) => new Date(timeMs).toISOString().slice(11, 16) },
      ),
    );
    const long = stories.filter(({ track: { points, beganMs } }) => points.at(-1)!.timeMs - beganMs >= HOUR_MS);
    expect(long.map(({ words }) => words)).toEqual([
      expect.stringMatching(
        /^A nocturnal jet from 12:00 to 14:[3-5]0: strongest at 12:\d0, 2[01] m\/s at 4\d0 m from 21\d/,
      ),
      expect.stringMatching(
        /^A nocturnal jet from 01:\d0 to 08:[0-3]0: .*turning clockwise at the inertial rate\. It has ended\.$/,
      ),
    ]);
    // The layer minimum's category 1 or more, hour by hour, is what the threads lie on.
    const onThread = (timeMs: number): boolean =>
      long.some(({ track }) => track.points.some((point) => point.timeMs === timeMs));
    const strong = expected.filter(({ jet }) => (jet.layerMinimum.category ?? -1) >= 1);
    const followed = strong.filter(({ time }) => onThread(Date.parse(time)));
    expect(followed.length / strong.length).toBeGreaterThan(0.85);
  });
});
