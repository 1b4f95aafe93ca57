// netCDF classic files (CDF-1, CDF-2, CDF-5) as a Dataset. No data are read until asked for.

import { DuskveerError, type Problem } from '../../air/index.ts';
import { ownNumbers } from './big-endian.ts';
import { BYTES_EACH, readHeader, type ClassicHeader, type ClassicVariable } from './classic-header.ts';
import { decodeText } from './cursor.ts';
import { sizeOf, type Dataset, type RawNumbers, type Variable } from './dataset.ts';

/** Where the records lie. */
interface Records {
  readonly count: number;
  /** Bytes from one record to the next. */
  readonly stride: number;
}

/**
 * Opens a classic file.
 * @throws DuskveerError `ingest/netcdf-damaged` when the header makes no sense
 */
export function openClassic(bytes: Uint8Array, source: string): Dataset {
  const header = readHeader(bytes, source);
  const problems: Problem[] = [];
  const records = recordsOf(header, bytes.length, source, problems);
  const lengths = header.dimensions.map(({ length }, id) => (id === header.recordDimension ? records.count : length));
  const variables = header.variables.map((variable): [string, Variable] => [
    variable.name,
    new ClassicData(bytes, source, variable, header, lengths, records),
  ]);
  return {
    source,
    dimensions: new Map(header.dimensions.map(({ name }, id) => [name, lengths[id]!])),
    attributes: header.attributes,
    variables: new Map(variables),
    groups: [],
    problems,
  };
}

/** How the records lie, and how many the file really holds: a count left open or too high is no reason to give up. */
function recordsOf(header: ClassicHeader, fileLength: number, source: string, problems: Problem[]): Records {
  const recorded = header.variables.filter((variable) => variable.dimensionIds[0] === header.recordDimension);
  if (header.recordDimension < 0 || recorded.length === 0) return { count: 0, stride: 0 };
  const sizes = recorded.map((variable) => slabBytes(variable, header));
  // Each variable's part of a record is padded to four bytes, but a variable alone in its records is not.
  const stride = sizes.length === 1 ? sizes[0]! : sizes.reduce((sum, size) => sum + Math.ceil(size / 4) * 4, 0);
  const last = Math.max(...recorded.map((variable, index) => variable.begin + sizes[index]!));
  const held = last > fileLength || stride === 0 ? 0 : Math.floor((fileLength - last) / stride) + 1;
  const announced = header.recordCount ?? held;
  if (announced > held) {
    problems.push({
      code: 'ingest/netcdf-truncated',
      what: `The file announces ${announced} records but ends after ${held}.`,
      mend: 'Fetch the file again; the records before its end were read.',
      where: { source, byte: fileLength },
    });
  }
  return { count: Math.min(announced, held), stride };
}

/** Bytes of a variable, or of one record of it. */
function slabBytes(variable: ClassicVariable, header: ClassicHeader): number {
  const lengths = variable.dimensionIds
    .filter((id, position) => position > 0 || id !== header.recordDimension)
    .map((id) => header.dimensions[id]!.length);
  return sizeOf(lengths) * BYTES_EACH[variable.type];
}

class ClassicData implements Variable {
  readonly name;
  readonly type;
  readonly attributes;
  readonly dimensions: readonly string[];
  readonly shape: readonly number[];
  readonly #bytes: Uint8Array;
  readonly #source: string;
  readonly #begin: number;
  readonly #stride: number;
  /** Bytes of one row of the outermost dimension. */
  readonly #rowBytes: number;
  /** Rows; 1 for a single value. */
  readonly #rows: number;
  readonly #letters: number;

  constructor(
    bytes: Uint8Array,
    source: string,
    variable: ClassicVariable,
    header: ClassicHeader,
    lengths: readonly number[],
    records: Records,
  ) {
    this.name = variable.name;
    this.type = variable.type;
    this.attributes = variable.attributes;
    this.#bytes = bytes;
    this.#source = source;
    this.#begin = variable.begin;
    const shape = variable.dimensionIds.map((id) => lengths[id]!);
    const dimensions = variable.dimensionIds.map((id) => header.dimensions[id]!.name);
    this.#rows = shape[0] ?? 1;
    this.#rowBytes = sizeOf(shape.slice(1)) * BYTES_EACH[variable.type];
    const recorded = variable.dimensionIds[0] === header.recordDimension && variable.dimensionIds.length > 0;
    this.#stride = recorded ? records.stride : this.#rowBytes;
    this.#letters = variable.type === 'text' ? (shape.at(-1) ?? 1) : 0;
    this.shape = variable.type === 'text' ? shape.slice(0, -1) : shape;
    this.dimensions = variable.type === 'text' ? dimensions.slice(0, -1) : dimensions;
  }

  numbers(from = 0, to = this.#rows): RawNumbers {
    return ownNumbers(this.#slab(from, to), this.type);
  }

  texts(): string[] {
    const slab = this.#slab(0, this.#rows);
    return Array.from({ length: this.#letters === 0 ? 0 : slab.length / this.#letters }, (_, k) =>
      decodeText(slab.subarray(k * this.#letters, (k + 1) * this.#letters)),
    );
  }

  /** A copy of the bytes of rows `from` up to `to`, without what lies between records. */
  #slab(from: number, to: number): Uint8Array {
    const rows = to - from;
    const start = this.#begin + from * this.#stride;
    const end = rows === 0 ? start : start + (rows - 1) * this.#stride + this.#rowBytes;
    if (!(end <= this.#bytes.length)) {
      throw new DuskveerError({
        code: 'ingest/netcdf-truncated',
        what: `The values of ${this.name} lie beyond the end of the file.`,
        mend: 'Fetch the file again; if it stays so, ask its provider for an intact copy.',
        where: { source: this.#source, key: this.name, byte: this.#bytes.length },
      });
    }
    if (this.#stride === this.#rowBytes) return new Uint8Array(this.#bytes.subarray(start, end));
    const slab = new Uint8Array(rows * this.#rowBytes);
    for (let row = 0; row < rows; row++) {
      const source = start + row * this.#stride;
      const target = row * this.#rowBytes;
      if (this.#rowBytes > 32) slab.set(this.#bytes.subarray(source, source + this.#rowBytes), target);
      else for (let k = 0; k < this.#rowBytes; k++) slab[target + k] = this.#bytes[source + k]!;
    }
    return slab;
  }
}
