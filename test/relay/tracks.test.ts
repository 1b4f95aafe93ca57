import { readdirSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { demo, duskveer } from './command-line.ts';

interface TrackLine {
  readonly station: string;
  readonly began: string;
  readonly ended: string | null;
  readonly phase: string;
  readonly peak_speed_mps: number;
  readonly kinds: Record<string, number>;
  readonly points: Record<string, unknown[]>;
  readonly evidence: Record<string, unknown>[];
  readonly words: string;
}

async function tracksOf(night: string, ...more: string[]): Promise<TrackLine[]> {
  const files = readdirSync(demo(night)).filter((name) => name !== 'site.json');
  const ran = await duskveer([
    'tracks',
    '--site',
    demo(`${night}/site.json`),
    ...more,
    ...files.map((name) => demo(`${night}/${name}`)),
  ]);
  expect(ran).toMatchObject({ code: 0, err: '' });
  return ran.lines() as unknown as TrackLine[];
}

describe('tracks', () => {
  it('tells the barrier jet of the demo with its evidence, in the keys of the contract', async () => {
    const lines = await tracksOf('barrier');
    const [track, ...others] = lines.filter(({ station }) => station === 'garrow-profiler');
    expect(others).toEqual([]);
    expect(Object.keys(track!).join(' ')).toBe(
      'station began ended phase peak_time peak_speed_mps peak_height_agl_m kinds points evidence words',
    );
    expect(Object.keys(track!.points).join(' ')).toBe(
      'time nose_height_agl_m nose_speed_mps nose_direction_deg confidence',
    );
    const [first] = track!.evidence;
    expect(Object.keys(first!).join(' ')).toBe('looked_at value unit threshold speaks_for weight source');
    // As the demo's README tells it, on the site's clock (UTC - 8 h): from 19:30 to 04:30, 45 % stronger than upstream.
    const hoursOff = (time: string, told: string): number => Math.abs(Date.parse(time) - Date.parse(told)) / 3_600_000;
    expect(hoursOff(track!.began, '2024-01-17T03:30:00Z')).toBeLessThanOrEqual(1.25);
    expect(hoursOff(track!.ended!, '2024-01-17T12:30:00Z')).toBeLessThanOrEqual(1.25);
    const strength = track!.evidence.find(({ looked_at: what }) => /strength along it/.test(what as string))!;
    expect(Math.abs((strength.value as number) - 1.45)).toBeLessThan(0.15);
    expect(track!.kinds.barrier).toBeGreaterThan(0.6);
    const sum = Object.values(track!.kinds).reduce((total, share) => total + share, 0);
    expect(sum).toBeCloseTo(1, 3);
    expect(track!.words).toMatch(/^A barrier jet from /);
    for (const column of Object.values(track!.points)) expect(column).toHaveLength(track!.points.time!.length);
  });

  it('tells the valley-exit jet of the southern hemisphere', async () => {
    const [track] = await tracksOf('valley');
    expect(track).toMatchObject({ station: 'quill-lidar', phase: 'ended' });
    expect(track!.kinds['valley-exit']).toBeGreaterThan(0.6);
  });

  it('asks what --criteria names, and says when there are none of that name', async () => {
    const strict = await tracksOf('valley', '--criteria', 'stull-1988');
    expect(strict.every(({ words }) => words !== '')).toBe(true);
    const { code, err } = await duskveer(['tracks', '--criteria', 'loud', demo('valley/quill-lidar.nc')]);
    expect(code).toBe(2);
    expect(err).toContain('There are no criteria named loud.');
  });
});
