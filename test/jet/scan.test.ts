import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CRITERIA, CRITERIA_NAMES, findJets, NO_JET, NOT_ASSESSABLE, scanNoses } from '../../src/jet/index.ts';
import { BlockBuilder, MARK, profilesOf, unplacedStation } from '../../src/profile/index.ts';

const level = fc.record({
  step: fc.integer({ min: 1, max: 400 }),
  // Halves, so that many neighbours are equal and thresholds are met exactly.
  speed: fc.oneof({ weight: 12, arbitrary: fc.integer({ min: 0, max: 50 }).map((n) => n / 2) }, fc.constant(NaN)),
  mark: fc.oneof({ weight: 12, arbitrary: fc.constant(0) }, fc.constant(MARK['vertical-jump'])),
});
const profiles = fc.array(fc.array(level, { maxLength: 25 }), { minLength: 1, maxLength: 6 });

describe('scanNoses', () => {
  it('says of many profiles what findJets says of each (property)', () => {
    fc.assert(
      fc.property(profiles, fc.constantFrom(...CRITERIA_NAMES), (all, name) => {
        const builder = new BlockBuilder();
        all.forEach((levels, timeMs) => {
          let height = 0;
          const heightAgl = levels.map(({ step }) => (height += step));
          builder.add({
            station: unplacedStation('scanned'),
            source: 'test',
            timeMs,
            levels: {
              heightAgl,
              speed: levels.map(({ speed }) => speed),
              direction: heightAgl.map((value) => value % 360),
              mark: levels.map(({ mark }) => mark),
            },
          });
        });
        const block = builder.finish();
        const table = scanNoses(block, CRITERIA[name]);
        let index = 0;
        for (const profile of profilesOf(block)) {
          const { status, jets } = findJets(profile, CRITERIA[name]);
          const jet = jets[0];
          const none = status === 'not-assessable' ? NOT_ASSESSABLE : NO_JET;
          expect(table.category[index]).toBe(jet === undefined ? none : (jet.category ?? 0));
          expect(table.noseHeight[index]).toEqual(jet?.noseHeight ?? NaN);
          expect(table.noseSpeed[index]).toEqual(jet?.noseSpeed ?? NaN);
          expect(table.noseDirection[index]).toEqual(jet?.noseDirection ?? NaN);
          expect(table.falloff[index]).toEqual(Math.fround(jet?.falloff ?? NaN));
          expect(table.falloffIsBound[index]).toBe(jet?.falloffIsBound === true ? 1 : 0);
          index++;
        }
      }),
      { numRuns: 300 },
    );
  });
});
