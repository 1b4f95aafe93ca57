// Radiosondes of an open archive against what another library read from the same files.

import { readdirSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { dewPointOf } from '../../../src/air/index.ts';
import { profileAt } from '../../../src/profile/index.ts';
import { readShared, readSharedJson, sharedIsHere, sharedPath } from '../../support/shared.ts';
import { readBytes } from './read-bytes.ts';

interface Expected {
  stationId: string;
  site: string;
  latitude: number;
  longitude: number;
  elevationM: number;
  validTime: string;
  levels: number;
  data: (number | null)[][];
}

const folder = 'real/radiosonde-netcdf';
const files = sharedIsHere ? readdirSync(sharedPath(folder)).filter((name) => name.endsWith('.cdf')) : [];

/** Within half a unit of the last digit given, plus what 32-bit floats cost. */
function expectEqual(got: number, want: number | null, half: number, label: string): void {
  const right = want === null ? Number.isNaN(got) : Math.abs(got - want) <= half + Math.abs(want) * 2e-7;
  if (!right) expect.fail(`${label}: got ${got}, want ${want}`);
}

describe.skipIf(!sharedIsHere)('radiosondes in netCDF classic', () => {
  it.each(files)('%s', async (name) => {
    const want = readSharedJson(`real/expected/radiosonde-netcdf/${name.replace(/\.cdf$/u, '.json')}`) as Expected;
    const { blocks, problems } = await readBytes(name, readShared(`${folder}/${name}`));
    expect(problems).toEqual([]);
    expect(blocks).toHaveLength(1);
    const [block] = blocks;
    expect(block!.profileCount).toBe(1);
    const profile = profileAt(block!, 0);
    expect(profile.instrument).toBe('radiosonde');
    expect(profile.station.id).toBe(want.stationId);
    expect(profile.station.name).toBe(want.site);
    expectEqual(profile.station.latitude, want.latitude, 1e-5, 'latitude');
    expectEqual(profile.station.longitude, want.longitude, 1e-5, 'longitude');
    expectEqual(profile.station.elevation, want.elevationM, 1e-4, 'elevation');
    expect(new Date(profile.timeMs).toISOString()).toBe(want.validTime.replace('Z', '.000Z'));
    expect(profile.levelCount).toBe(want.levels);
    // The stored order is by height: a sinking balloon's levels are moved, equal heights stay in the file's order.
    const rows = want.data
      .map((row, index) => ({ row, index }))
      .sort((a, b) => a.row[2]! - b.row[2]! || a.index - b.index)
      .map(({ row }) => row);
    rows.forEach(([, pressure, height, temperature, dewPoint, , speed, direction], k) => {
      const at = `level ${k}`;
      expectEqual(profile.pressure![k]!, pressure!, 0.5, `${at} pressure`);
      // Heights are differences of two large ones: each costs a rounding.
      expectEqual(profile.heightAgl[k]! + want.elevationM, height!, 0.05 + 0.004, `${at} height`);
      expectEqual(profile.temperature?.[k] ?? NaN, temperature!, 0.005, `${at} temperature`);
      expectEqual(profile.speed[k]!, speed!, 0.05, `${at} speed`);
      expectEqual(profile.direction[k]!, direction!, 0.5, `${at} direction`);
      const humidity = profile.specificHumidity?.[k] ?? NaN;
      // Through specific humidity and back: 32-bit humidity and pressure cost about a thousandth of a degree.
      expectEqual(dewPointOf(humidity, profile.pressure![k]!), dewPoint!, 0.005 + 0.002, `${at} dew point`);
    });
  });
});
