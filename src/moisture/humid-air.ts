// Wind without humidity: whose humidity to use, how old and how far it is, and how unsure that makes it.

import { distanceBetween, eastward, northward } from '../air/index.ts';
import { gatherWind, profileAt, windColumn, type Profile, type ProfileBlock } from '../profile/index.ts';
import { airColumn, completeAir, linearHeld, type AirColumn } from './air-column.ts';

/** Humidity that serves a wind profile. */
export interface HumidityUse {
  /** Identifier of the station it comes from; empty where there is none. */
  readonly id: string;
  /** s between its valid time and the wind's; 0 for the profile's own. */
  readonly ageS: number;
  /** m to its station; 0 for the profile's own, NaN when a position is not known. */
  readonly distance: number;
  /** Standard uncertainty of the humidity as a share of it. */
  readonly uncertainty: number;
}

/** Relative uncertainty of specific humidity that was just measured in place (common practice, without source). */
const MEASURED = 0.05;
/**
 * Added as the root of the hours since and of the distance, as for a value that wanders. Our own choice: in the outside
 * data's tropical soundings 12 h apart levels below 3 km change by a tenth, plains with moisture on the move change more.
 */
const PER_ROOT_HOUR = 0.05;
const PER_ROOT_50_KM = 0.05;
/** Distance taken where a position is not known, m. */
const UNKNOWN_DISTANCE = 100_000;
/** Levels that make a humidity profile. */
const LEAST_LEVELS = 2;
/** Below its lowest level borrowed humidity is held for so many metres; above its top it ends. */
const HELD_BELOW = 100;

/** Relative uncertainty of humidity so old and so far away; both 0 give that of a measurement in place. */
export function humidityUncertainty(ageS: number, distance: number): number {
  const far = Number.isNaN(distance) ? UNKNOWN_DISTANCE : distance;
  return Math.sqrt(MEASURED ** 2 + (PER_ROOT_HOUR ** 2 * ageS) / 3600 + (PER_ROOT_50_KM ** 2 * far) / 50_000);
}

/** What may serve where a wind profile has no humidity of its own. */
export interface HumidityOptions {
  /** Soundings, radiometer or mast profiles of named stations. */
  readonly humidity?: readonly Profile[] | undefined;
  /** s; older humidity is not used. */
  readonly oldestHumidityS?: number | undefined;
  /** Pa at the ground, for profiles without pressure of their own. */
  readonly surfacePressure?: number | undefined;
}

/** Soundings are twelve hours apart: an hour more and the next one is overdue. */
export const OLDEST_HUMIDITY_S = 13 * 3600;
const NO_HUMIDITY: HumidityUse = { id: '', ageS: NaN, distance: NaN, uncertainty: NaN };

/** A profile's air with the humidity that serves it. */
export interface HumidAir {
  readonly air: AirColumn;
  readonly use: HumidityUse;
  /** Why there is no humidity, empty otherwise: `no humidity since 2031-07-14 23:10 UTC (Larkfield)`. */
  readonly why: string;
}

/**
 * A profile's air: with its own humidity where it has some at two levels or more, else with the least uncertain of the
 * candidates that were valid at or before the wind's time and are no older than allowed, laid on the wind's levels by height
 * above sea level (above ground where an elevation is not known).
 */
export function humidAir(profile: Profile, options: HumidityOptions = {}): HumidAir {
  const own = airColumn(profile, options.surfacePressure);
  const levels = humidLevels(own);
  if (levels >= LEAST_LEVELS) {
    return {
      air: own,
      use: { id: profile.station.id, ageS: 0, distance: 0, uncertainty: humidityUncertainty(0, 0) },
      why: '',
    };
  }
  let best: { source: Profile; air: AirColumn; use: HumidityUse } | undefined;
  let tooOld: Profile | undefined;
  for (const source of options.humidity ?? []) {
    const ageS = (profile.timeMs - source.timeMs) / 1000;
    if (!(ageS >= 0)) continue;
    const air = airOfSource(source);
    if (humidLevels(air) < LEAST_LEVELS) continue;
    if (ageS > (options.oldestHumidityS ?? OLDEST_HUMIDITY_S)) {
      if (tooOld === undefined || source.timeMs > tooOld.timeMs) tooOld = source;
      continue;
    }
    const distance = distanceBetween(profile.station, source.station);
    const use = { id: source.station.id, ageS, distance, uncertainty: humidityUncertainty(ageS, distance) };
    if (best === undefined || use.uncertainty < best.use.uncertainty) best = { source, air, use };
  }
  if (best !== undefined) {
    return { air: layOn(profile, best.source, best.air, options.surfacePressure ?? NaN), use: best.use, why: '' };
  }
  if (tooOld !== undefined) return { air: own, use: NO_HUMIDITY, why: sinceWords(tooOld) };
  return { air: own, use: NO_HUMIDITY, why: levels > 0 ? 'humidity at a single level only' : 'no humidity' };
}

