// The rotor tables of the outside checks.

import { describe, expect, it } from 'vitest';
import { windColumn } from '../../src/profile/index.ts';
import {
  FleetScan,
  normalisePower,
  normaliseSpeed,
  powerFromCurve,
  segmentArea,
  windOnDisc,
} from '../../src/rotor/index.ts';
import { checkBlock, expectAgrees } from '../support/check-table.ts';
import { sharedIsHere } from '../support/shared.ts';
import { profileOf } from '../support/profiles.ts';
import { columnOf } from './support.ts';

describe.skipIf(!sharedIsHere)('checks/rotor.json', () => {
  const cases = (name: string) => {
    const block = checkBlock('rotor', name);
    return block.cases.map((one) => ({ block, one, label: `${one.id} ${one.note ?? ''}` }));
  };

  it.each(sharedIsHere ? cases('segment_area') : [])('$label', ({ block, one, label }) => {
    const { hub_m, radius_m, z_bottom_m, z_top_m } = one.in as Record<string, number>;
    const disc = { hubHeight: hub_m!, rotorDiameter: 2 * radius_m! };
    const area = segmentArea(disc, z_bottom_m!, z_top_m!);
    expectAgrees(block, 'area_m2', area, one.out.area_m2!, label);
    expectAgrees(block, 'fraction', area / (Math.PI * radius_m! ** 2), one.out.fraction!, label);
  });

  it.each(sharedIsHere ? cases('rews') : [])('$label', ({ block, one, label }) => {
    const disc = { hubHeight: one.in.hub_m as number, rotorDiameter: 2 * (one.in.radius_m as number) };
    const heights = columnOf(one.in.height_m);
    const directions = one.in.direction_deg === undefined ? undefined : columnOf(one.in.direction_deg);
    const profile = profileOf({ heightAgl: heights, speed: columnOf(one.in.speed_m_per_s), direction: directions });
    const wind = windOnDisc(profile, disc);
    const got: Record<string, unknown> = {
      status: wind.status === 'ok' ? 'ok' : 'not_computable',
      coverage_fraction: wind.coverage,
      rews_m_per_s: wind.equivalentSpeed,
      rews_veer_m_per_s: wind.equivalentSpeedVeer,
      hub_speed_m_per_s: wind.hubSpeed,
      hub_direction_deg: wind.hubDirection,
      ...slicesOf(disc, heights, columnOf(one.in.speed_m_per_s), directions),
    };
    for (const [key, want] of Object.entries(one.out)) expectAgrees(block, key, got[key], want, `${label} ${key}`);
    if (wind.status !== 'ok') expect(wind.why).toMatch(/^rotor only \d+ % covered$/);
  });

  it.each(sharedIsHere ? cases('density_normalisation') : [])('$label', ({ block, one, label }) => {
    const { speed_m_per_s, density_kg_per_m3, power_kw } = one.in as Record<string, number>;
    const speed = normaliseSpeed(speed_m_per_s!, density_kg_per_m3!);
    expectAgrees(block, 'speed_normalised_m_per_s', speed, one.out.speed_normalised_m_per_s!, label);
    const power = normalisePower(power_kw!, density_kg_per_m3!);
    expectAgrees(block, 'power_normalised_kw', power, one.out.power_normalised_kw!, label);
  });

  it.each(sharedIsHere ? cases('power_from_curve') : [])('$label', ({ block, one, label }) => {
    const curve = { speed: columnOf(one.in.curve_speed_m_per_s), powerKw: columnOf(one.in.curve_power_kw) };
    const power = columnOf(one.in.speed_m_per_s).map((speed) => powerFromCurve(curve, speed));
    expectAgrees(block, 'power_kw', power, one.out.power_kw!, label);
  });
});

/** All gates in use and the area each owns, laid out as in the table. */
function slicesOf(
  disc: { hubHeight: number; rotorDiameter: number },
  heights: number[],
  speeds: number[],
  directions: number[] | undefined,
): Record<string, number[]> {
  const column = windColumn(heights.length);
  column.count = 0;
  heights.forEach((height, k) => {
    if (Number.isNaN(speeds[k])) return;
    column.heightAgl[column.count] = height;
    column.speed[column.count] = speeds[k]!;
    column.direction[column.count] = directions?.[k] ?? NaN;
    column.count++;
  });
  const scan = new FleetScan([disc]);
  const plan = scan.scan(column).plans[0]!;
  const areas = Array.from({ length: scan.levels.count }, (_, k) => plan.share[k - plan.first] ?? 0);
  return {
    used_height_m: [...scan.levels.heightAgl.subarray(0, scan.levels.count)],
    segment_area_m2: areas.map((share) => (share * Math.PI * disc.rotorDiameter ** 2) / 4),
  };
}
