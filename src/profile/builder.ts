// Builds a block out of profiles as readers find them: sorts levels by height, marks what was doubled, out of order or
// without height, and drops nothing in silence.

import { directionOf, speedOf } from '../air/index.ts';
import { VALUE_COLUMNS, WIND_COLUMNS, type ProfileBlock, type ValueColumn } from './block.ts';
import { descentStart } from './descent.ts';
import { indexIn } from './index-in.ts';
import { MARK } from './marks.ts';
import { INSTRUMENTS, sameStation, type Instrument, type Station } from './station.ts';

/** Level columns as a reader has them: wind as speed and direction or as components, all of equal length, NaN missing. */
export interface LevelInput {
  readonly heightAgl: ArrayLike<number>;
  readonly speed?: ArrayLike<number> | undefined;
  readonly direction?: ArrayLike<number> | undefined;
  /** Eastward and northward, m/s: used where speed and direction are not given. */
  readonly u?: ArrayLike<number> | undefined;
  readonly v?: ArrayLike<number> | undefined;
  readonly verticalSpeed?: ArrayLike<number> | undefined;
  readonly pressure?: ArrayLike<number> | undefined;
  readonly temperature?: ArrayLike<number> | undefined;
  readonly specificHumidity?: ArrayLike<number> | undefined;
  readonly signal?: ArrayLike<number> | undefined;
  readonly speedUncertainty?: ArrayLike<number> | undefined;
  readonly consensus?: ArrayLike<number> | undefined;
  readonly spectralWidth?: ArrayLike<number> | undefined;
  readonly speedDeviation?: ArrayLike<number> | undefined;
  readonly gust?: ArrayLike<number> | undefined;
  readonly mark?: ArrayLike<number> | undefined;
}

export interface ProfileInput {
  readonly station: Station;
  readonly source: string;
  readonly instrument?: Instrument;
  readonly timeMs: number;
  readonly periodS?: number;
  /** Number of corrections made before this one was sent; up to 255. */
  readonly revision?: number;
  readonly notes?: readonly string[];
  readonly levels: LevelInput;
}

/** A float column that grows by doubling. */
class Column {
  values = new Float32Array(256);
  filled = false;

  reserve(length: number): void {
    if (length <= this.values.length) return;
    const grown = new Float32Array(Math.max(length, this.values.length * 2));
    grown.set(this.values);
    this.values = grown;
  }

  set(position: number, given: number): void {
    const value = finiteOrNaN(given);
    this.values[position] = value;
    if (!this.filled && !Number.isNaN(value)) this.filled = true;
  }
}

/** Collects profiles and ends in one block. One builder makes one block. */
export class BlockBuilder {
  readonly #columns = Object.fromEntries(VALUE_COLUMNS.map((name) => [name, new Column()])) as Record<
    ValueColumn,
    Column
  >;
  #mark = new Uint32Array(256);
  #levelCount = 0;
  readonly #stations: Station[] = [];
  readonly #sources: string[] = [];
  readonly #offsets: number[] = [0];
  readonly #stationIndex: number[] = [];
  readonly #sourceIndex: number[] = [];
  readonly #instrumentIndex: number[] = [];
  readonly #timeMs: number[] = [];
  readonly #periodS: number[] = [];
  readonly #revision: number[] = [];
  readonly #notes: Record<number, readonly string[]> = {};

  get profileCount(): number {
    return this.#timeMs.length;
  }

  get levelCount(): number {
    return this.#levelCount;
  }

