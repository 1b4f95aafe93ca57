import { describe, expect, it } from 'vitest';
import {
  causeInWords,
  causesOfRamp,
  rampInWords,
  type NoseTrack,
  type Ramp,
  type RampEvidence,
} from '../../src/rotor/index.ts';

const MINUTE = 60_000;
const START = Date.UTC(2031, 6, 14, 22, 0);
const times = Array.from({ length: 13 }, (_, k) => START + (k - 3) * 10 * MINUTE);
const ramp = (sense: 'up' | 'down'): Ramp => ({
  definition: 'hour',
  sense,
  startMs: START,
  endMs: START + 60 * MINUTE,
  changeKw: sense === 'up' ? 12_300 : -12_300,
  changeShare: sense === 'up' ? 0.41 : -0.41,
  ratePerHourKw: sense === 'up' ? 12_300 : -12_300,
});
const still: RampEvidence = {
  disc: { hubHeight: 110, rotorDiameter: 130 },
  timeMs: times,
  hubSpeed: times.map(() => 8),
  hubDirection: times.map(() => 200),
  state: times.map(() => 'turning' as const),
  tracks: [],
  sunrisesMs: [],
};
const track = (
  noseHeight: (k: number) => number,
  noseSpeed: (k: number) => number,
  more: Partial<NoseTrack> = {},
): NoseTrack => ({
  beganMs: START - 300 * MINUTE,
  endedMs: null,
  points: times.map((timeMs, k) => ({ timeMs, noseHeight: noseHeight(k), noseSpeed: noseSpeed(k) })),
  ...more,
});
const firmest = (sense: 'up' | 'down', evidence: Partial<RampEvidence>): { cause: string; words: string } => {
  const [first] = causesOfRamp(ramp(sense), { ...still, ...evidence });
  return { cause: first!.cause, words: causeInWords(first!) };
};

describe('causesOfRamp', () => {
  it('names a high-wind shutdown and a restart before all else', () => {
    const state = times.map((_, k) => (k >= 5 ? ('stopped-high-wind' as const) : ('turning' as const)));
    expect(firmest('down', { state })).toMatchObject({ cause: 'shutdown', words: 'high-wind shutdown at 22:20 UTC' });
    const back = [...state].reverse();
    expect(firmest('up', { state: back }).cause).toBe('restart');
  });

  it('names the onset of a jet', () => {
    const fresh = track(
      () => 300,
      () => 12,
      { beganMs: START - 20 * MINUTE },
    );
    expect(firmest('up', { tracks: [fresh] })).toMatchObject({
      cause: 'jet-onset',
      words: 'the jet formed at 21:40 UTC',
    });
  });

  it('names a nose that comes down through the disc, whether output rises or falls', () => {
    const descending = track(
      (k) => 220 - 12 * k,
      () => 14,
    );
    for (const sense of ['up', 'down'] as const) {
      expect(firmest(sense, { tracks: [descending] })).toMatchObject({
        cause: 'nose-descends',
        words: "the nose came down through the disc's upper tip (from 208 to 112 m)",
      });
    }
  });

  it('names the decay of a jet after sunrise', () => {
    const fading = track(
      () => 300,
      (k) => 16 - 0.6 * k,
    );
    const sunrisesMs = [START - 90 * MINUTE];
    expect(firmest('down', { tracks: [fading], sunrisesMs })).toMatchObject({
      cause: 'jet-decay',
      words: "the jet's nose lost 3.6 m/s, after sunrise at 20:30 UTC",
    });
    expect(firmest('down', { tracks: [fading] }).words).toBe("the jet's nose lost 3.6 m/s");
    const ended = track(
      () => 300,
      () => 12,
      { endedMs: START + 30 * MINUTE },
    );
    expect(firmest('down', { tracks: [ended], sunrisesMs }).words).toContain('the jet ended at 22:30 UTC');
    // Mixing takes a while from the nose down to the hub.
    const gone = { ...ended, endedMs: START - 40 * MINUTE };
    expect(firmest('down', { tracks: [gone], sunrisesMs }).words).toContain('the jet ended at 21:20 UTC');
    const longGone = { ...ended, endedMs: START - 80 * MINUTE };
    expect(firmest('down', { tracks: [longGone], sunrisesMs }).cause).toBe('unknown');
  });

  it('names a wind shift through north, and a plain change of wind', () => {
    const hubDirection = times.map((_, k) => (330 + 10 * k) % 360);
    expect(firmest('up', { hubDirection })).toMatchObject({
      cause: 'wind-shift',
      words: 'the wind at hub height veered by 60°',
    });
    expect(firmest('down', { hubSpeed: times.map((_, k) => 12 - 0.5 * k) })).toMatchObject({
      cause: 'wind-falls',
      words: 'the wind at hub height fell by 3.0 m/s',
    });
  });

  it('says so when nothing explains it', () => {
    expect(causesOfRamp(ramp('up'), still)).toEqual([
      { cause: 'unknown', weight: 0, pieces: ['nothing measured here explains it'] },
    ]);
  });
});

describe('rampInWords', () => {
  it('is one sentence with size, share, time and cause', () => {
    const causes = [{ cause: 'jet-onset', weight: 0.8, pieces: ['the jet formed at ', START - 20 * MINUTE] } as const];
    expect(rampInWords(ramp('up'), causes)).toBe(
      'Output rose by 12.3 MW (41 % of capacity) in 60 min from 22:00 UTC: the jet formed at 21:40 UTC.',
    );
    const site = (timeMs: number): string => new Date(timeMs - 360 * MINUTE).toISOString().slice(11, 16);
    expect(rampInWords(ramp('up'), causes, site)).toMatch(/from 16:00: the jet formed at 15:40\.$/);
  });
});
