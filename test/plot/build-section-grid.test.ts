import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildSectionGrid, type SectionGrid } from '../../src/plot/index.ts';
import {
  BlockBuilder,
  MARK,
  MARKS,
  unplacedStation,
  type ProfileBlock,
  type ProfileInput,
} from '../../src/profile/index.ts';

const station = unplacedStation('here');
const MINUTE = 60_000;

const blockOf = (...profiles: Omit<ProfileInput, 'station' | 'source'>[]): ProfileBlock => {
  const builder = new BlockBuilder();
  for (const profile of profiles) builder.add({ station, source: 'a.csv', ...profile });
  return builder.finish();
};
const valueAt = (grid: SectionGrid, timeMs: number, height: number): number => {
  const column = grid.startMs.findIndex((start, k) => timeMs >= start && timeMs < grid.endMs[k]!);
  const row = grid.edges.findIndex((edge, k) => height >= edge && height < grid.edges[k + 1]!);
  return column < 0 || row < 0 ? NaN : grid.values[column * grid.rowCount + row]!;
};
const speeds = (grid: SectionGrid, timeMs: number, heights: number[]): number[] =>
  heights.map((height) => valueAt(grid, timeMs, height));

describe('buildSectionGrid in height', () => {
  it('lets each gate own the cell to mid-height', () => {
    const grid = buildSectionGrid(
      [blockOf({ timeMs: 10 * MINUTE, levels: { heightAgl: [40, 70, 100], speed: [4, 7, 10] } })],
      { field: 'speed' },
    );
    expect([...grid.edges]).toEqual([25, 55, 85, 115]);
    expect([...grid.values]).toEqual([4, 7, 10]);
  });

  it('leaves a rejected gate and a lost one empty, whether the file names it or not', () => {
    const heights = [40, 70, 100, 130, 160, 190];
    const full = { timeMs: 10 * MINUTE, levels: { heightAgl: heights, speed: [1, 2, 3, 4, 5, 6] } };
    const lost = { timeMs: 20 * MINUTE, levels: { heightAgl: heights, speed: [1, 2, NaN, 4, 5, 6] } };
    const absent = { timeMs: 30 * MINUTE, levels: { heightAgl: [40, 70, 130, 160, 190], speed: [1, 2, 4, 5, 6] } };
    const mark = [0, 0, MARK['low-signal'], 0, 0, 0];
    const rejected = { timeMs: 40 * MINUTE, levels: { heightAgl: heights, speed: [1, 2, 3, 4, 5, 6], mark } };
    const grid = buildSectionGrid([blockOf(full, lost, absent, rejected)], { field: 'speed' });
    for (const minute of [15, 25, 35]) {
      expect(speeds(grid, minute * MINUTE, [84, 86, 100, 114, 116]), `minute ${minute}`).toEqual([2, NaN, NaN, NaN, 4]);
    }
  });

  it('flags doubtful levels and keeps them', () => {
    const mark = [0, MARK['source-doubts'], 0];
    const levels = { heightAgl: [40, 70, 100], speed: [4, 7, 10], mark };
    const grid = buildSectionGrid([blockOf({ timeMs: 0, levels })], { field: 'speed' });
    expect([...grid.values]).toEqual([4, 7, 10]);
    expect([...grid.doubt]).toEqual([0b010]);
  });

  it('puts profiles of many different heights on equal rows, the strongest of a cell winning', () => {
    const count = 600;
    const heightAgl = Array.from({ length: count }, (_, k) => 5 * k + 2.5);
    const speed = heightAgl.map((_, k) => k % 7);
    const sounding = { timeMs: 0, periodS: 0, instrument: 'radiosonde' as const, levels: { heightAgl, speed } };
    const grid = buildSectionGrid([blockOf(sounding)], { field: 'speed', maxRows: 100 });
    expect(grid.rowCount).toBe(100);
    for (let row = 0; row < 100; row++) {
      const inside = speed.filter((_, k) => heightAgl[k]! >= grid.edges[row]! && heightAgl[k]! < grid.edges[row + 1]!);
      // A neighbour may reach over the edge up to its mid-height, 2.5 m.
      expect(grid.values[row]).toBeGreaterThanOrEqual(Math.max(...inside));
      expect(grid.values[row]).toBeLessThanOrEqual(6);
    }
  });

  it('does not stretch a level over a gap: half a spacing and a quarter at most', () => {
    const heightAgl = [100, 150, 200, 250, 600, 650, 700, 750];
    const speed = [1, 2, 3, 4, 5, 6, 7, 8];
    const other = { timeMs: 20 * MINUTE, levels: { heightAgl: [300, 325, 350, 400, 500, 550, 562.5, 600], speed } };
    const grid = buildSectionGrid([blockOf({ timeMs: 10 * MINUTE, levels: { heightAgl, speed } }, other)], {
      field: 'speed',
    });
    expect(speeds(grid, 9 * MINUTE, [250, 300, 350, 500, 550, 562.5, 600])).toEqual([4, NaN, NaN, NaN, NaN, 5, 5]);
  });

  it('passes levels above the ceiling, and is empty without any', () => {
    const levels = { heightAgl: [100, 4000], speed: [4, 7] };
    expect(buildSectionGrid([blockOf({ timeMs: 0, levels })], { field: 'speed' }).rowCount).toBe(1);
    expect(buildSectionGrid([], { field: 'speed' }).values).toHaveLength(0);
    expect(buildSectionGrid([blockOf({ timeMs: NaN, levels })], { field: 'speed' }).columnCount).toBe(0);
  });
});

