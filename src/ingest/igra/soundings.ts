// Collects the levels of soundings as columns and makes blocks of them.

import { specificHumidityOfDewPoint, specificHumidityOfRelative, ZERO_CELSIUS } from '../../air/index.ts';
import {
  blockOfColumns,
  INSTRUMENTS,
  sameStation,
  withHeights,
  type ProfileBlock,
  type Station,
} from '../../profile/index.ts';
import { MISSING, numberAt, REMOVED } from './fixed-columns.ts';

const RADIOSONDE = INSTRUMENTS.indexOf('radiosonde');
const PILOT_BALLOON = INSTRUMENTS.indexOf('pilot-balloon');
/** Second figure of a level's type that stands for the surface. */
const SURFACE = 49;

const REMOVED_NOTE = "Values that the archive's own checks removed are missing.";
const NO_GROUND_NOTE =
  'Neither the sounding nor anything else tells the height of the ground: it was taken to lie at sea level.';

const NAMES = ['height', 'pressure', 'temperature', 'humidity', 'speed', 'direction'] as const;

/** Numbers of single levels in file order, growing. */
class Columns {
  capacity = 4096;
  height = new Float32Array(4096);
  pressure = new Float32Array(4096);
  temperature = new Float32Array(4096);
  humidity = new Float32Array(4096);
  speed = new Float32Array(4096);
  direction = new Float32Array(4096);

  moveToFront(start: number, end: number): void {
    for (const name of NAMES) this[name].copyWithin(0, start, end);
  }

  grow(): void {
    this.capacity *= 2;
    for (const name of NAMES) {
      const grown = new Float32Array(this.capacity);
      grown.set(this[name]);
      this[name] = grown;
    }
  }
}

/** Takes soundings line by line, gives blocks. One serves a file. */
export class Soundings {
  readonly #source: string;
  #columns = new Columns();
  #count = 0;
  #offsets: number[] = [0];
  #timeMs: number[] = [];
  #stationIndex: number[] = [];
  #instrument: number[] = [];
  #stations: Station[] = [];
  #notes: Record<number, readonly string[]> = {};

  #surfaceHeight = NaN;
  #removed = false;
  #heightless = false;
  #warm = false;

  constructor(source: string) {
    this.#source = source;
  }

  /** Levels in finished soundings that wait to be handed out. */
  get waiting(): number {
    return this.#offsets.at(-1)!;
  }

  /** Levels of the sounding that is open. */
  get open(): number {
    return this.#count - this.waiting;
  }

  /** Takes a data line, columns as in the archive's description, less one. */
  takeLevel(bytes: Uint8Array, start: number, end: number): void {
    if (this.#count === this.#columns.capacity) this.#columns.grow();
    const columns = this.#columns;
    const at = this.#count++;
    const pressure = this.#value(numberAt(bytes, start + 9, start + 15, end));
    const height = this.#value(numberAt(bytes, start + 16, start + 21, end));
    const temperature = this.#value(numberAt(bytes, start + 22, start + 27, end)) / 10 + ZERO_CELSIUS;
    const relative = this.#value(numberAt(bytes, start + 28, start + 33, end)) / 1000;
    const depression = this.#value(numberAt(bytes, start + 34, start + 39, end)) / 10;
    columns.pressure[at] = pressure > 0 ? pressure : NaN;
    columns.height[at] = height;
    columns.temperature[at] = temperature;
    const byDewPoint = specificHumidityOfDewPoint(temperature - depression, pressure);
    columns.humidity[at] = Number.isNaN(byDewPoint)
      ? specificHumidityOfRelative(relative, temperature, pressure)
      : byDewPoint;
    columns.direction[at] = this.#value(numberAt(bytes, start + 40, start + 45, end));
    columns.speed[at] = this.#value(numberAt(bytes, start + 46, start + 51, end)) / 10;
    if (Number.isNaN(height)) this.#heightless = true;
    else if (bytes[start + 1] === SURFACE) this.#surfaceHeight = height;
    if (!Number.isNaN(temperature)) this.#warm = true;
  }

  /**
   * Ends the open sounding. Its levels wait with the others until `handOut`.
   * @param station where the elevation is NaN the height of the surface level serves
   */
  close(station: Station, timeMs: number): void {
    const start = this.waiting;
    const end = this.#count;
    const { height, pressure, temperature, humidity } = this.#columns;
    if (this.#heightless) {
      const filled = withHeights({
        height: height.subarray(start, end),
        pressure: pressure.subarray(start, end),
        temperature: temperature.subarray(start, end),
        specificHumidity: humidity.subarray(start, end),
      });
      height.set(filled, start);
    }
    const elevation = Number.isNaN(station.elevation) ? this.#surfaceHeight : station.elevation;
    const ground = Number.isNaN(elevation) ? 0 : elevation;
    for (let k = start; k < end; k++) height[k] = height[k]! - ground;

    const notes: string[] = [];
    if (this.#removed) notes.push(REMOVED_NOTE);
    if (Number.isNaN(elevation)) notes.push(NO_GROUND_NOTE);
    if (notes.length > 0) this.#notes[this.#timeMs.length] = notes;
    this.#offsets.push(end);
    this.#timeMs.push(timeMs);
    this.#stationIndex.push(this.#placeOf({ ...station, elevation }));
    this.#instrument.push(this.#warm ? RADIOSONDE : PILOT_BALLOON);
    this.#reset();
  }

  /** Forgets the open sounding. */
  drop(): void {
    this.#count = this.waiting;
    this.#reset();
  }

  /** The block of all finished soundings; the levels of an open one stay. */
  handOut(): ProfileBlock {
    const columns = this.#columns;
    const profileCount = this.#timeMs.length;
    const { waiting, open } = this;
    const cut = (column: Float32Array): Float32Array => column.slice(0, waiting);
    const block = blockOfColumns({
      stations: this.#stations,
      sources: [this.#source],
      profileCount,
      offsets: Uint32Array.from(this.#offsets),
      stationIndex: Uint16Array.from(this.#stationIndex),
      sourceIndex: new Uint16Array(profileCount),
      instrumentIndex: Uint8Array.from(this.#instrument),
      timeMs: Float64Array.from(this.#timeMs),
      periodS: new Float32Array(profileCount).fill(NaN),
      notes: this.#notes,
      heightAgl: cut(columns.height),
      speed: cut(columns.speed),
      direction: cut(columns.direction),
      pressure: cut(columns.pressure),
      temperature: cut(columns.temperature),
      specificHumidity: cut(columns.humidity),
    });
    columns.moveToFront(waiting, this.#count);
    this.#count = open;
    this.#offsets = [0];
    this.#timeMs = [];
    this.#stationIndex = [];
    this.#instrument = [];
    this.#stations = [];
    this.#notes = {};
    return block;
  }

  #value(number: number): number {
    if (number === MISSING) return NaN;
    if (number !== REMOVED) return number;
    this.#removed = true;
    return NaN;
  }

  #placeOf(station: Station): number {
    const last = this.#stations.length - 1;
    if (last >= 0 && sameStation(this.#stations[last]!, station)) return last;
    const found = this.#stations.findIndex((known) => sameStation(known, station));
    return found >= 0 ? found : this.#stations.push(station) - 1;
  }

  #reset(): void {
    this.#surfaceHeight = NaN;
    this.#removed = false;
    this.#heightless = false;
    this.#warm = false;
  }
}
