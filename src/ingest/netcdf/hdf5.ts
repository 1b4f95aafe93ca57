// netCDF-4 files, which are HDF5, as a Dataset. The HDF5 library is WebAssembly and loaded when the first such file comes.

import type * as H5 from 'h5wasm';
import { DuskveerError } from '../../air/index.ts';
import type { AttributeValue, Dataset, StorageType, Variable } from './dataset.ts';
import { damagedHdf5, Hdf5Data } from './hdf5-data.ts';
import { brokenHeap } from './hdf5-heaps.ts';
import { mendText } from './mend-text.ts';

/** An open file; `close` gives its memory back. */
export interface OpenHdf5 {
  readonly dataset: Dataset;
  readonly close: () => void;
}

interface Library {
  readonly h5: typeof H5;
  readonly module: Awaited<typeof H5.ready>;
}

/** A page's security policy can keep WebAssembly from ever getting ready, in silence: wait so long, ms, and no longer. */
const LOADING_LIMIT = 20_000;
/** Variables and groups that one file may hold: a damaged or spiteful one may link to itself without end. */
const MOST_OBJECTS = 5000;
const DEEPEST_GROUP = 4;

let loading: Promise<Library> | undefined;

async function loadLibrary(): Promise<Library> {
  const h5 = await import('h5wasm');
  let timer: ReturnType<typeof setTimeout> | undefined;
  const timeout = new Promise<never>((_, reject) => {
    timer = setTimeout(() => reject(new Error('not ready in time')), LOADING_LIMIT);
  });
  const module = await Promise.race([h5.ready, timeout]).finally(() => clearTimeout(timer));
  // Without this a damaged piece of data comes out as garbage instead of an error.
  module.activate_throwing_error_handler();
  return { h5, module };
}

let opened = 0;

/**
 * Opens a netCDF-4 file held in memory.
 * @throws DuskveerError `ingest/netcdf-damaged`, or `ingest/hdf5-not-available` when the library cannot start
 */
export async function openHdf5(bytes: Uint8Array, source: string): Promise<OpenHdf5> {
  const broken = brokenHeap(bytes);
  if (broken !== null) throw damagedHdf5(source, undefined, undefined, broken);
  loading ??= loadLibrary();
  const library = await loading.catch((cause: unknown) => {
    loading = undefined;
    throw new DuskveerError(
      {
        code: 'ingest/hdf5-not-available',
        what: 'The part that reads netCDF-4 (HDF5) files could not be started.',
        mend: "Reload the page; its server must allow 'wasm-unsafe-eval' for scripts.",
        where: { source },
      },
      { cause },
    );
  });
  const { h5, module } = library;
  const path = `/netcdf-${++opened}.nc`;
  const forget = (): void => {
    try {
      module.FS.unlink(path);
    } catch {
      // Never written, or gone already.
    }
  };
  try {
    module.FS.writeFile(path, bytes);
    const file = new h5.File(path, 'r');
    const close = (): void => {
      try {
        file.close();
      } catch {
        // A damaged file may refuse to close; its bytes go all the same.
      }
      forget();
    };
    try {
      const reader = new GroupReader(library, source);
      return { dataset: reader.dataset(file, 0, undefined), close };
    } catch (error) {
      close();
      throw error;
    }
  } catch (cause) {
    forget();
    throw damagedHdf5(source, undefined, cause);
  }
}

class GroupReader {
  readonly #library: Library;
  readonly #source: string;
  #objects = 0;

  constructor(library: Library, source: string) {
    this.#library = library;
    this.#source = source;
  }

