// Values of any variable of a file, brought into the order of its profiles: level after level, profile after profile.

import { asMeant, codingOf, decodeInto } from './values.ts';
import { sizeOf, textOf, type Dataset, type Variable } from './dataset.ts';
import type { Layout } from './layout.ts';
import { layOutInto, stridesFor } from './strided.ts';

interface Unit {
  readonly scale: number;
  readonly offset: number;
}

/** Levels of one piece of a file; about so many make a piece. */
const PIECE_LEVELS = 2 ** 20;
/** A block numbers its stations in 16 bits. */
const PIECE_PROFILES = 2 ** 15;

/** A run of profiles of the file, gathered together into one block. */
export class Piece {
  readonly profileCount: number;
  /** Length profileCount + 1, as in a block. */
  readonly offsets: Uint32Array;
  /** Numbers that look like fills, were not declared and were taken as missing, by variable. */
  readonly undeclared = new Map<string, Set<number>>();
  readonly #layout: Layout;
  readonly #from: number;
  readonly #rows: number;

  /** @param from first row of the outermost profile dimension @param to row after the last */
  constructor(layout: Layout, from: number, to: number) {
    this.#layout = layout;
    this.#from = from;
    this.#rows = to - from;
    this.profileCount = this.#rows * sizeOf(layout.profileShape.slice(1));
    this.offsets =
      layout.ragged === null
        ? Uint32Array.from({ length: this.profileCount + 1 }, (_, index) => index * layout.levelCount)
        : layout.ragged.offsets;
  }

  /**
   * A column of levels.
   * @param downward whether the file's heights descend, so that its levels are to be turned round
   * @returns null when the variable lies along other dimensions
   */
  levels(variable: Variable, unit: Unit, downward = false): Float32Array | null {
    return this.#levels(variable, unit, downward, Float32Array, true);
  }

  /**
   * A value for each profile; of a variable that runs along the levels, the first that is not missing.
   * @param mayBeAnything true for times: there -999 is a number like any other
   */
  perProfile(variable: Variable, unit: Unit, mayBeAnything = false): Float64Array | null {
    const { levelDimension } = this.#layout;
    if (levelDimension !== null && variable.dimensions.includes(levelDimension)) {
      const levels = this.#levels(variable, unit, false, Float64Array, !mayBeAnything);
      if (levels === null) return null;
      return Float64Array.from({ length: this.profileCount }, (_, index) =>
        firstKnown(levels, this.offsets[index]!, this.offsets[index + 1]!),
      );
    }
    return this.#laidOut(variable, unit, this.#profileTarget(), Float64Array, false, !mayBeAnything);
  }

  /** The same, also of a variable that lies along stations to which the profiles point. */
  perProfileOrStation(variable: Variable, unit: Unit, dataset: Dataset): Float64Array | null {
    const direct = this.perProfile(variable, unit);
    if (direct !== null || variable.dimensions.length !== 1) return direct;
    const places = this.indexAlong(variable.dimensions[0]!, dataset);
    if (places === null) return null;
    const values = this.#decoded(variable, unit, 0, variable.shape[0]!, Float64Array, true);
    return Float64Array.from(places, (place) => values[place] ?? NaN);
  }

  /** Two values for each profile, of a variable whose last dimension is a pair, as bounds of time are. */
  pairPerProfile(variable: Variable): [number, number][] | null {
    if (variable.shape.at(-1) !== 2) return null;
    const { names, shape } = this.#profileTarget();
    const target = { names: [...names, variable.dimensions.at(-1)!], shape: [...shape, 2] };
    const flat = this.#laidOut(variable, { scale: 1, offset: 0 }, target, Float64Array, false, false);
    if (flat === null) return null;
    return Array.from({ length: this.profileCount }, (_, index) => [flat[2 * index]!, flat[2 * index + 1]!]);
  }

