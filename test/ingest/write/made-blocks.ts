// Blocks of any make-up for round trips: grids and ragged, placed and unplaced stations, every column or few.

import fc from 'fast-check';
import { BlockBuilder, INSTRUMENTS, MARKS, type ProfileBlock, type Station } from '../../../src/profile/index.ts';

const number = (min: number, max: number) =>
  fc.oneof(
    // Adding zero makes a negative zero positive: text formats do not keep its sign.
    { weight: 9, arbitrary: fc.float({ min, max, noNaN: true }).map((x) => x + 0) },
    { weight: 1, arbitrary: fc.constant(NaN) },
  );

const station: fc.Arbitrary<Station> = fc.record({
  id: fc.stringMatching(/^[a-zé][a-z0-9-]{0,8}$/u),
  name: fc.stringMatching(/^[A-ZÄ][a-zü]{0,5}(?:, [A-Z][a-z]{0,3})?$/u),
  latitude: fc.oneof(
    fc.constant(NaN),
    fc.integer({ min: -9000, max: 9000 }).map((x) => x / 100),
  ),
  longitude: fc.oneof(
    fc.constant(NaN),
    fc.integer({ min: -18000, max: 18000 }).map((x) => x / 100),
  ),
  elevation: fc.oneof(fc.constant(NaN), fc.integer({ min: 0, max: 3000 })),
});

const level = fc.record({
  speed: number(0, 80),
  direction: number(0, 360),
  verticalSpeed: number(-5, 5),
  pressure: number(100, 110_000),
  temperature: number(180, 330),
  specificHumidity: number(Math.fround(1e-6), Math.fround(0.03)),
  signal: number(-30, 40),
  speedUncertainty: number(0, 5),
  mark: fc.oneof(fc.constant(0), fc.constantFrom(...MARKS.slice(5).map(({ bit }) => bit))),
});

const profile = fc.record({
  station: fc.nat(1),
  instrument: fc.constantFrom(...INSTRUMENTS),
  timeMs: fc.integer({ min: Date.UTC(1990, 0, 1), max: Date.UTC(2030, 0, 1) }),
  periodS: fc.constantFrom(NaN, 0, 60, 600),
  revision: fc.constantFrom(0, 0, 0, 1),
  heights: fc.uniqueArray(fc.integer({ min: 1, max: 3000 }), { minLength: 1, maxLength: 6 }),
  levels: fc.array(level, { minLength: 6, maxLength: 6 }),
});

/** @param isGrid one station, one instrument, the same heights and rising times in all profiles */
export function madeBlock(isGrid: boolean): fc.Arbitrary<ProfileBlock> {
  return fc
    .tuple(fc.tuple(station, station), fc.array(profile, { minLength: 1, maxLength: 5 }), fc.boolean())
    .map(([[first, second], profiles, windOnly]) => {
      const stations = [first, { ...second, id: `${second.id}2` }];
      const builder = new BlockBuilder();
      profiles.forEach((made, index) => {
        const heights = [...(isGrid ? profiles[0]! : made).heights].sort((a, b) => a - b);
        const column = (name: keyof (typeof made.levels)[0]): number[] => heights.map((_, k) => made.levels[k]![name]);
        builder.add({
          station: stations[isGrid ? 0 : made.station]!,
          source: 'made.nc',
          instrument: made.instrument,
          timeMs: isGrid ? profiles[0]!.timeMs + 600_000 * index : made.timeMs,
          periodS: made.periodS,
          revision: made.revision,
          levels: {
            heightAgl: heights,
            speed: column('speed'),
            direction: column('direction'),
            ...(windOnly
              ? {}
              : {
                  verticalSpeed: column('verticalSpeed'),
                  pressure: column('pressure'),
                  temperature: column('temperature'),
                  specificHumidity: column('specificHumidity'),
                  signal: column('signal'),
                  speedUncertainty: column('speedUncertainty'),
                  mark: column('mark'),
                }),
          },
        });
      });
      return builder.finish();
    });
}
