import { describe, expect, it } from 'vitest';
import { Desk, type TriangleState } from '../../src/desk/index.ts';
import { BlockBuilder } from '../../src/profile/index.ts';
import { PLAIN_SITE } from '../../src/site/index.ts';

const NOW = Date.UTC(2031, 6, 15, 5);
const HEIGHTS = Array.from({ length: 40 }, (_, k) => 100 + 80 * k);

interface Place {
  readonly id: string;
  readonly latitude: number;
  readonly longitude: number;
  /** Hours by which its clock is wrong. */
  readonly late?: number;
}

function triangle(
  places: readonly Place[],
  neighbours: readonly (readonly string[])[] = [],
): TriangleState | undefined {
  const desk = new Desk({ ...PLAIN_SITE, neighbours });
  for (const { id, latitude, longitude, late = 0 } of places) {
    const builder = new BlockBuilder();
    builder.add({
      station: { id, name: id, latitude, longitude, elevation: 300 },
      source: id,
      instrument: 'wind-profiler',
      timeMs: NOW - late * 3_600_000,
      // Stronger southward: the stream runs together.
      levels: { heightAgl: HEIGHTS, speed: HEIGHTS.map(() => 20 - latitude + 38), direction: HEIGHTS.map(() => 180) },
    });
    desk.accept(builder.finish());
  }
  return desk.moisture(NOW, { feed: 'A/wind-profiler' })!.triangles[0];
}

const A = { id: 'A', latitude: 39, longitude: 0 };
const B = { id: 'B', latitude: 38, longitude: -1 };
const C = { id: 'C', latitude: 38, longitude: 1 };

describe('triangles', () => {
  it('take all places that are open where the site file names none', () => {
    const found = triangle([A, B, C])!;
    expect(found).toMatchObject({ named: false, why: '', apartS: 0 });
    // 1 m/s less over a degree northward, 111.2 km.
    expect(found.layers[0]!.field.divergence).toBeCloseTo(-1 / 111_195, 8);
    expect(found.layers[0]!.points.map(({ v }) => Math.round(v))).toEqual([19, 20, 20]);
    expect(triangle([A, B])).toBeUndefined();
  });

  it('refuse a clock that is hours apart, with the reason', () => {
    const found = triangle([A, B, { ...C, late: 5 }])!;
    expect(found.apartS).toBe(5 * 3600);
    expect(found.notes).toContain('the profiles lie 300 min apart');
    expect(found.layers.every(({ field }) => field.status === 'not-assessable')).toBe(true);
    expect(found.layers[0]!.field.why).toBe("the stations' profiles lie 300 min apart");
  });

  it('refuse stations on one line, with the reason', () => {
    const found = triangle([A, { ...B, longitude: 0 }, { ...C, latitude: 37, longitude: 0 }])!;
    expect(found.layers[0]!.field).toMatchObject({ status: 'not-assessable', why: 'the stations lie on one line' });
  });

  it('say which of the named stations is missing', () => {
    expect(triangle([A, B], [['A', 'B', 'X']])!.why).toBe('three stations are needed, and none lately of X');
    expect(triangle([A, B, { ...C, late: 9 }], [['A', 'B', 'C']])!.why).toBe(
      'three stations are needed, and none lately of C',
    );
  });
});