/** Columns of sources, which serve one wind after another. */
const airOfSources = new WeakMap<Profile, AirColumn>();

function airOfSource(source: Profile): AirColumn {
  let air = airOfSources.get(source);
  if (air === undefined) {
    air = airColumn(source);
    airOfSources.set(source, air);
  }
  return air;
}

function humidLevels(air: AirColumn): number {
  let known = 0;
  for (const value of air.specificHumidity) if (value >= 0) known++;
  return known;
}

function sinceWords(source: Profile): string {
  const at = new Date(source.timeMs).toISOString();
  return `no humidity since ${at.slice(0, 10)} ${at.slice(11, 16)} UTC (${source.station.name})`;
}

function layOn(profile: Profile, source: Profile, air: AirColumn, surfacePressure: number): AirColumn {
  const wind = gatherWind(profile, windColumn(profile.levelCount));
  const heightAgl = wind.heightAgl.slice(0, wind.count);
  const lift = profile.station.elevation - source.station.elevation;
  const raise = Number.isNaN(lift) ? 0 : lift;
  const lay = (values: Float64Array): Float64Array => {
    const known = [...values.keys()].filter((k) => Number.isFinite(values[k]!));
    const heights = known.map((k) => air.heightAgl[k]!);
    const kept = known.map((k) => values[k]!);
    return heightAgl.map((height) => {
      const at = height + raise;
      if (heights.length < LEAST_LEVELS || at < heights[0]! - HELD_BELOW || at > heights.at(-1)!) return NaN;
      return linearHeld(heights, kept, at);
    });
  };
  const logPressure = lay(air.pressure.map(Math.log));
  return completeAir(
    {
      heightAgl,
      pressure: logPressure.map(Math.exp),
      temperature: lay(air.temperature),
      specificHumidity: lay(air.specificHumidity),
      u: heightAgl.map((_, k) => eastward(wind.speed[k]!, wind.direction[k]!)),
      v: heightAgl.map((_, k) => northward(wind.speed[k]!, wind.direction[k]!)),
    },
    { surfacePressure, elevation: profile.station.elevation },
  );
}

/**
 * A block with pressure, temperature and humidity laid on its wind levels where a profile has no humidity of its own and
 * another's may serve it; the block itself where that is nowhere so.
 */
export function withLentAir(block: ProfileBlock, lenders: (profile: Profile) => readonly Profile[]): ProfileBlock {
  const total = block.heightAgl.length;
  const column = (own: Float32Array | null): Float32Array => own?.slice() ?? new Float32Array(total).fill(NaN);
  let laid: Record<'pressure' | 'temperature' | 'specificHumidity', Float32Array> | null = null;
  for (let index = 0; index < block.profileCount; index++) {
    const profile = profileAt(block, index);
    if (humidLevels(airColumn(profile)) >= LEAST_LEVELS) continue;
    const humidity = lenders(profile);
    if (humidity.length === 0) continue;
    const { air, why } = humidAir(profile, { humidity });
    if (why !== '') continue;
    laid ??= {
      pressure: column(block.pressure),
      temperature: column(block.temperature),
      specificHumidity: column(block.specificHumidity),
    };
    let at = 0;
    for (let k = block.offsets[index]!; k < block.offsets[index + 1]! && at < air.count; k++) {
      if (block.heightAgl[k] !== air.heightAgl[at]) continue;
      laid.pressure[k] = air.pressure[at]!;
      laid.temperature[k] = air.temperature[at]!;
      laid.specificHumidity[k] = air.specificHumidity[at]!;
      at++;
    }
  }
  return laid === null ? block : { ...block, ...laid };
}
