// `triangle`: how the wind through three or more stations spreads, turns and gathers moisture; a JSON line a time and layer.

import { distanceBetween, toJsonNumber } from '../air/index.ts';
import { AirSources } from '../desk/index.ts';
import { triangleThroughTime, type TriangleLayer, type TriangleTime } from '../moisture/index.ts';
import { profilesOf, type Profile } from '../profile/index.ts';
import { readPaths } from './blocks.ts';
import { EXIT, parseOptions, type Command } from './command.ts';
import { DECIMALS, isoTime } from './json-edge.ts';
import { LineWriter } from './output.ts';
import { screener, SCREENS_HELP, SCREENS_OPTION } from './screening.ts';
import { SITE_OPTION, siteOf } from './site-option.ts';
import { STATIONS_HELP, STATIONS_OPTION, stationsOf } from './stations-option.ts';

/** Instruments no further apart than this stand at one place, m. */
const SAME_PLACE = 2000;

export const command: Command = {
  help: `duskveer triangle PATH... [--site FILE]

Reads the profiles of three or more stations from files, from all files in folders, or from stdin (-), screens them and
fits a linear wind field through the stations (Bellamy 1949; least squares for more than three). All profiles are held at
once. The station with the fewest profiles sets the times; of each other one the nearest profile in time is taken. Where
several instruments stand at one place, the one with the most profiles gives the wind and all may give the humidity.

Prints a JSON line a time and layer: levels that the stations share where those are few, else layers of 250 m up to 3 km:
  time, stations           UTC; the stations that took part
  height_agl_m             the level, or the middle of the layer
  status, why              ok, or not-assessable with the reason
  area_km2                 within the outermost stations
  divergence_per_s, vorticity_per_s
  moisture_flux_divergence_per_s
                           of q V with q in kg/kg; negative where moisture gathers; null where a humidity is missing

  --site FILE    positions of stations
${STATIONS_HELP}
${SCREENS_HELP}`,
  async run(args) {
    const { values, positionals } = parseOptions(args, { ...SITE_OPTION, ...STATIONS_OPTION, ...SCREENS_OPTION });
    const site = await siteOf(values.site);
    const listed = await stationsOf(values.stations);
    const screened = screener(site, values.screens);
    const stations = new Map<string, Profile[]>();
    const sources = new AirSources(site);
    const code = await readPaths(positionals, site, {
      stations: listed,
      take: (block) => {
        const checked = screened(block);
        sources.gather(checked);
        for (const profile of profilesOf(checked)) {
          const known = stations.get(profile.station.id);
          if (known === undefined) stations.set(profile.station.id, [profile]);
          else known.push(profile);
        }
        return Promise.resolve();
      },
    });
    const all = [...stations.values()];
    for (const profiles of all) profiles.sort((a, b) => a.timeMs - b.timeMs);
    const series = onePerPlace(all);
    if (series.length < 3) {
      const names = series.map(([profile]) => profile!.station.id).join(', ');
      process.stderr.write(`Three places are needed; here are ${series.length}${names === '' ? '' : ` (${names})`}.\n`);
      return code === EXIT.well ? EXIT.someUnread : code;
    }
    const out = new LineWriter(process.stdout);
    for (const time of triangleThroughTime(series, { humidityFor: (profile) => sources.for(profile) })) {
      for (const layer of time.layers) await out.write(layerLine(time, layer));
    }
    await out.flush();
    return code;
  },
};

/** Of the stations at one place the one with the most profiles; those without a position only where the others are too few. */
function onePerPlace(stations: readonly (readonly Profile[])[]): (readonly Profile[])[] {
  const places: (readonly Profile[])[] = [];
  for (const profiles of [...stations].sort((a, b) => b.length - a.length)) {
    const here = profiles[0]!.station;
    if (!places.some(([other]) => distanceBetween(other!.station, here) <= SAME_PLACE)) places.push(profiles);
  }
  const placed = places.filter(([profile]) => Number.isFinite(profile!.station.latitude + profile!.station.longitude));
  const taken = placed.length >= 3 ? placed : places;
  return taken.sort((a, b) => (a[0]!.station.id < b[0]!.station.id ? -1 : 1));
}

/** A layer as the contract of `triangle` has it. */
function layerLine(time: TriangleTime, { heightAgl, field }: TriangleLayer): Record<string, unknown> {
  return {
    time: isoTime(time.timeMs),
    stations: time.stations,
    height_agl_m: heightAgl,
    status: field.status,
    why: field.why,
    area_km2: toJsonNumber(field.area / 1e6, DECIMALS.area),
    divergence_per_s: significant(field.divergence),
    vorticity_per_s: significant(field.vorticity),
    moisture_flux_divergence_per_s: significant(field.moistureFluxDivergence),
  };
}

/** Divergences are of the order of 1e-5: digits count from the first, not from the point. */
function significant(value: number): number | null {
  return Number.isFinite(value) ? Number(value.toPrecision(5)) : null;
}
