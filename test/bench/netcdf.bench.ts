// How fast netCDF becomes profiles: a day and a month of ten-minute and one-minute profiles, classic and netCDF-4.

import * as h5 from 'h5wasm';
import { bytesSource, readProfiles, writeNetcdf } from '../../src/ingest/index.ts';
import { blockOfColumns, type ProfileBlock } from '../../src/profile/index.ts';

interface Figure {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly note?: string;
}

const GATES = 120;
/** Ten-minute profiles of a month of 31 days. */
const MONTH = 4464;
const DAY = 144;

export default async function bench(report: (figure: Figure) => void): Promise<void> {
  const day = writeNetcdf([made(DAY)]);
  await read('day.nc', day);
  report({ name: 'netcdf: one day, classic, 144 x 120', value: await bestMs(day), unit: 'ms' });
  const month = made(MONTH);
  const classic = writeNetcdf([month]);
  report({
    name: 'netcdf: one month, classic, 4464 x 120, wind, temperature, humidity',
    value: MONTH / ((await bestMs(classic)) / 1000),
    unit: 'profiles/s',
    note: `${(classic.length / 2 ** 20).toFixed(1)} MiB`,
  });
  const packed = await asHdf5(month);
  const began = performance.now();
  await read('first.nc', packed);
  report({ name: 'netcdf-4: first file, library not yet warm', value: performance.now() - began, unit: 'ms' });
  report({
    name: 'netcdf-4: one month, deflated, 4464 x 120, wind, temperature, humidity',
    value: MONTH / ((await bestMs(packed)) / 1000),
    unit: 'profiles/s',
    note: `${(packed.length / 2 ** 20).toFixed(1)} MiB`,
  });
  const beganWriting = performance.now();
  for (let k = 0; k < 5; k++) writeNetcdf([month]);
  report({
    name: 'netcdf: writing one month',
    value: (5 * MONTH) / ((performance.now() - beganWriting) / 1000),
    unit: 'profiles/s',
  });
}

/** Smooth winds with a jet, so that packing has what real data give it. */
function made(profiles: number): ProfileBlock {
  const count = profiles * GATES;
  const column = (value: (profile: number, gate: number) => number): Float32Array =>
    Float32Array.from({ length: count }, (_, k) => value(Math.floor(k / GATES), k % GATES));
  return blockOfColumns({
    stations: [{ id: 'bench', name: 'Bench', latitude: 52, longitude: 9, elevation: 70 }],
    sources: ['made'],
    profileCount: profiles,
    offsets: Uint32Array.from({ length: profiles + 1 }, (_, index) => index * GATES),
    stationIndex: new Uint16Array(profiles),
    sourceIndex: new Uint16Array(profiles),
    instrumentIndex: new Uint8Array(profiles).fill(5),
    timeMs: Float64Array.from({ length: profiles }, (_, index) => Date.UTC(2024, 0, 1) + 600_000 * index),
    periodS: new Float32Array(profiles).fill(600),
    notes: {},
    heightAgl: column((_, gate) => 40 + 25 * gate),
    speed: column(
      (profile, gate) => 8 + 5 * Math.sin(0.06 * gate + 0.01 * profile) + ((profile * 31 + gate * 17) % 11) / 20,
    ),
    direction: column((profile, gate) => (210 + gate / 2 + profile / 50) % 360),
    temperature: column((_, gate) => 285 - 0.16 * gate),
    specificHumidity: column((_, gate) => 0.008 * Math.exp(-gate / 60)),
  });
}

async function read(name: string, bytes: Uint8Array): Promise<number> {
  let profiles = 0;
  for await (const { block, problems } of readProfiles(bytesSource(name, bytes))) {
    profiles += block.profileCount;
    if (problems.length > 0) throw new Error(problems[0]!.what);
  }
  return profiles;
}

/** The least disturbed of several runs. */
async function bestMs(bytes: Uint8Array): Promise<number> {
  let best = Infinity;
  for (let k = 0; k < 12; k++) {
    const began = performance.now();
    await read('bench.nc', bytes);
    best = Math.min(best, performance.now() - began);
  }
  return best;
}

/** The block as the netCDF library would write it: dimension scales, shuffled and deflated pieces of a day. */
async function asHdf5(block: ProfileBlock): Promise<Uint8Array> {
  const { FS } = await h5.ready;
  const file = new h5.File('/bench-made.nc', 'w');
  const seconds = block.timeMs.map((time) => time / 1000);
  const time = file.create_dataset({ name: 'time', data: seconds });
  time.create_attribute('units', 'seconds since 1970-01-01');
  time.make_scale('time');
  const height = file.create_dataset({ name: 'height', data: block.heightAgl.slice(0, GATES) });
  height.create_attribute('units', 'm');
  height.create_attribute('standard_name', 'height');
  height.make_scale('height');
  const columns = [
    ['wind_speed', block.speed, 'm s-1'],
    ['wind_from_direction', block.direction, 'degree'],
    ['air_temperature', block.temperature!, 'K'],
    ['specific_humidity', block.specificHumidity!, 'kg kg-1'],
  ] as const;
  for (const [name, data, units] of columns) {
    const dataset = file.create_dataset({
      name,
      data,
      shape: [block.profileCount, GATES],
      chunks: [144, GATES],
      compression: 'gzip',
      compression_opts: 4,
    });
    dataset.create_attribute('units', units);
    dataset.create_attribute('standard_name', name);
    dataset.attach_scale(0, '/time');
    dataset.attach_scale(1, '/height');
  }
  file.close();
  const bytes = FS.readFile('/bench-made.nc').slice();
  FS.unlink('/bench-made.nc');
  return bytes;
}
