// Bytes of a netCDF classic file: CDF-1, or CDF-2 where a place in the file needs more than 31 bits (netCDF User's Guide,
// appendix B). Fixed dimensions only: what is written is known to its end.

export type OutAttribute = string | Int8Array | Int32Array | Float32Array | Float64Array;

export interface OutVariable {
  readonly name: string;
  /** Names of its dimensions, outermost first. */
  readonly dimensions: readonly string[];
  readonly attributes: Readonly<Record<string, OutAttribute>>;
  /** Its values, flat; bytes of type Uint8Array are text. */
  readonly data: Uint8Array | Int8Array | Int32Array | Float32Array | Float64Array;
}

export interface OutFile {
  readonly dimensions: Readonly<Record<string, number>>;
  readonly attributes: Readonly<Record<string, OutAttribute>>;
  readonly variables: readonly OutVariable[];
}

/** The file's bytes. */
export function encodeClassic(file: OutFile): Uint8Array {
  const sizes = file.variables.map(({ data }) => padded(data.byteLength));
  const body = sizes.reduce((sum, size) => sum + size, 0);
  const version = body > 2 ** 31 - 2 ** 20 ? 2 : 1;
  let at = headerOf(file, version, sizes, []).length;
  const begins = sizes.map((size) => (at += size) - size);
  const out = new Uint8Array(at);
  out.set(headerOf(file, version, sizes, begins));
  file.variables.forEach(({ data }, k) => putInto(out, begins[k]!, data));
  return out;
}

function padded(length: number): number {
  return Math.ceil(length / 4) * 4;
}

function headerOf(file: OutFile, version: 1 | 2, sizes: readonly number[], begins: readonly number[]): Uint8Array {
  const bytes: number[] = [0x43, 0x44, 0x46, version];
  const word = (x: number): number => bytes.push((x >>> 24) & 255, (x >>> 16) & 255, (x >>> 8) & 255, x & 255);
  const text = (value: string): void => {
    const utf8 = new TextEncoder().encode(value);
    word(utf8.length);
    for (const byte of utf8) bytes.push(byte);
    while (bytes.length % 4 !== 0) bytes.push(0);
  };
  const list = <T>(tag: number, entries: readonly T[], write: (entry: T, index: number) => void): void => {
    word(entries.length === 0 ? 0 : tag);
    word(entries.length);
    entries.forEach(write);
  };
  const attributes = (of: Readonly<Record<string, OutAttribute>>): void =>
    list(0x0c, Object.entries(of), ([name, value]) => {
      text(name);
      word(typeof value === 'string' ? 2 : codeOf(value));
      if (typeof value === 'string') {
        text(value);
        return;
      }
      word(value.length);
      const encoded = new Uint8Array(padded(value.byteLength));
      putInto(encoded, 0, value);
      for (const byte of encoded) bytes.push(byte);
    });

  word(0);
  const names = Object.keys(file.dimensions);
  list(0x0a, names, (name) => {
    text(name);
    word(file.dimensions[name]!);
  });
  attributes(file.attributes);
  list(0x0b, file.variables, (variable, index) => {
    text(variable.name);
    word(variable.dimensions.length);
    for (const dimension of variable.dimensions) word(names.indexOf(dimension));
    attributes(variable.attributes);
    word(codeOf(variable.data));
    // A size beyond 32 bits is written as all ones; readers work it out themselves.
    word(Math.min(sizes[index]!, 2 ** 32 - 1));
    const begin = begins[index] ?? 0;
    if (version === 2) word(Math.floor(begin / 2 ** 32));
    word(begin % 2 ** 32);
  });
  return Uint8Array.from(bytes);
}

/** Number of a type in the header. */
function codeOf(values: OutVariable['data']): number {
  if (values instanceof Uint8Array) return 2;
  if (values instanceof Int8Array) return 1;
  if (values instanceof Int32Array) return 4;
  return values instanceof Float32Array ? 5 : 6;
}

/** Writes values big-endian. */
function putInto(out: Uint8Array, at: number, values: OutVariable['data']): void {
  const view = new DataView(out.buffer, out.byteOffset + at, values.byteLength);
  if (values instanceof Float32Array) for (let k = 0; k < values.length; k++) view.setFloat32(4 * k, values[k]!);
  else if (values instanceof Float64Array) for (let k = 0; k < values.length; k++) view.setFloat64(8 * k, values[k]!);
  else if (values instanceof Int32Array) for (let k = 0; k < values.length; k++) view.setInt32(4 * k, values[k]!);
  else for (let k = 0; k < values.length; k++) view.setUint8(k, values[k]!);
}
