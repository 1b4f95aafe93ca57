// Spoiled files: whatever the bytes, the reader ends soon, with profiles or a plain word, and never with a bare exception.

import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { DuskveerError } from '../../../src/air/index.ts';
import { bytesSource, DEFAULT_LIMITS, type FileFormat, type ReadOptions } from '../../../src/ingest/index.ts';
import { netcdf4, netcdfClassic } from '../../../src/ingest/netcdf/formats.ts';
import { PLAIN_SITE } from '../../../src/site/index.ts';
import { buildClassic } from './build-classic.ts';
import { buildHdf5 } from './build-hdf5.ts';

const options: ReadOptions = {
  site: PLAIN_SITE,
  limits: { ...DEFAULT_LIMITS, levels: 100_000 },
  signal: undefined,
  onProgress: undefined,
  referenceTimeMs: undefined,
  stationList: [],
};

/** Reads with the format itself, past the front door that would catch what should not be thrown. */
async function survive(format: FileFormat, bytes: Uint8Array): Promise<string> {
  try {
    let profiles = 0;
    for await (const { block } of format.read(bytesSource('spoiled.nc', bytes), options))
      profiles += block.profileCount;
    return `${profiles} profiles`;
  } catch (error) {
    if (!(error instanceof DuskveerError)) throw error;
    expect(error.problem.what).not.toBe('');
    expect(error.problem.mend).not.toBe('');
    expect(error.problem.where.source).toBe('spoiled.nc');
    return error.code;
  }
}

const spoiling = (length: number) =>
  fc.record({
    bytes: fc.array(fc.tuple(fc.nat(length - 1), fc.integer({ min: 0, max: 255 })), { minLength: 1, maxLength: 12 }),
    length: fc.option(fc.integer({ min: 8, max: length }), { freq: 4 }),
  });

function spoiled(
  intact: Uint8Array,
  { bytes, length }: { bytes: [number, number][]; length: number | null },
): Uint8Array {
  const copy = intact.slice(0, length ?? intact.length);
  // The first eight bytes stay: without them nobody would take the file for netCDF.
  for (const [at, byte] of bytes) if (at >= 8 && at < copy.length) copy[at] = byte;
  return copy;
}

const classic = buildClassic({
  dimensions: { time: null, height: 4, profile: 2, two: 2 },
  records: 3,
  attributes: { title: 'Lidar', latitude: [50] },
  variables: {
    time: {
      type: 'f8',
      dimensions: ['time'],
      data: [1, 2, 3],
      attributes: { units: 'hours since 2024-01-01', bounds: 'edges' },
    },
    edges: { type: 'f8', dimensions: ['time', 'two'], data: [0, 1, 1, 2, 2, 3] },
    height: {
      type: 'f4',
      dimensions: ['height'],
      data: [10, 20, 30, 40],
      attributes: { units: 'm', standard_name: 'altitude' },
    },
    alt: { type: 'f4', data: [5], attributes: { units: 'm' } },
    wspd: {
      type: 'i2',
      dimensions: ['time', 'height'],
      data: [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12],
      attributes: { units: 'm s-1', scale_factor: [0.5] },
    },
    wdir: {
      type: 'f4',
      dimensions: ['time', 'height'],
      data: [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12],
      attributes: { units: 'degree' },
    },
    rows: { type: 'i4', dimensions: ['profile'], data: [2, 1], attributes: { sample_dimension: 'time' } },
  },
});

describe('spoiled netCDF classic', () => {
  it('is read when it is not spoiled', async () => {
    expect(await survive(netcdfClassic, classic)).toBe('3 profiles');
  });

  it('never leads to anything but profiles or a problem (property)', async () => {
    await fc.assert(
      fc.asyncProperty(spoiling(classic.length), async (spoil) => {
        const began = performance.now();
        await survive(netcdfClassic, spoiled(classic, spoil));
        // A hang is what this looks for; the machine may be busy.
        expect(performance.now() - began).toBeLessThan(5000);
      }),
      { numRuns: 500 },
    );
  });

  it('cut at every length', async () => {
    for (let length = 4; length < classic.length; length += 7) await survive(netcdfClassic, classic.slice(0, length));
  });
});

describe('spoiled netCDF-4', () => {
  let intact: Uint8Array;
  const quiet = console.error;
  beforeAll(async () => {
    console.error = () => undefined;
    intact = await buildHdf5();
  });
  afterAll(() => {
    console.error = quiet;
  });

  it('is read when it is not spoiled', async () => {
    expect(await survive(netcdf4, intact)).toBe('6 profiles');
  });

  it('refuses a heap of texts in which the library would go round for ever', async () => {
    const bytes = intact.slice();
    const heap = Buffer.from(bytes.buffer).indexOf('GCOL');
    // The first object's head follows the heap's 16 bytes; its size stands 8 bytes further on.
    new DataView(bytes.buffer).setBigUint64(heap + 16 + 8, 2n ** 64n - 16n, true);
    expect(await survive(netcdf4, bytes)).toBe('ingest/netcdf-damaged');
  });

  it('never leads to anything but profiles or a problem (property)', async () => {
    await fc.assert(
      fc.asyncProperty(spoiling(intact.length), async (spoil) => {
        const began = performance.now();
        await survive(netcdf4, spoiled(intact, spoil));
        expect(performance.now() - began).toBeLessThan(5000);
      }),
      // The same spoiled files every time: about one in two thousand upsets the memory of the HDF5 library for good, and
      // the files after it; its message then says to start anew.
      { numRuns: 150, seed: 20240521 },
    );
    expect(await survive(netcdf4, intact)).toBe('6 profiles');
  });
});
