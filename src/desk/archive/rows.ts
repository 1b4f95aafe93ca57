// One row a profile and one a jet: what the archive keeps of years of profiles. Columns of typed arrays, so that they cross
// between threads and into files unchanged; missing is NaN.

import type { FeedName } from '../feed-name.ts';

/** What a profile was found to be; the code in `status` is the index. */
export const STATUSES = ['not-assessable', 'no-jet', 'jet'] as const;
export type RowStatus = (typeof STATUSES)[number];
export const NOT_ASSESSABLE_ROW = 0;
export const JET_ROW = 2;

/** A row a profile. */
export interface ProfileColumns {
  /** UTC, ms */
  readonly timeMs: Float64Array;
  /** Number of corrections before this report. */
  readonly revision: Uint8Array;
  /** Levels that came with a speed, and those left after screening. */
  readonly windLevels: Uint16Array;
  readonly usableLevels: Uint16Array;
  /** m above ground: highest usable level */
  readonly top: Float32Array;
  /** Index into STATUSES. */
  readonly status: Uint8Array;
  /** Index into the rows' `reasons`: why the profile is not assessable. */
  readonly why: Uint16Array;
  /** Probability that there is a jet; NaN for criteria that the levels decide, whose scan runs no ensemble. */
  readonly confidence: Float32Array;
  /** kg/(m s): vapour carried below 3 km, with the profile's own humidity; NaN where it has none. */
  readonly below3Km: Float32Array;
  /** Jets of the profile; those of all rows stand in their order in the jets' columns. */
  readonly jetCount: Uint8Array;
  /** Index into the rows' `sources`. */
  readonly source: Uint32Array;
}

/** A row a jet found, the strongest of a profile first. */
export interface JetColumns {
  /** Highest category met; -1 where the criteria know none. */
  readonly category: Int8Array;
  /** m above ground, m/s, degrees from */
  readonly noseHeight: Float32Array;
  readonly noseSpeed: Float32Array;
  readonly noseDirection: Float32Array;
  /** m/s, and 1 where it is a lower bound */
  readonly falloff: Float32Array;
  readonly falloffIsBound: Uint8Array;
  readonly confidence: Float32Array;
}

/** The wind on one turbine type's disc, a row a profile; as in `FleetWind`. */
export interface DiscColumns {
  readonly coverage: Float32Array;
  readonly hubSpeed: Float32Array;
  readonly hubDirection: Float32Array;
  readonly equivalentSpeed: Float32Array;
  readonly equivalentSpeedVeer: Float32Array;
  readonly shearExponent: Float32Array;
  readonly veer: Float32Array;
}

/** All rows of one feed. */
export interface FeedRows {
  readonly feed: FeedName;
  /** Names of the files the profiles came from. */
  readonly sources: readonly string[];
  /** Reasons in words; the first is the empty one. */
  readonly reasons: readonly string[];
  readonly profiles: ProfileColumns;
  readonly jets: JetColumns;
  /** By turbine type, in the order of the question. */
  readonly discs: readonly DiscColumns[];
}

export function profileColumns(count: number): ProfileColumns {
  return {
    timeMs: new Float64Array(count),
    revision: new Uint8Array(count),
    windLevels: new Uint16Array(count),
    usableLevels: new Uint16Array(count),
    top: missing(count),
    status: new Uint8Array(count),
    why: new Uint16Array(count),
    confidence: missing(count),
    below3Km: missing(count),
    jetCount: new Uint8Array(count),
    source: new Uint32Array(count),
  };
}

export function jetColumns(count: number): JetColumns {
  return {
    category: new Int8Array(count),
    noseHeight: missing(count),
    noseSpeed: missing(count),
    noseDirection: missing(count),
    falloff: missing(count),
    falloffIsBound: new Uint8Array(count),
    confidence: missing(count),
  };
}

export const DISC_COLUMNS = [
  'coverage',
  'hubSpeed',
  'hubDirection',
  'equivalentSpeed',
  'equivalentSpeedVeer',
  'shearExponent',
  'veer',
] as const satisfies readonly (keyof DiscColumns)[];

export function discColumns(count: number): DiscColumns {
  return Object.fromEntries(DISC_COLUMNS.map((name) => [name, missing(count)])) as unknown as DiscColumns;
}

/** No rows: what the tables' columns are told from. */
export function emptyRows(feed: FeedName, discs: number): FeedRows {
  return {
    feed,
    sources: [],
    reasons: [''],
    profiles: profileColumns(0),
    jets: jetColumns(0),
    discs: Array.from({ length: discs }, () => discColumns(0)),
  };
}

/** Where each profile's jets begin in the jets' columns; one more than there are profiles. */
export function jetOffsets({ jetCount }: ProfileColumns): Uint32Array {
  const offsets = new Uint32Array(jetCount.length + 1);
  for (let row = 0; row < jetCount.length; row++) offsets[row + 1] = offsets[row]! + jetCount[row]!;
  return offsets;
}

function missing(count: number): Float32Array {
  return new Float32Array(count).fill(NaN);
}
