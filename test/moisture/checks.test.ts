// The moisture tables of the outside checks: trapezoid of the products, as the tables' main values.

import { describe, expect, it } from 'vitest';
import { eastward, northward } from '../../src/air/index.ts';
import {
  fluxOf,
  precipitableWater,
  transportByHeight,
  transportByPressure,
  windField,
} from '../../src/moisture/index.ts';
import { checkBlock, expectAgrees, type CheckBlock, type CheckCase } from '../support/check-table.ts';
import { sharedIsHere } from '../support/shared.ts';

interface LabelledCase {
  readonly block: CheckBlock;
  readonly one: CheckCase;
  readonly label: string;
}

const cases = (name: string): LabelledCase[] => {
  if (!sharedIsHere) return [];
  const block = checkBlock('moisture', name);
  return block.cases.map((one) => ({ block, one, label: `${one.id} ${one.note ?? ''}` }));
};
const column = (one: CheckCase, key: string, scale = 1): number[] =>
  (one.in[key] as (number | null)[]).map((value) => (value ?? NaN) * scale);
const limit = (one: CheckCase, key: string, scale = 1): number | undefined =>
  one.in[key] === undefined ? undefined : (one.in[key] as number) * scale;
const wind = (one: CheckCase): { u: number[]; v: number[]; speed: number[] } => {
  const speed = column(one, 'speed_m_per_s');
  const direction = column(one, 'direction_deg');
  return {
    speed,
    u: speed.map((value, k) => eastward(value, direction[k]!)),
    v: speed.map((value, k) => northward(value, direction[k]!)),
  };
};
const expectAll = ({ block, one, label }: LabelledCase, got: Record<string, unknown>): void => {
  for (const [key, want] of Object.entries(one.out)) {
    if (key !== 'other_quadrature') expectAgrees(block, key, got[key], want, `${label} ${key}`);
  }
};

describe.skipIf(!sharedIsHere)('checks/moisture.json', () => {
  it.each(cases('flux_profile'))('$label', (labelled) => {
    const { u, v, speed } = wind(labelled.one);
    const density = column(labelled.one, 'density_kg_per_m3');
    const humidity = column(labelled.one, 'specific_humidity_g_per_kg', 1e-3);
    const flux = (component: number[]): number[] =>
      component.map((value, k) => fluxOf(density[k]!, humidity[k]!, value));
    expectAll(labelled, {
      flux_east_kg_per_m2_s: flux(u),
      flux_north_kg_per_m2_s: flux(v),
      flux_kg_per_m2_s: flux(speed),
    });
  });

  it.each(cases('transport_pressure'))('$label', (labelled) => {
    const levels = {
      pressure: column(labelled.one, 'pressure_hpa', 100),
      specificHumidity: column(labelled.one, 'specific_humidity_g_per_kg', 1e-3),
      ...wind(labelled.one),
    };
    const limits = { bottom: limit(labelled.one, 'p_bottom_hpa', 100), top: limit(labelled.one, 'p_top_hpa', 100) };
    const { east, north, size } = transportByPressure(levels, limits);
    expectAll(labelled, {
      ivt_east_kg_per_m_s: east,
      ivt_north_kg_per_m_s: north,
      ivt_kg_per_m_s: size,
      precipitable_water_kg_per_m2: precipitableWater(levels, limits),
    });
  });

  it.each(cases('transport_height'))('$label', (labelled) => {
    const levels = {
      heightAgl: column(labelled.one, 'height_m'),
      density: column(labelled.one, 'density_kg_per_m3'),
      specificHumidity: column(labelled.one, 'specific_humidity_g_per_kg', 1e-3),
      ...wind(labelled.one),
    };
    const limits = { bottom: limit(labelled.one, 'z_bottom_m'), top: limit(labelled.one, 'z_top_m') };
    const { east, north, size } = transportByHeight(levels, limits);
    expectAll(labelled, {
      transport_east_kg_per_m_s: east,
      transport_north_kg_per_m_s: north,
      transport_kg_per_m_s: size,
    });
  });

  it.each(cases('triangle'))('$label', (labelled) => {
    const latitude = column(labelled.one, 'latitude_deg');
    const longitude = column(labelled.one, 'longitude_deg');
    const humidity = column(labelled.one, 'specific_humidity_g_per_kg', 1e-3);
    const { u, v } = wind(labelled.one);
    const field = windField(
      latitude.map((value, k) => ({
        latitude: value,
        longitude: longitude[k]!,
        u: u[k]!,
        v: v[k]!,
        specificHumidity: humidity[k]!,
      })),
    );
    expectAll(labelled, {
      divergence_per_s: field.divergence,
      vorticity_per_s: field.vorticity,
      moisture_flux_divergence_g_per_kg_s: field.moistureFluxDivergence * 1000,
      area_km2: field.area / 1e6,
    });
    if (field.status !== 'ok') expect(field.why).not.toBe('');
  });
});
