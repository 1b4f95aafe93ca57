// A conical lidar scan of an open archive against an independent fit of the same beams.

import { describe, expect, it } from 'vitest';
import { MARK, profileAt } from '../../../src/profile/index.ts';
import { readShared, readSharedJson, sharedIsHere } from '../../support/shared.ts';
import { readBytes } from '../netcdf/read-bytes.ts';

interface Expected {
  latitude: number;
  longitude: number;
  elevationM: number;
  scanStart: string;
  scanEnd: string;
  data: number[][];
}

const FILE = 'sgpdlppiC1.b1.20191015.120023';

describe.skipIf(!sharedIsHere)('a conical lidar scan', () => {
  it('gives the winds of the independent fit, and doubts its ranges', async () => {
    const want = readSharedJson(`real/expected/lidar-scan/${FILE}.json`) as Expected;
    const { blocks, problems } = await readBytes(`${FILE}.cdf`, readShared(`real/lidar-scan/${FILE}.cdf`));
    expect(problems.map(({ code }) => code)).toEqual(['ingest/scan-range-doubtful']);
    expect(problems[0]!.what).toContain('probably lie 3 m apart, not 30 m');
    expect(blocks).toHaveLength(1);
    expect(blocks[0]!.profileCount).toBe(1);
    const profile = profileAt(blocks[0]!, 0);
    expect(profile.instrument).toBe('lidar');
    expect(profile.station).toMatchObject({ id: 'sgpC1', name: 'Lamont, Oklahoma', elevation: want.elevationM });
    expect(profile.station.latitude).toBeCloseTo(want.latitude, 4);
    // The decoder's times are cut to milliseconds, not rounded.
    expect(Math.abs(profile.timeMs - Date.parse(want.scanEnd))).toBeLessThanOrEqual(1);
    expect(profile.periodS).toBeCloseTo((Date.parse(want.scanEnd) - Date.parse(want.scanStart)) / 1000, 2);
    for (const [gate, nearRange, , height, , beams, , , , , w, speed, direction, , error] of want.data) {
      const label = `gate ${gate}`;
      expect(Math.abs(profile.heightAgl[gate!]! - height!), label).toBeLessThan(0.06);
      expect(Math.abs(profile.speed[gate!]! - speed!), label).toBeLessThan(0.002);
      expect(Math.abs(profile.verticalSpeed![gate!]! - w!), label).toBeLessThan(0.002);
      if (speed! > 0.5) expect(Math.abs(profile.direction[gate!]! - direction!), label).toBeLessThan(0.2);
      expect((profile.mark[gate!]! & MARK.clutter) !== 0, `${label} clutter`).toBe(nearRange === 1);
      expect(profile.mark[gate!]! & MARK['few-beams'], `${label} beams`).toBe(0);
      // On a full circle of eight beams at 60 degrees: error / (cos 60 sqrt(8/2)) = error.
      if (beams === 8 && nearRange === 0) {
        expect(profile.speedUncertainty![gate!]!, `${label} uncertainty`).toBeCloseTo(error!, 2);
      }
    }
    // Noise has no wind: beyond the expected gates there are only the few with four or five beams, and marked so.
    for (let gate = want.data.length; gate < profile.levelCount; gate++) {
      if (!Number.isNaN(profile.speed[gate]!)) expect(profile.mark[gate]! & MARK['few-beams']).not.toBe(0);
    }
    expect(profile.levelCount).toBeLessThan(want.data.length + 30);
  });
});
