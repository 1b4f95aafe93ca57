import { describe, expect, it } from 'vitest';
import { demo, duskveer } from './command-line.ts';

describe('moisture', () => {
  it('prints a line a profile with the keys of the contract', async () => {
    const ran = await duskveer(['moisture', demo('plains/larkmoor-lidar.nc')]);
    expect(ran).toMatchObject({ code: 0, err: '' });
    const line = ran.lines().find((candidate) => candidate.time === '2024-05-22T08:40:00Z')!;
    expect(Object.keys(line).join(' ')).toBe(
      'station time status why humidity_from humidity_age_s precipitable_water_kg_per_m2 transport_kg_per_m_s ' +
        'transport_east_kg_per_m_s transport_north_kg_per_m_s below_3km_kg_per_m_s in_jet_kg_per_m_s flux',
    );
    expect(line).toMatchObject({ status: 'ok', humidity_from: 'larkmoor-lidar', humidity_age_s: 0 });
    const transport = Math.hypot(line.transport_east_kg_per_m_s as number, line.transport_north_kg_per_m_s as number);
    expect(line.transport_kg_per_m_s).toBeCloseTo(transport, 2);
    const flux = line.flux as Record<string, number[]>;
    expect(flux.east_kg_per_m2_s).toHaveLength(flux.height_agl_m!.length);
  });

  it('keeps to the layer that is asked for', async () => {
    const ask = async (...options: string[]): Promise<number> => {
      const [line] = (await duskveer(['moisture', ...options, demo('plains/larkmoor-lidar.nc')])).lines();
      return line!.precipitable_water_kg_per_m2 as number;
    };
    const [whole, lower] = await Promise.all([ask(), ask('--top-pa', '85000')]);
    expect(lower).toBeLessThan(whole);
    expect(lower).toBeGreaterThan(0);
  });

  it('borrows humidity and says whose and how old', async () => {
    const ran = await duskveer(['moisture', demo('storm')]);
    const line = ran.lines().find(({ station, time }) => station === 'ashwillow' && time === '2024-06-28T06:30:00Z')!;
    expect(line).toMatchObject({ status: 'ok', humidity_from: 'ashwillow-sonde', humidity_age_s: 3600 });
  });

  it('says why where there is no humidity', async () => {
    const [line] = (await duskveer(['moisture', demo('valley/quill-lidar.nc')])).lines();
    expect(line).toMatchObject({ status: 'not-assessable', why: 'no humidity', transport_kg_per_m_s: null });
  });

  it('refuses a layer that stands on its head', async () => {
    const options = ['--bottom-pa', '70000', '--top-pa', '90000'];
    const { code, err } = await duskveer(['moisture', ...options, demo('plains/larkmoor-lidar.nc')]);
    expect(code).toBe(2);
    expect(err).toContain('pressure falls with height');
  });
});
