import fc from 'fast-check';
import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { NetCDFReader } from 'netcdfjs';
import { describe, expect, it } from 'vitest';
import { writeNetcdf } from '../../../src/ingest/index.ts';
import { BlockBuilder, concatBlocks, unplacedStation, type ProfileBlock } from '../../../src/profile/index.ts';
import { readBytes } from '../netcdf/read-bytes.ts';
import { madeBlock } from './made-blocks.ts';

/** Two profiles of three heights. */
function example(): ProfileBlock {
  const builder = new BlockBuilder();
  for (const index of [0, 1]) {
    builder.add({
      station: { id: 'heath', name: 'Heath, Über', latitude: 52.5, longitude: 9.25, elevation: 71 },
      source: 'x.csv',
      instrument: 'lidar',
      timeMs: Date.UTC(2024, 5, 1, 12, 10 * index),
      periodS: 600,
      levels: {
        heightAgl: [40, 80, 120],
        speed: [5, 7.5, NaN],
        direction: [350, 355, 0],
        temperature: [280, 281, 282],
      },
    });
  }
  return builder.finish();
}

describe('writeNetcdf', () => {
  it.each([true, false])('comes back as it was (grid: %s, property)', async (isGrid) => {
    await fc.assert(
      fc.asyncProperty(madeBlock(isGrid), async (block) => {
        const { blocks, problems } = await readBytes('made.nc', writeNetcdf([block]));
        expect(problems).toEqual([]);
        const back = concatBlocks(blocks);
        expect({ ...back, notes: {} }).toEqual({ ...block, notes: {}, timeMs: back.timeMs });
        back.timeMs.forEach((time, index) => expect(Math.abs(time - block.timeMs[index]!)).toBeLessThanOrEqual(0));
      }),
      { numRuns: 40 },
    );
  });

  it('opens in another reader, a grid where heights are shared', () => {
    const reader = new NetCDFReader(writeNetcdf([example()]));
    expect(reader.getAttribute('Conventions')).toBe('CF-1.11');
    expect(reader.getAttribute('featureType')).toBe('timeSeriesProfile');
    expect(reader.dimensions.filter(({ name }) => name === 'time' || name === 'height')).toEqual([
      { name: 'time', size: 2 },
      { name: 'height', size: 3 },
    ]);
    expect(reader.getDataVariable('height')).toEqual([40, 80, 120]);
    expect(reader.getDataVariable('wind_speed')).toEqual([5, 7.5, 9.969209968386869e36, 5, 7.5, 9.969209968386869e36]);
    expect(reader.getDataVariable('time')).toEqual([1717243200, 1717243800]);
    expect(reader.getDataVariable('latitude')).toEqual([52.5]);
    const speed = reader.variables.find(({ name }) => name === 'wind_speed')!;
    const attributes = Object.fromEntries(speed.attributes.map(({ name, value }) => [name, value]));
    expect(attributes).toMatchObject({ standard_name: 'wind_speed', units: 'm s-1' });
  });

  it('opens ragged in another reader, with the counts and the station of each profile', () => {
    const builder = new BlockBuilder();
    const add = (id: string, heightAgl: number[]): void =>
      builder.add({ station: unplacedStation(id), source: 'x', timeMs: 0, levels: { heightAgl, speed: heightAgl } });
    add('a', [10, 20]);
    add('b', [10, 30, 50]);
    const reader = new NetCDFReader(writeNetcdf([builder.finish()]));
    expect(reader.getDataVariable('levels')).toEqual([2, 3]);
    expect(reader.getDataVariable('station_index')).toEqual([0, 1]);
    expect(reader.getDataVariable('wind_speed')).toEqual([10, 20, 10, 30, 50]);
  });

  it('refuses to write nothing', () => {
    expect(() => writeNetcdf([])).toThrow('There is no profile to write.');
  });

  const dump = 'ncdump';
  const hasNcdump = spawnSync(dump, []).error === undefined;
  const hasScipy = spawnSync('python3', ['-c', 'import scipy.io']).status === 0;

  it.skipIf(!hasNcdump)('opens in ncdump', () => {
    inFile(writeNetcdf([example()]), (path) => {
      const text = execFileSync(dump, ['-t', path], { encoding: 'utf8' });
      expect(text).toContain('wind_speed:standard_name = "wind_speed"');
      expect(text).toContain('2024-06-01 12:10');
    });
  });

  it.skipIf(!hasScipy)('opens in a third reader (SciPy)', () => {
    inFile(writeNetcdf([example()]), (path) => {
      const script = `
import sys, json
from scipy.io import netcdf_file
f = netcdf_file(sys.argv[1], mmap=False)
print(json.dumps({"speed": f.variables["wind_speed"][:].tolist(), "id": f.variables["station_name"][:].tobytes().decode(),
  "bounds": f.variables["time_bounds"][:].tolist(), "instrument": f.variables["instrument"][:].tolist()}))`;
      const said = JSON.parse(execFileSync('python3', ['-c', script, path], { encoding: 'utf8' })) as Record<
        string,
        unknown
      >;
      expect(said.speed).toEqual([
        [5, 7.5, 9.969209968386869e36],
        [5, 7.5, 9.969209968386869e36],
      ]);
      expect(said.id).toBe('Heath, Über');
      expect(said.bounds).toEqual([
        [1717242600, 1717243200],
        [1717243200, 1717243800],
      ]);
      expect(said.instrument).toEqual([5, 5]);
    });
  });
});

function inFile(bytes: Uint8Array, use: (path: string) => void): void {
  const folder = mkdtempSync(join(tmpdir(), 'duskveer-'));
  try {
    writeFileSync(join(folder, 'out.nc'), bytes);
    use(join(folder, 'out.nc'));
  } finally {
    rmSync(folder, { recursive: true });
  }
}
