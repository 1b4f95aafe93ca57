// Writes netCDF classic files for tests, well formed or odd: any version, record variables, any type.

export type Value = string | number[] | Float32Array;
export type TypeName = 'i1' | 'text' | 'i2' | 'i4' | 'f4' | 'f8' | 'u1' | 'u2' | 'u4' | 'i8' | 'u8';

export interface FileParts {
  version?: 1 | 2 | 5;
  /** Length null: the record dimension. */
  dimensions?: Record<string, number | null>;
  records?: number;
  /** Leaves the count of records open, as a writer still at work does. */
  streaming?: boolean;
  attributes?: Record<string, Value>;
  variables?: Record<string, VariableParts>;
}

export interface VariableParts {
  type: TypeName;
  dimensions?: string[];
  attributes?: Record<string, Value>;
  data: ArrayLike<number> | string;
}

const CODES: Record<TypeName, number> = {
  i1: 1,
  text: 2,
  i2: 3,
  i4: 4,
  f4: 5,
  f8: 6,
  u1: 7,
  u2: 8,
  u4: 9,
  i8: 10,
  u8: 11,
};
const SIZES: Record<TypeName, number> = {
  i1: 1,
  text: 1,
  i2: 2,
  i4: 4,
  f4: 4,
  f8: 8,
  u1: 1,
  u2: 2,
  u4: 4,
  i8: 8,
  u8: 8,
};

export function buildClassic(parts: FileParts): Uint8Array {
  const { version = 1, dimensions = {}, attributes = {}, variables = {}, records = 0, streaming = false } = parts;
  const names = Object.keys(dimensions);
  const isRecord = (name: string): boolean => dimensions[name] === null;
  const bytes: number[] = [0x43, 0x44, 0x46, version];
  const u32 = (x: number): number => bytes.push((x >>> 24) & 255, (x >>> 16) & 255, (x >>> 8) & 255, x & 255);
  const u64 = (x: number): void => {
    u32(Math.floor(x / 2 ** 32));
    u32(x % 2 ** 32);
  };
  const count = (x: number): void => {
    if (version === 5) u64(x);
    else u32(x);
  };
  const padded = (list: Iterable<number>): void => {
    for (const byte of list) bytes.push(byte);
    while (bytes.length % 4 !== 0) bytes.push(0);
  };
  const name = (text: string): void => {
    const utf8 = new TextEncoder().encode(text);
    count(utf8.length);
    padded(utf8);
  };
  const attributeList = (list: Record<string, Value>): void => {
    const entries = Object.entries(list);
    u32(entries.length === 0 ? 0 : 0x0c);
    count(entries.length);
    for (const [key, value] of entries) {
      name(key);
      if (typeof value === 'string') {
        u32(2);
        name(value);
      } else {
        const type = value instanceof Float32Array ? 'f4' : 'f8';
        u32(CODES[type]);
        count(value.length);
        padded(encode(value, type));
      }
    }
  };

  if (streaming) bytes.push(...new Array<number>(version === 5 ? 8 : 4).fill(255));
  else count(records);
  u32(names.length === 0 ? 0 : 0x0a);
  count(names.length);
  for (const key of names) {
    name(key);
    count(dimensions[key] ?? 0);
  }
  attributeList(attributes);
  const entries = Object.entries(variables);
  u32(entries.length === 0 ? 0 : 0x0b);
  count(entries.length);
  const begins: number[] = [];
  for (const [key, variable] of entries) {
    name(key);
    const own = variable.dimensions ?? [];
    count(own.length);
    for (const dimension of own) count(names.indexOf(dimension));
    attributeList(variable.attributes ?? {});
    u32(CODES[variable.type]);
    const values =
      own[0] !== undefined && isRecord(own[0]) ? variable.data.length / Math.max(1, records) : variable.data.length;
    count(Math.ceil((values * SIZES[variable.type]) / 4) * 4);
    begins.push(bytes.length);
    if (version === 1) u32(0);
    else u64(0);
  }
  const setBegin = (index: number): void => {
    const at = bytes.length;
    const place = begins[index]! + (version === 1 ? 0 : 4);
    [at >>> 24, at >>> 16, at >>> 8, at].forEach((byte, k) => (bytes[place + k] = byte & 255));
  };

  const recorded = entries.filter(
    ([, variable]) => variable.dimensions?.[0] !== undefined && isRecord(variable.dimensions[0]),
  );
  entries.forEach(([, variable], index) => {
    if (recorded.some(([, other]) => other === variable)) return;
    setBegin(index);
    padded(encode(variable.data, variable.type));
  });
  for (let record = 0; record < records; record++) {
    for (const [, variable] of recorded) {
      if (record === 0) setBegin(entries.findIndex(([, other]) => other === variable));
      const each = variable.data.length / records;
      const slab = encode(variable.data, variable.type).slice(
        record * each * SIZES[variable.type],
        (record + 1) * each * SIZES[variable.type],
      );
      // A variable alone in its records is not padded.
      if (recorded.length === 1) for (const byte of slab) bytes.push(byte);
      else padded(slab);
    }
  }
  return Uint8Array.from(bytes);
}

function encode(values: ArrayLike<number> | string, type: TypeName): Uint8Array {
  if (typeof values === 'string') return new TextEncoder().encode(values);
  const view = new DataView(new ArrayBuffer(values.length * SIZES[type]));
  for (let k = 0; k < values.length; k++) {
    const at = k * SIZES[type];
    const value = values[k]!;
    switch (type) {
      case 'i1':
      case 'u1':
      case 'text':
        view.setUint8(at, value);
        break;
      case 'i2':
      case 'u2':
        view.setUint16(at, value);
        break;
      case 'i4':
      case 'u4':
        view.setUint32(at, value);
        break;
      case 'f4':
        view.setFloat32(at, value);
        break;
      case 'f8':
        view.setFloat64(at, value);
        break;
      case 'i8':
      case 'u8':
        view.setBigInt64(at, BigInt(value));
    }
  }
  return new Uint8Array(view.buffer);
}
