import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { trackJets, type JetFinding, type SmoothNose, type TimedFinding } from '../../src/jet/index.ts';

const MINUTE_MS = 60_000;
const START_MS = Date.UTC(2024, 5, 1, 18);

const nose = (height: number, speed: number, confidence = 0.95, direction = 210): SmoothNose => ({
  height,
  speed,
  direction,
  heightSpread: 20,
  speedSpread: 0.3,
  confidence,
});

const finding = (noses: readonly SmoothNose[]): JetFinding => ({
  criteria: 'duskveer',
  status: noses.some(({ confidence }) => confidence >= 0.5) ? 'jet' : 'no-jet',
  why: '',
  jets: [],
  noses,
  confidence: Math.max(0, ...noses.map(({ confidence }) => confidence)),
  assessedTo: 2000,
});

/** Noses every ten minutes; null where no profile came. */
const night = (all: readonly (readonly SmoothNose[] | null)[]): TimedFinding[] =>
  all.flatMap((noses, k) =>
    noses === null ? [] : [{ stationId: 'plain', timeMs: START_MS + 10 * k * MINUTE_MS, finding: finding(noses) }],
  );
const none: SmoothNose[] = [];
const minutes = (timeMs: number | null | undefined): number => ((timeMs ?? NaN) - START_MS) / MINUTE_MS;

