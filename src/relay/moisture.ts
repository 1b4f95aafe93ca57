// `moisture`: what vapour each profile carries; a JSON line a profile.

import { toJsonNumber, toJsonNumbers } from '../air/index.ts';
import { AirSources } from '../desk/index.ts';
import { moistureOf, type MoistureNumbers } from '../moisture/index.ts';
import { profilesOf, type Profile } from '../profile/index.ts';
import { readPaths } from './blocks.ts';
import { numberOption, parseOptions, UsageError, type Command } from './command.ts';
import { chosenCriteria, findingOf } from './jets.ts';
import { DECIMALS, isoTime } from './json-edge.ts';
import { LineWriter } from './output.ts';
import { screener, SCREENS_HELP, SCREENS_OPTION } from './screening.ts';
import { SITE_OPTION, siteOf } from './site-option.ts';
import { STATIONS_HELP, STATIONS_OPTION, stationsOf } from './stations-option.ts';

export const command: Command = {
  help: `duskveer moisture PATH... [--site FILE] [--bottom-pa P] [--top-pa P]

Reads profiles from files, from all files in folders, or from stdin (-), screens them and computes what vapour they carry.
Winds without humidity take that of the newest profile before them from a station within 150 km or named in the site file.

Prints a JSON line a profile:
  station, time
  status, why                                 ok, or not-assessable with the reason
  humidity_from, humidity_age_s               whose humidity was used, and how old it was
  precipitable_water_kg_per_m2                of the layer
  transport_kg_per_m_s                        of the layer: (1/g) integral of q V dp, its size
  transport_east_kg_per_m_s, transport_north_kg_per_m_s
  below_3km_kg_per_m_s                        integral of rho q V dz up to 3 km above ground or the top of data, its size
  in_jet_kg_per_m_s                           the same within the jet's layer; null without a jet
  flux                                        rho q V at each level: height_agl_m, east_kg_per_m2_s, north_kg_per_m2_s

  --site FILE      stations, criteria of the jet
  --bottom-pa P    limits of the layer, Pa; without them all that was measured
  --top-pa P
${STATIONS_HELP}
${SCREENS_HELP}`,
  async run(args) {
    const { values, positionals } = parseOptions(args, {
      ...SITE_OPTION,
      ...STATIONS_OPTION,
      ...SCREENS_OPTION,
      'bottom-pa': { type: 'string' },
      'top-pa': { type: 'string' },
    });
    const site = await siteOf(values.site);
    const stations = await stationsOf(values.stations);
    const screened = screener(site, values.screens);
    const bottomPressure = pressureOption('bottom-pa', values['bottom-pa']);
    const topPressure = pressureOption('top-pa', values['top-pa']);
    if (topPressure !== undefined && bottomPressure !== undefined && !(topPressure < bottomPressure)) {
      throw new UsageError('--top-pa must be less than --bottom-pa: pressure falls with height.');
    }
    const criteria = chosenCriteria(site, undefined);
    const sources = new AirSources(site);
    const out = new LineWriter(process.stdout);
    return readPaths(positionals, site, {
      stations,
      survey: (block) => sources.gather(screened(block)),
      take: async (block) => {
        for (const profile of profilesOf(screened(block))) {
          const jetLayer = findingOf(profile, criteria, site).jets[0]?.core;
          const options = { bottomPressure, topPressure, jetLayer, humidity: sources.for(profile) };
          await out.write(moistureLine(profile, moistureOf(profile, options)));
        }
        await out.flush();
      },
    });
  },
};

function pressureOption(name: string, text: string | undefined): number | undefined {
  return text === undefined ? undefined : numberOption(name, text, 1, 110_000);
}

/** The numbers of a profile as the contract of `moisture` has them. */
export function moistureLine(profile: Profile, numbers: MoistureNumbers): Record<string, unknown> {
  const { transport, flux } = numbers;
  return {
    station: profile.station.id,
    time: isoTime(profile.timeMs),
    status: numbers.status,
    why: numbers.why,
    humidity_from: numbers.humidityFrom === '' ? null : numbers.humidityFrom,
    humidity_age_s: toJsonNumber(numbers.humidityAgeS, 0),
    precipitable_water_kg_per_m2: toJsonNumber(numbers.precipitableWater, DECIMALS.water),
    transport_kg_per_m_s: toJsonNumber(transport.size, DECIMALS.transport),
    transport_east_kg_per_m_s: toJsonNumber(transport.east, DECIMALS.transport),
    transport_north_kg_per_m_s: toJsonNumber(transport.north, DECIMALS.transport),
    below_3km_kg_per_m_s: toJsonNumber(numbers.below3Km.size, DECIMALS.transport),
    in_jet_kg_per_m_s: toJsonNumber(numbers.inJet.size, DECIMALS.transport),
    flux: {
      height_agl_m: toJsonNumbers(flux.heightAgl, DECIMALS.height),
      east_kg_per_m2_s: toJsonNumbers(flux.east, DECIMALS.flux),
      north_kg_per_m2_s: toJsonNumbers(flux.north, DECIMALS.flux),
    },
  };
}
