// Simulated nights with the true wind beside what an instrument reports: is a confidence right as often as it says, and do
// tracks begin when the true jet does? Every fourth night; what all of them give stands in the comments.

import { beforeAll, describe, expect, it } from 'vitest';
import { bytesSource, readProfiles } from '../../src/ingest/index.ts';
import { CRITERIA, findJets, trackJets, type Criteria } from '../../src/jet/index.ts';
import { profileAt, type ProfileBlock } from '../../src/profile/index.ts';
import { screen } from '../../src/quality/index.ts';
import { PLAIN_SITE } from '../../src/site/index.ts';
import { readShared, sharedIsHere } from '../support/shared.ts';
import { readToEnd } from '../support/sources.ts';

const HOUR_MS = 3600_000;
/** Every fourth, but for those with hours of bird-like error. */
const NIGHTS = Array.from({ length: 15 }, (_, k) => 4 * k + 1).filter(
  (number) => ![6, 10, 15, 22, 30, 31, 57].includes(number),
);

interface Night {
  readonly seen: ProfileBlock;
  /** True profile by time. */
  readonly truth: ReadonlyMap<number, ReturnType<typeof profileAt>>;
}

async function readNight(number: number): Promise<Night> {
  const name = `night-${String(number).padStart(3, '0')}.csv.gz`;
  const read = async (file: string): Promise<ProfileBlock> =>
    (await readToEnd(readProfiles(bytesSource(file, readShared(file))))).block;
  const seen = screen(await read(`nights/${name}`), { site: PLAIN_SITE }).block;
  const truth = await read(`nights/truth/${name}`);
  return {
    seen,
    truth: new Map(Array.from({ length: truth.profileCount }, (_, k) => [truth.timeMs[k]!, profileAt(truth, k)])),
  };
}

describe.skipIf(!sharedIsHere)('simulated nights', () => {
  const nights: Night[] = [];
  beforeAll(async () => {
    for (const number of NIGHTS) nights.push(await readNight(number));
  }, 120_000);

  // All 53 nights without bird-like error, on the levels that the instrument did not lose: the four categories say 0.00,
  // 0.25, 0.54, 0.74, 0.85, 0.99 and are right 0.01, 0.26, 0.54, 0.63, 0.77, 0.97 of the time; Baas the same but 0.02, 0.34,
  // 0.51, 0.74, 0.80, 0.97; Stull says too little in between: 0.25, 0.54, 0.75, 0.99 for 0.56, 0.77, 0.85, 0.98.
  it.each(['whiteman-1997', 'baas-2009'] as const)(
    'has a confidence by %s that is right as often as it says',
    (name) => {
      const bins = [0.2, 0.8, 1.01].map((upTo) => ({ upTo, said: 0, right: 0, count: 0 }));
      for (const { seen, truth } of nights) {
        for (let index = 0; index < seen.profileCount; index++) {
          const profile = profileAt(seen, index);
          const { confidence } = findJets(profile, CRITERIA[name]);
          if (Number.isNaN(confidence)) continue;
          const real = truth.get(profile.timeMs)!;
          // The true wind on the levels that were seen.
          const speed = real.speed.map((value, k) => (profile.speed[k]! >= 0 ? value : NaN));
          const right = findJets({ ...real, speed }, CRITERIA[name], { memberPairs: 1 }).status === 'jet';
          const bin = bins.find(({ upTo }) => confidence < upTo)!;
          bin.said += confidence;
          bin.right += Number(right);
          bin.count++;
        }
      }
      for (const { said, right, count } of bins) {
        // Profiles of one night err together, so a bin is worth fewer than it counts.
        const allowed = 0.04 + 1.2 / Math.sqrt(Math.max(1, count));
        expect(Math.abs(said - right) / Math.max(1, count), `${said} said, ${right} right`).toBeLessThan(allowed);
      }
    },
  );

  it.each([
    // Median of the error, hours: many of the low noses of this set lie above what the lidars saw that night.
    ['baas-2009', CRITERIA['baas-2009'], 2],
    ['duskveer', CRITERIA.duskveer, 0.75],
  ] as const)('begins tracks by %s when the true jet begins', (_, criteria, median) => {
    // Of all 53 nights: the four categories begin within an hour on 15 of 18 nights, 20 minutes off in the median and never
    // where there is no jet; Baas 23 of 35, 20 minutes; Stull 27 of 44, 20 minutes. Most of the others lie above the levels.
    const errors: number[] = [];
    let falseAlarms = 0;
    for (const night of nights) {
      const truth = trueOnset(night, criteria);
      const { seen } = night;
      const findings = Array.from({ length: seen.profileCount }, (_, k) => ({
        stationId: 'night',
        timeMs: seen.timeMs[k]!,
        finding: findJets(profileAt(seen, k), criteria),
      }));
      const began = Math.min(...trackJets(findings).map(({ beganMs }) => beganMs));
      if (Number.isFinite(truth)) errors.push(Math.abs(began - truth) / HOUR_MS);
      else if (Number.isFinite(began)) falseAlarms++;
    }
    expect(falseAlarms).toBe(0);
    expect(errors.filter((error) => error <= 1).length / errors.length).toBeGreaterThanOrEqual(0.5);
    expect(errors.sort((a, b) => a - b)[errors.length >> 1]).toBeLessThan(median);
  });

  /** First of three true profiles in a row that meet the criteria: the four categories stand in for the house's own. */
  function trueOnset({ truth }: Night, criteria: Criteria): number {
    const asked = criteria.decides === 'confidence' ? CRITERIA['whiteman-1997'] : criteria;
    const met = [...truth.values()].map((profile) => findJets(profile, asked, { memberPairs: 1 }).status === 'jet');
    const first = met.findIndex((here, k) => here && met[k + 1] === true && met[k + 2] === true);
    return [...truth.keys()][first] ?? NaN;
  }
});
