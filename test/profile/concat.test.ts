import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { BlockBuilder, concatBlocks, profilesOf, unplacedStation, type ProfileBlock } from '../../src/profile/index.ts';

interface Made {
  station: string;
  timeMs: number;
  speeds: number[];
  temperature: boolean;
  notes: string[];
}

function blockOf(profiles: readonly Made[]): ProfileBlock {
  const builder = new BlockBuilder();
  for (const { station, timeMs, speeds, temperature, notes } of profiles) {
    builder.add({
      station: unplacedStation(station),
      source: `${station}.csv`,
      timeMs,
      notes,
      levels: {
        heightAgl: speeds.map((_, k) => 10 * k),
        speed: speeds,
        direction: speeds,
        temperature: temperature ? speeds.map((speed) => 280 + speed) : undefined,
      },
    });
  }
  return builder.finish();
}

const plain = (block: ProfileBlock): unknown[] =>
  [...profilesOf(block)].map((profile) => ({
    ...profile,
    heightAgl: [...profile.heightAgl],
    speed: [...profile.speed],
    direction: [...profile.direction],
    // Null and all missing say the same once blocks are joined.
    temperature: [...(profile.temperature ?? new Float32Array(profile.levelCount).fill(NaN))],
    mark: [...profile.mark],
  }));

const made: fc.Arbitrary<Made> = fc.record({
  station: fc.constantFrom('a', 'b', 'c'),
  timeMs: fc.integer(),
  speeds: fc.array(fc.integer({ min: 0, max: 40 }), { maxLength: 6 }),
  temperature: fc.boolean(),
  notes: fc.array(fc.constantFrom('x', 'y'), { maxLength: 2 }),
});

describe('concatBlocks', () => {
  it('holds every profile of every block in order (property)', () => {
    fc.assert(
      fc.property(fc.array(fc.array(made, { maxLength: 5 }), { maxLength: 4 }), (lists) => {
        const blocks = lists.map(blockOf);
        expect(plain(concatBlocks(blocks))).toEqual(blocks.flatMap(plain));
      }),
    );
  });

  it('has a column where any block has it, missing where the others lack it', () => {
    const cold = { station: 'a', timeMs: 0, speeds: [1, 2], temperature: false, notes: [] };
    const joined = concatBlocks([blockOf([cold]), blockOf([{ ...cold, temperature: true }])]);
    expect([...joined.temperature!]).toEqual([NaN, NaN, 281, 282]);
    expect(joined.pressure).toBeNull();
    expect(joined.stations).toHaveLength(1);
  });

  it('gives a block without profiles of nothing', () => {
    const none = concatBlocks([]);
    expect(none.profileCount).toBe(0);
    expect([...none.offsets]).toEqual([0]);
  });
});
