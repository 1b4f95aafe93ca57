// What a netCDF file holds, whatever its coding: dimensions, attributes and variables, read piece by piece.

import type { Problem } from '../../air/index.ts';

/** Numbers as the file stores them; 64-bit integers come as Float64Array. */
export type RawNumbers =
  Int8Array | Uint8Array | Int16Array | Uint16Array | Int32Array | Uint32Array | Float32Array | Float64Array;

/** How a variable's values are stored; `text` counts characters or strings alike. */
export type StorageType = 'i1' | 'u1' | 'i2' | 'u2' | 'i4' | 'u4' | 'i8' | 'u8' | 'f4' | 'f8' | 'text';

export type AttributeValue = string | readonly number[];
export type Attributes = ReadonlyMap<string, AttributeValue>;

export interface Variable {
  /** Without the names of its groups. */
  readonly name: string;
  readonly type: StorageType;
  /** Names of its dimensions, outermost first; of a text variable without the one that counts characters. */
  readonly dimensions: readonly string[];
  /** Lengths of those dimensions; empty for a single value. */
  readonly shape: readonly number[];
  readonly attributes: Attributes;
  /**
   * Numbers as stored, flat, outermost dimension first.
   * @param from first row of the outermost dimension, 0 when left out
   * @param to row after the last, all rows when left out
   * @throws DuskveerError when the data are damaged or end too soon
   */
  numbers(from?: number, to?: number): RawNumbers;
  /** The values of a text variable, flat. @throws DuskveerError as `numbers` */
  texts(): string[];
}

export interface Dataset {
  /** Name of the file. */
  readonly source: string;
  readonly dimensions: ReadonlyMap<string, number>;
  readonly attributes: Attributes;
  readonly variables: ReadonlyMap<string, Variable>;
  /** Groups of a netCDF-4 file; each sees its own variables and, beneath them, those of its parent. */
  readonly groups: readonly Dataset[];
  /** What was found wrong while opening. */
  readonly problems: readonly Problem[];
}

/** An attribute as text, trimmed; empty when absent. */
export function textOf(attributes: Attributes, name: string): string {
  const value = attributes.get(name);
  if (value === undefined) return '';
  return typeof value === 'string' ? value.trim() : value.join(' ');
}

/** An attribute as numbers, also where a careless writer stored them as text; empty when absent. */
export function numbersOf(attributes: Attributes, name: string): readonly number[] {
  const value = attributes.get(name);
  if (value === undefined) return [];
  if (typeof value !== 'string') return value;
  return value
    .split(/[\s,]+/u)
    .filter((part) => part !== '')
    .map(Number)
    .filter((number) => !Number.isNaN(number));
}

/** How many values a shape holds. */
export function sizeOf(shape: readonly number[]): number {
  return shape.reduce((product, length) => product * length, 1);
}
