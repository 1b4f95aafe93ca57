import { describe, expect, it } from 'vitest';
import { profileAt } from '../../../src/profile/index.ts';
import { mendText } from '../../../src/ingest/netcdf/mend-text.ts';
import { readShared, sharedIsHere } from '../../support/shared.ts';
import { buildGroups, buildHdf5 } from './build-hdf5.ts';
import { readBytes } from './read-bytes.ts';

describe('netCDF-4', () => {
  it('reads dimensions by their scales, packed data, and text flagged as ASCII', async () => {
    const { blocks, problems } = await readBytes('made.nc', await buildHdf5());
    expect(problems).toEqual([]);
    const second = profileAt(blocks[0]!, 1);
    expect([...second.heightAgl]).toEqual([10, 20, 30, 40, 50]);
    expect([...second.speed]).toEqual([5, 6, NaN, 8, 9]);
    expect(second.timeMs).toBe(Date.UTC(2024, 0, 1, 1));
    expect(second.station.name).toBe('Jülich');
  });

  it('reads groups, with what they share in their parent', async () => {
    const { blocks, problems } = await readBytes('groups.nc', await buildGroups());
    expect(problems).toEqual([]);
    expect(blocks.map((block) => [...block.speed])).toEqual([
      [1, 2],
      [2, 3],
    ]);
    expect(blocks.map(({ timeMs }) => timeMs[0])).toEqual([Date.UTC(2024, 0, 1, 1), Date.UTC(2024, 0, 1, 2)]);
    expect([...blocks[1]!.heightAgl]).toEqual([10, 20]);
  });

  it.skipIf(!sharedIsHere)('gives no garbage for a damaged piece of packed data', async () => {
    const bytes = readShared('real/lidar-netcdf/doppler-lidar-wind.nc').slice();
    const intact = await readBytes('lidar.nc', bytes);
    // The largest packed pieces fill the file's second half: spoil a stretch of it.
    for (let k = 20_000; k < 40_000; k += 500) bytes[k]! ^= 0xff;
    const damaged = await readBytes('lidar.nc', bytes);
    expect(damaged.problems.length).toBeGreaterThan(0);
    expect(damaged.problems[0]!.mend).toContain('Fetch the file again');
    for (const block of damaged.blocks) expect([...block.speed]).toEqual([...intact.blocks[0]!.speed]);
  });
});

describe('mendText', () => {
  it.each([
    ['JÃ¼lich', 'Jülich'],
    ['Ã…s â€“ 60Â°N', 'Ås – 60°N'],
    ['Jülich', 'Jülich'],
    ['plain\0\0', 'plain'],
    ['日本', '日本'],
  ])('%s', (text, want) => expect(mendText(text)).toBe(want));
});
