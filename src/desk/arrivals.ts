// When moist air at the upstream stations gets here, and whether it came when it was told to.

import {
  arrivalOf,
  findSurges,
  matchArrivals,
  scoreArrivals,
  type Arrival,
  type ArrivalMatch,
  type ArrivalScore,
  type Surge,
  type WayWind,
} from '../moisture/index.ts';
import type { Station } from '../profile/index.ts';
import type { StationRecord } from './station-record.ts';
import { transportLevel, windAbout } from './transport-level.ts';

/** The arrivals that are told, an entry an upstream station, in the site file's order. */
export interface ArrivalBoard {
  readonly upstream: readonly UpstreamAir[];
  /** Why there is none to tell; empty when there is. */
  readonly why: string;
}

/** What comes from one upstream station. */
export interface UpstreamAir {
  readonly station: Station;
  /** m above ground: where the flux of vapour is greatest over it; NaN where that cannot be told. */
  readonly level: number;
  /** UTC ms of the profile the level was taken from. */
  readonly levelMs: number;
  /** Air that leaves it now. */
  readonly now: Arrival;
  /** The newest surge of moist air over it within half a day, and when that gets here; null without one. */
  readonly surge: { readonly surge: Surge; readonly arrival: Arrival; readonly came: Surge | null } | null;
  readonly score: KeptScore;
}

/** Arrivals told from this station over the record that is open, against the surges that then came. */
export interface KeptScore {
  /** Why no score can be kept; empty when it can. */
  readonly why: string;
  readonly score: ArrivalScore;
  readonly matches: readonly ArrivalMatch[];
  /** Whose humidity tells what came. */
  readonly seenBy: string;
}

const HOUR_MS = 3_600_000;
/** Winds so old speak for the way now. */
const LATELY_MS = HOUR_MS;
/** A profile this old still tells at which height the vapour travels. */
const LEVEL_MS = 3 * HOUR_MS;
/** A surge older than this is no news. */
const NEWS_MS = 12 * HOUR_MS;
/** Winds from so long before a surge was half done count for its way … */
const BEFORE_MS = HOUR_MS / 2;
/** … and for the score those until so long after, when it would have been told. */
const TOLD_AFTER_MS = HOUR_MS;
/** A surge this far from the time told is another one, s. Our own choice. */
const TOLERANCE_S = 3 * 3600;

export interface Surroundings {
  readonly atMs: number;
  /** Identifiers that the site file names as upstream. */
  readonly wanted: readonly string[];
  readonly target: Station;
  readonly upstream: readonly StationRecord[];
  /** Places that may measure the wind of the way, those above among them, one instrument each. */
  readonly all: readonly StationRecord[];
  /** Humidity at the target's place; null where none is measured. */
  readonly here: StationRecord | null;
}

export function arrivalBoard({ atMs, wanted, target, upstream, all, here }: Surroundings): ArrivalBoard {
  if (wanted.length === 0) return { upstream: [], why: `the site file names no station upstream of ${target.id}` };
  if (upstream.length === 0) {
    return { upstream: [], why: `no profile of the upstream stations ${wanted.join(', ')} is open` };
  }
  const came = here === null ? [] : surgesOf(here);
  return {
    why: '',
    upstream: upstream.map((record) => {
      const { station } = record;
      const newest = record
        .between(atMs - LEVEL_MS, atMs)
        .map((profile) => ({ timeMs: profile.timeMs, level: transportLevel(profile) }))
        .findLast(({ level: each }) => Number.isFinite(each));
      const level = newest?.level ?? NaN;
      const winds = (fromMs: number, toMs: number): WayWind[] => windsAt(all, level, fromMs, toMs);
      const told = surgesOf(record).map((surge) => ({
        surge,
        arrival: arrivalOf(
          station,
          target,
          winds(surge.timeMs - BEFORE_MS, surge.timeMs + TOLD_AFTER_MS),
          surge.timeMs,
        ),
      }));
      const score = keptScore(
        told.map(({ arrival }) => arrival),
        came,
        here,
      );
      const news = told.at(-1);
      return {
        station,
        level,
        levelMs: newest?.timeMs ?? NaN,
        now: arrivalOf(station, target, winds(atMs - LATELY_MS, atMs), atMs),
        surge:
          news === undefined || atMs - news.surge.timeMs > NEWS_MS
            ? null
            : {
                surge: news.surge,
                // All the wind it has met so far, not only what was known when it was first told.
                arrival: arrivalOf(station, target, winds(news.surge.timeMs - BEFORE_MS, atMs), news.surge.timeMs),
                came: score.matches.find(({ told: each }) => each === news.arrival)?.came ?? null,
              },
        score,
      };
    }),
  };
}

function surgesOf({ timeMs, lowHumidity }: StationRecord): Surge[] {
  return findSurges(timeMs, lowHumidity);
}

function windsAt(records: readonly StationRecord[], level: number, fromMs: number, toMs: number): WayWind[] {
  return records.flatMap((record) => {
    const wind = windAbout(record.station, record.between(fromMs, toMs), level);
    return wind === null ? [] : [wind];
  });
}

/** Only arrivals count for which somebody could have seen whether they came. */
function keptScore(told: readonly Arrival[], came: readonly Surge[], here: StationRecord | null): KeptScore {
  const nothing = { score: scoreArrivals([], [], TOLERANCE_S), matches: [] };
  if (here === null) {
    return { why: 'no humidity is measured here that could tell what came', seenBy: '', ...nothing };
  }
  const [firstMs, lastMs] = [here.timeMs[0]!, here.timeMs[here.timeMs.length - 1]!];
  const judged = told.filter(
    ({ status, latestMs, arrivesMs }) =>
      status === 'on-its-way' && firstMs <= arrivesMs && lastMs >= Math.min(latestMs, arrivesMs + HOUR_MS),
  );
  const why = judged.length === 0 ? 'no arrival has come due yet in the record that is open' : '';
  const tolerance = TOLERANCE_S;
  return {
    why,
    seenBy: here.station.name,
    score: scoreArrivals(judged, came, tolerance),
    matches: matchArrivals(judged, came, tolerance),
  };
}
