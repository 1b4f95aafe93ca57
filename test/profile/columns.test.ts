import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { BlockBuilder, blockOfColumns, unplacedStation, type ProfileBlock } from '../../src/profile/index.ts';

const station = unplacedStation('here');

/** The same profiles by the builder and as columns. */
function bothWays(profiles: readonly { height: number; speed: number }[][]): [ProfileBlock, ProfileBlock] {
  const builder = new BlockBuilder();
  for (const levels of profiles) {
    builder.add({
      station,
      source: 'a.nc',
      timeMs: 0,
      levels: { heightAgl: levels.map((level) => level.height), speed: levels.map((level) => level.speed) },
    });
  }
  const flat = profiles.flat();
  const count = profiles.length;
  const offsets = new Uint32Array(count + 1);
  profiles.forEach((levels, index) => (offsets[index + 1] = offsets[index]! + levels.length));
  const columns = blockOfColumns({
    stations: count === 0 ? [] : [station],
    sources: count === 0 ? [] : ['a.nc'],
    profileCount: count,
    offsets,
    stationIndex: new Uint16Array(count),
    sourceIndex: new Uint16Array(count),
    instrumentIndex: new Uint8Array(count),
    timeMs: new Float64Array(count),
    periodS: new Float32Array(count).fill(NaN),
    notes: {},
    heightAgl: Float32Array.from(flat, (level) => level.height),
    speed: Float32Array.from(flat, (level) => level.speed),
  });
  return [builder.finish(), columns];
}

describe('blockOfColumns', () => {
  it('makes the same block as the builder, whatever the order (property)', () => {
    const height = fc.oneof(fc.integer({ min: 0, max: 20 }), fc.constantFrom(NaN, Infinity));
    const level = fc.record({
      height,
      speed: fc.oneof(fc.integer({ min: 0, max: 9 }), fc.constantFrom(NaN, Infinity)),
    });
    fc.assert(
      fc.property(fc.array(fc.array(level, { maxLength: 12 }), { maxLength: 6 }), (profiles) => {
        const [built, columns] = bothWays(profiles);
        expect(columns).toEqual(built);
      }),
    );
  });
});
