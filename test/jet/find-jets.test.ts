import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CRITERIA, CRITERIA_NAMES, criteriaOf, findJets } from '../../src/jet/index.ts';
import { MARK } from '../../src/profile/index.ts';
import type { OwnCriteria } from '../../src/site/index.ts';
import { profileOf } from './support.ts';

const heightAgl = [40, 80, 120, 160, 200, 250, 300, 400, 500, 600, 800, 1000, 1250, 1500, 2000, 2500, 3000];
/** Rises to 18 m/s at 250 m, falls to 7 at 1000 m, and rises no further than 9. */
const jet = [6, 9, 12, 15, 17, 18, 17, 14, 11, 9, 7.5, 7, 7.5, 8, 8.5, 9, 9];
const direction = heightAgl.map((_, k) => 170 + 5 * k);

const speeds = fc.array(fc.integer({ min: 0, max: 60 }), { minLength: 3, maxLength: heightAgl.length });
const anySet = fc.constantFrom(...CRITERIA_NAMES);
const published = fc.constantFrom(...CRITERIA_NAMES.filter((name) => CRITERIA[name].decides === 'levels'));

describe('findJets', () => {
  it('describes a plain jet by every criteria set', () => {
    for (const name of CRITERIA_NAMES) {
      const finding = findJets(profileOf({ heightAgl, speed: jet, direction }), CRITERIA[name]);
      expect(finding.status, name).toBe('jet');
      expect(finding.jets[0]).toMatchObject({ noseHeight: 250, noseSpeed: 18, noseDirection: 195, falloff: 11 });
      expect(finding.jets[0]!.category, name).toBe(CRITERIA[name].categories.length > 1 ? 2 : null);
      expect(finding.confidence, name).toBeGreaterThan(0.95);
    }
  });

  it('refines the nose by the parabola through three levels', () => {
    // 17, 18, 17 at 200, 250, 300 m: symmetric, so the vertex is the level itself.
    const plain = findJets(profileOf({ heightAgl, speed: jet }), CRITERIA['whiteman-1997']).jets[0]!;
    expect(plain.refinedHeight).toBeCloseTo(250, 9);
    // s = 20 - (z - 230)^2/5000 gives 19.82 at 200, 19.92 at 250, 19.02 at 300 m: vertex 20 m/s at 230 m.
    const skewed = jet.map((speed, k) => [19.82, 19.92, 19.02][k - 4] ?? speed);
    const refined = findJets(profileOf({ heightAgl, speed: skewed }), CRITERIA['whiteman-1997']).jets[0]!;
    expect(refined.noseHeight).toBe(250);
    expect(refined.refinedHeight).toBeCloseTo(230, 3);
    expect(refined.refinedSpeed).toBeCloseTo(20, 5);
  });

  it('says why nothing can be told', () => {
    const none = profileOf({ heightAgl, speed: heightAgl.map(() => NaN) });
    expect(findJets(none, CRITERIA.duskveer)).toMatchObject({ status: 'not-assessable', jets: [], confidence: NaN });
    expect(findJets(none, CRITERIA.duskveer).why).toContain('has both height and speed');
    const screened = profileOf({ heightAgl, speed: jet, mark: heightAgl.map(() => MARK['low-signal']) });
    expect(findJets(screened, CRITERIA.duskveer).why).toContain('17 are screened out');
    const one = profileOf({ heightAgl: [100], speed: [12] });
    expect(findJets(one, CRITERIA['whiteman-1997']).why).toContain('Only 1 usable level');
    const high = profileOf({ heightAgl: [600, 700, 800, 900], speed: [9, 12, 8, 5] });
    expect(findJets(high, CRITERIA['baas-2009']).why).toBe('No level below 500 m: the lowest lies at 600 m.');
    expect(findJets(profileOf({ heightAgl: [] }), CRITERIA.duskveer).why).toBe('The profile holds no levels.');
  });

  it('does not settle by the house’s own criteria what lies beyond the end of data', () => {
    const lidar = profileOf({
      heightAgl: [40, 80, 120, 160, 200, 240, 280, 320],
      speed: [5, 8, 11, 13, 14, 13, 12, 11],
    });
    const own = findJets(lidar, CRITERIA.duskveer);
    expect(own.status).toBe('not-assessable');
    expect(own.why).toContain('data end at 320 m while the speed still falls');
    expect(findJets(lidar, CRITERIA['whiteman-1997']).status).toBe('no-jet');
  });

  it('finds two jets at once only where they stand apart', () => {
    const double = [6, 10, 14, 16, 15, 12, 9, 7, 10, 14, 18, 14, 10, 8, 7, 7, 7];
    const finding = findJets(profileOf({ heightAgl, speed: double }), CRITERIA.duskveer);
    expect(finding.jets.map((found) => found.noseHeight)).toEqual([800, 160]);
    expect(finding.noses).toHaveLength(2);
  });

  it('lets a small wiggle end the fall-off by the literal criteria and not by the house’s own', () => {
    const wiggle = jet.map((speed, k) => (k === 7 ? 14 : k === 8 ? 14.1 : speed));
    const literal = findJets(profileOf({ heightAgl, speed: wiggle }), CRITERIA['whiteman-1997-strongest']);
    expect(literal.status).toBe('no-jet');
    expect(findJets(profileOf({ heightAgl, speed: wiggle }), CRITERIA.duskveer).jets[0]!.falloff).toBe(11);
  });

  it('is less sure where levels are doubtful or uncertain', () => {
    const weak = jet.map((speed) => 0.6 * speed);
    const confidence = (levels: { mark?: number[]; speedUncertainty?: number[] }): number =>
      findJets(profileOf({ heightAgl, speed: weak, ...levels }), CRITERIA.duskveer).confidence;
    const sure = confidence({ speedUncertainty: heightAgl.map(() => 0.1) });
    expect(sure).toBeGreaterThan(confidence({ speedUncertainty: heightAgl.map(() => 1) }));
    expect(sure).toBeGreaterThan(
      confidence({
        speedUncertainty: heightAgl.map(() => 0.3),
        mark: heightAgl.map(() => MARK['migrants-likely']),
      }),
    );
  });

  it('reads criteria of the site’s own', () => {
    const own: OwnCriteria = {
      name: 'ours',
      ceiling: 1000,
      noseCeiling: 600,
      candidates: 'strongest',
      falloffTo: 'layer-minimum',
      endingRise: 0,
      categories: [{ speed: 15, falloff: 3 }],
      ratioAbove: 2,
      riseBelow: 10,
    };
    expect(findJets(profileOf({ heightAgl, speed: jet }), criteriaOf(own)).jets[0]).toMatchObject({
      category: null,
      noseHeight: 250,
      minimumHeight: 1000,
      rise: 12,
    });
    expect(findJets(profileOf({ heightAgl, speed: jet }), criteriaOf({ ...own, ratioAbove: 3 })).status).toBe('no-jet');
    expect(() => criteriaOf('nonesuch')).toThrow(/no criteria set called “nonesuch”/);
  });

  it('depends on speeds only: turning every wind turns the nose and nothing else (property)', () => {
    fc.assert(
      fc.property(speeds, anySet, fc.integer({ min: 0, max: 359 }), (speed, name, turn) => {
        const heights = heightAgl.slice(0, speed.length);
        const find = (by: number) =>
          findJets(profileOf({ heightAgl: heights, speed, direction: heights.map(() => by) }), CRITERIA[name], {
            memberPairs: 4,
          });
        const plain = find(0);
        const turned = find(turn);
        expect({ ...turned, jets: [], noses: [] }).toEqual({ ...plain, jets: [], noses: [] });
        expect(turned.jets).toEqual(plain.jets.map((found) => ({ ...found, noseDirection: turn })));
        expect(turned.noses.map(({ height }) => height)).toEqual(plain.noses.map(({ height }) => height));
      }),
      { numRuns: 60 },
    );
  });

  it('finds the same nose when speeds and thresholds grow alike (property)', () => {
    fc.assert(
      fc.property(speeds, published, (speed, name) => {
        const heights = heightAgl.slice(0, speed.length);
        const criteria = CRITERIA[name];
        const doubled = {
          ...criteria,
          riseBelow: 2 * criteria.riseBelow,
          categories: criteria.categories.map((one) => ({ speed: 2 * one.speed, falloff: 2 * one.falloff })),
        };
        const options = { memberPairs: 1 };
        const plain = findJets(profileOf({ heightAgl: heights, speed }), criteria, options);
        const twice = findJets(profileOf({ heightAgl: heights, speed: speed.map((s) => 2 * s) }), doubled, options);
        expect(twice.jets.map((found) => [found.level, found.category, found.falloff])).toEqual(
          plain.jets.map((found) => [found.level, found.category, 2 * found.falloff]),
        );
      }),
      { numRuns: 60 },
    );
  });

  it('gives every published nose the evidence its criteria ask for (property)', () => {
    fc.assert(
      fc.property(speeds, published, (speed, name) => {
        const criteria = CRITERIA[name];
        const profile = profileOf({ heightAgl: heightAgl.slice(0, speed.length), speed });
        for (const found of findJets(profile, criteria, { memberPairs: 1 }).jets) {
          const wanted = criteria.categories[found.category ?? 0]!;
          expect(found.noseSpeed).toBeGreaterThanOrEqual(wanted.speed - 1e-5);
          expect(found.falloff).toBeGreaterThanOrEqual(wanted.falloff - 1e-5);
          expect(found.noseSpeed).toBeGreaterThanOrEqual(criteria.ratioAbove * found.minimumSpeed - 1e-5);
          if (criteria.riseBelow > 0) expect(found.rise).toBeGreaterThanOrEqual(criteria.riseBelow - 1e-5);
          expect(found.noseHeight).toBeLessThanOrEqual(criteria.noseCeiling);
          expect(found.refinedSpeed).toBeGreaterThanOrEqual(found.noseSpeed - 1e-9);
          expect(found.core.bottom).toBeLessThanOrEqual(found.noseHeight);
          expect(found.core.top).toBeGreaterThanOrEqual(found.noseHeight);
        }
      }),
      { numRuns: 200 },
    );
  });

  it('has the same confidence every time (property)', () => {
    fc.assert(
      fc.property(speeds, anySet, (speed, name) => {
        const profile = profileOf({ heightAgl: heightAgl.slice(0, speed.length), speed });
        const first = findJets(profile, CRITERIA[name], { memberPairs: 4 });
        expect(first.confidence).toBeGreaterThanOrEqual(0);
        expect(first.confidence).toBeLessThanOrEqual(1);
        expect(findJets(profile, CRITERIA[name], { memberPairs: 4 })).toEqual(first);
      }),
      { numRuns: 60 },
    );
  });
});

describe('a sounding of significant levels', () => {
  const jetOf = (heights: readonly number[], speed: readonly number[]): ReturnType<typeof findJets> => {
    const column = { heightAgl: heights, speed, direction: heights.map(() => 200) };
    return findJets({ ...profileOf(column), instrument: 'radiosonde' }, CRITERIA.duskveer);
  };

  it('shows its nose in a lone fast level, however smooth the air above', () => {
    const aloft = [830, 1050, 1300, 1550, 1800, 2100, 2400, 2700, 3000, 3100];
    const slow = [10.5, 10, 9.5, 9, 9, 9, 9, 9, 9, 9];
    const finding = jetOf([10, 100, 215, 409, 615, 720, ...aloft], [8, 10, 12, 19, 11, 11, ...slow]);
    expect(finding.status).toBe('jet');
    expect(finding.confidence).toBeGreaterThan(0.8);
    expect(finding.jets[0]!.noseHeight).toBe(409);
  });

  it('shows none where the wind only wavers by its uncertainty', () => {
    const finding = jetOf([10, 300, 600, 1000, 1500, 2200, 3000, 3100], [5, 8, 11, 10.3, 11, 10.4, 13, 14]);
    expect(finding.status).toBe('no-jet');
  });
});
