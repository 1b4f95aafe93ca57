// How the streams of three or more stations spread, turn and gather moisture now and through the night.

import { triangleLayers, triangleThroughTime, type TriangleLayer } from '../moisture/index.ts';
import type { Profile, Station } from '../profile/index.ts';
import { onePerPlace, type StationRecord } from './station-record.ts';

/** One set of stations. */
export interface TriangleState {
  /** Whether the site file names the set, or it is simply all that is open. */
  readonly named: boolean;
  readonly members: readonly TriangleMember[];
  /** Why nothing can be said at all; empty when layers follow, which may each have a reason of their own. */
  readonly why: string;
  /** UTC ms of the newest profile that took part. */
  readonly timeMs: number;
  /** s between the first and the last of the profiles. */
  readonly apartS: number;
  readonly layers: readonly TriangleLayer[];
  readonly notes: readonly string[];
  /** The lowest kilometre through the night; in parallel, NaN where not assessable. */
  readonly through: {
    readonly timeMs: readonly number[];
    readonly divergence: readonly number[];
    readonly divergenceUncertainty: readonly number[];
    readonly moistureFluxDivergence: readonly number[];
    readonly moistureFluxDivergenceUncertainty: readonly number[];
  };
}

export interface TriangleMember {
  /** As the site file names it. */
  readonly id: string;
  /** Null where nothing of it is open. */
  readonly station: Station | null;
  /** UTC ms of its newest profile; NaN without one. */
  readonly timeMs: number;
}

/** m above ground: bounds of the layer that is followed through the night. */
const FOLLOWED = [100, 1000];
/** A last profile older than this is not looked at any more, ms. */
const OLDEST_MS = 6 * 3_600_000;

export interface TriangleQuestion {
  readonly atMs: number;
  readonly startMs: number;
  /** Sets of identifiers that the site file names. */
  readonly named: readonly (readonly string[])[];
  /** The fullest record of each station, by identifier. */
  readonly records: ReadonlyMap<string, StationRecord>;
  readonly humidityFor: (profile: Profile) => readonly Profile[];
}

/** The sets of the site file; without any, all places that are open where they are three or more. */
export function triangleStates(question: TriangleQuestion): TriangleState[] {
  const { named, records } = question;
  if (named.length > 0) return named.map((ids) => triangleState(ids, true, question));
  const places = onePerPlace(records.values());
  if (places.length < 3) return [];
  return [triangleState(places.map(({ station }) => station.id).sort(), false, question)];
}

function triangleState(
  ids: readonly string[],
  named: boolean,
  { atMs, startMs, records, humidityFor }: TriangleQuestion,
): TriangleState {
  const found = ids.map((id) => ({ id, record: records.get(id) }));
  const newest = found.map(({ record }) => record?.between(atMs - OLDEST_MS, atMs).at(-1));
  const members = found.map(({ id, record }, k) => ({
    id,
    station: record?.station ?? null,
    timeMs: newest[k]?.timeMs ?? NaN,
  }));
  const profiles = newest.filter((profile) => profile !== undefined);
  const series = found.map(({ record }) => record?.between(startMs, atMs) ?? []).filter((each) => each.length > 0);
  const times = profiles.map(({ timeMs }) => timeMs);
  const silent = members.filter(({ timeMs }) => Number.isNaN(timeMs)).map(({ id }) => id);
  const why = profiles.length >= 3 ? '' : `three stations are needed, and none lately of ${silent.join(', ')}`;
  const { layers, notes } = why === '' ? triangleLayers(profiles, { humidityFor }) : { layers: [], notes: [] };
  const through = series.length < 3 ? [] : triangleThroughTime(series, { humidityFor, edges: FOLLOWED });
  const fields = through.map((time) => time.layers[0]!.field);
  return {
    named,
    members,
    why,
    timeMs: Math.max(...times),
    apartS: (Math.max(...times) - Math.min(...times)) / 1000,
    layers,
    notes,
    through: {
      timeMs: through.map((time) => time.timeMs),
      divergence: fields.map((field) => field.divergence),
      divergenceUncertainty: fields.map((field) => field.divergenceUncertainty),
      moistureFluxDivergence: fields.map((field) => field.moistureFluxDivergence),
      moistureFluxDivergenceUncertainty: fields.map((field) => field.moistureFluxDivergenceUncertainty),
    },
  };
}
