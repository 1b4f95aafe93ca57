// `read`: what is in the files, a JSON line a profile.

import { dewPointOf, toJsonNumber, toJsonNumbers } from '../air/index.ts';
import type { StationList } from '../ingest/index.ts';
import { markNames, profilesOf, type Profile } from '../profile/index.ts';
import type { Site } from '../site/index.ts';
import { readPaths } from './blocks.ts';
import { parseOptions, UsageError, type Command } from './command.ts';
import { DECIMALS, isoTime } from './json-edge.ts';
import { LineWriter } from './output.ts';
import { SITE_OPTION, siteOf } from './site-option.ts';
import { STATIONS_HELP, STATIONS_OPTION, stationsOf } from './stations-option.ts';
import { formatWriter, type FormatWriter } from './write-as.ts';

export const command: Command = {
  help: `duskveer read PATH... [--site FILE] [--to FORMAT [--out FILE]]

Reads profiles from files, from all files in folders, or from stdin (-), recognising each format by its content, plain or
in gzip or zip. Values are as the source gives them, turned into SI units; nothing is screened or left out.

Prints a JSON line a profile, unless --to asks for another form:
  station, name, lat, lon, elevation_m    where; null what is not known
  time, period_s                          UTC; end of the averaging period, or launch, and the period
  instrument, source                      kind of instrument; the file
  levels                                  lists of equal length, by height, null for missing: height_agl_m, height_amsl_m,
                                          pressure_pa, speed_mps, direction_deg (from), vertical_speed_mps, temperature_k,
                                          dewpoint_k, mark (names of quality marks, separated by blanks, "" for none)
  notes                                   what the reader has to say

  --site FILE    positions of stations, headings of your own tables, time zone of files without one
${STATIONS_HELP}
  --to FORMAT    writes the profiles for other software: csv (a line a level), netcdf (CF, classic format) or
                 coveragejson (OGC CoverageJSON); all but csv hold every profile until the last is read
  --out FILE     where to; without it to stdout`,
  async run(args) {
    const { values, positionals } = parseOptions(args, {
      ...SITE_OPTION,
      ...STATIONS_OPTION,
      to: { type: 'string' },
      out: { type: 'string' },
    });
    if (values.out !== undefined && values.to === undefined) throw new UsageError('--out goes with --to.');
    const site = await siteOf(values.site);
    const stations = await stationsOf(values.stations);
    if (values.to !== undefined) return convert(positionals, site, stations, formatWriter(values.to, values.out));
    const out = new LineWriter(process.stdout);
    return readPaths(positionals, site, {
      stations,
      take: async (block) => {
        for (const profile of profilesOf(block)) await out.write(profileLine(profile));
        await out.flush();
      },
    });
  },
};

async function convert(
  paths: readonly string[],
  site: Site,
  stations: StationList,
  writer: FormatWriter,
): Promise<number> {
  try {
    const code = await readPaths(paths, site, { take: writer.take, stations });
    await writer.finish();
    return code;
  } catch (error) {
    await writer.giveUp();
    throw error;
  }
}

/** A profile as the contract of `read` has it. */
export function profileLine(profile: Profile): Record<string, unknown> {
  const { station, levelCount, pressure, specificHumidity } = profile;
  const column = (values: Float32Array | null, decimals: number): (number | null)[] =>
    values === null ? new Array<null>(levelCount).fill(null) : toJsonNumbers(values, decimals);
  const computed = (value: (k: number) => number, decimals: number): (number | null)[] =>
    Array.from({ length: levelCount }, (_, k) => toJsonNumber(value(k), decimals));
  return {
    station: station.id,
    name: station.name,
    lat: toJsonNumber(station.latitude, DECIMALS.degrees),
    lon: toJsonNumber(station.longitude, DECIMALS.degrees),
    elevation_m: toJsonNumber(station.elevation, DECIMALS.height),
    time: isoTime(profile.timeMs),
    period_s: toJsonNumber(profile.periodS, 3),
    instrument: profile.instrument,
    source: profile.source,
    levels: {
      height_agl_m: column(profile.heightAgl, DECIMALS.height),
      height_amsl_m: computed((k) => profile.heightAgl[k]! + station.elevation, DECIMALS.height),
      pressure_pa: column(pressure, DECIMALS.pressure),
      speed_mps: column(profile.speed, DECIMALS.speed),
      direction_deg: column(profile.direction, DECIMALS.direction),
      vertical_speed_mps: column(profile.verticalSpeed, DECIMALS.speed),
      temperature_k: column(profile.temperature, DECIMALS.temperature),
      dewpoint_k: computed((k) => dewPointOf(specificHumidity?.[k] ?? NaN, pressure?.[k] ?? NaN), DECIMALS.temperature),
      mark: Array.from(profile.mark, (bits) => markNames(bits).join(' ')),
    },
    notes: profile.notes,
  };
}
