// A day of a wind lidar of an open archive against what another library read from the same file.

import { describe, expect, it } from 'vitest';
import { profileAt } from '../../../src/profile/index.ts';
import { readShared, readSharedJson, sharedIsHere } from '../../support/shared.ts';
import { readBytes } from './read-bytes.ts';

interface Expected {
  latitude: number;
  longitude: number;
  elevationM: number;
  profiles: { validTime: string; gates: number; screenedGates: number; data: number[][] }[];
}

describe.skipIf(!sharedIsHere)('a wind lidar in netCDF-4', () => {
  it('reads as the independent decoder does', async () => {
    const want = readSharedJson('real/expected/lidar-netcdf/doppler-lidar-wind.json') as Expected;
    const { blocks, problems, format } = await readBytes(
      'doppler-lidar-wind.nc',
      readShared('real/lidar-netcdf/doppler-lidar-wind.nc'),
    );
    expect(problems).toEqual([]);
    expect(format).toBe('netcdf-4');
    expect(blocks).toHaveLength(1);
    const [block] = blocks;
    expect(block!.profileCount).toBe(want.profiles.length);
    want.profiles.forEach((expected, index) => {
      const profile = profileAt(block!, index);
      expect(profile.instrument).toBe('lidar');
      expect(profile.station).toMatchObject({ id: 'Jülich', name: 'Jülich', elevation: want.elevationM });
      expect(profile.station.latitude).toBeCloseTo(want.latitude, 5);
      expect(profile.station.longitude).toBeCloseTo(want.longitude, 5);
      // The decoder's times are cut to milliseconds, not rounded.
      expect(Math.abs(profile.timeMs - Date.parse(expected.validTime))).toBeLessThanOrEqual(1);
      expect(profile.levelCount).toBe(expected.gates);
      // Gates that the file screened out stay missing: the raw winds beside them are noise.
      const known = Array.from({ length: profile.levelCount }, (_, k) => k).filter(
        (k) => !Number.isNaN(profile.speed[k]!),
      );
      expect(known).toHaveLength(expected.screenedGates);
      expected.data.forEach(([, heightAgl, u, v, speed, direction], row) => {
        const k = known[row]!;
        expect(Math.abs(profile.heightAgl[k]! - heightAgl!)).toBeLessThanOrEqual(0.0051);
        expect(Math.abs(profile.speed[k]! - speed!)).toBeLessThanOrEqual(0.00051);
        // Rounded components of a faint wind turn its direction: compare what the rounding leaves.
        const slack = 0.0051 + (Math.hypot(0.0005, 0.0005) / Math.hypot(u!, v!)) * (180 / Math.PI);
        expect(Math.abs(profile.direction[k]! - direction!)).toBeLessThanOrEqual(slack);
      });
    });
  });
});
