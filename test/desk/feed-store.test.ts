import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { FeedStore } from '../../src/desk/feed-store.ts';
import { BlockBuilder, profileAt, type ProfileBlock } from '../../src/profile/index.ts';
import { PLAIN_SITE, type Site } from '../../src/site/index.ts';

interface Given {
  id: string;
  timeMs: number;
  speed: number;
  latitude: number;
  source: string;
}

function blockOf(given: readonly Given[]): ProfileBlock {
  const builder = new BlockBuilder();
  for (const { id, timeMs, speed, latitude, source } of given) {
    builder.add({
      station: { id, name: id, latitude, longitude: 10, elevation: 100 },
      source,
      instrument: 'lidar',
      timeMs,
      periodS: 600,
      levels: { heightAgl: [40, 80], speed: [speed, speed + 1], direction: [180, NaN] },
    });
  }
  return builder.finish();
}

const contents = (store: FeedStore): unknown => store.names().map((name) => [name, store.block(name.key)]);

describe('FeedStore', () => {
  it('ends in the same state in any order, twice and in any pieces (property)', () => {
    const given = fc.record({
      id: fc.constantFrom('a', 'b'),
      timeMs: fc.integer({ min: 1, max: 5 }),
      speed: fc.oneof(fc.integer({ min: 0, max: 3 }), fc.constant(NaN)),
      latitude: fc.constantFrom(50, 50.1, NaN),
      source: fc.constantFrom('x.csv', 'y.csv'),
    });
    fc.assert(
      fc.property(
        fc.array(given, { minLength: 1, maxLength: 12 }),
        fc.integer(),
        fc.boolean(),
        (list, seed, askBetween) => {
          const ordered = new FeedStore(PLAIN_SITE);
          ordered.accept(blockOf(list));
          const shuffled = new FeedStore(PLAIN_SITE);
          const key = (k: number): number => Math.abs(Math.sin(seed + k * 12.9898)) % 1;
          const order = [...list.keys(), ...list.keys()].sort((a, b) => key(a) - key(b));
          for (const k of order) {
            shuffled.accept(blockOf([list[k]!]));
            // Asking for the block part of the way must leave no trace either.
            if (askBetween) contents(shuffled);
          }
          expect(contents(shuffled)).toEqual(contents(ordered));
        },
      ),
    );
  });

  it('says what was new, repeated and replaced', () => {
    const store = new FeedStore(PLAIN_SITE);
    const one = { id: 'a', timeMs: 1, speed: 5, latitude: 50, source: 'x' };
    expect(store.accept(blockOf([one]))).toEqual({ added: 1, repeated: 0, replaced: 0, changed: ['a/lidar'] });
    expect(store.accept(blockOf([one])).repeated).toBe(1);
    expect(store.accept(blockOf([{ ...one, speed: 6 }]))).toMatchObject({ replaced: 1, changed: ['a/lidar'] });
    expect(profileAt(store.block('a/lidar')!, 0).speed[0]).toBe(6);
  });

  it('lets the site file place, name and rename a station', () => {
    const site: Site = {
      ...PLAIN_SITE,
      stations: [
        {
          id: 'mast-1',
          name: 'Mast',
          latitude: 48,
          longitude: NaN,
          elevation: 300,
          instrument: 'mast',
          aliases: ['A'],
          speedUncertainty: NaN,
        },
      ],
    };
    const store = new FeedStore(site);
    store.accept(blockOf([{ id: 'a', timeMs: 1, speed: 5, latitude: NaN, source: 'x' }]));
    expect(store.names()).toEqual([
      {
        key: 'mast-1/mast',
        instrument: 'mast',
        station: { id: 'mast-1', name: 'Mast', latitude: 48, longitude: 10, elevation: 300 },
      },
    ]);
  });
});
