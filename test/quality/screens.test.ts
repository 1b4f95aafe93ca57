// Each screen on made-up profiles: what it must catch and what it must leave alone.

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { MARK, REJECTING, type ProfileBlock } from '../../src/profile/index.ts';
import { screen } from '../../src/quality/index.ts';
import { randomFrom } from '../support/random.ts';
import { blockOf, jetNight, marksOf, MINUTE_MS, START_MS, type Made } from './support.ts';

const has = (block: ProfileBlock, i: number, mark: keyof typeof MARK): boolean[] =>
  marksOf(block, i).map((bits) => (bits & MARK[mark]) !== 0);

describe('gross limits', () => {
  it('marks pressures that grossly contradict their heights, and lets cyclones, cold and unknown ground pass', () => {
    const levels = (heightAgl: number[], hectopascals: number[]): ProfileBlock =>
      blockOf([
        {
          timeMs: START_MS,
          levels: {
            heightAgl,
            pressure: hectopascals.map((value) => value * 100),
            speed: heightAgl.map(() => 5),
            direction: heightAgl.map(() => 200),
          },
        },
      ]);
    const impossible = (block: ProfileBlock): number[] =>
      [...screen(block, { without: ['vertical-continuity'] }).block.mark].map((bits) =>
        Number(bits === MARK.impossible),
      );
    // The station stands at 120 m. 5574 m is the standard height of 500 hPa, 16180 m that of 100 hPa.
    expect(impossible(levels([0, 5450, 16_060], [1000, 500, 100]))).toEqual([0, 0, 0]);
    expect(impossible(levels([0, 4800, 15_000], [1065, 500, 100]))).toEqual([0, 0, 0]);
    expect(impossible(levels([0, 5100, 5450], [880, 500, 850]))).toEqual([0, 0, 1]);
    // Feet taken for metres.
    expect(impossible(levels([100, 5450 / 0.3048], [988, 500]))).toEqual([0, 1]);
    const block = levels([10, 1500, 9000], [560, 470, 850]);
    const unplaced = { ...block, stations: block.stations.map((station) => ({ ...station, elevation: NaN })) };
    expect(impossible(block)).toEqual([1, 1, 1]);
    expect(impossible(unplaced)).toEqual([0, 0, 1]);
  });
});

describe('duplicates', () => {
  const levels = { heightAgl: [100, 200, 300], speed: [5, 6, 7], direction: [200, 200, 200] };
  const at = (more: Partial<Made> & { levels?: Made['levels'] }): Made => ({ levels, timeMs: START_MS, ...more });

  it('keeps the latest correction, whatever the order', () => {
    const corrected = { ...levels, speed: [5, 6, 8] };
    for (const order of [
      [at({ revision: 1, levels: corrected }), at({})],
      [at({}), at({ revision: 1, levels: corrected })],
    ]) {
      const { block } = screen(blockOf(order));
      order.forEach(({ revision }, i) => expect(has(block, i, 'superseded')).toEqual(Array(3).fill(revision !== 1)));
    }
  });

  it('keeps the fuller of two reports and one of two equal ones', () => {
    const poorer = { ...levels, speed: [5, NaN, 7] };
    const { block } = screen(blockOf([at({ levels: poorer }), at({}), at({ source: 'other feed' })]));
    expect([0, 1, 2].filter((i) => has(block, i, 'superseded')[0] === false)).toEqual([1]);
  });

  it('keeps profiles of one time on different heights, instruments or stations', () => {
    const high = { heightAgl: [1000, 1300, 1600], speed: [9, 9, 9], direction: [200, 200, 200] };
    const { block } = screen(
      blockOf([at({}), at({ levels: high }), at({ instrument: 'lidar' }), at({ station: 'gull-bank' })]),
    );
    expect(block.mark.every((bits) => (bits & MARK.superseded) === 0)).toBe(true);
  });
});

describe('clock', () => {
  const profile = (minutes: number): Made => ({
    timeMs: START_MS + minutes * MINUTE_MS,
    levels: { heightAgl: [100], speed: [5], direction: [200] },
  });

  it('doubts the profiles off the beat and no other', () => {
    const minutes = [0, 10, 20, 30, 40, 50, 60, 64, 70, 80, 90];
    const { block } = screen(blockOf(minutes.map(profile)));
    expect(minutes.filter((_, i) => has(block, i, 'clock')[0])).toEqual([64]);
  });

  it('is silent where there is no beat, or a gap of whole steps', () => {
    const random = randomFrom(3);
    const irregular = Array.from({ length: 30 }, (_, i) => profile(i * 10 + random() * 9));
    expect(screen(blockOf(irregular)).feeds[0]!.byMark.clock).toBeUndefined();
    expect(
      screen(blockOf([0, 10, 20, 30, 90, 100, 110, 120, 130].map(profile))).feeds[0]!.byMark.clock,
    ).toBeUndefined();
  });
});