describe('buildSectionGrid in time', () => {
  const levels = { heightAgl: [100], speed: [5] };
  const cellsOf = (times: number[], periodS = NaN): [number, number][] => {
    const block = blockOf(...times.map((minute) => ({ timeMs: minute * MINUTE, periodS, levels })));
    const { startMs, endMs } = buildSectionGrid([block], { field: 'speed' });
    return [...startMs].map((start, k) => [start / MINUTE, endMs[k]! / MINUTE]);
  };

  it('ends a cell at its time and reaches back over the usual interval, leaving lost times open', () => {
    expect(cellsOf([10, 20, 30, 60, 70])).toEqual([
      [0, 10],
      [10, 20],
      [20, 30],
      [50, 60],
      [60, 70],
    ]);
  });

  it('closes small gaps of an uneven clock', () => {
    expect(cellsOf([10, 20, 31, 41])).toEqual([
      [0, 10],
      [10, 20],
      [20, 31],
      [31, 41],
    ]);
  });

  it('takes a longer averaging period, without overlap', () => {
    expect(cellsOf([20, 30, 40], 1200)).toEqual([
      [0, 20],
      [20, 30],
      [30, 40],
    ]);
  });

  it('stands for an hour at most, and a lone profile for ten minutes', () => {
    expect(cellsOf([0, 720, 1440])[1]).toEqual([660, 720]);
    expect(cellsOf([30])).toEqual([[20, 30]]);
  });

  it('lets a sounding stand for what follows its launch', () => {
    const block = blockOf({ timeMs: 0, periodS: 0, instrument: 'radiosonde', levels });
    const grid = buildSectionGrid([block], { field: 'speed' });
    expect([grid.startMs[0], grid.endMs[0]]).toEqual([0, 10 * MINUTE]);
  });

  it('ends the same in any order and split (property)', () => {
    const times = fc.uniqueArray(fc.integer({ min: 0, max: 60 }), { minLength: 1, maxLength: 20 });
    fc.assert(
      fc.property(times, fc.nat(), (minutes, cut) => {
        const one = (minute: number): Omit<ProfileInput, 'station' | 'source'> => ({
          timeMs: minute * MINUTE,
          levels: { heightAgl: [50, 100 + (minute % 3) * 10], speed: [minute, 1], direction: [minute, 2] },
        });
        const sorted = blockOf(...[...minutes].sort((a, b) => a - b).map(one));
        const at = cut % minutes.length;
        const split = [blockOf(...minutes.slice(at).map(one)), blockOf(...minutes.slice(0, at).map(one))];
        for (const field of ['speed', 'direction', 'shear'] as const) {
          expect(buildSectionGrid(split, { field })).toEqual(buildSectionGrid([sorted], { field }));
        }
      }),
    );
  });

  it('lets profiles of one time share a column, the stronger wind winning', () => {
    const grid = buildSectionGrid(
      [
        blockOf({ timeMs: 0, levels: { heightAgl: [50, 100], speed: [5, 6], direction: [180, 190] } }),
        blockOf({ timeMs: 0, levels: { heightAgl: [100, 150], speed: [9, 7], direction: [200, 210] } }),
      ],
      { field: 'direction' },
    );
    expect(grid.columnCount).toBe(1);
    expect([...grid.values]).toEqual([180, 200, 210]);
    expect([...grid.strength!]).toEqual([5, 9, 7]);
  });
});

