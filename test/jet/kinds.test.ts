import { describe, expect, it } from 'vitest';
import { JET_KINDS, storyOf, trackJets, type JetFinding, type TimedFinding } from '../../src/jet/index.ts';
import type { Profile, Station } from '../../src/profile/index.ts';
import type { TerrainAxis } from '../../src/site/index.ts';
import { profileOf } from './support.ts';

const HOUR_MS = 3600_000;
/** 21 March 2024 at 45 N, 0 E: sunset about 18:15, sunrise about 6:05 UTC. */
const DAY_MS = Date.UTC(2024, 2, 21);
const place = (latitude: number, longitude = 0): Station => ({
  id: 'here',
  name: 'Here',
  latitude,
  longitude,
  elevation: 0,
});

interface Shape {
  readonly station?: Station;
  /** Hours after midnight UTC */
  readonly from: number;
  readonly to: number;
  readonly height?: number;
  readonly speed?: number;
  readonly direction?: number;
  readonly axes?: readonly TerrainAxis[];
}

/** The story of a steady jet between two hours, profiles every half hour from four hours before to four after. */
function storyFrom({ station = place(45), from, to, height = 300, speed = 15, direction = 200, axes = [] }: Shape) {
  const profiles: Profile[] = [];
  const findings: TimedFinding[] = [];
  for (let hour = from - 4; hour <= to + 4; hour += 0.5) {
    const timeMs = DAY_MS + hour * HOUR_MS;
    const here = hour >= from && hour <= to;
    const nose = { height, speed, direction, heightSpread: 20, speedSpread: 0.3, confidence: 0.99 };
    const finding: JetFinding = {
      criteria: 'duskveer',
      status: here ? 'jet' : 'no-jet',
      why: '',
      jets: [],
      noses: here ? [nose] : [],
      confidence: here ? 0.99 : 0,
      assessedTo: 2000,
    };
    findings.push({ stationId: 'here', timeMs, finding });
    profiles.push(
      profileOf(
        { heightAgl: [50, height, 900], speed: [6, speed, 6], direction: [direction, direction, direction] },
        timeMs,
      ),
    );
  }
  const [track] = trackJets(findings);
  return storyOf(
    track!,
    { station, profiles, findings, axes, undisturbed: [], discs: [], geostrophicSpeed: NaN },
    { time: (timeMs) => new Date(timeMs).toISOString().slice(11, 16) },
  );
}

const axis = (kind: 'barrier' | 'valley', bearing: number): TerrainAxis => ({
  name: 'Low Fell',
  kind,
  bearing,
  crestHeight: 1500,
  stations: ['here'],
});

describe('kinds of jet', () => {
  it('gives probabilities of all kinds that add up, and rows that say what they stand for', () => {
    const story = storyFrom({ from: 20, to: 29 });
    expect(JET_KINDS.reduce((sum, kind) => sum + story.kinds[kind], 0)).toBeCloseTo(1, 12);
    expect(story.kind).toBe('nocturnal');
    expect(story.kinds.barrier).toBe(0);
    for (const one of story.evidence) {
      expect(JET_KINDS).toContain(one.speaksFor);
      expect(one.lookedAt + one.threshold + one.source).not.toBe('');
      if (Number.isNaN(one.value)) expect(one.weight).toBe(0);
    }
  });

  it('does not call a jet nocturnal that lasts through the day', () => {
    const story = storyFrom({ from: 20, to: 42 });
    expect(story.kind).toBe('other');
    expect(story.words).toMatch(/^A jet that the night does not explain from 20:00 to 18:00/);
  });

  it('decides nothing where nothing is known', () => {
    expect(storyFrom({ station: place(NaN, NaN), from: 20, to: 29 }).kind).toBe('undecided');
  });

  it('stands at the poles, on the equator and in polar night', () => {
    for (const latitude of [90, -90, 0, 78]) {
      const story = storyFrom({ station: place(latitude), from: 20, to: 29 });
      expect(JET_KINDS.reduce((sum, kind) => sum + story.kinds[kind], 0)).toBeCloseTo(1, 12);
      expect(story.words).toContain('jet');
    }
    const midwinter = storyFrom({ station: place(78), from: 20 - 24 * 80, to: 29 - 24 * 80 });
    expect(midwinter.evidence.find(({ lookedAt }) => lookedAt.startsWith('share'))!.value).toBe(1);
    expect(midwinter.evidence.find(({ lookedAt }) => lookedAt.startsWith('onset'))!.value).toBeNaN();
  });

  it('knows the way that dammed air runs in each hemisphere', () => {
    // Range to the east: on the left of one who looks south. In the north the jet runs northward, a wind from 180.
    const barrier = (latitude: number, direction: number) =>
      storyFrom({ station: place(latitude), from: 20, to: 29, height: 900, direction, axes: [axis('barrier', 180)] })
        .kinds.barrier;
    expect(barrier(45, 180)).toBeGreaterThan(barrier(45, 0));
    expect(barrier(-45, 0)).toBeGreaterThan(barrier(-45, 180));
    expect(barrier(45, 90)).toBeLessThan(0.05);
  });

  it('wants a valley-exit jet low and down the valley', () => {
    const valley = (height: number, direction: number) =>
      storyFrom({ from: 20, to: 29, height, direction, axes: [axis('valley', 140)] }).kinds['valley-exit'];
    expect(valley(120, 320)).toBeGreaterThan(0.6);
    expect(valley(600, 320)).toBeLessThan(0.3);
    expect(valley(120, 140)).toBeLessThan(0.05);
  });
});
