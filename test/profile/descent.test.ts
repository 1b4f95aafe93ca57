import { describe, expect, it } from 'vitest';
import { BlockBuilder, blockOfColumns, MARK, unplacedStation } from '../../src/profile/index.ts';

/** 5 m a step up to 3 km, then down again 10 m a step to 1 km. */
const UP = Array.from({ length: 601 }, (_, k) => 5 * k);
const DOWN = Array.from({ length: 200 }, (_, k) => 2990.5 - 10 * k);

function built(heightAgl: number[]): { heightAgl: Float32Array; mark: Uint32Array } {
  const builder = new BlockBuilder();
  const speed = heightAgl.map((_, k) => k);
  builder.add({ station: unplacedStation('here'), source: 'a', timeMs: 0, levels: { heightAgl, speed } });
  const block = builder.finish();
  const columns = blockOfColumns({
    ...block,
    heightAgl: Float32Array.from(heightAgl),
    speed: Float32Array.from(speed),
    mark: new Uint32Array(heightAgl.length),
  });
  expect([...columns.mark]).toEqual([...block.mark]);
  return block;
}

const descending = (heightAgl: number[]): number[] => {
  const { heightAgl: heights, mark } = built(heightAgl);
  return [...heights].filter((_, k) => (mark[k]! & MARK.descent) !== 0);
};

describe('a sonde that is followed until it is down again', () => {
  it('has its descent marked, level by level', () => {
    expect(descending([...UP, ...DOWN])).toEqual([...DOWN].reverse());
  });

  it('is none where levels come from the top down, in two modes, with a stall, or fall but a little', () => {
    expect(descending([...UP].reverse())).toEqual([]);
    expect(descending([...UP.slice(0, 300), ...UP.slice(100)])).toEqual([]);
    expect(descending([...UP.slice(100), ...UP.slice(0, 300)])).toEqual([]);
    expect(descending([...UP.slice(0, 200), 990, 985, 990, ...UP.slice(200)])).toEqual([]);
    expect(descending([...UP, ...DOWN.slice(0, 30)])).toEqual([]);
  });
});
