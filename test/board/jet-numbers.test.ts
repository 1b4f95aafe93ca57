import { describe, expect, it } from 'vitest';
import { jetNumbers } from '../../src/board/words/jet-numbers.ts';
import { storiesInOrder, storyTitle } from '../../src/board/words/story.ts';
import { timeWords } from '../../src/board/words/time.ts';
import { Desk, type NightState } from '../../src/desk/index.ts';
import { BlockBuilder } from '../../src/profile/index.ts';
import { PLAIN_SITE, type Site, type TurbineType } from '../../src/site/index.ts';

const STEP = 600_000;
const START = Date.UTC(2024, 4, 21, 20);
const turbine = (name: string, hubHeight: number, rotorDiameter: number): TurbineType => ({
  name,
  count: 1,
  hubHeight,
  rotorDiameter,
  powerCurve: null,
  cutIn: NaN,
  rated: NaN,
  cutOut: NaN,
  restart: NaN,
  groundElevation: NaN,
});
const site: Site = { ...PLAIN_SITE, turbines: [turbine('Low', 90, 100), turbine('Tall', 250, 180)] };

/** A nose of 15 m/s that sinks from 380 m by 60 m an hour for two hours, then is gone. */
function nightAt(index: number): NightState {
  const builder = new BlockBuilder();
  const heights = Float64Array.from({ length: 100 }, (_, k) => 20 + 15 * k);
  for (let k = 0; k <= 24; k++) {
    const nose = 380 - 10 * k;
    const strength = k <= 12 ? 9 : 0;
    builder.add({
      station: { id: 'plain', name: 'Plain', latitude: 38, longitude: 0, elevation: 600 },
      source: 'night.csv',
      instrument: 'lidar',
      timeMs: START + k * STEP,
      periodS: 600,
      levels: {
        heightAgl: heights,
        speed: heights.map((z) => 6 + strength * Math.exp(-(((z - nose) / 180) ** 2))),
        direction: heights.map(() => 190),
      },
    });
  }
  const desk = new Desk(site);
  desk.accept(builder.finish());
  return desk.night(START + index * STEP, { feed: 'plain/lidar' })!;
}

describe('a jet in numbers', () => {
  it('tells how the nose changes, where its core ends and how it stands against each rotor', () => {
    const night = nightAt(12);
    const [story] = storiesInOrder(night);
    const numbers = jetNumbers(story!, site.turbines, { speed: 'm/s', height: 'm' });
    const named = (name: string) => numbers.find((number) => number.name === name)!;
    const perHour = Number(/^[+−]?(\d+) ±/.exec(named('nose height').words)![1]);
    expect(Math.abs(perHour - 60)).toBeLessThan(6);
    expect(named('nose height').words).toMatch(/^−/);
    // Nose at 260 m, 15 m/s; far above 6 m/s: halfway is 10.5 m/s, at 180 sqrt(ln 2) = 150 m from the nose.
    const [, bottom, top] = /from (\d+) to (\d+) m/.exec(named('core').words)!.map(Number);
    expect(Math.abs(bottom! - 110)).toBeLessThan(12);
    expect(Math.abs(top! - 410)).toBeLessThan(12);
    expect(named('nose against Low').value).toBe('above the disc');
    expect(named('nose against Tall').value).toBe('in the disc');
    expect(named('below the nose').words).toContain('not known: no temperature');
  });

  it('writes in the reader’s units', () => {
    const [story] = storiesInOrder(nightAt(12));
    const numbers = jetNumbers(story!, site.turbines, { speed: 'kt', height: 'ft' });
    // 15 m/s are 29 kt.
    expect(numbers.find(({ name }) => name === 'nose speed')!.value).toMatch(/^29 ± \d\.\d kt$/);
    expect(numbers.find(({ name }) => name === 'nose height')!.value).toMatch(/ ft$/);
  });

  it('names jets by when they began and ended', () => {
    const times = timeWords('utc', 'UTC');
    expect(storyTitle(storiesInOrder(nightAt(12))[0]!, times)).toBe('The jet since 20:00');
    expect(storyTitle(storiesInOrder(nightAt(24))[0]!, times)).toBe('The jet from 20:00 to 22:00');
  });
});
