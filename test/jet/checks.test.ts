// Every case of the outside check table for noses, by the table's own readings.

import { describe, expect, it } from 'vitest';
import { CRITERIA, findJets, type Criteria } from '../../src/jet/index.ts';
import { ALLOWANCE } from '../../src/jet/nose.ts';
import { checkBlock, expectAgrees, type CheckCase, type CheckValue } from '../support/check-table.ts';
import { sharedIsHere } from '../support/shared.ts';
import { profileOf } from './support.ts';

const missing = (list: CheckValue | undefined): number[] => (list as (number | null)[]).map((value) => value ?? NaN);

function findingOf(check: CheckCase, criteria: Criteria) {
  return findJets(
    profileOf({ heightAgl: missing(check.in.height_m), speed: missing(check.in.speed_m_per_s) }),
    criteria,
    { memberPairs: 1 },
  );
}

/** The table holds doubles, the profile 32-bit floats: heights and speeds below 64 m/s and 4096 m are off by so much. */
const STORED = 4e-6;

describe.skipIf(!sharedIsHere)('check table jet', () => {
  const block = sharedIsHere ? checkBlock('jet', 'nose') : undefined!;
  const sets = [
    ['bonner_whiteman', CRITERIA['whiteman-1997']],
    ['stull_andreas', CRITERIA['stull-1988']],
    ['stull_andreas', CRITERIA['andreas-2000']],
    ['baas', CRITERIA['baas-2009']],
  ] as const;

  for (const [key, criteria] of sets) {
    it(`agrees with ${key} by ${criteria.name}`, () => {
      for (const check of block.cases) {
        const want = check.out[key] as Record<string, CheckValue>;
        const finding = findingOf(check, criteria);
        const jet = finding.jets[0];
        const label = `${check.id} ${key}`;
        expect(jet !== undefined, label).toBe(want.detected);
        if ('category' in want) expect(jet?.category ?? null, label).toBe(want.category);
        if (jet === undefined) continue;
        const got: Record<string, unknown> = {
          detected: true,
          category: jet.category,
          nose_height_m: jet.noseHeight,
          nose_speed_m_per_s: jet.noseSpeed,
          minimum_above_height_m: jet.minimumHeight,
          minimum_above_speed_m_per_s: jet.minimumSpeed,
          minimum_below_speed_m_per_s: jet.minimumBelowSpeed,
          drop_m_per_s: jet.falloff,
          drop_is_lower_bound: jet.falloffIsBound,
          rise_m_per_s: jet.rise,
        };
        for (const [name, value] of Object.entries(want)) {
          if (typeof value === 'number' && name !== 'category') {
            expect(Math.abs((got[name] as number) - value), `${label} ${name}`).toBeLessThanOrEqual(STORED);
          } else expectAgrees(block, name, got[name], value, `${label} ${name}`);
        }
      }
    });
  }

  it('agrees on the layer of the jet', () => {
    for (const check of block.cases) {
      const want = check.out.jet_layer as Record<string, CheckValue> | undefined;
      if (want === undefined) continue;
      const core = findingOf(check, CRITERIA['whiteman-1997']).jets[0]!.core;
      expectAgrees(block, 'bottom_m', core.bottom, want.bottom_m!, check.id);
      expectAgrees(block, 'top_m', core.top, want.top_m!, check.id);
      expect(Math.abs(core.threshold - (want.threshold_m_per_s as number))).toBeLessThanOrEqual(STORED);
    }
  });

  it('has no margin so small that the allowance for 32-bit floats could decide a case', () => {
    const thresholds = [...CRITERIA['whiteman-1997'].categories.flatMap((one) => [one.speed, one.falloff]), 2];
    for (const check of block.cases) {
      const speed = missing(check.in.speed_m_per_s).filter((value) => !Number.isNaN(value));
      for (const nose of speed) {
        const margins = thresholds.map((threshold) => nose - threshold);
        for (const minimum of speed) {
          margins.push(nose - 1.25 * minimum, ...thresholds.map((threshold) => nose - minimum - threshold));
        }
        // In doubles a margin of nought is off by a few times 1e-16.
        const smallest = Math.min(...margins.map(Math.abs).filter((margin) => margin > 1e-12));
        expect(smallest, check.id).toBeGreaterThan(100 * ALLOWANCE);
      }
    }
  });
});
