import { describe, expect, it } from 'vitest';
import { demo, duskveer } from './command-line.ts';

interface JetLine {
  readonly station: string;
  readonly time: string;
  readonly status: string;
  readonly why: string;
  readonly jets: Record<string, number | boolean | null>[];
}

const LIDAR = demo('plains/larkmoor-lidar.nc');

describe('jets', () => {
  it('tells the night of the demo: a jet before dawn, none in the calm night', async () => {
    const ran = await duskveer(['jets', LIDAR]);
    expect(ran).toMatchObject({ code: 0, err: '' });
    const lines = ran.lines() as unknown as JetLine[];
    const at = (time: string): JetLine => lines.find((line) => line.time === time)!;
    expect(Object.keys(lines[0]!)).toEqual(['station', 'time', 'criteria', 'status', 'why', 'jets']);

    const strong = at('2024-05-22T08:40:00Z');
    expect(strong).toMatchObject({ station: 'larkmoor-lidar', criteria: 'duskveer', status: 'jet', why: '' });
    expect(Object.keys(strong.jets[0]!).join(' ')).toBe(
      'category nose_height_agl_m nose_speed_mps nose_direction_deg falloff_mps falloff_is_bound confidence',
    );
    // As the demo's README tells it: nose in the upper half of the discs after two in the morning, higher before.
    expect(strong.jets[0]!.nose_height_agl_m).toBeGreaterThan(125);
    expect(strong.jets[0]!.nose_height_agl_m).toBeLessThan(207);
    expect(strong.jets[0]!.category).toBe(0);
    expect(at('2024-05-22T06:00:00Z').jets[0]!.nose_height_agl_m).toBeGreaterThan(250);

    const calm = at('2024-05-23T08:40:00Z');
    expect(calm).toMatchObject({ status: 'no-jet', jets: [] });
    expect(calm.why).not.toBe('');
  });

  it('asks the question that --criteria names', async () => {
    const ran = await duskveer(['jets', '--criteria', 'baas-2009', LIDAR]);
    const [first] = ran.lines();
    expect(first).toMatchObject({ criteria: 'baas-2009' });
    expect((ran.lines() as unknown as JetLine[]).flatMap((line) => line.jets)[0]).toMatchObject({ category: null });
  });

  it('leaves out more or fewer levels as --screens asks', async () => {
    const ask = async (screens: string): Promise<string> => (await duskveer(['jets', '--screens', screens, LIDAR])).out;
    const [all, gross] = await Promise.all([ask('all'), ask('gross')]);
    expect(all).not.toBe(gross);
    const { code, err } = await duskveer(['jets', '--screens', 'some', LIDAR]);
    expect(code).toBe(2);
    expect(err).toContain('--screens is all or gross');
  });

  it('lists the criteria when the name is none of them', async () => {
    const { code, out, err } = await duskveer(['jets', '--criteria', 'loud', LIDAR]);
    expect(code).toBe(2);
    expect(out).toBe('');
    expect(err).toContain('There are no criteria named loud. Known: whiteman-1997, ');
  });
});
