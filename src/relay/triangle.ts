// `triangle`: how the wind through three or more stations spreads, turns and gathers moisture; a JSON line a time and layer.

import { toJsonNumber } from '../air/index.ts';
import { windField, type WindField } from '../moisture/index.ts';
import { profilesOf, type Profile } from '../profile/index.ts';
import { screen } from '../quality/index.ts';
import { PLAIN_SITE } from '../site/index.ts';
import { forEachBlock } from './blocks.ts';
import { EXIT, parseOptions, type Command } from './command.ts';
import { DECIMALS, isoTime } from './json-edge.ts';
import { levelsOf, pointAt, type StationLevels } from './layer-point.ts';
import { LineWriter } from './output.ts';

/** Layers where the stations' levels differ, m above ground: every so many up to the top. */
const LAYER_STEP = 100;
const HIGHEST_LAYER = 3000;
/** Profiles of the stations no further apart than this belong to one time, ms. */
const TOGETHER_MS = 30 * 60_000;

export const command: Command = {
  help: `duskveer triangle PATH...

Reads the profiles of three or more stations from files, from all files in folders, or from stdin (-), screens them and
fits a linear wind field through the stations (Bellamy 1949; least squares for more than three). All profiles are held at
once. The station with the fewest profiles sets the times; of each other one the nearest profile within ${TOGETHER_MS / 60_000} minutes is taken.

Prints a JSON line a time and layer, at the levels that the stations share, else every ${LAYER_STEP} m, up to ${HIGHEST_LAYER} m:
  time, stations           UTC; the stations that had wind there
  height_agl_m
  status, why              ok, or not-assessable with the reason
  area_km2                 within the outermost stations
  divergence_per_s, vorticity_per_s
  moisture_flux_divergence_per_s
                           of q V with q in kg/kg; negative where moisture gathers; null where a humidity is missing`,
  async run(args) {
    const { positionals } = parseOptions(args, {});
    const stations = new Map<string, Profile[]>();
    const code = await forEachBlock(positionals, PLAIN_SITE, (block) => {
      for (const profile of profilesOf(screen(block, { site: PLAIN_SITE }).block)) {
        const known = stations.get(profile.station.id);
        if (known === undefined) stations.set(profile.station.id, [profile]);
        else known.push(profile);
      }
      return Promise.resolve();
    });
    if (stations.size < 3) {
      const names = [...stations.keys()].join(', ');
      process.stderr.write(
        `Three stations are needed; here are ${stations.size}${names === '' ? '' : ` (${names})`}.\n`,
      );
      return code === EXIT.well ? EXIT.someUnread : code;
    }
    const out = new LineWriter(process.stdout);
    for (const moment of momentsOf([...stations.values()])) {
      for (const height of layerHeights(moment.levels)) {
        await out.write(layerLine(moment.timeMs, moment.levels, height));
      }
    }
    await out.flush();
    return code;
  },
};

interface TriangleMoment {
  readonly timeMs: number;
  readonly levels: readonly StationLevels[];
}

/** The times of the station with the fewest profiles, with the nearest profile of each other one. */
function* momentsOf(stations: readonly (readonly Profile[])[]): Generator<TriangleMoment> {
  const byCount = [...stations].sort((a, b) => a.length - b.length || (a[0]!.station.id < b[0]!.station.id ? -1 : 1));
  const [fewest, ...others] = byCount;
  for (const profile of [...fewest!].sort((a, b) => a.timeMs - b.timeMs)) {
    const near = others.map((profiles) => nearest(profiles, profile.timeMs)).filter((found) => found !== null);
    yield { timeMs: profile.timeMs, levels: [profile, ...near].map(levelsOf) };
  }
}

function nearest(profiles: readonly Profile[], timeMs: number): Profile | null {
  const away = (profile: Profile): number => Math.abs(profile.timeMs - timeMs);
  const best = profiles.reduce((a, b) => (away(b) < away(a) ? b : a));
  return away(best) <= TOGETHER_MS ? best : null;
}

/** The levels that all stations have, where those are most of them; else even steps within the data of three stations. */
function layerHeights(levels: readonly StationLevels[]): number[] {
  const [first, ...others] = levels.map(({ wind }) => wind.heightAgl.filter((height) => height <= HIGHEST_LAYER));
  const shared = first!.filter((height) => others.every((heights) => heights.includes(height)));
  const fewest = Math.min(first!.length, ...others.map((heights) => heights.length));
  if (shared.length > 0 && 2 * shared.length >= fewest) return shared;
  const steps = Array.from({ length: HIGHEST_LAYER / LAYER_STEP }, (_, k) => LAYER_STEP * (k + 1));
  const within = (height: number): number =>
    levels.filter(({ wind }) => wind.heightAgl[0]! <= height && wind.heightAgl.at(-1)! >= height).length;
  const reached = steps.filter((height) => within(height) >= 3);
  // Where nothing is reached one line says why.
  return reached.length > 0 ? reached : [LAYER_STEP];
}

function layerLine(timeMs: number, levels: readonly StationLevels[], heightAgl: number): Record<string, unknown> {
  const points = levels.map((station) => ({ id: station.id, ...pointAt(station, heightAgl) }));
  const field: WindField = windField(points);
  return {
    time: isoTime(timeMs),
    stations: points.filter(({ u }) => !Number.isNaN(u)).map(({ id }) => id),
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