describe('fields of a section', () => {
  it('gives shear and turn per metre between the neighbours, the short way round', () => {
    const levels = { heightAgl: [100, 150, 200], speed: [5, 7, 6], direction: [350, 0, 20] };
    const block = blockOf({ timeMs: 0, levels });
    const shear = buildSectionGrid([block], { field: 'shear' });
    expect([...shear.values].map((value) => Number(value.toFixed(5)))).toEqual([0.04, 0.01, -0.02]);
    const veer = buildSectionGrid([block], { field: 'veer' });
    expect([...veer.values].map((value) => Number(value.toFixed(5)))).toEqual([0.2, 0.3, 0.4]);
  });

  it('takes no slope over a gap or between gates a few metres apart', () => {
    const levels = { heightAgl: [100, 150, 158, 200, 600], speed: [5, 7, 9, 8, 1] };
    const grid = buildSectionGrid([blockOf({ timeMs: 0, levels })], { field: 'shear' });
    // At 150 m the gate at 158 m is too near: (8 - 5) / 100. At 600 m nothing is near enough.
    expect(grid.values[1]).toBeCloseTo(0.03, 6);
    expect(grid.values[4]).toBeNaN();
  });

  it('gives humidity flux where temperature and humidity are known', () => {
    const levels = {
      heightAgl: [100, 200, 300],
      speed: [10, 10, 10],
      pressure: [100_000, NaN, NaN],
      temperature: [290, 290, 290],
      specificHumidity: [0.01, 0.01, NaN],
    };
    const grid = buildSectionGrid([blockOf({ timeMs: 0, levels })], { field: 'humidity-flux' });
    // Virtual temperature 290 (1 + 0.6077 x 0.01) = 291.762 K; density 100000 / (287.05 x 291.762) = 1.19403 kg/m3.
    expect(grid.values[0]).toBeCloseTo(0.119403, 4);
    // 100 m higher, in hydrostatic balance, the pressure is exp(-9.80665 x 100 / (287.05 x 291.762)) = 0.988358 of that.
    expect(grid.values[1]).toBeCloseTo(0.118013, 4);
    expect(grid.values[2]).toBeNaN();
  });

  it('shows no temperature that a screen rejected, though the wind stays', () => {
    const levels = {
      heightAgl: [100, 200],
      speed: [5, 6],
      temperature: [290, 350],
      mark: [0, MARKS.find((mark) => mark.effect === 'reject-air')!.bit],
    };
    const block = blockOf({ timeMs: 0, levels });
    expect([...buildSectionGrid([block], { field: 'temperature' }).values]).toEqual([290, NaN]);
    expect([...buildSectionGrid([block], { field: 'speed' }).values]).toEqual([5, 6]);
  });
});
