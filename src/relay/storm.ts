// `storm`: parcels, shear, helicity and motion; a JSON line a profile.

import { toJsonNumber } from '../air/index.ts';
import { AirSources } from '../desk/index.ts';
import { profilesOf, type Profile } from '../profile/index.ts';
import { joinWindAndAir, stormOf, type Figure, type StormNumbers, type VectorFigure } from '../storm/index.ts';
import { readPaths } from './blocks.ts';
import { parseOptions, UsageError, type Command } from './command.ts';
import { chosenCriteria, findingOf } from './jets.ts';
import { DECIMALS, isoTime } from './json-edge.ts';
import { LineWriter } from './output.ts';
import { screener, SCREENS_HELP, SCREENS_OPTION } from './screening.ts';
import { SITE_OPTION, siteOf } from './site-option.ts';
import { STATIONS_HELP, STATIONS_OPTION, stationsOf } from './stations-option.ts';

export const command: Command = {
  help: `duskveer storm PATH... [--site FILE] [--motion U,V]

Reads profiles from files, from all files in folders, or from stdin (-), screens them and computes what storms would get.
Winds without temperature and humidity take those of the newest profile before them from a station within 150 km or named
in the site file. An aid to judgement: official warnings come from the national weather service.

Prints a JSON line a profile:
  station, time
  status, why          ok; partly, where data end below what a number needs, and why; not-assessable
  air_from, air_age_s  whose temperature and humidity were used, and how old they were
  parcels              start (surface-based, mixed-layer, most-unstable, jet-fed), start_pressure_pa, lcl_pressure_pa,
                       lfc_pressure_pa, el_pressure_pa, cape_j_per_kg, cin_j_per_kg
  shear_0_1km_mps, shear_0_3km_mps, shear_0_6km_mps
  srh_0_1km_m2_per_s2, srh_0_3km_m2_per_s2
                       storm-relative helicity for the mover that prevails: right in the north, left in the south
  motion               mean, right, left: east_mps, north_mps (Bunkers et al. 2000)
  clusters             cloud_layer, upwind, downwind: east_mps, north_mps (Corfidi 2003)

  --site FILE     stations, criteria of the jet
  --motion U,V    storm motion in m/s eastward and northward, for the helicity in place of the mover
${STATIONS_HELP}
${SCREENS_HELP}`,
  async run(args) {
    const { values, positionals } = parseOptions(args, {
      ...SITE_OPTION,
      ...STATIONS_OPTION,
      ...SCREENS_OPTION,
      motion: { type: 'string' },
    });
    const site = await siteOf(values.site);
    const stations = await stationsOf(values.stations);
    const screened = screener(site, values.screens);
    const motion = motionOption(values.motion);
    const criteria = chosenCriteria(site, undefined);
    const sources = new AirSources(site);
    const out = new LineWriter(process.stdout);
    return readPaths(positionals, site, {
      stations,
      survey: (block) => sources.gather(screened(block)),
      take: async (block) => {
        for (const profile of profilesOf(screened(block))) {
          const [jet] = findingOf(profile, criteria, site).jets;
          const { air, why } = joinWindAndAir(profile, sources.nearest(profile));
          const numbers = stormOf(profile, {
            ...(air === null ? { noAir: why } : { air }),
            ...(jet === undefined ? {} : { jet }),
            ...(motion === undefined ? {} : { motion }),
          });
          await out.write(stormLine(profile, numbers));
        }
        await out.flush();
      },
    });
  },
};

function motionOption(text: string | undefined): { u: number; v: number } | undefined {
  if (text === undefined) return undefined;
  const parts = text.split(',').map((part) => (part.trim() === '' ? NaN : Number(part)));
  const [u, v] = parts;
  if (parts.length !== 2 || !(Math.hypot(u!, v!) < 100)) {
    throw new UsageError(`--motion needs two numbers in m/s, eastward and northward, such as 12,5.5, not "${text}".`);
  }
  return { u: u!, v: v! };
}

/** The numbers of a profile as the contract of `storm` has them. */
export function stormLine(profile: Profile, numbers: StormNumbers): Record<string, unknown> {
  const { parcels, shear, helicity, motion, clusters } = numbers;
  const speed = ({ value }: Figure): number | null => toJsonNumber(value, DECIMALS.speed);
  const pressure = (value: number): number | null => toJsonNumber(value, DECIMALS.pressure);
  const energy = (value: number): number | null => toJsonNumber(value, DECIMALS.energy);
  const vector = ({ u, v }: VectorFigure): Record<string, number | null> => ({
    east_mps: toJsonNumber(u, DECIMALS.speed),
    north_mps: toJsonNumber(v, DECIMALS.speed),
  });
  return {
    station: profile.station.id,
    time: isoTime(profile.timeMs),
    status: numbers.status === 'assessed' ? 'ok' : numbers.status,
    why: numbers.why,
    air_from: numbers.airFrom.station,
    air_age_s: toJsonNumber(numbers.airFrom.ageS, 0),
    parcels: parcels.map((parcel) => ({
      start: parcel.name,
      start_pressure_pa: pressure(parcel.start?.pressure ?? NaN),
      lcl_pressure_pa: pressure(parcel.lclPressure),
      lfc_pressure_pa: pressure(parcel.lfcPressure),
      el_pressure_pa: pressure(parcel.elPressure),
      cape_j_per_kg: energy(parcel.cape),
      cin_j_per_kg: energy(parcel.cin),
    })),
    shear_0_1km_mps: speed(shear.to1km),
    shear_0_3km_mps: speed(shear.to3km),
    shear_0_6km_mps: speed(shear.to6km),
    srh_0_1km_m2_per_s2: energy(helicity.to1km.value),
    srh_0_3km_m2_per_s2: energy(helicity.to3km.value),
    motion: { mean: vector(motion.mean), right: vector(motion.right), left: vector(motion.left) },
    clusters: {
      cloud_layer: vector(clusters.cloudLayer),
      upwind: vector(clusters.upwind),
      downwind: vector(clusters.downwind),
    },
  };
}
