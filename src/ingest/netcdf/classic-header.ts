// The header of a netCDF classic file: CDF-1, CDF-2 (64-bit offsets) and CDF-5 (64-bit data), by the format
// specification in the netCDF User's Guide, appendix B ("File Format Specifications").

import type { AttributeValue, StorageType } from './dataset.ts';
import { Cursor, decodeText } from './cursor.ts';
import { decodeNumbers } from './big-endian.ts';

export interface ClassicVariable {
  readonly name: string;
  readonly type: StorageType;
  /** Indices into the header's dimensions. */
  readonly dimensionIds: readonly number[];
  readonly attributes: ReadonlyMap<string, AttributeValue>;
  /** First byte of its data; of its first record when it has records. */
  readonly begin: number;
}

export interface ClassicHeader {
  readonly dimensions: readonly { readonly name: string; readonly length: number }[];
  /** Index of the dimension that grows with records, -1 without. */
  readonly recordDimension: number;
  /** Records announced; null when the writer was still at work and left the count open. */
  readonly recordCount: number | null;
  readonly attributes: ReadonlyMap<string, AttributeValue>;
  readonly variables: readonly ClassicVariable[];
}

const DIMENSIONS = 0x0a;
const VARIABLES = 0x0b;
const ATTRIBUTES = 0x0c;

/** Types by their number in the header, 1 to 11. */
const TYPES: readonly (StorageType | undefined)[] = [
  undefined,
  'i1',
  'text',
  'i2',
  'i4',
  'f4',
  'f8',
  'u1',
  'u2',
  'u4',
  'i8',
  'u8',
];

/** Bytes of one value. */
export const BYTES_EACH: Readonly<Record<StorageType, number>> = {
  i1: 1,
  u1: 1,
  text: 1,
  i2: 2,
  u2: 2,
  i4: 4,
  u4: 4,
  f4: 4,
  i8: 8,
  u8: 8,
  f8: 8,
};

/** More dimensions than any variable has in practice. */
const MOST_DIMENSIONS = 64;

/** Whether the bytes begin as a netCDF classic file does. */
export function isClassic(head: Uint8Array): boolean {
  return head[0] === 0x43 && head[1] === 0x44 && head[2] === 0x46 && [1, 2, 5].includes(head[3]!);
}

/**
 * Reads the header.
 * @throws DuskveerError `ingest/netcdf-damaged` with the byte where it stops making sense
 */
export function readHeader(bytes: Uint8Array, source: string): ClassicHeader {
  if (!isClassic(bytes)) new Cursor(bytes, source).fail('The file does not begin as netCDF classic does.');
  return new HeaderReader(new Cursor(bytes, source, 4), bytes[3]!).read();
}

class HeaderReader {
  readonly #cursor: Cursor;
  readonly #version: number;

  constructor(cursor: Cursor, version: number) {
    this.#cursor = cursor;
    this.#version = version;
  }

  read(): ClassicHeader {
    const open = this.#version === 5 ? 2 ** 64 : 2 ** 32 - 1;
    const recordCount = this.#count();
    const dimensions = this.#list(DIMENSIONS, 8, 'dimensions', () => ({ name: this.#name(), length: this.#count() }));
    const attributes = this.#attributes();
    const variables = this.#list(VARIABLES, 28, 'variables', () => this.#variable(dimensions.length));
    return {
      dimensions,
      recordDimension: dimensions.findIndex(({ length }) => length === 0),
      recordCount: recordCount >= open ? null : recordCount,
      attributes,
      variables,
    };
  }

  /** A count: four bytes, eight in CDF-5. */
  #count(): number {
    return this.#version === 5 ? this.#cursor.uint64() : this.#cursor.uint32();
  }

  #list<T>(tag: number, leastBytesEach: number, ofWhat: string, entry: () => T): T[] {
    const found = this.#cursor.uint32();
    const count = this.#count();
    if (found === 0 && count === 0) return [];
    if (found !== tag) this.#cursor.fail(`The header has no list of ${ofWhat} where one belongs.`);
    this.#cursor.checkCount(count, leastBytesEach, ofWhat);
    return Array.from({ length: count }, entry);
  }

  #name(): string {
    const length = this.#cursor.checkCount(this.#count(), 1, 'letters in a name');
    return decodeText(this.#padded(length));
  }

  #padded(length: number): Uint8Array {
    const taken = this.#cursor.take(length);
    // Padding may be missing at the very end of a file that has no data.
    this.#cursor.take(Math.min(-length & 3, this.#cursor.bytes.length - this.#cursor.at));
    return taken;
  }

  #type(): StorageType {
    const type = TYPES[this.#cursor.uint32()];
    return type ?? this.#cursor.fail('The header names a kind of number that does not exist.');
  }

  #attributes(): Map<string, AttributeValue> {
    const entries = this.#list(ATTRIBUTES, 12, 'attributes', (): [string, AttributeValue] => {
      const name = this.#name();
      const type = this.#type();
      const count = this.#cursor.checkCount(this.#count(), BYTES_EACH[type], 'values of an attribute');
      const bytes = this.#padded(count * BYTES_EACH[type]);
      return [name, type === 'text' ? decodeText(bytes) : Array.from(decodeNumbers(bytes, type))];
    });
    return new Map(entries);
  }

  #variable(dimensionCount: number): ClassicVariable {
    const name = this.#name();
    const rank = this.#cursor.checkCount(this.#count(), 4, 'dimensions of a variable');
    if (rank > MOST_DIMENSIONS) this.#cursor.fail(`The variable ${name} is given ${rank} dimensions.`);
    const dimensionIds = Array.from({ length: rank }, () => {
      const id = this.#count();
      if (id >= dimensionCount) this.#cursor.fail(`The variable ${name} uses a dimension that does not exist.`);
      return id;
    });
    const attributes = this.#attributes();
    const type = this.#type();
    this.#count(); // The stated size is worked out anew: it overflows in large files and is known to be wrong in some.
    const begin = this.#version === 1 ? this.#cursor.uint32() : this.#cursor.uint64();
    return { name, type, dimensionIds, attributes, begin };
  }
}
