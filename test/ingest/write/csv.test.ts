import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { writeCsv } from '../../../src/ingest/index.ts';
import { BlockBuilder, concatBlocks, MARK, profileAt } from '../../../src/profile/index.ts';
import { readBytes } from '../netcdf/read-bytes.ts';
import { madeBlock } from './made-blocks.ts';

describe('writeCsv', () => {
  it('writes a line a level, with units in the headings and nothing where nothing is known', () => {
    const builder = new BlockBuilder();
    builder.add({
      station: { id: 'heath', name: 'Heath, "Upper"', latitude: 52.5, longitude: NaN, elevation: 71 },
      source: 'x.nc',
      instrument: 'lidar',
      timeMs: Date.UTC(2024, 5, 1, 12),
      periodS: 600,
      levels: {
        heightAgl: [40, 80],
        speed: [5.1, NaN],
        direction: [350, NaN],
        pressure: [100_000, 99_500],
        specificHumidity: [0.01, NaN],
        mark: [0, MARK['low-signal'] | MARK['few-beams']],
      },
    });
    const lines = [...writeCsv([builder.finish()])].join('').split('\r\n');
    expect(lines[0]).toBe(
      'station,name,latitude_deg,longitude_deg,elevation_m,time,period_s,instrument,height_agl_m,pressure_pa,speed_mps,' +
        'direction_deg,vertical_speed_mps,temperature_k,dewpoint_k,specific_humidity (kg/kg),signal,' +
        'speed_uncertainty_mps,mark',
    );
    // Dew point by Bolton's formula at e = 0.01 p / (eps + (1 - eps) 0.01), p = 1000 hPa, eps = 0.6219935: 15.98 hPa.
    expect(lines[1]).toBe(
      'heath,"Heath, ""Upper""",52.5,,71,2024-06-01T12:00:00.000Z,600,lidar,40,100000,5.1,350,,,287.156,0.01,,,',
    );
    expect(lines[2]).toBe(
      'heath,"Heath, ""Upper""",52.5,,71,2024-06-01T12:00:00.000Z,600,lidar,80,99500,,,,,,,,,low-signal few-beams',
    );
    expect(lines).toHaveLength(4);
  });

  it('comes back with the same winds and air (property)', async () => {
    await fc.assert(
      fc.asyncProperty(madeBlock(true), async (block) => {
        const text = [...writeCsv([block])].join('');
        const { blocks, problems } = await readBytes('made.csv', new TextEncoder().encode(text));
        const back = concatBlocks(blocks);
        expect(problems.map(({ code }) => code)).toEqual([]);
        expect(back.profileCount).toBe(block.profileCount);
        for (let index = 0; index < block.profileCount; index++) {
          const [want, got] = [profileAt(block, index), profileAt(back, index)];
          expect(got.station.id).toBe(want.station.id);
          expect(got.timeMs).toBe(want.timeMs);
          expect(got.heightAgl).toEqual(want.heightAgl);
          expect(got.speed).toEqual(want.speed);
          expect(got.direction).toEqual(want.direction);
          if (want.specificHumidity !== null && got.specificHumidity !== null) {
            expect(got.specificHumidity).toEqual(want.specificHumidity);
          }
          if (want.temperature !== null && got.temperature !== null) expect(got.temperature).toEqual(want.temperature);
        }
      }),
      { numRuns: 40 },
    );
  });
});