  /**
   * For each profile its index along another dimension: one of the profiles' own, or one that a variable points along
   * (`instance_dimension`, CF-1.11 section 9.3), as from profiles to stations.
   */
  indexAlong(dimension: string, dataset: Dataset): Float64Array | null {
    const position = this.#layout.profileDimensions.indexOf(dimension);
    if (position < 0) {
      const pointer = [...dataset.variables.values()].find(
        (variable) =>
          variable.type !== 'text' &&
          textOf(variable.attributes, 'instance_dimension') === dimension &&
          variable.dimensions.every((name) => this.#layout.profileDimensions.includes(name)),
      );
      return pointer === undefined ? null : this.perProfile(pointer, { scale: 1, offset: 0 });
    }
    const target = this.#profileTarget();
    const out = new Float64Array(this.profileCount);
    const first = position === 0 ? this.#from : 0;
    const indices = Float64Array.from({ length: target.shape[position]! }, (_, index) => first + index);
    layOutInto(out, indices, { at: 0, by: target.shape.map((_, axis) => (axis === position ? 1 : 0)) }, target.shape);
    return out;
  }

  #levels<T extends Float32Array | Float64Array>(
    variable: Variable,
    unit: Unit,
    downward: boolean,
    make: new (length: number) => T,
    wary: boolean,
  ): T | null {
    const { ragged, levelDimension, levelCount } = this.#layout;
    if (ragged === null) {
      const target = this.#profileTarget();
      if (levelDimension !== null) {
        target.names.push(levelDimension);
        target.shape.push(levelCount);
      }
      return this.#laidOut(variable, unit, target, make, downward, wary);
    }
    if (variable.dimensions.length !== 1 || variable.dimensions[0] !== levelDimension) return null;
    const decoded = this.#decoded(variable, unit, 0, variable.shape[0]!, make, wary);
    const { order, offsets } = ragged;
    const count = offsets.at(-1)!;
    if (order === null) return decoded.subarray(0, count) as T;
    const out = new make(count);
    for (let k = 0; k < count; k++) out[k] = decoded[order[k]!]!;
    return out;
  }

  #profileTarget(): { names: string[]; shape: number[] } {
    const { profileDimensions, profileShape } = this.#layout;
    return {
      names: [...profileDimensions],
      shape: profileShape.length === 0 ? [] : [this.#rows, ...profileShape.slice(1)],
    };
  }

  #laidOut<T extends Float32Array | Float64Array>(
    variable: Variable,
    unit: Unit,
    target: { names: readonly string[]; shape: readonly number[] },
    make: new (length: number) => T,
    downward: boolean,
    wary: boolean,
  ): T | null {
    const rowDimension = this.#layout.profileDimensions[0];
    const byRows = rowDimension !== undefined && variable.dimensions[0] === rowDimension;
    const shape = byRows ? [this.#rows, ...variable.shape.slice(1)] : variable.shape;
    const strides = stridesFor(variable.dimensions, shape, target.names);
    if (strides === null) return null;
    const decoded = byRows
      ? this.#decoded(variable, unit, this.#from, this.#from + this.#rows, make, wary)
      : this.#decoded(variable, unit, 0, variable.shape[0] ?? 1, make, wary);
    const size = sizeOf(target.shape);
    if (!downward && decoded.length === size && isNatural(strides.by, target.shape)) return decoded;
    // Rows of a variable that does not have them outermost are reached by stepping over those before.
    let at = byRows || strides.by.length === 0 ? 0 : this.#from * (rowDimension === undefined ? 0 : strides.by[0]!);
    const by = [...strides.by];
    if (downward) {
      const last = by.length - 1;
      at += (target.shape[last]! - 1) * by[last]!;
      by[last] = -by[last]!;
    }
    const out = new make(size);
    layOutInto(out, decoded, { at, by }, target.shape);
    return out;
  }

  #decoded<T extends Float32Array | Float64Array>(
    variable: Variable,
    unit: Unit,
    from: number,
    to: number,
    make: new (length: number) => T,
    wary: boolean,
  ): T {
    const raw = asMeant(variable.numbers(from, to), variable);
    const out = raw instanceof make ? raw : new make(raw.length);
    const undeclared = wary ? new Set<number>() : null;
    decodeInto(out, raw, codingOf(variable), unit, undeclared);
    if (undeclared !== null && undeclared.size > 0) this.undeclared.set(variable.name, undeclared);
    return out;
  }
}

/** Whether laying out by these strides would change nothing. */
function isNatural(by: readonly number[], shape: readonly number[]): boolean {
  let stride = 1;
  for (let axis = shape.length - 1; axis >= 0; axis--) {
    if (by[axis] !== stride && shape[axis] !== 1) return false;
    stride *= shape[axis]!;
  }
  return true;
}

function firstKnown(values: Float64Array, start: number, end: number): number {
  for (let k = start; k < end; k++) if (!Number.isNaN(values[k]!)) return values[k]!;
  return NaN;
}

/**
 * The pieces a file is read in, so that a long one neither fills the memory nor delays a cancel.
 * @param divisible whether the rows of the winds can be read by themselves
 */
export function* piecesOf(layout: Layout, divisible: boolean): Generator<Piece> {
  const rows = layout.profileShape[0] ?? 1;
  if (layout.ragged !== null || !divisible) {
    yield new Piece(layout, 0, rows);
    return;
  }
  const profilesPerRow = sizeOf(layout.profileShape.slice(1));
  const byLevels = PIECE_LEVELS / Math.max(1, profilesPerRow * layout.levelCount);
  const step = Math.max(1, Math.floor(Math.min(byLevels, PIECE_PROFILES / Math.max(1, profilesPerRow))));
  for (let from = 0; from < rows; from += step) yield new Piece(layout, from, Math.min(rows, from + step));
}
