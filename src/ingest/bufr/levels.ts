// The levels of one report while it is read, and what becomes of them at its end: heights above ground, humidity, marks.

import { GRAVITY, specificHumidityOfDewPoint, specificHumidityOfRelative } from '../../air/index.ts';
import { MARK, withHeights, type LevelInput } from '../../profile/index.ts';
import { SAID } from './elements.ts';
import { FIRST_OF_LEVEL, ROLE, ROLE_COUNT } from './roles.ts';

/** Surface bit of vertical sounding significance 0 08 001 (7 bits, counted from the left) and 0 08 042 (18 bits). */
const SURFACE = 64;
const EXTENDED_SURFACE = 131_072;
/** Heights are coded to the metre or coarser: a level this far below the surface level is still the surface, m. */
const COARSENESS = 2;
/** Wind profiler quality tests 0 25 034 (4 bits, from the left): test A failed, test B failed, inconclusive. */
const TEST_FAILED = 8 | 4;
const TEST_INCONCLUSIVE = 2;

/** A consensus of fewer soundings says nothing in shares. */
const FEWEST_OF_CONSENSUS = 4;

/** Roles whose doubted or rejected values make the level's wind doubtful or rejected. */
const BEARS_ON_WIND: ReadonlySet<number> = new Set([
  ROLE.pressure,
  ROLE.heightAboveStation,
  ROLE.heightAmsl,
  ROLE.coordinateGpm,
  ROLE.coordinateGeopotential,
  ROLE.gpm,
  ROLE.geopotential,
  ROLE.geometricHeight,
  ROLE.speed,
  ROLE.direction,
  ROLE.u,
  ROLE.v,
]);
const BEARS_ON_AIR: ReadonlySet<number> = new Set([
  ROLE.temperature,
  ROLE.dewPoint,
  ROLE.specificHumidity,
  ROLE.mixingRatio,
  ROLE.relativeHumidity,
]);
/**
 * A substituted wind is a bad one. Substituted heights are not: centres recompute those of all levels from pressure and
 * temperature, and differ by a metre or two.
 */
const BAD_IF_SUBSTITUTED: readonly number[] = [ROLE.speed, ROLE.direction, ROLE.u, ROLE.v];
const SAID_OF = Uint8Array.from({ length: ROLE_COUNT }, (_, role) =>
  BEARS_ON_WIND.has(role) ? 1 : BEARS_ON_AIR.has(role) ? 2 : 0,
);

const COLUMNS = [
  'amsl',
  'aboveStation',
  'pressure',
  'speed',
  'direction',
  'u',
  'v',
  'verticalSpeed',
  'signal',
  'temperature',
  'specificHumidity',
  'speedUncertainty',
  'consensus',
  'spectralWidth',
] as const;
type Columns = Record<(typeof COLUMNS)[number], number[]>;

/** m/s2 x m: what a geopotential is divided by for geopotential metres (WMO-No. 8). */
const metres = (geopotential: number): number => geopotential / GRAVITY;

export class LevelGatherer {
  readonly #columns = Object.fromEntries(COLUMNS.map((name) => [name, []])) as unknown as Columns;
  readonly #marks: number[] = [];
  readonly #value = new Float64Array(ROLE_COUNT).fill(NaN);
  readonly #said = new Uint8Array(ROLE_COUNT);
  /** Roles already met in the level that is open. */
  readonly #met = new Uint8Array(ROLE_COUNT);
  #open = false;
  #surface = -1;

  get count(): number {
    return this.#marks.length;
  }

  clear(): void {
    this.#reset();
    for (const name of COLUMNS) this.#columns[name].length = 0;
    this.#marks.length = 0;
    this.#surface = -1;
  }

  hasMet(role: number): boolean {
    return this.#met[role] === 1;
  }

