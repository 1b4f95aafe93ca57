import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  BlockBuilder,
  buffersOf,
  gatherWindAt,
  MARK,
  profileAt,
  unplacedStation,
  windColumn,
} from '../../src/profile/index.ts';

const station = unplacedStation('here');
const oneProfile = (levels: Parameters<BlockBuilder['add']>[0]['levels']) => {
  const builder = new BlockBuilder();
  builder.add({ station, source: 'a.csv', timeMs: 0, levels });
  return builder.finish();
};

describe('BlockBuilder', () => {
  it('keeps every level, sorted by height, and marks what was not in order', () => {
    const block = oneProfile({ heightAgl: [300, 100, NaN, 100], speed: [3, 1, 9, 2], direction: [30, 10, 90, 20] });
    const profile = profileAt(block, 0);
    expect([...profile.heightAgl]).toEqual([100, 100, 300, NaN]);
    expect([...profile.speed]).toEqual([1, 2, 3, 9]);
    expect(profile.mark[1]! & MARK.doubled).toBeTruthy();
    expect(profile.mark[3]! & MARK['no-height']).toBeTruthy();
    expect(profile.mark[0]! & MARK['out-of-order']).toBeTruthy();
  });

  it('makes speed and direction of components, direction missing when calm', () => {
    const block = oneProfile({ heightAgl: [10, 20, 30], u: [0, 3, NaN], v: [0, 4, 1] });
    expect([...block.speed]).toEqual([0, 5, NaN]);
    expect(block.direction[0]).toBeNaN();
    expect(block.direction[1]).toBeCloseTo(216.8699, 3);
  });

  it('leaves out columns that nobody filled', () => {
    const block = oneProfile({ heightAgl: [10], speed: [1], direction: [1], temperature: [NaN], pressure: [1e5] });
    expect(block.temperature).toBeNull();
    expect(block.pressure).not.toBeNull();
  });

  it('loses no level and ends ascending, whatever the order (property)', () => {
    const height = fc.oneof(fc.integer({ min: 0, max: 50 }), fc.constant(NaN));
    fc.assert(
      fc.property(fc.array(height, { maxLength: 40 }), (heights) => {
        const block = oneProfile({ heightAgl: heights, speed: heights.map((_, k) => k), direction: heights });
        expect([...block.speed].sort((a, b) => a - b)).toEqual(heights.map((_, k) => k));
        const known = [...block.heightAgl].filter((value) => !Number.isNaN(value));
        expect(known).toEqual([...known].sort((a, b) => a - b));
        const used = gatherWindAt(block, 0, windColumn(1));
        expect(used.count).toBe(new Set(known).size);
      }),
    );
  });

  it('hands over every buffer once', () => {
    const block = oneProfile({ heightAgl: [10], speed: [1], direction: [1] });
    const copy = structuredClone(block, { transfer: buffersOf(block) });
    expect(block.heightAgl.length).toBe(0);
    expect([...copy.heightAgl]).toEqual([10]);
  });
});
