// `jets`: is there a low-level jet, by which criteria, how sure; a JSON line a profile.

import { toJsonNumber } from '../air/index.ts';
import { profilesOf, type Profile } from '../profile/index.ts';
import { CRITERIA, CRITERIA_NAMES, criteriaOf, findJets, type Criteria, type JetFinding } from '../jet/index.ts';
import { siteStation, type Site } from '../site/index.ts';
import { readPaths } from './blocks.ts';
import { parseOptions, UsageError, type Command } from './command.ts';
import { DECIMALS, isoTime } from './json-edge.ts';
import { LineWriter } from './output.ts';
import { screener, SCREENS_HELP, SCREENS_OPTION } from './screening.ts';
import { SITE_OPTION, siteOf } from './site-option.ts';
import { STATIONS_HELP, STATIONS_OPTION, stationsOf } from './stations-option.ts';

export const command: Command = {
  help: `duskveer jets PATH... [--criteria NAME] [--site FILE]

Reads profiles from files, from all files in folders, or from stdin (-) and looks for jets. Published criteria are put to the
levels as the files give them, the house's own to levels that have passed all screens; --screens says otherwise.

Prints a JSON line a profile:
  station, time, criteria
  status          jet, no-jet or not-assessable
  why             the reason in words where there is no jet
  jets            category (null where the criteria know none), nose_height_agl_m, nose_speed_mps, nose_direction_deg,
                  falloff_mps, falloff_is_bound (data end while the speed still falls: at least this much), confidence (0 to 1)

  --criteria NAME    one of these; without it the site's, else duskveer
${CRITERIA_NAMES.map((name) => `                     ${name.padEnd(24)} ${CRITERIA[name].title}`).join('\n')}
  --site FILE        stations with their uncertainty, the site's own criteria
${STATIONS_HELP}
${SCREENS_HELP}`,
  async run(args) {
    const { values, positionals } = parseOptions(args, {
      ...SITE_OPTION,
      ...STATIONS_OPTION,
      ...SCREENS_OPTION,
      criteria: { type: 'string' },
    });
    const site = await siteOf(values.site);
    const stations = await stationsOf(values.stations);
    const criteria = chosenCriteria(site, values.criteria);
    const screened = screener(site, values.screens, criteria.decides === 'levels' ? 'gross' : 'all');
    const out = new LineWriter(process.stdout);
    return readPaths(positionals, site, {
      stations,
      take: async (block) => {
        for (const profile of profilesOf(screened(block))) {
          await out.write(jetLine(profile, findingOf(profile, criteria, site)));
        }
        await out.flush();
      },
    });
  },
};

/**
 * The criteria asked for, else the site's.
 * @throws UsageError when there are none of that name
 */
export function chosenCriteria(site: Site, name: string | undefined): Criteria {
  if (name === undefined) return criteriaOf(site.criteria);
  if (typeof site.criteria !== 'string' && site.criteria.name === name) return criteriaOf(site.criteria);
  const known: readonly string[] = CRITERIA_NAMES;
  if (known.includes(name)) return criteriaOf(name);
  throw new UsageError(`There are no criteria named ${name}. Known: ${known.join(', ')}.`);
}

/** The jets of a profile, with the uncertainty that the site states for its station. */
export function findingOf(profile: Profile, criteria: Criteria, site: Site): JetFinding {
  const speedUncertainty = siteStation(site, profile.station.id)?.speedUncertainty ?? NaN;
  return findJets(profile, criteria, { speedUncertainty });
}

/** A finding as the contract of `jets` has it. */
export function jetLine(profile: Profile, finding: JetFinding): Record<string, unknown> {
  return {
    station: profile.station.id,
    time: isoTime(profile.timeMs),
    criteria: finding.criteria,
    status: finding.status,
    why: finding.why,
    jets: finding.jets.map((jet) => ({
      category: jet.category,
      nose_height_agl_m: toJsonNumber(jet.noseHeight, DECIMALS.height),
      nose_speed_mps: toJsonNumber(jet.noseSpeed, DECIMALS.speed),
      nose_direction_deg: toJsonNumber(jet.noseDirection, DECIMALS.direction),
      falloff_mps: toJsonNumber(jet.falloff, DECIMALS.speed),
      falloff_is_bound: jet.falloffIsBound,
      confidence: toJsonNumber(jet.confidence, 3),
    })),
  };
}
