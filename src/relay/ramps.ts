// `ramps`: when the output of a farm changed fast, by how much and why; a JSON line a ramp.

import { nightOf, toJsonNumber } from '../air/index.ts';
import { siteDiscWind, USUAL_RAMPS } from '../desk/index.ts';
import { trackJets, type JetFinding } from '../jet/index.ts';
import type { Profile } from '../profile/index.ts';
import {
  causesOfRamp,
  findRamps,
  rampInWords,
  ratedPower,
  typeOutput,
  type DiscWind,
  type Ramp,
  type RampCause,
} from '../rotor/index.ts';
import type { Site, TurbineType } from '../site/index.ts';
import { parseOptions, UsageError, type Command } from './command.ts';
import { chosenCriteria, findingOf } from './jets.ts';
import { DECIMALS, isoTime } from './json-edge.ts';
import { LineWriter } from './output.ts';
import { readPlaces, tellJoin } from './place-series.ts';
import { screener, SCREENS_HELP, SCREENS_OPTION } from './screening.ts';
import { SITE_OPTION, siteOf } from './site-option.ts';
import { STATIONS_HELP, STATIONS_OPTION, stationsOf } from './stations-option.ts';

export const command: Command = {
  help: `duskveer ramps PATH... --site FILE

Reads profiles from files, from all files in folders, or from stdin (-), screens them, reckons what the site's turbines would
yield by their rotor-equivalent wind, and finds fast changes. All profiles are held until all are read; instruments at one
place are joined as \`rotor\` joins them.

Prints a JSON line a ramp:
  station, turbine         whose wind; the turbine type, all of its machines together
  definition               the site file's definition that it meets; without any there, ${USUAL_RAMPS[0]!.name} of capacity
  start, end               UTC
  change_kw, change_share  from start to end, negative when output fell; share of the type's capacity
  cause                    shutdown, restart, jet-onset, nose-descends, nose-rises, jet-decay, wind-shift, wind-rises, wind-falls
                           or unknown: the firmest by the evidence
  words                    the same in a sentence

  --site FILE    turbines with power curves, definitions of ramps
${STATIONS_HELP}
${SCREENS_HELP}`,
  async run(args) {
    const { values, positionals } = parseOptions(args, { ...SITE_OPTION, ...STATIONS_OPTION, ...SCREENS_OPTION });
    if (values.site === undefined) throw new UsageError('It needs --site with a file that lists turbines.');
    const site = await siteOf(values.site);
    const listed = await stationsOf(values.stations);
    const screened = screener(site, values.screens);
    const turbines = site.turbines.filter((turbine) => turbine.powerCurve !== null && turbine.count > 0);
    if (turbines.length === 0) throw new UsageError(`${values.site} lists no turbine with a power curve.`);
    const criteria = chosenCriteria(site, undefined);
    const { code, places } = await readPlaces(positionals, site, screened, listed);
    const out = new LineWriter(process.stdout);
    for (const place of places) {
      tellJoin(place);
      const facts = place.profiles.map(({ wind, own }) =>
        factsOf(wind, own === null ? null : findingOf(own, criteria, site), turbines, site),
      );
      for (const line of rampLines(place.feed.station.id, facts, turbines, site)) await out.write(line);
    }
    await out.flush();
    return code;
  },
};

/** All that ramps need of a profile. */
interface ProfileFacts {
  readonly timeMs: number;
  /** null where the instrument that tells of jets did not measure. */
  readonly finding: JetFinding | null;
  /** One for each turbine type. */
  readonly winds: readonly DiscWind[];
  /** UTC, ms; NaN where the sun does not rise or the place is not known. */
  readonly sunriseMs: number;
}

function factsOf(
  profile: Profile,
  finding: JetFinding | null,
  turbines: readonly TurbineType[],
  site: Site,
): ProfileFacts {
  const { timeMs, station } = profile;
  const nose = finding?.jets[0]?.noseHeight ?? NaN;
  return {
    timeMs,
    finding,
    winds: turbines.map((turbine) => siteDiscWind(profile, turbine, nose, site)),
    sunriseMs: nightOf(timeMs, station.latitude, station.longitude).sunriseMs,
  };
}

function* rampLines(
  station: string,
  facts: readonly ProfileFacts[],
  turbines: readonly TurbineType[],
  site: Site,
): Generator<Record<string, unknown>> {
  const timeMs = facts.map((fact) => fact.timeMs);
  const tracks = trackJets(
    facts.flatMap(({ timeMs: at, finding }) => (finding === null ? [] : [{ stationId: station, timeMs: at, finding }])),
  );
  const sunrisesMs = [...new Set(facts.map((fact) => fact.sunriseMs))].filter((ms) => !Number.isNaN(ms));
  const definitions = site.ramps.length > 0 ? site.ramps : USUAL_RAMPS;
  for (const [index, turbine] of turbines.entries()) {
    const winds = facts.map((fact) => fact.winds[index]!);
    const output = typeOutput(turbine, winds);
    const powerKw = output.equivalentKw.map((power) => power * turbine.count * site.farmFactor);
    const capacityKw = ratedPower(turbine) * turbine.count * site.farmFactor;
    const evidence = {
      disc: turbine,
      timeMs,
      hubSpeed: winds.map((wind) => wind.hubSpeed),
      hubDirection: winds.map((wind) => wind.hubDirection),
      state: output.state,
      tracks,
      sunrisesMs,
    };
    for (const ramp of findRamps({ timeMs, powerKw }, capacityKw, definitions)) {
      yield rampLine(station, turbine, ramp, causesOfRamp(ramp, evidence));
    }
  }
}

/** A ramp as the contract of `ramps` has it. */
function rampLine(
  station: string,
  turbine: TurbineType,
  ramp: Ramp,
  causes: readonly RampCause[],
): Record<string, unknown> {
  return {
    station,
    turbine: turbine.name,
    definition: ramp.definition,
    start: isoTime(ramp.startMs),
    end: isoTime(ramp.endMs),
    change_kw: toJsonNumber(ramp.changeKw, DECIMALS.power),
    change_share: toJsonNumber(ramp.changeShare, DECIMALS.share),
    cause: causes[0]!.cause,
    words: rampInWords(ramp, causes),
  };
}
