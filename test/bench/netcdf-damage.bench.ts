// Ten million spoiled bytes through the netCDF and CoverageJSON readers: nothing may crash, hang or eat memory.

import { DuskveerError } from '../../src/air/index.ts';
import {
  bytesSource,
  DEFAULT_LIMITS,
  FORMATS,
  writeCoverageJson,
  writeNetcdf,
  type FileFormat,
  type ReadOptions,
} from '../../src/ingest/index.ts';
import { BlockBuilder, type ProfileBlock } from '../../src/profile/index.ts';
import { PLAIN_SITE } from '../../src/site/index.ts';
import { buildHdf5 } from '../ingest/netcdf/build-hdf5.ts';

interface Figure {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly note?: string;
}

const SPOILED_BYTES = 10_000_000;
const OPTIONS: ReadOptions = {
  site: PLAIN_SITE,
  limits: { ...DEFAULT_LIMITS, levels: 1_000_000 },
  signal: undefined,
  onProgress: undefined,
  referenceTimeMs: undefined,
  stationList: [],
};

export default async function bench(report: (figure: Figure) => void): Promise<void> {
  // The HDF5 library speaks of its troubles on its own.
  console.error = (): void => undefined;
  const block = made();
  const cases: [string, Uint8Array][] = [
    ['netcdf-classic', writeNetcdf([block])],
    ['netcdf-4', await buildHdf5()],
    ['coverage-json', new TextEncoder().encode(writeCoverageJson([block]))],
  ];
  for (const [name, intact] of cases) {
    const format = FORMATS.find((candidate) => candidate.name === name)!;
    report(await spoilAll(format, intact));
  }
}

async function spoilAll(format: FileFormat, intact: Uint8Array): Promise<Figure> {
  const next = chance(20_240_601);
  const runs = Math.ceil(SPOILED_BYTES / intact.length);
  let slowest = 0;
  let readable = 0;
  const before = process.memoryUsage().rss;
  for (let run = 0; run < runs; run++) {
    const bytes = intact.slice(0, next() < 0.2 ? Math.max(8, Math.floor(next() * intact.length)) : intact.length);
    const changes = 1 + Math.floor(next() * 12);
    for (let k = 0; k < changes; k++) bytes[8 + Math.floor(next() * (bytes.length - 8))] = Math.floor(next() * 256);
    const began = performance.now();
    if (await survives(format, bytes)) readable++;
    slowest = Math.max(slowest, performance.now() - began);
  }
  const grown = Math.round((process.memoryUsage().rss - before) / 2 ** 20);
  return {
    name: `${format.name}: slowest of ${runs} spoiled files, ${(SPOILED_BYTES / 1e6).toFixed(0)} million bytes`,
    value: slowest,
    unit: 'ms',
    note: `${readable} still gave profiles, memory grew by ${grown} MiB`,
  };
}

/** @throws what is neither a profile nor a plain word */
async function survives(format: FileFormat, bytes: Uint8Array): Promise<boolean> {
  try {
    let profiles = 0;
    for await (const { block } of format.read(bytesSource('spoiled', bytes), OPTIONS)) profiles += block.profileCount;
    return profiles > 0;
  } catch (error) {
    if (error instanceof DuskveerError) return false;
    throw error;
  }
}

function made(): ProfileBlock {
  const builder = new BlockBuilder();
  for (let index = 0; index < 4; index++) {
    builder.add({
      station: { id: 'made', name: 'Made', latitude: 52, longitude: 9, elevation: 70 },
      source: 'made',
      instrument: 'lidar',
      timeMs: Date.UTC(2024, 0, 1) + 600_000 * index,
      periodS: index < 2 ? 600 : NaN,
      levels: {
        heightAgl: Array.from({ length: 5 + index }, (_, k) => 40 * (k + 1)),
        speed: Array.from({ length: 5 + index }, (_, k) => k + index),
        direction: Array.from({ length: 5 + index }, (_, k) => 200 + k),
        temperature: Array.from({ length: 5 + index }, (_, k) => 285 - k),
      },
    });
  }
  return builder.finish();
}

/** A repeatable sequence in [0, 1): mulberry-like mixing of a counter. */
function chance(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
}
