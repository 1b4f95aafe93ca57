// The profile model: many profiles as columns of typed arrays with an offsets array, so that fixed-gate and irregular
// profiles share one form and a hand-over between threads is a transfer. Missing is NaN.

import { INSTRUMENTS, type Instrument, type Station } from './station.ts';

/**
 * Level columns, equal length. Speed and direction are stored as measured rather than as components: equal speeds stay
 * equal to the last bit, which tie rules of the jet criteria rest on, and a scan reads one array instead of two.
 * A column that no level fills is null.
 */
export interface Levels {
  /** m above ground, ascending within a profile; NaN only at the end of a profile and marked `no-height`. */
  readonly heightAgl: Float32Array;
  /** m/s */
  readonly speed: Float32Array;
  /** degrees, where the wind comes from */
  readonly direction: Float32Array;
  /** m/s, upward */
  readonly verticalSpeed: Float32Array | null;
  /** Pa */
  readonly pressure: Float32Array | null;
  /** K */
  readonly temperature: Float32Array | null;
  /** kg/kg */
  readonly specificHumidity: Float32Array | null;
  /** Strength of the echo, dB or as the source states it; only for showing and screening. */
  readonly signal: Float32Array | null;
  /** Standard uncertainty of the speed, m/s, where source or reader can state it. */
  readonly speedUncertainty: Float32Array | null;
  /** Share of the soundings of the period that agree on the wind, 0 to 1: of a wind profiler's consensus average. */
  readonly consensus: Float32Array | null;
  /** Width of the Doppler spectrum, m/s. */
  readonly spectralWidth: Float32Array | null;
  /** Standard deviation of the speed within the averaging period, m/s. */
  readonly speedDeviation: Float32Array | null;
  /** Strongest gust within the averaging period, m/s. */
  readonly gust: Float32Array | null;
  /** Quality marks, bits as in `marks.ts`. */
  readonly mark: Uint32Array;
}

/** Names of the level columns that hold numbers. */
export const VALUE_COLUMNS = [
  'heightAgl',
  'speed',
  'direction',
  'verticalSpeed',
  'pressure',
  'temperature',
  'specificHumidity',
  'signal',
  'speedUncertainty',
  'consensus',
  'spectralWidth',
  'speedDeviation',
  'gust',
] as const;
export type ValueColumn = (typeof VALUE_COLUMNS)[number];
/** Columns that every block has; the others may be null. */
export const WIND_COLUMNS = ['heightAgl', 'speed', 'direction'] as const satisfies readonly ValueColumn[];

/** Many profiles. Plain data throughout: it can be posted to a worker. */
export interface ProfileBlock extends Levels {
  readonly stations: readonly Station[];
  /** Names of the files or feeds the profiles came from. */
  readonly sources: readonly string[];
  readonly profileCount: number;
  /** Length profileCount + 1: profile i owns levels offsets[i] up to offsets[i + 1]. */
  readonly offsets: Uint32Array;
  /** Index into `stations`, per profile. */
  readonly stationIndex: Uint16Array;
  /** Index into `sources`, per profile. */
  readonly sourceIndex: Uint16Array;
  /** Index into INSTRUMENTS, per profile. */
  readonly instrumentIndex: Uint8Array;
  /** UTC, ms: end of the averaging period; launch time of a sounding. */
  readonly timeMs: Float64Array;
  /** Averaging period, s; 0 for a momentary value, NaN when not known. */
  readonly periodS: Float32Array;
  /** How many times the source had corrected the profile when it sent it: 0 for a first report. */
  readonly revision: Uint8Array;
  /** What the reader has to say of a profile, by profile index. */
  readonly notes: Readonly<Record<number, readonly string[]>>;
}

/** One profile: views into its block, nothing copied. */
export interface Profile extends Levels {
  readonly station: Station;
  readonly instrument: Instrument;
  readonly source: string;
  readonly timeMs: number;
  readonly periodS: number;
  readonly revision: number;
  readonly notes: readonly string[];
  readonly levelCount: number;
}

/** Views the i-th profile of a block. */
export function profileAt(block: ProfileBlock, index: number): Profile {
  const start = block.offsets[index]!;
  const end = block.offsets[index + 1]!;
  const view = (column: Float32Array | null): Float32Array | null => column?.subarray(start, end) ?? null;
  return {
    station: block.stations[block.stationIndex[index]!]!,
    instrument: INSTRUMENTS[block.instrumentIndex[index]!]!,
    source: block.sources[block.sourceIndex[index]!]!,
    timeMs: block.timeMs[index]!,
    periodS: block.periodS[index]!,
    revision: block.revision[index]!,
    notes: block.notes[index] ?? [],
    levelCount: end - start,
    heightAgl: block.heightAgl.subarray(start, end),
    speed: block.speed.subarray(start, end),
    direction: block.direction.subarray(start, end),
    verticalSpeed: view(block.verticalSpeed),
    pressure: view(block.pressure),
    temperature: view(block.temperature),
    specificHumidity: view(block.specificHumidity),
    signal: view(block.signal),
    speedUncertainty: view(block.speedUncertainty),
    consensus: view(block.consensus),
    spectralWidth: view(block.spectralWidth),
    speedDeviation: view(block.speedDeviation),
    gust: view(block.gust),
    mark: block.mark.subarray(start, end),
  };
}

/** All profiles of a block, in its order. */
export function* profilesOf(block: ProfileBlock): Generator<Profile> {
  for (let index = 0; index < block.profileCount; index++) yield profileAt(block, index);
}

/** Buffers to hand over when a block is transferred to another thread; the sender's block is dead afterwards. */
export function buffersOf(block: ProfileBlock): ArrayBuffer[] {
  const arrays = [
    block.offsets,
    block.stationIndex,
    block.sourceIndex,
    block.instrumentIndex,
    block.timeMs,
    block.periodS,
    block.revision,
    block.mark,
    ...VALUE_COLUMNS.map((name) => block[name]),
  ];
  return [...new Set(arrays.flatMap((array) => (array === null ? [] : [array.buffer as ArrayBuffer])))];
}