  /**
   * Adds a profile. Levels may come in any order; they are stored by ascending height, levels without height last.
   * A level moved is marked `out-of-order`, the second of equal heights `doubled`, one without height `no-height`, those of a
   * sonde that falls again after its ascent `descent`.
   */
  add(input: ProfileInput): void {
    const { levels } = input;
    const count = levels.heightAgl.length;
    const start = this.#levelCount;
    for (const name of VALUE_COLUMNS) this.#columns[name].reserve(start + count);
    this.#reserveMarks(start + count);
    const order = heightOrder(levels.heightAgl);
    const descent = order === null ? -1 : descentStart(levels.heightAgl);

    let previous = NaN;
    for (let k = 0; k < count; k++) {
      const from = order === null ? k : order[k]!;
      const at = start + k;
      const height = finiteOrNaN(levels.heightAgl[from]!);
      let bits = levels.mark?.[from] ?? 0;
      if (descent >= 0 && from >= descent) bits |= MARK.descent;
      if (Number.isNaN(height)) bits |= MARK['no-height'];
      else if (height === previous) bits |= MARK.doubled;
      if (order !== null && from !== k && !Number.isNaN(height)) bits |= MARK['out-of-order'];
      previous = height;
      this.#mark[at] = bits;
      this.#setWind(at, levels, from);
      for (const name of VALUE_COLUMNS) {
        if (name === 'speed' || name === 'direction') continue;
        this.#columns[name].set(at, levels[name]?.[from] ?? NaN);
      }
    }

    this.#levelCount = start + count;
    this.#offsets.push(this.#levelCount);
    this.#stationIndex.push(indexIn(this.#stations, input.station, sameStation));
    this.#sourceIndex.push(indexIn(this.#sources, input.source, Object.is));
    this.#instrumentIndex.push(INSTRUMENTS.indexOf(input.instrument ?? 'unknown'));
    this.#timeMs.push(input.timeMs);
    this.#periodS.push(input.periodS ?? NaN);
    this.#revision.push(Math.min(255, input.revision ?? 0));
    if (input.notes !== undefined && input.notes.length > 0) this.#notes[this.#timeMs.length - 1] = [...input.notes];
  }

  /** The block of all profiles added so far. */
  finish(): ProfileBlock {
    const take = (name: ValueColumn): Float32Array => this.#columns[name].values.slice(0, this.#levelCount);
    const takeIfFilled = (name: ValueColumn): Float32Array | null => (this.#columns[name].filled ? take(name) : null);
    const [heightAgl, speed, direction] = WIND_COLUMNS.map(take) as [Float32Array, Float32Array, Float32Array];
    return {
      stations: [...this.#stations],
      sources: [...this.#sources],
      profileCount: this.profileCount,
      offsets: Uint32Array.from(this.#offsets),
      stationIndex: Uint16Array.from(this.#stationIndex),
      sourceIndex: Uint16Array.from(this.#sourceIndex),
      instrumentIndex: Uint8Array.from(this.#instrumentIndex),
      timeMs: Float64Array.from(this.#timeMs),
      periodS: Float32Array.from(this.#periodS),
      revision: Uint8Array.from(this.#revision),
      notes: { ...this.#notes },
      heightAgl,
      speed,
      direction,
      verticalSpeed: takeIfFilled('verticalSpeed'),
      pressure: takeIfFilled('pressure'),
      temperature: takeIfFilled('temperature'),
      specificHumidity: takeIfFilled('specificHumidity'),
      signal: takeIfFilled('signal'),
      speedUncertainty: takeIfFilled('speedUncertainty'),
      consensus: takeIfFilled('consensus'),
      spectralWidth: takeIfFilled('spectralWidth'),
      speedDeviation: takeIfFilled('speedDeviation'),
      gust: takeIfFilled('gust'),
      mark: this.#mark.slice(0, this.#levelCount),
    };
  }

  #setWind(at: number, levels: LevelInput, from: number): void {
    let speed = levels.speed?.[from] ?? NaN;
    let direction = levels.direction?.[from] ?? NaN;
    const u = levels.u?.[from] ?? NaN;
    const v = levels.v?.[from] ?? NaN;
    if (Number.isNaN(speed)) speed = speedOf(u, v);
    if (Number.isNaN(direction)) direction = directionOf(u, v);
    this.#columns.speed.set(at, speed);
    this.#columns.direction.set(at, direction);
  }

  #reserveMarks(length: number): void {
    if (length <= this.#mark.length) return;
    const grown = new Uint32Array(Math.max(length, this.#mark.length * 2));
    grown.set(this.#mark);
    this.#mark = grown;
  }
}

/** Infinities carry no more information than a missing value. */
function finiteOrNaN(value: number): number {
  return Number.isFinite(value) ? value : NaN;
}

/** Order of levels by ascending height, missing heights last, equals as they came; null when already so. */
export function heightOrder(heights: ArrayLike<number>): Uint32Array | null {
  let ascending = true;
  for (let k = 1; k < heights.length && ascending; k++) {
    if (!(heights[k]! >= heights[k - 1]!) && Number.isFinite(heights[k]!)) ascending = false;
  }
  if (ascending) return null;
  const order = Uint32Array.from({ length: heights.length }, (_, k) => k);
  const key = (k: number): number => (Number.isFinite(heights[k]!) ? heights[k]! : Infinity);
  return order.sort((a, b) => key(a) - key(b) || a - b);
}