describe('trackJets', () => {
  it('joins one jet from birth to end and tells what it did', () => {
    const tracks = trackJets(
      night([
        none,
        none,
        ...Array.from({ length: 12 }, (_, k) => [nose(200 + 10 * k, 12 + 0.5 * k, 0.95, 200 + 3 * k)]),
        none,
        none,
        none,
      ]),
    );
    expect(tracks).toHaveLength(1);
    const [track] = tracks;
    expect(minutes(track!.beganMs)).toBe(20);
    expect(minutes(track!.endedMs)).toBe(130);
    expect(track!.phase).toBe('ended');
    // The thread lags a steady climb by a little; its spread says so.
    expect(Math.abs(track!.peak.noseSpeed - 17.5)).toBeLessThan(track!.peak.speedSpread);
    expect(Math.abs(track!.peak.noseHeight - 310)).toBeLessThan(track!.peak.heightSpread);
    expect(track!.rates.height.perHour).toBeCloseTo(60, 6);
    expect(track!.rates.speed.perHour).toBeCloseTo(3, 6);
    expect(track!.rates.direction.perHour).toBeCloseTo(18, 6);
  });

  it('tells building, steady and easing while the jet lasts', () => {
    const phase = (change: number) =>
      trackJets(night(Array.from({ length: 12 }, (_, k) => [nose(300, 15 + change * k)])))[0];
    expect(phase(0.2)).toMatchObject({ phase: 'building', endedMs: null });
    expect(phase(0)).toMatchObject({ phase: 'steady', endedMs: null });
    expect(phase(-0.2)).toMatchObject({ phase: 'easing', endedMs: null });
  });

  it('does not flicker: a weak nose between sure ones stays in, a lone sure one starts nothing', () => {
    const sure = [nose(300, 14)];
    const weak = [nose(310, 13.5, 0.2)];
    const [track, ...others] = trackJets(night([sure, sure, sure, weak, sure, weak, weak, sure, sure, none, none]));
    expect(others).toEqual([]);
    expect(track!.points).toHaveLength(9);
    expect(trackJets(night([none, none, sure, none, none, none]))).toEqual([]);
  });

  it('bridges a gap and marks it, and does not bridge a long one', () => {
    const sure = [nose(300, 14)];
    const [bridged] = trackJets(night([sure, sure, sure, sure, null, null, null, null, sure, sure, sure, sure]));
    expect(bridged!.points.map((point) => point.afterGap)).toEqual([
      false,
      false,
      false,
      false,
      true,
      false,
      false,
      false,
    ]);
    const long = Array.from({ length: 15 }, () => null);
    expect(trackJets(night([sure, sure, sure, ...long, sure, sure, sure]))).toHaveLength(2);
  });

  it('follows two jets at once, each to itself, and says where one flows into the other', () => {
    const apart = Array.from({ length: 10 }, (_, k) => [nose(200, 13), nose(900 - 40 * k, 15, 0.95, 250 - 3 * k)]);
    const [upper, lower] = trackJets(night(apart)).sort((a, b) => b.points[0]!.noseHeight - a.points[0]!.noseHeight);
    upper!.points.forEach((point, k) => expect(Math.abs(point.noseHeight - apart[k]![1]!.height)).toBeLessThan(25));
    lower!.points.forEach((point) => expect(point.noseHeight).toBeCloseTo(200, 6));

    const joining = Array.from({ length: 10 }, (_, k) => [nose(300, 15), nose(720 - 40 * k, 14)]);
    const after = Array.from({ length: 8 }, () => [nose(310, 15)]);
    const tracks = trackJets(night([...joining, ...after]));
    expect(tracks).toHaveLength(2);
    const merged = tracks.findIndex((track) => track.mergedInto !== null);
    expect(tracks[merged]!.mergedInto).toBe(1 - merged);
  });

  it('does not jump to a stray nose far off', () => {
    const all = Array.from({ length: 12 }, (_, k) => (k === 6 ? [nose(1400, 18)] : [nose(300, 14)]));
    const [track] = trackJets(night(all));
    track!.points.forEach((point) => expect(point.noseHeight).toBeCloseTo(300, 6));
    expect(track!.points).toHaveLength(11);
  });

  it('ends in the same tracks in any order, with repeats (property)', () => {
    const anyNose = fc.record({
      height: fc.integer({ min: 100, max: 1200 }),
      speed: fc.integer({ min: 8, max: 22 }),
      confidence: fc.integer({ min: 0, max: 100 }).map((n) => n / 100),
      direction: fc.integer({ min: 180, max: 260 }),
    });
    const anyNight = fc.array(fc.array(anyNose, { maxLength: 3 }), { minLength: 1, maxLength: 30 });
    fc.assert(
      fc.property(anyNight, fc.infiniteStream(fc.nat()), (all, stream) => {
        const ordered = night(
          all.map((noses) => noses.map((one) => nose(one.height, one.speed, one.confidence, one.direction))),
        );
        const keyed = [...ordered, ...ordered.slice(0, 3)].map((one) => ({ one, key: stream.next().value as number }));
        const shuffled = keyed.sort((a, b) => a.key - b.key).map(({ one }) => one);
        expect(trackJets(shuffled)).toEqual(trackJets(ordered));
      }),
    );
  });

  it('follows each of many nights as if it were alone', () => {
    const sure = [nose(300, 14)];
    const one = night([none, sure, sure, sure, sure, none, none, [nose(800, 12)], none, none]);
    const shifted = (days: number): TimedFinding[] =>
      one.map((each) => ({ ...each, timeMs: each.timeMs + days * 1440 * MINUTE_MS }));
    const alone = trackJets(one);
    expect(alone).toHaveLength(1);
    const tracks = trackJets([0, 1, 2].flatMap(shifted));
    expect(
      tracks.map(({ beganMs, endedMs, points }) => [minutes(beganMs) % 1440, minutes(endedMs) % 1440, points.length]),
    ).toEqual(Array.from({ length: 3 }, () => [minutes(alone[0]!.beganMs), minutes(alone[0]!.endedMs), 4]));
  });

  it('keeps stations apart and takes nothing for something', () => {
    const sure = [nose(300, 14)];
    const here = night([sure, sure, sure, sure]);
    const there = here.map((one) => ({ ...one, stationId: 'other' }));
    expect(trackJets([...here, ...there]).map((track) => track.stationId)).toEqual(['other', 'plain']);
    expect(trackJets([])).toEqual([]);
    const unseen = here.map((one) => ({ ...one, finding: { ...one.finding, noses: [], confidence: NaN } }));
    expect(trackJets(unseen)).toEqual([]);
  });
});
