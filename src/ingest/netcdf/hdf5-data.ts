// The values of one variable of a netCDF-4 file.

import type * as H5 from 'h5wasm';
import { DuskveerError } from '../../air/index.ts';
import { sizeOf, type AttributeValue, type RawNumbers, type StorageType, type Variable } from './dataset.ts';
import { mendText } from './mend-text.ts';

/** Bytes of values read at once: packed data can stand for far more than the file's own length. */
const MOST_BYTES = 2 ** 30;

/** A damaged file made the library run out of its own memory's bounds: from then on it may misread sound files, too. */
let shaken = false;

/** The library's complaint in the house's form; errors already in that form pass. */
export function damagedHdf5(source: string, key: string | undefined, cause: unknown, byte?: number): DuskveerError {
  if (cause instanceof DuskveerError) return cause;
  if (cause instanceof Error && cause.name === 'RuntimeError') shaken = true;
  return new DuskveerError(
    {
      code: 'ingest/netcdf-damaged',
      what: key === undefined ? 'The netCDF-4 (HDF5) file is damaged.' : `The values of ${key} are damaged.`,
      mend: shaken
        ? 'A damaged file has upset the part that reads netCDF-4: reload the page or start the command anew, and open this file again.'
        : 'Fetch the file again; if it stays so, ask its provider for an intact copy.',
      where: { source, ...(key === undefined ? {} : { key }), ...(byte === undefined ? {} : { byte }) },
    },
    { cause },
  );
}

export class Hdf5Data implements Variable {
  readonly name: string;
  readonly #source: string;
  readonly #data: H5.Dataset;
  readonly #letters: number;

  /** @param isLetters text stored a letter a value, the last dimension counting letters */
  constructor(
    source: string,
    data: H5.Dataset,
    readonly type: StorageType,
    readonly dimensions: readonly string[],
    readonly shape: readonly number[],
    readonly attributes: ReadonlyMap<string, AttributeValue>,
    isLetters: boolean,
  ) {
    this.name = data.path.slice(data.path.lastIndexOf('/') + 1);
    this.#source = source;
    this.#data = data;
    this.#letters = isLetters ? (data.shape?.at(-1) ?? 1) : 0;
  }

  numbers(from = 0, to = this.shape[0] ?? 1): RawNumbers {
    const rows = to - from;
    const count = this.shape.length === 0 ? 1 : rows * sizeOf(this.shape.slice(1));
    this.#checkSize(count);
    const whole = this.shape.length === 0 || (from === 0 && to === this.shape[0]);
    const value = this.#read(() => (whole ? this.#data.value : this.#data.slice([[from, to]])));
    const numbers = plainNumbers(value);
    if (numbers?.length !== count) throw damagedHdf5(this.#source, this.name, undefined);
    return numbers;
  }

  texts(): string[] {
    this.#checkSize(sizeOf(this.shape) * Math.max(1, this.#letters));
    const value = this.#read(() => this.#data.value);
    const texts = (Array.isArray(value) ? value : [value]).map((text) => (typeof text === 'string' ? text : ''));
    if (this.#letters === 0) return texts.map((text) => mendText(text).trim());
    return Array.from({ length: Math.floor(texts.length / this.#letters) }, (_, k) =>
      mendText(texts.slice(k * this.#letters, (k + 1) * this.#letters).join('')),
    );
  }

  #checkSize(count: number): void {
    if (count * this.#data.metadata.size <= MOST_BYTES) return;
    throw new DuskveerError({
      code: 'ingest/too-large',
      what: `The variable ${this.name} would fill more than ${MOST_BYTES / 2 ** 20} MiB at once.`,
      mend: 'Split the file by day or month.',
      where: { source: this.#source, key: this.name },
    });
  }

  #read<T>(read: () => T): T {
    try {
      return read();
    } catch (cause) {
      throw damagedHdf5(this.#source, this.name, cause);
    }
  }
}

function plainNumbers(value: unknown): RawNumbers | null {
  if (typeof value === 'number' || typeof value === 'bigint') return Float64Array.of(Number(value));
  if (value instanceof BigInt64Array || value instanceof BigUint64Array) {
    return Float64Array.from(value as BigInt64Array, Number);
  }
  return ArrayBuffer.isView(value) && !(value instanceof DataView) ? (value as RawNumbers) : null;
}