describe('signal', () => {
  const heightAgl = Array.from({ length: 30 }, (_, k) => 100 + 60 * k);
  const windy = (k: number): boolean => k < 12;
  const levels = (signal: (k: number) => number): Made => ({
    timeMs: START_MS,
    levels: {
      heightAgl,
      speed: heightAgl.map((_, k) => (windy(k) ? 6 : NaN)),
      direction: heightAgl.map((_, k) => (windy(k) ? 200 : NaN)),
      signal: heightAgl.map((_, k) => signal(k)),
    },
  });

  it('rejects winds whose echo is that of windless gates', () => {
    const { block } = screen(blockOf([levels((k) => (windy(k) && k !== 11 ? -8 : -28))]));
    expect(has(block, 0, 'low-signal').indexOf(true)).toBe(11);
    expect(has(block, 0, 'low-signal').lastIndexOf(true)).toBe(11);
  });

  it('rejects winds without a consensus, and doubts those of a poor one', () => {
    const profile = levels(() => NaN);
    const consensus = heightAgl.map((_, k) => (k === 5 ? 0.3 : k === 6 ? NaN : k === 7 ? 0.5 : 0.8));
    const { block } = screen(blockOf([{ ...profile, levels: { ...profile.levels, consensus } }]));
    expect(has(block, 0, 'low-signal').indexOf(true)).toBe(5);
    expect(has(block, 0, 'low-signal').lastIndexOf(true)).toBe(5);
    expect(has(block, 0, 'few-beams').indexOf(true)).toBe(7);
    expect(has(block, 0, 'few-beams').lastIndexOf(true)).toBe(7);
  });

  it('is silent where the signal does not tell wind from noise', () => {
    const { feeds } = screen(blockOf([levels(() => -20)]));
    expect(feeds[0]!.byMark['low-signal']).toBeUndefined();
  });
});

describe('clutter', () => {
  const heightAgl = [40, 80, 120, 160, 200, 240];
  const night = (low: (i: number) => [number, number], instrument: Made['instrument']): Made[] =>
    Array.from({ length: 12 }, (_, i) => {
      const [speed, direction] = low(i);
      return {
        timeMs: START_MS + i * 10 * MINUTE_MS,
        instrument: instrument!,
        levels: {
          heightAgl,
          speed: [speed, 6, 7, 8, 8, 8],
          direction: [direction, 200, 202, 204, 206, 208],
        },
      };
    });

  it('rejects a lowest gate that stands still or turns at random', () => {
    for (const low of [(): [number, number] => [0.1, 210], (i: number): [number, number] => [4, (i * 97) % 360]]) {
      const { block } = screen(blockOf(night(low, 'lidar')));
      for (let i = 0; i < 12; i++) expect(has(block, i, 'clutter')).toEqual([true, ...Array<boolean>(5).fill(false)]);
    }
  });

  it('leaves a calm ground under a wind aloft to the mast, and a steady shear to all', () => {
    expect(screen(blockOf(night(() => [0.1, 210], 'mast'))).feeds[0]!.byMark.clutter).toBeUndefined();
    expect(screen(blockOf(night(() => [1.5, 170], 'lidar'))).feeds[0]!.byMark.clutter).toBeUndefined();
  });
});

describe('precipitation', () => {
  it('doubts falling layers and passes over a lone gate', () => {
    const heightAgl = [100, 200, 300, 400, 500, 600];
    const verticalSpeed = [-6, -5, -4, 0.2, -5, 0];
    const { block } = screen(
      blockOf([
        {
          timeMs: START_MS,
          levels: { heightAgl, speed: [5, 5, 5, 5, 5, 5], direction: heightAgl.map(() => 200), verticalSpeed },
        },
      ]),
    );
    expect(has(block, 0, 'precipitation')).toEqual([true, true, true, false, false, false]);
  });
});

describe('pendulum', () => {
  /** An ascent at 5 m/s, a level a second, with a swing of the given amplitude below 1 km. */
  const ascent = (swing: number): Made => {
    const heightAgl = Array.from({ length: 400 }, (_, k) => 5 * k);
    return {
      timeMs: START_MS,
      instrument: 'radiosonde',
      levels: {
        heightAgl,
        u: heightAgl.map((z) => 8 + z / 400 + (z < 1000 ? swing * Math.sin((2 * Math.PI * z) / 65) : 0)),
        v: heightAgl.map((z) => 2 - z / 900),
      },
    };
  };

  it('doubts the swinging layer only', () => {
    const { block } = screen(blockOf([ascent(4)]));
    const marks = has(block, 0, 'pendulum');
    expect(marks.slice(20, 160).every(Boolean)).toBe(true);
    expect(marks.slice(240).some(Boolean)).toBe(false);
  });

  it('is silent for a smooth ascent', () => {
    expect(screen(blockOf([ascent(0.4)])).feeds[0]!.byMark.pendulum).toBeUndefined();
  });

  it('doubts the height at which a balloon stalls', () => {
    const smooth = ascent(0);
    const heights = (smooth.levels.heightAgl as number[]).map((z, k) =>
      k < 200 ? z : k < 230 ? 1000 + k / 1000 : z - 145,
    );
    const { block } = screen(blockOf([{ ...smooth, levels: { ...smooth.levels, heightAgl: heights } }]));
    const marks = has(block, 0, 'pendulum');
    expect(marks.slice(203, 227).every(Boolean)).toBe(true);
    expect(marks.slice(0, 190).some(Boolean)).toBe(false);
  });
});