  /** An element of the open level. The first of a kind counts: a second wind or temperature is something else's. */
  put(role: number, value: number, said: number): void {
    if (this.#met[role] === 1) return;
    this.#met[role] = 1;
    this.#value[role] = value;
    this.#said[role] = said;
    this.#open = true;
  }

  /** Ends the open level. It is kept if anything tells where it lies, and is none if it holds wind shear. */
  close(): void {
    if (!this.#open) return;
    const value = this.#value;
    const amsl = firstKnown(
      value[ROLE.gpm]!,
      metres(value[ROLE.geopotential]!),
      value[ROLE.geometricHeight]!,
      value[ROLE.heightAmsl]!,
      value[ROLE.coordinateGpm]!,
      metres(value[ROLE.coordinateGeopotential]!),
    );
    const aboveStation = value[ROLE.heightAboveStation]!;
    const pressure = value[ROLE.pressure]!;
    const isShear = this.hasMet(ROLE.shearBelow) || this.hasMet(ROLE.shearAbove);
    const isPlaced = !(Number.isNaN(amsl) && Number.isNaN(aboveStation) && Number.isNaN(pressure));
    if (isPlaced && !isShear) this.#keep(amsl, aboveStation, pressure);
    this.#reset();
  }

  #keep(amsl: number, aboveStation: number, pressure: number): void {
    const value = this.#value;
    const isSurface =
      (value[ROLE.soundingSignificance]! & SURFACE) !== 0 ||
      (value[ROLE.extendedSignificance]! & EXTENDED_SURFACE) !== 0;
    if (isSurface && this.#surface < 0) this.#surface = this.count;
    const columns = this.#columns;
    columns.amsl.push(amsl);
    columns.aboveStation.push(aboveStation);
    columns.pressure.push(pressure);
    columns.speed.push(value[ROLE.speed]!);
    columns.direction.push(value[ROLE.direction]!);
    columns.u.push(value[ROLE.u]!);
    columns.v.push(value[ROLE.v]!);
    columns.verticalSpeed.push(value[ROLE.w]!);
    columns.signal.push(value[ROLE.signal]!);
    columns.temperature.push(value[ROLE.temperature]!);
    columns.specificHumidity.push(this.#humidity(pressure));
    columns.speedUncertainty.push(this.#uncertainty());
    columns.consensus.push(value[ROLE.agreeing]!);
    columns.spectralWidth.push(value[ROLE.spectralWidth]!);
    this.#marks.push(this.#mark());
  }

  #humidity(pressure: number): number {
    const value = this.#value;
    const ratio = value[ROLE.mixingRatio]!;
    return firstKnown(
      specificHumidityOfDewPoint(value[ROLE.dewPoint]!, pressure),
      value[ROLE.specificHumidity]!,
      ratio / (1 + ratio),
      specificHumidityOfRelative(value[ROLE.relativeHumidity]! / 100, value[ROLE.temperature]!, pressure),
    );
  }

  /** Of the speed, from those of the components by propagation of errors; where calm, the larger one. */
  #uncertainty(): number {
    const value = this.#value;
    const [su, sv] = [value[ROLE.uncertaintyU]!, value[ROLE.uncertaintyV]!];
    const [u, v] = [value[ROLE.u]!, value[ROLE.v]!];
    const speed = Math.hypot(u, v);
    return speed > 0 ? Math.hypot(u * su, v * sv) / speed : Math.max(su, sv);
  }

  #mark(): number {
    const value = this.#value;
    let [wind, air] = [0, 0];
    for (let role = FIRST_OF_LEVEL; role < ROLE_COUNT; role++) {
      if (SAID_OF[role] === 1) wind |= this.#said[role]!;
      else if (SAID_OF[role] === 2) air |= this.#said[role]!;
    }
    if (BAD_IF_SUBSTITUTED.some((role) => (this.#said[role]! & SAID.substituted) !== 0)) wind |= SAID.rejected;
    const tests = value[ROLE.tests]!;
    if ((tests & TEST_FAILED) !== 0) wind |= SAID.rejected;
    else if ((tests & TEST_INCONCLUSIVE) !== 0) wind |= SAID.doubted;
    if (value[ROLE.fitness] === 3) wind |= SAID.rejected;
    if (value[ROLE.suspicion] === 1 || value[ROLE.fitness] === 1 || value[ROLE.fitness] === 2) wind |= SAID.doubted;
    let marks = 0;
    if ((wind & SAID.rejected) !== 0) marks |= MARK['source-rejects'];
    else if ((wind & SAID.doubted) !== 0) marks |= MARK['source-doubts'];
    if ((air & SAID.rejected) !== 0) marks |= MARK['air-source-rejects'];
    return marks;
  }

  #reset(): void {
    this.#value.fill(NaN, FIRST_OF_LEVEL);
    this.#said.fill(0, FIRST_OF_LEVEL);
    this.#met.fill(0, FIRST_OF_LEVEL);
    this.#open = false;
  }

  /** Height above sea level of the surface level, m; NaN where none is marked. */
  get surfaceHeight(): number {
    return this.#surface < 0 ? NaN : this.#columns.amsl[this.#surface]!;
  }

  /**
   * All levels kept so far, for the block builder.
   * @param elevation m above sea level of the ground that heights are to count from
   */
  finish(elevation: number): LevelInput {
    const { amsl, aboveStation, pressure, ...rest } = this.#columns;
    const marks = this.#marks;
    const given = amsl.map((height, k) => (Number.isNaN(height) ? aboveStation[k]! : height - elevation));
    const heightAgl = withHeights({
      height: given,
      pressure,
      temperature: rest.temperature,
      specificHumidity: rest.specificHumidity,
    });
    const surfacePressure = this.#surface < 0 ? NaN : pressure[this.#surface]!;
    const surfaceHeight = this.#surface < 0 ? 0 : heightAgl[this.#surface]! || 0;
    for (let k = 0; k < marks.length; k++) {
      if (Number.isNaN(given[k]!) && !Number.isNaN(heightAgl[k]!)) marks[k]! |= MARK['height-worked-out'];
      if (k === this.#surface) continue;
      if (pressure[k]! > surfacePressure || heightAgl[k]! < surfaceHeight - COARSENESS) {
        marks[k]! |= MARK['below-ground'];
      }
    }
    return { heightAgl, pressure, ...rest, consensus: sharesOf(rest.consensus), mark: marks };
  }
}

/**
 * Shares out of how many soundings agree on each level's wind. The code gives the number alone, so the level on which the
 * most agree stands for all of them.
 */
function sharesOf(agreeing: readonly number[]): number[] {
  const most = agreeing.reduce((greatest, count) => (count > greatest ? count : greatest), 0);
  return agreeing.map((count) => (most >= FEWEST_OF_CONSENSUS ? count / most : NaN));
}

function firstKnown(...values: readonly number[]): number {
  for (const value of values) if (!Number.isNaN(value)) return value;
  return NaN;
}
