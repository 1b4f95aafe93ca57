import { describe, expect, it } from 'vitest';
import { demo, duskveer } from './command-line.ts';

describe('triangle', () => {
  it('shows the streams of the storm night running together', async () => {
    const ran = await duskveer(['triangle', demo('storm')]);
    expect(ran.code).toBe(0);
    const lines = ran.lines().filter((line) => line.time === '2024-06-28T08:00:00Z');
    expect(Object.keys(lines[0]!).join(' ')).toBe(
      'time stations height_agl_m status why area_km2 divergence_per_s vorticity_per_s moisture_flux_divergence_per_s',
    );
    expect(lines.map((line) => line.height_agl_m)).toEqual(Array.from({ length: 12 }, (_, k) => 125 + 250 * k));
    // From Dry Fork to the others, km: (30.3, 133.4) and (108.2, 22.2); half of their cross product.
    expect(lines[0]!.area_km2).toBeCloseTo((108.2 * 133.4 - 30.3 * 22.2) / 2, -2);
    const inJet = lines.filter((line) => (line.height_agl_m as number) > 400 && (line.height_agl_m as number) < 1000);
    for (const line of inJet) {
      expect(line).toMatchObject({ status: 'ok', stations: ['ashwillow', 'dry-fork', 'long-slough'] });
      expect(line.divergence_per_s).toBeLessThan(-2e-5);
      expect(line.moisture_flux_divergence_per_s).toBeLessThan(-2e-7);
    }
  });

  it('says that three stations are needed', async () => {
    const { code, out, err } = await duskveer(['triangle', demo('storm/ashwillow.nc'), demo('storm/dry-fork.nc')]);
    expect(code).toBe(3);
    expect(out).toBe('');
    expect(err).toContain('Three places are needed; here are 2 (ashwillow, dry-fork).');
  });
});
