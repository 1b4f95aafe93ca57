import { describe, expect, it } from 'vitest';
import { buildSectionGrid, sectionCells, sectionCsv } from '../../src/plot/index.ts';
import { BlockBuilder, MARK, unplacedStation, type LevelInput } from '../../src/profile/index.ts';

const MINUTE = 60_000;
const blockOf = (count: number, levels: LevelInput) => {
  const builder = new BlockBuilder();
  for (let k = 1; k <= count; k++)
    builder.add({ station: unplacedStation('here'), source: 'a', timeMs: k * 10 * MINUTE, levels });
  return builder.finish();
};
const levels = {
  heightAgl: [40, 70, 100],
  speed: [10, NaN, 5],
  direction: [1, 2, 3],
  mark: [0, 0, MARK['source-doubts']],
};

describe('sectionCsv', () => {
  it('tells units in the headings and doubt in words, and leaves gaps out', () => {
    const grid = buildSectionGrid([blockOf(2, levels)], { field: 'speed' });
    const text = [...sectionCsv(grid, { speed: 'kt', height: 'ft' })].join('');
    // 10 m/s = 19.44 kt; edges 25, 55, 85, 115 m = 82, 180.4, 278.9, 377.3 ft.
    expect(text).toBe(
      [
        'time_start_utc,time_end_utc,bottom_agl_ft,top_agl_ft,speed_kt,doubtful',
        '1970-01-01T00:00:00.000Z,1970-01-01T00:10:00.000Z,82,180.4,19.44,no',
        '1970-01-01T00:00:00.000Z,1970-01-01T00:10:00.000Z,278.9,377.3,9.72,yes',
        '1970-01-01T00:10:00.000Z,1970-01-01T00:20:00.000Z,82,180.4,19.44,no',
        '1970-01-01T00:10:00.000Z,1970-01-01T00:20:00.000Z,278.9,377.3,9.72,yes',
        '',
      ].join('\n'),
    );
  });

  it('comes in pieces that join without a seam', () => {
    const grid = buildSectionGrid([blockOf(3000, levels)], { field: 'direction' });
    const pieces = [...sectionCsv(grid, { speed: 'm/s', height: 'm' })];
    expect(pieces.length).toBeGreaterThan(1);
    expect(pieces.join('').split('\n')).toHaveLength(1 + 3000 * 3 + 1);
  });

  it('keeps to what is in view', () => {
    const grid = buildSectionGrid([blockOf(5, levels)], { field: 'speed' });
    const extent = { startMs: 15 * MINUTE, endMs: 25 * MINUTE, bottom: 0, top: 50 };
    expect([...sectionCells(grid, extent)].map((cell) => [cell.endMs / MINUTE, cell.value])).toEqual([
      [20, 10],
      [30, 10],
    ]);
  });
});