describe('vertical continuity', () => {
  const heightAgl = [100, 200, 300, 400, 500, 600, 700];

  it('rejects a wild level of a lone profile and keeps a jet', () => {
    const jet = [4, 9, 14, 17, 13, 9, 7];
    const direction = heightAgl.map(() => 220);
    const sound = screen(blockOf([{ timeMs: START_MS, levels: { heightAgl, speed: jet, direction } }]));
    expect(sound.feeds[0]!.rejected).toBe(0);
    const wild = jet.map((speed, k) => (k === 4 ? 39 : speed));
    const { block } = screen(blockOf([{ timeMs: START_MS, levels: { heightAgl, speed: wild, direction } }]));
    expect(has(block, 0, 'vertical-jump')).toEqual(heightAgl.map((_, k) => k === 4));
  });
});

describe('time continuity', () => {
  it('loses next to nothing of a sound night, however noisy', () => {
    for (const noise of [0.2, 0.7, 1.3]) {
      const { feeds } = screen(blockOf(jetNight(60, noise).made));
      expect(feeds[0]!.rejected / feeds[0]!.windLevels).toBeLessThan(0.01);
    }
  });

  it('catches lone wild gates', () => {
    const { made, u, v } = jetNight(60, 0.7);
    const random = randomFrom(5);
    const wild = new Set<string>();
    for (let n = 0; n < 40; n++) {
      const [i, g] = [Math.floor(random() * 60), Math.floor(random() * 40)];
      wild.add(`${i},${g}`);
      u[i]![g]! += 12 * (random() < 0.5 ? -1 : 1);
      v[i]![g]! += 6 * (random() - 0.5);
    }
    const { block } = screen(blockOf(made));
    let caught = 0;
    let lost = 0;
    for (let i = 0; i < 60; i++) {
      has(block, i, 'time-jump').forEach((is, g) => {
        if (is && wild.has(`${i},${g}`)) caught++;
        else if (is) lost++;
      });
    }
    expect(caught / wild.size).toBeGreaterThan(0.95);
    expect(lost).toBeLessThan(12);
  });

  it('keeps the wind behind a front', () => {
    const { made, u, v } = jetNight(60, 0.5);
    for (let i = 40; i < 60; i++) for (let g = 0; g < 40; g++) [u[i]![g], v[i]![g]] = [-v[i]![g]! - 4, u[i]![g]! - 6];
    const { feeds } = screen(blockOf(made));
    expect(feeds[0]!.rejected / feeds[0]!.windLevels).toBeLessThan(0.02);
  });

  it('says nothing of profiles hours apart', () => {
    const { made } = jetNight(4, 3);
    const apart = made.map((profile, i) => ({ ...profile, timeMs: START_MS + i * 360 * MINUTE_MS }));
    expect(screen(blockOf(apart)).feeds[0]!.byMark['time-jump']).toBeUndefined();
  });
});

describe('all screens', () => {
  it('mark the same whatever the order of the profiles, and never take a mark or a value away (property)', () => {
    const { made, u } = jetNight(24, 0.7);
    u[9]![12]! += 14;
    u[10]![12]! += 13;
    const speeds = { heightAgl: [100, 160, 220], speed: [0.1, 5, 50], direction: [1, 2, 3] };
    const all = [...made, { timeMs: START_MS, levels: speeds, source: 'second feed' }, { ...made[3]!, revision: 1 }];
    const wanted = screen(blockOf(all)).block;
    fc.assert(
      fc.property(fc.shuffledSubarray([...all.keys()], { minLength: all.length }), (order) => {
        const given = blockOf(order.map((i) => all[i]!));
        const { block } = screen(given);
        order.forEach((from, at) => expect(marksOf(block, at)).toEqual(marksOf(wanted, from)));
        expect(block.speed).toBe(given.speed);
        expect(given.mark.every((bits, k) => (block.mark[k]! & bits) === bits)).toBe(true);
      }),
      { numRuns: 10 },
    );
  });

  it('take levels without height, wind or anything', () => {
    const levels = { heightAgl: [NaN, 100, 200], speed: [5, NaN, NaN], direction: [NaN, NaN, 100] };
    const profiles = Array.from({ length: 5 }, (_, i) => ({ timeMs: START_MS + i * 600_000, levels }));
    const { feeds, block } = screen(blockOf([...profiles, { timeMs: START_MS, levels: { heightAgl: [] } }]));
    expect(feeds[0]!.levels).toBe(15);
    expect(block.mark.some((bits) => (bits & REJECTING) !== 0)).toBe(true);
  });
});
