// Writes netCDF classic (CDF-1): header, then each variable in turn, big-endian, padded to four bytes.

export type NetcdfAttribute = string | number | { type: 'byte'; values: readonly number[] };

export interface NetcdfVariable {
  readonly name: string;
  readonly dimensions: readonly string[];
  readonly type: 'byte' | 'char' | 'float' | 'double';
  /** A bare number takes the variable's own type. */
  readonly attributes: Readonly<Record<string, NetcdfAttribute>>;
  readonly values: readonly number[] | string;
}

export interface NetcdfContent {
  readonly dimensions: Readonly<Record<string, number>>;
  readonly attributes: Readonly<Record<string, string>>;
  readonly variables: readonly NetcdfVariable[];
}

const CODES = { byte: 1, char: 2, float: 5, double: 6 } as const;
const SIZES = { byte: 1, char: 1, float: 4, double: 8 } as const;
const DIMENSION = 10;
const VARIABLE = 11;
const ATTRIBUTE = 12;

type Type = keyof typeof CODES;

class Bytes {
  readonly pieces: Uint8Array[] = [];
  length = 0;

  put(piece: Uint8Array): void {
    const padded = new Uint8Array(Math.ceil(piece.length / 4) * 4);
    padded.set(piece);
    this.pieces.push(padded);
    this.length += padded.length;
  }

  int(value: number): void {
    const piece = new Uint8Array(4);
    new DataView(piece.buffer).setInt32(0, value);
    this.put(piece);
  }

  text(value: string): void {
    const bytes = new TextEncoder().encode(value);
    this.int(bytes.length);
    this.put(bytes);
  }

  list(tag: number, count: number): void {
    this.int(count === 0 ? 0 : tag);
    this.int(count);
  }
}

export function classicNetcdf(content: NetcdfContent): Uint8Array {
  const bodies = content.variables.map(({ type, values }) => encoded(type, values));
  // Offsets do not change the header's length, so it is laid out once to measure it.
  const headerLength = header(content, bodies, 0).length;
  const whole = header(content, bodies, headerLength);
  for (const body of bodies) whole.put(body);
  const out = new Uint8Array(whole.length);
  let at = 0;
  for (const piece of whole.pieces) {
    out.set(piece, at);
    at += piece.length;
  }
  return out;
}

function header(content: NetcdfContent, bodies: readonly Uint8Array[], firstOffset: number): Bytes {
  const bytes = new Bytes();
  bytes.put(Uint8Array.of(0x43, 0x44, 0x46, 1));
  bytes.int(0);
  const names = Object.keys(content.dimensions);
  bytes.list(DIMENSION, names.length);
  for (const name of names) {
    bytes.text(name);
    bytes.int(content.dimensions[name]!);
  }
  attributes(bytes, content.attributes, 'char');
  bytes.list(VARIABLE, content.variables.length);
  let offset = firstOffset;
  content.variables.forEach((variable, index) => {
    bytes.text(variable.name);
    bytes.int(variable.dimensions.length);
    for (const name of variable.dimensions) bytes.int(names.indexOf(name));
    attributes(bytes, variable.attributes, variable.type);
    const size = Math.ceil(bodies[index]!.length / 4) * 4;
    bytes.int(CODES[variable.type]);
    bytes.int(size);
    bytes.int(offset);
    offset += size;
  });
  return bytes;
}

function attributes(bytes: Bytes, given: Readonly<Record<string, NetcdfAttribute>>, ownType: Type): void {
  const entries = Object.entries(given);
  bytes.list(ATTRIBUTE, entries.length);
  for (const [name, value] of entries) {
    bytes.text(name);
    if (typeof value === 'string') {
      bytes.int(CODES.char);
      bytes.text(value);
      continue;
    }
    const { type, values } = typeof value === 'number' ? { type: ownType, values: [value] } : value;
    bytes.int(CODES[type]);
    bytes.int(values.length);
    bytes.put(encoded(type, values));
  }
}

function encoded(type: Type, values: readonly number[] | string): Uint8Array {
  if (typeof values === 'string') return new TextEncoder().encode(values);
  const bytes = new Uint8Array(values.length * SIZES[type]);
  const view = new DataView(bytes.buffer);
  values.forEach((value, k) => {
    if (type === 'float') view.setFloat32(4 * k, value);
    else if (type === 'double') view.setFloat64(8 * k, value);
    else view.setInt8(k, value);
  });
  return bytes;
}