  dataset(group: H5.Group, depth: number, parent: Dataset | undefined): Dataset {
    const { h5 } = this.#library;
    const datasets: H5.Dataset[] = [];
    const groups: H5.Group[] = [];
    for (const name of group.keys()) {
      if (++this.#objects > MOST_OBJECTS) throw new Error('too many objects');
      const entity = this.#attempt(() => group.get(name));
      if (entity instanceof h5.Dataset) datasets.push(entity);
      else if (entity instanceof h5.Group && depth < DEEPEST_GROUP) groups.push(entity);
    }
    const scales = new Map<number, string>();
    const dimensions = new Map(parent?.dimensions);
    for (const dataset of datasets) this.#noteScale(dataset, scales, dimensions);
    const variables = new Map(parent?.variables);
    for (const dataset of datasets) {
      const variable = this.#attempt(() => this.#variable(dataset, scales, dimensions));
      if (variable !== null && variable !== undefined) variables.set(variable.name, variable);
    }
    const made: { -readonly [K in keyof Dataset]: Dataset[K] } = {
      source: this.#source,
      dimensions,
      attributes: new Map([...(parent?.attributes ?? []), ...this.#attributes(group)]),
      variables,
      groups: [],
      problems: [],
    };
    made.groups = groups.map((child) => this.dataset(child, depth + 1, made));
    return made;
  }

  /** One object that cannot be read does not spoil the others. */
  #attempt<T>(read: () => T): T | undefined {
    try {
      return read();
    } catch {
      return undefined;
    }
  }

  #noteScale(dataset: H5.Dataset, scales: Map<number, string>, dimensions: Map<string, number>): void {
    const names = this.#attributeNames(dataset);
    if (!names.includes('CLASS')) return;
    const length = this.#attempt(() => dataset.shape?.[0]);
    if (length === undefined) return;
    const name = lastName(dataset.path);
    dimensions.set(name, length);
    const id = names.includes('_Netcdf4Dimid') ? this.#attribute(dataset, '_Netcdf4Dimid') : undefined;
    if (typeof id === 'object') scales.set(id[0]!, name);
  }

  #variable(
    dataset: H5.Dataset,
    scales: ReadonlyMap<number, string>,
    dimensions: Map<string, number>,
  ): Variable | null {
    const { metadata } = dataset;
    const type = storageType(metadata);
    const attributes = this.#attributes(dataset);
    if (type === null || isBareDimension(attributes)) return null;
    const lengths = metadata.shape ?? [];
    const isLetters = type === 'text' && metadata.size === 1 && !metadata.vlen;
    const shape = isLetters ? lengths.slice(0, -1) : lengths;
    const named = this.#dimensionNames(dataset, lengths, scales, dimensions);
    return new Hdf5Data(this.#source, dataset, type, named.slice(0, shape.length), shape, attributes, isLetters);
  }

  #dimensionNames(
    dataset: H5.Dataset,
    shape: readonly number[],
    scales: ReadonlyMap<number, string>,
    dimensions: Map<string, number>,
  ): string[] {
    const name = lastName(dataset.path);
    const ids = this.#attribute(dataset, '_Netcdf4Coordinates');
    return shape.map((length, axis) => {
      const byId = typeof ids === 'object' && ids.length === shape.length ? scales.get(ids[axis]!) : undefined;
      const attached = byId ?? this.#attempt(() => dataset.get_attached_scales(axis)[0]);
      if (attached !== undefined) return lastName(attached);
      if (shape.length === 1 && dimensions.get(name) === length) return name;
      // No scale tells: plain HDF5. A dimension of that length serves, else one is named after its length.
      const sameLength = [...dimensions].find(([, known]) => known === length)?.[0] ?? `length_${length}`;
      dimensions.set(sameLength, length);
      return sameLength;
    });
  }

  #attributes(object: H5.Dataset | H5.Group): Map<string, AttributeValue> {
    const found = new Map<string, AttributeValue>();
    for (const name of this.#attributeNames(object)) {
      if (HOUSEKEEPING.has(name)) continue;
      const value = this.#attribute(object, name);
      if (value !== undefined) found.set(name, value);
    }
    return found;
  }

  #attributeNames(object: H5.Dataset | H5.Group): string[] {
    return this.#attempt(() => this.#library.module.get_attribute_names(object.file_id, object.path)) ?? [];
  }

  #attribute(object: H5.Dataset | H5.Group, name: string): AttributeValue | undefined {
    const value = this.#attempt(() => object.get_attribute(name, false));
    return value === undefined || value === null ? undefined : plainAttribute(value);
  }
}

/** How HDF5 and the netCDF library keep their own books; REFERENCE_LIST alone can be long. */
const HOUSEKEEPING = new Set(['CLASS', 'REFERENCE_LIST', 'DIMENSION_LIST', '_Netcdf4Dimid', '_Netcdf4Coordinates']);

function isBareDimension(attributes: ReadonlyMap<string, AttributeValue>): boolean {
  const name = attributes.get('NAME');
  return typeof name === 'string' && name.startsWith('This is a netCDF dimension but not a netCDF variable');
}

function lastName(path: string): string {
  return path.slice(path.lastIndexOf('/') + 1);
}

function plainAttribute(value: unknown): AttributeValue | undefined {
  if (typeof value === 'string') return mendText(value);
  if (typeof value === 'number' || typeof value === 'bigint') return [Number(value)];
  if (Array.isArray(value) && value.every((part) => typeof part === 'string')) return value.map(mendText).join(' ');
  if (ArrayBuffer.isView(value) && !(value instanceof DataView)) {
    return Array.from(value as unknown as ArrayLike<number | bigint>, Number);
  }
  return undefined;
}

/** HDF5 type classes, by number in the HDF5 file format. */
const INTEGER = 0;
const FLOAT = 1;
const STRING = 3;

function storageType(metadata: H5.Metadata): StorageType | null {
  const { type, size, signed } = metadata;
  if (type === STRING) return 'text';
  if (type === FLOAT && (size === 4 || size === 8)) return size === 4 ? 'f4' : 'f8';
  if (type === INTEGER && (size === 1 || size === 2 || size === 4 || size === 8)) {
    return `${signed ? 'i' : 'u'}${size}`;
  }
  return null;
}
