import { describe, expect, it } from 'vitest';
import { farmCsv } from '../../src/board/words/farm-csv.ts';
import { farmStory } from '../../src/board/words/farm-story.ts';
import { timeWords } from '../../src/board/words/time.ts';
import { Desk } from '../../src/desk/index.ts';
import { BlockBuilder } from '../../src/profile/index.ts';
import { PLAIN_SITE, type Site } from '../../src/site/index.ts';

const START = Date.UTC(2024, 4, 21, 22);
const STEP = 600_000;
const METRIC = { speed: 'm/s', height: 'm' } as const;
const station = { id: 'plain', name: 'Plain', latitude: 38, longitude: 0, elevation: NaN };

/** Ten turbines of an invented type that yield 100 kW for each m/s up to 2 MW. */
const site: Site = {
  ...PLAIN_SITE,
  turbines: [
    {
      name: 'Invented "A"',
      count: 10,
      hubHeight: 100,
      rotorDiameter: 120,
      powerCurve: { speed: [0, 20, 25], powerKw: [0, 2000, 2000], airDensity: 1.225 },
      cutIn: 0,
      rated: 20,
      cutOut: 25,
      restart: 22,
      groundElevation: NaN,
    },
  ],
};

/** Six times of a uniform wind, then six of a wind that has doubled; a nose at 120 m, in the disc, comes with it. */
function night(): ReturnType<Desk['night']> {
  const desk = new Desk(site);
  const builder = new BlockBuilder();
  const heights = Array.from({ length: 60 }, (_, k) => 20 + 20 * k);
  for (let k = 0; k < 12; k++) {
    const strength = k < 6 ? 0 : 9;
    builder.add({
      station,
      source: 'night.csv',
      instrument: 'lidar',
      timeMs: START + k * STEP,
      periodS: 600,
      levels: {
        heightAgl: heights,
        speed: heights.map((z) => 7 + strength * Math.exp(-(((z - 120) / 90) ** 2))),
        direction: heights.map(() => 200),
      },
    });
  }
  desk.accept(builder.finish());
  return desk.night(START + 11 * STEP, { feed: 'plain/lidar' });
}

describe('the farm through the night', () => {
  const state = night()!;

  it('reckons power by hub height and by the profile, which agree in a uniform wind', () => {
    const { output } = state.farm;
    // 7 m/s give 700 kW, ten of them 7 MW; no temperature is known, so the density is not corrected.
    expect(output.hubKw[0]).toBeCloseTo(7000, 3);
    expect(output.differenceKw[0]).toBeCloseTo(0, 3);
    // The nose stands near the hub: everywhere else in the disc the wind is less, so the profile takes power.
    expect(output.differenceKw[11]!).toBeLessThan(-100);
  });

  it('finds the one ramp and says why', () => {
    expect(state.farm.ramps).toHaveLength(1);
    const { ramp, causes } = state.farm.ramps[0]!;
    expect(ramp.sense).toBe('up');
    expect(ramp.startMs).toBe(START + 5 * STEP);
    expect(causes[0]!.cause).not.toBe('unknown');
  });

  it('tells the farm’s night in a sentence: power, what the profile takes, when the nose entered the disc', () => {
    const text = farmStory(state, METRIC, timeWords('utc', 'UTC'))
      .map((piece) => piece.text)
      .join('');
    expect(text).toMatch(/^At 23:50 the wind over the discs is good for \d+\.\d MW of 20; the jet takes \d+\.\d MW/);
    expect(text).toContain('The nose entered the disc of Invented "A" at 23:00 and stands at 120 m.');
    expect(text).toMatch(/Output rose by \d+\.\d MW \(\d+ % of capacity\) in \d+ min from 22:50: .*\.$/);
  });

  it('writes a line a profile and type, with missing cells empty and names quoted', () => {
    const lines = farmCsv(state).trim().split('\n');
    expect(lines).toHaveLength(1 + 12);
    expect(lines[1]).toMatch(/^2024-05-21T22:00:00\.000Z,"Invented ""A""",ok,"",1\.000,0\.000,7\.00,/);
    expect(lines[1]!.split(',')).toHaveLength(lines[0]!.split(',').length);
  });

  it('keeps watch on shear and on the nose', () => {
    const { loads } = state.farm.discs[0]!;
    const inRotor = loads.find(({ now }) => now.name === 'nose-in-rotor')!;
    expect(inRotor.now.on).toBe(true);
    // Six profiles of ten minutes each.
    expect(inRotor.time.totalS).toBe(3600);
  });
});
