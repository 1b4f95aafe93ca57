// `rotor`: what the wind of each profile does on a turbine's disc; a JSON line a profile and turbine type.

import { toJsonNumber } from '../air/index.ts';
import { siteDiscWind } from '../desk/index.ts';
import type { Profile } from '../profile/index.ts';
import { keepsTurning, typeOutput, type DiscWind } from '../rotor/index.ts';
import type { Site, TurbineType } from '../site/index.ts';
import { numberOption, parseOptions, UsageError, type Command } from './command.ts';
import { chosenCriteria, findingOf } from './jets.ts';
import { DECIMALS, isoTime } from './json-edge.ts';
import { LineWriter } from './output.ts';
import { readPlaces, tellJoin } from './place-series.ts';
import { screener, SCREENS_HELP, SCREENS_OPTION } from './screening.ts';
import { SITE_OPTION, siteOf } from './site-option.ts';
import { STATIONS_HELP, STATIONS_OPTION, stationsOf } from './stations-option.ts';

export const command: Command = {
  help: `duskveer rotor PATH... (--hub M --diameter M | --site FILE)

Reads profiles from files, from all files in folders, or from stdin (-), screens them and computes what their wind does on a
rotor disc. Nothing is extrapolated unless the site file asks for it: a disc that the levels do not cover is not assessable.
All profiles are held until all are read. Instruments at one place (of one station, or of stations within a kilometre) are
joined by height, the better one winning; what they steadily differ by in direction is turned back and said on stderr.

Prints a JSON line a profile and turbine type, place by place in order of time:
  station, time, turbine           of joined instruments the station of the one that reaches highest; where only another
                                   measured, its own
  status, why                      ok, or not-assessable with the reason
  coverage                         part of the disc between lowest and highest level, 0 to 1
  hub_speed_mps, hub_direction_deg
  rews_mps, rews_veer_mps          rotor-equivalent speed (IEC 61400-12-1, slices), without and with veer
  shear_exponent                   power law, least squares over the levels from tip to tip
  veer_deg                         turn from the lower to the upper tip, clockwise positive
  nose_in_rotor                    whether the jet's nose lies between the tips; null without a jet
  air_density_kg_per_m3            at the hub, where temperature is known
  power_kw, power_equivalent_kw    of one machine, from the site's curve, by hub speed and by rotor-equivalent speed (with veer
                                   where directions are known), brought to the curve's density where density is known;
                                   once stopped in high wind it stays so until the wind falls below the restart speed

  --hub M         hub height above ground
  --diameter M    rotor diameter
  --site FILE     takes the turbine types of a site instead
${STATIONS_HELP}
${SCREENS_HELP}`,
  async run(args) {
    const { values, positionals } = parseOptions(args, {
      ...SITE_OPTION,
      ...STATIONS_OPTION,
      ...SCREENS_OPTION,
      hub: { type: 'string' },
      diameter: { type: 'string' },
    });
    const site = await siteOf(values.site);
    const stations = await stationsOf(values.stations);
    const screened = screener(site, values.screens);
    const turbines = chosenTurbines(site, values.hub, values.diameter);
    const criteria = chosenCriteria(site, undefined);
    const { code, places } = await readPlaces(positionals, site, screened, stations);
    const out = new LineWriter(process.stdout);
    for (const place of places) {
      tellJoin(place);
      const turning = turbines.map(() => true);
      for (const { wind, own } of place.profiles) {
        const nose = own === null ? NaN : (findingOf(own, criteria, site).jets[0]?.noseHeight ?? NaN);
        for (const [index, turbine] of turbines.entries()) {
          const disc = siteDiscWind(wind, turbine, nose, site);
          await out.write(rotorLine(wind, turbine, disc, turning[index]!));
          turning[index] = keepsTurning(turbine, turning[index]!, disc.hubSpeed);
        }
      }
    }
    await out.flush();
    return code;
  },
};

function chosenTurbines(site: Site, hub: string | undefined, diameter: string | undefined): readonly TurbineType[] {
  const turbines = turbinesOf(site, hub, diameter);
  if (turbines.length > 0) return turbines;
  throw new UsageError('It needs a disc: --hub and --diameter in metres, or --site with a file that lists turbines.');
}

/**
 * The disc of these numbers, or the site's turbine types where they are not given.
 * @throws UsageError when the numbers make no disc
 */
export function turbinesOf(site: Site, hub: string | undefined, diameter: string | undefined): readonly TurbineType[] {
  if (hub === undefined && diameter === undefined) return site.turbines;
  if (hub === undefined || diameter === undefined) throw new UsageError('--hub and --diameter go together.');
  const hubHeight = numberOption('hub', hub, 1, 500);
  const rotorDiameter = numberOption('diameter', diameter, 1, 500);
  if (rotorDiameter / 2 > hubHeight) throw new UsageError('Half the diameter is more than the hub height.');
  const notStated = { cutIn: NaN, rated: NaN, cutOut: NaN, restart: NaN, groundElevation: NaN };
  const name = `hub ${hubHeight} m, diameter ${rotorDiameter} m`;
  return [{ name, count: 1, hubHeight, rotorDiameter, powerCurve: null, ...notStated }];
}

/** The numbers of a disc as the contract of `rotor` has them. */
function rotorLine(
  profile: Profile,
  turbine: TurbineType,
  wind: DiscWind,
  turnedBefore: boolean,
): Record<string, unknown> {
  const output = typeOutput(turbine, [wind], turnedBefore);
  return {
    station: profile.station.id,
    time: isoTime(profile.timeMs),
    turbine: turbine.name,
    status: wind.status,
    why: wind.why,
    coverage: toJsonNumber(wind.coverage, DECIMALS.share),
    hub_speed_mps: toJsonNumber(wind.hubSpeed, DECIMALS.speed),
    hub_direction_deg: toJsonNumber(wind.hubDirection, DECIMALS.direction),
    rews_mps: toJsonNumber(wind.equivalentSpeed, DECIMALS.speed),
    rews_veer_mps: toJsonNumber(wind.equivalentSpeedVeer, DECIMALS.speed),
    shear_exponent: toJsonNumber(wind.shearExponent, DECIMALS.exponent),
    veer_deg: toJsonNumber(wind.veer, DECIMALS.direction),
    nose_in_rotor: wind.noseInRotor,
    air_density_kg_per_m3: toJsonNumber(wind.airDensity, DECIMALS.density),
    power_kw: toJsonNumber(output.hubKw[0]!, DECIMALS.power),
    power_equivalent_kw: toJsonNumber(output.equivalentKw[0]!, DECIMALS.power),
  };
}
