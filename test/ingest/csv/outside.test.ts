// Against the real night and the simulated nights beside the checkout.

import { gunzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { specificHumidityOfRelative, standardAtmosphere } from '../../../src/air/index.ts';
import { bytesSource, readProfiles } from '../../../src/ingest/index.ts';
import { gatherWindAt, profileAt, windColumn } from '../../../src/profile/index.ts';
import { readShared, readSharedJson, sharedIsHere } from '../../support/shared.ts';
import { readToEnd } from '../../support/sources.ts';

interface NightTime {
  time: string;
  levels: number;
  topM: number;
  jet: { noseHeight: number; noseSpeed: number; noseDirection: number };
}

describe.skipIf(!sharedIsHere)('the real night as CSV', () => {
  const bytes = (): Uint8Array => readShared('real/night/combined_radar_data_qc.csv');

  it('gives 145 profiles with the levels and the strongest wind that were worked out independently', async () => {
    const { block, problems } = await readToEnd(readProfiles(bytesSource('night/combined_radar_data_qc.csv', bytes())));
    expect(problems).toEqual([]);
    expect(block.profileCount).toBe(145);
    expect(block.mark.every((mark) => mark === 0)).toBe(true);
    expect(block.stations.map(({ id }) => id)).toEqual(['combined_radar_data_qc']);
    const { times } = readSharedJson('real/expected/night-numbers.json') as { times: NightTime[] };
    const column = windColumn();
    for (const expected of times) {
      const index = block.timeMs.indexOf(Date.parse(expected.time));
      expect(index, expected.time).toBeGreaterThanOrEqual(0);
      gatherWindAt(block, index, column);
      expect(column.count).toBe(expected.levels);
      expect(column.heightAgl[column.count - 1]).toBe(expected.topM);
      const levels = [...column.speed.subarray(0, column.count).keys()];
      const strongest = Math.max(...column.speed.subarray(0, column.count));
      // Speeds that differ in the fifteenth digit only are equal in 32 bits: any of these levels may be meant.
      const nose = levels.find(
        (k) => column.speed[k] === strongest && Math.abs(column.heightAgl[k]! - expected.jet.noseHeight) < 0.05,
      )!;
      expect(nose, expected.time).toBeDefined();
      expect(strongest).toBeCloseTo(expected.jet.noseSpeed, 2);
      // Half a unit of the last digit given, and what 32-bit floats cost.
      expect(Math.abs(column.direction[nose]! - expected.jet.noseDirection)).toBeLessThan(0.0501);
    }
  });

  it('holds the speeds exactly as written, and says what it took for granted', async () => {
    const lines = new TextDecoder().decode(bytes()).trim().split('\n').slice(1);
    const { block } = await readToEnd(readProfiles(bytesSource('night.csv', bytes())));
    lines.forEach((line, k) => {
      const [, height, , , speed, direction] = line.split(',').map(Number) as [0, number, 0, 0, number, number];
      expect(block.heightAgl[k]).toBe(Math.fround(height));
      expect(block.speed[k]).toBe(Math.fround(speed));
      expect(block.direction[k]).toBe(Math.fround(direction));
    });
    const { notes } = profileAt(block, 0);
    expect(notes).toContain('Columns not used: t_index, scan_type.');
    expect(notes).toContain('Times carry no zone: taken as UTC.');
    expect(notes.join(' ')).toContain('height above ground m, speed m/s, direction degrees');
  });
});

describe.skipIf(!sharedIsHere)('the simulated nights', () => {
  it.each(['001', '006', '039', '060'])('night %s reads as it stands', async (night) => {
    const packed = readShared(`nights/night-${night}.csv.gz`);
    const { block, problems } = await readToEnd(readProfiles(bytesSource(`night-${night}.csv.gz`, packed)));
    expect(problems).toEqual([]);
    const about = readSharedJson(`nights/night-${night}.json`) as { latitude_deg: number; longitude_deg: number };
    const [station] = block.stations;
    expect(block.stations).toHaveLength(1);
    expect(station).toMatchObject({ id: `sim-${night}`, latitude: about.latitude_deg, longitude: about.longitude_deg });
    const rows = gunzipSync(packed).toString().trim().split('\n').slice(1);
    expect(block.mark).toHaveLength(rows.length);
    rows.forEach((row, k) => {
      const numbers: number[] = row.split(',').map((cell) => (cell === '' ? NaN : Number(cell)));
      const [, , , , height, speed, direction, celsius, humidity] = numbers;
      expect(block.heightAgl[k]).toBe(height);
      expect(block.speed[k]).toBe(Math.fround(speed!));
      expect(block.direction[k]).toBe(Math.fround(direction!));
      expect(block.temperature![k]).toBe(Math.fround(celsius! + 273.15));
      // No pressure is given: that of the standard atmosphere serves, the ground taken at sea level.
      const wanted = specificHumidityOfRelative(
        humidity! / 100,
        celsius! + 273.15,
        standardAtmosphere(height!).pressure,
      );
      if (Number.isNaN(wanted)) expect(block.specificHumidity![k]).toBeNaN();
      else expect(block.specificHumidity![k]! / wanted).toBeCloseTo(1, 4);
    });
    expect(block.pressure).toBeNull();
    expect(profileAt(block, 0).notes.join(' ')).toMatch(/standard atmosphere/);
    const times = new Set(rows.map((row) => row.split(',')[3]));
    expect(block.profileCount).toBe(times.size);
  });
});
