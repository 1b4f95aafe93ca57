import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { pickRows } from '../../../src/desk/archive/merge.ts';
import { archiveRows, mergeRows, type FeedRows } from '../../../src/desk/index.ts';
import { CRITERIA, findJets } from '../../../src/jet/index.ts';
import { profileAt } from '../../../src/profile/index.ts';
import { screen } from '../../../src/quality/index.ts';
import { windOnDisc } from '../../../src/rotor/index.ts';
import { blockOf, PLAIN, QUESTION, type Made } from './support.ts';

const START = Date.UTC(2024, 4, 21, 18);
const STEP = 600_000;

const MADE: Made[] = Array.from({ length: 60 }, (_, k) => ({
  timeMs: START + k * STEP,
  jet: k % 5 === 0 ? 0 : 4 + (k % 17),
  noseHeight: 150 + 13 * k,
  lost: k % 7 === 3 ? [2, 3, 20] : k % 11 === 5 ? Array.from({ length: 40 }, (_, level) => level) : [],
  levels: k % 13 === 6 ? 3 : 40,
}));

describe('archiveRows', () => {
  for (const name of ['whiteman-1997', 'baas-2009', 'duskveer'] as const) {
    it(`says of each profile what the single profile's functions say, by ${name}`, () => {
      const block = blockOf(MADE);
      const [rows] = archiveRows(block, { ...QUESTION, criteria: CRITERIA[name] });
      const screened = screen(block).block;
      let jet = 0;
      for (let index = 0; index < block.profileCount; index++) {
        const profile = profileAt(screened, index);
        const finding = findJets(profile, CRITERIA[name]);
        expect(['not-assessable', 'no-jet', 'jet'][rows!.profiles.status[index]!]).toBe(finding.status);
        if (finding.status === 'not-assessable') {
          expect(rows!.reasons[rows!.profiles.why[index]!]).toBe(finding.why);
        }
        expect(rows!.profiles.jetCount[index]).toBe(finding.jets.length);
        for (const { category, noseHeight, falloff } of finding.jets) {
          expect(rows!.jets.category[jet]).toBe(category ?? -1);
          expect(rows!.jets.noseHeight[jet]).toBe(noseHeight);
          expect(rows!.jets.falloff[jet++]).toBe(Math.fround(falloff));
        }
        const wind = windOnDisc(profile, QUESTION.discs[0]!);
        expect(rows!.discs[0]!.equivalentSpeed[index]).toBe(Math.fround(wind.equivalentSpeed));
        expect(rows!.discs[0]!.veer[index]).toBe(Math.fround(wind.veer));
        const raised = windOnDisc(profile, QUESTION.discs[1]!, { groundOffset: 20 });
        expect(rows!.discs[1]!.shearExponent[index]).toBe(Math.fround(raised.shearExponent));
      }
      expect(jet).toBe(rows!.jets.category.length);
      expect(jet).toBeGreaterThan(5);
    });
  }

  it('does without directions near the rotor as the single profile does', () => {
    const block = blockOf([{ timeMs: START, jet: 8 }]);
    block.direction.fill(NaN, 0, 12);
    const [rows] = archiveRows(block, QUESTION);
    const wind = windOnDisc(profileAt(block, 0), QUESTION.discs[0]!);
    expect(wind.status).toBe('not-assessable');
    expect(rows!.discs[0]!.coverage[0]).toBe(Math.fround(wind.coverage));
    expect(rows!.discs[0]!.hubSpeed[0]).toBeNaN();
  });

  it('keeps feeds apart, each ascending in time', () => {
    const hill = { ...PLAIN, id: 'hill' };
    const made = MADE.map((one, k) => (k % 3 === 0 ? { ...one, station: hill } : one)).reverse();
    const feeds = archiveRows(blockOf(made), QUESTION);
    expect(feeds.map(({ feed, profiles }) => [feed.key, profiles.timeMs.length])).toEqual([
      ['hill/lidar', 20],
      ['plain/lidar', 40],
    ]);
    for (const { profiles } of feeds) expect([...profiles.timeMs]).toEqual([...profiles.timeMs].sort((a, b) => a - b));
  });
});

describe('mergeRows', () => {
  const rowsOf = (made: readonly Made[], source: string): FeedRows =>
    archiveRows(blockOf(made), { ...QUESTION, source })[0]!;

  it('comes to the same whatever the parts and their order, doubled profiles included', () => {
    const whole = rowsOf(MADE, 'x');
    expect(whole.jets.category.length).toBeGreaterThan(5);
    fc.assert(
      fc.property(fc.array(fc.nat(2), { minLength: 60, maxLength: 60 }), fc.boolean(), (part, backwards) => {
        const parts = [0, 1, 2].flatMap((wanted) => {
          // Each part overlaps the next one by a profile.
          const own = MADE.flatMap((_, k) => (part[k] === wanted || (k > 0 && part[k - 1] === wanted) ? [k] : []));
          const row = Uint32Array.from(own);
          return own.length === 0 ? [] : [pickRows([whole], { part: new Uint32Array(own.length), row })];
        });
        expect(mergeRows(backwards ? parts.reverse() : parts)).toEqual(whole);
      }),
      { numRuns: 30 },
    );
  });

  it('keeps the fuller of two profiles of one time, and the first name of equal ones', () => {
    const full = rowsOf([{ timeMs: START, jet: 9 }], 'b.nc');
    const thin = rowsOf([{ timeMs: START, jet: 9, lost: [3, 4, 5] }], 'a.nc');
    const same = rowsOf([{ timeMs: START, jet: 9 }], 'c.nc');
    for (const parts of [
      [full, thin, same],
      [same, thin, full],
    ]) {
      const merged = mergeRows(parts);
      expect(merged.profiles.windLevels).toEqual(Uint16Array.of(40));
      expect(merged.sources[merged.profiles.source[0]!]).toBe('b.nc');
    }
  });
});
