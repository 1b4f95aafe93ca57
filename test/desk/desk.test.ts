import { describe, expect, it } from 'vitest';
import { Desk } from '../../src/desk/index.ts';
import { BlockBuilder, pickProfiles, type ProfileBlock } from '../../src/profile/index.ts';
import { PLAIN_SITE, type Site } from '../../src/site/index.ts';

const station = { id: 'plain', name: 'Plain', latitude: 38, longitude: 0, elevation: 600 };
const start = Date.UTC(2024, 4, 21, 20);
const STEP = 600_000;
const feed = 'plain/lidar';

/** A night of profiles: no shape for an hour, then a nose of 15 m/s at 300 m that nothing could miss. */
function night(count: number): ProfileBlock {
  const builder = new BlockBuilder();
  const heights = Float64Array.from({ length: 50 }, (_, k) => 20 + 30 * k);
  for (let k = 0; k < count; k++) {
    const strength = k < 6 ? 0 : 9;
    builder.add({
      station,
      source: 'night.csv',
      instrument: 'lidar',
      timeMs: start + k * STEP,
      periodS: 600,
      levels: {
        heightAgl: heights,
        speed: heights.map((z) => 6 + strength * Math.exp(-(((z - 320) / 180) ** 2))),
        direction: heights.map(() => 190),
      },
    });
  }
  return builder.finish();
}

const site: Site = {
  ...PLAIN_SITE,
  turbines: [
    {
      name: 'Invented 120',
      count: 3,
      hubHeight: 100,
      rotorDiameter: 120,
      powerCurve: null,
      cutIn: NaN,
      rated: NaN,
      cutOut: NaN,
      restart: NaN,
      groundElevation: NaN,
    },
  ],
};

describe('Desk', () => {
  it('finds the jet of the night and what it does to the disc', () => {
    const desk = new Desk(site);
    desk.accept(night(12));
    const state = desk.night(start + 11 * STEP, { feed })!;
    expect(state.timeMs).toHaveLength(12);
    expect(state.findings.slice(0, 6).every(({ jets }) => jets.length === 0)).toBe(true);
    const jet = state.findings[11]!.jets[0]!;
    expect([jet.noseHeight, jet.category]).toEqual([320, 1]);
    expect(jet.noseSpeed).toBeCloseTo(15, 4);
    const disc = state.discs[0]!.winds[11]!;
    // The nose stands above the disc, so the wind grows over all of it.
    expect(disc.noseInRotor).toBe(false);
    expect(disc.shearExponent).toBeGreaterThan(0);
    expect(disc.hubDirection).toBeCloseTo(190, 4);
  });

  it('looks at nothing later than the moment asked for', () => {
    const whole = new Desk(site);
    whole.accept(night(12));
    const known = new Desk(site);
    known.accept(night(8));
    const atMs = start + 7.5 * STEP;
    expect(whole.night(atMs, { feed })!.findings).toEqual(known.night(atMs, { feed })!.findings);
  });

  it('gives the same night when profiles come late, twice and in reverse', () => {
    const block = night(12);
    const inOrder = new Desk(site);
    inOrder.accept(block);
    const troubled = new Desk(site);
    for (let index = 11; index >= 0; index--) {
      troubled.accept(pickProfiles([{ block, index }]));
      if (index % 4 === 0) troubled.night(start + 11 * STEP, { feed });
      troubled.accept(pickProfiles([{ block, index }]));
    }
    expect(troubled.night(start + 11 * STEP, { feed })).toEqual(inOrder.night(start + 11 * STEP, { feed }));
    expect(troubled.feeds()).toEqual(inOrder.feeds());
  });

  it('names its feeds with extent, interval and losses', () => {
    const desk = new Desk(site);
    desk.accept(night(12));
    const [only] = desk.feeds();
    expect(only).toMatchObject({
      key: feed,
      profiles: 12,
      firstMs: start,
      lastMs: start + 11 * STEP,
      intervalMs: STEP,
    });
    expect(only!.top).toBe(1490);
    expect(only!.screening[0]!.windLevels).toBe(600);
  });

  it('answers null for a feed it does not have, and an empty night outside the record', () => {
    const desk = new Desk(site);
    desk.accept(night(2));
    expect(desk.night(start, { feed: 'elsewhere/lidar' })).toBeNull();
    expect(desk.night(start - 30 * 86_400_000, { feed })!.timeMs).toEqual([]);
  });

  it('tells the stories of the whole record as it tells that of the night', () => {
    const desk = new Desk(site);
    desk.accept(night(30));
    const [told, ...others] = desk.stories({ feed });
    expect(others).toEqual([]);
    const { track } = desk.night(start + 29 * STEP, { feed })!.stories[0]!;
    expect(told!.track).toEqual(track);
    expect(told!.track.beganMs).toBe(start + 6 * STEP);
    expect(desk.stories({ feed: 'nowhere/mast' })).toEqual([]);
  });
});
