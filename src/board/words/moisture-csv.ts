// The moist night as tables to take away: keys with units, times in UTC, missing is an empty cell.

import type { MoistureState, TriangleState } from '../../desk/index.ts';

const HEAD = [
  'time_utc',
  'status',
  'why',
  'humidity_from',
  'humidity_age_s',
  'humidity_distance_m',
  'humidity_uncertainty',
  'transport_kg_per_m_s',
  'transport_direction_deg',
  'transport_by_height_kg_per_m_s',
  'below_3km_kg_per_m_s',
  'below_3km_direction_deg',
  'below_3km_reaches_m',
  'in_jet_kg_per_m_s',
  'precipitable_water_kg_per_m2',
  'moist_layer_top_m',
  'theta_e_greatest_k',
  'theta_e_greatest_height_m',
  'theta_e_least_k',
  'theta_e_least_height_m',
  'theta_e_slope_k_per_km',
];

/** A line a profile. */
export function moistureCsv(state: MoistureState): string {
  const lines = state.numbers.map((numbers, k) =>
    [
      time(state.timeMs[k]!),
      numbers.status,
      quoted(numbers.why),
      quoted(numbers.humidityFrom),
      number(numbers.humidityAgeS, 0),
      number(numbers.humidityDistance, 0),
      number(numbers.humidityUncertainty, 3),
      number(numbers.transport.size, 2),
      number(numbers.transport.direction, 1),
      number(numbers.transportInHeight.size, 2),
      number(numbers.below3Km.size, 2),
      number(numbers.below3Km.direction, 1),
      number(numbers.below3Km.reaches, 0),
      number(numbers.inJet.size, 2),
      number(numbers.precipitableWater, 2),
      number(numbers.moistTop, 0),
      number(numbers.instability.greatest, 2),
      number(numbers.instability.greatestHeight, 0),
      number(numbers.instability.least, 2),
      number(numbers.instability.leastHeight, 0),
      number(1000 * numbers.instability.slope, 3),
    ].join(','),
  );
  return `${[HEAD.join(','), ...lines].join('\n')}\n`;
}

const TRIANGLE_HEAD = [
  'time_utc',
  'stations',
  'bottom_m',
  'top_m',
  'status',
  'why',
  'divergence_per_s',
  'divergence_uncertainty_per_s',
  'vorticity_per_s',
  'vorticity_uncertainty_per_s',
  'moisture_flux_divergence_per_s',
  'moisture_flux_divergence_uncertainty_per_s',
  'vertical_motion_at_top_mps',
  'vertical_motion_uncertainty_mps',
];

/** A line a layer of each set of stations. */
export function trianglesCsv(triangles: readonly TriangleState[]): string {
  const lines = triangles.flatMap(({ timeMs, members, layers }) =>
    layers.map(({ bottom, top, field, verticalMotion, verticalMotionUncertainty }) =>
      [
        time(timeMs),
        quoted(members.map(({ id }) => id).join(' ')),
        number(bottom, 0),
        number(top, 0),
        field.status,
        quoted(field.why),
        significant(field.divergence),
        significant(field.divergenceUncertainty),
        significant(field.vorticity),
        significant(field.vorticityUncertainty),
        significant(field.moistureFluxDivergence),
        significant(field.moistureFluxDivergenceUncertainty),
        significant(verticalMotion),
        significant(verticalMotionUncertainty),
      ].join(','),
    ),
  );
  return `${[TRIANGLE_HEAD.join(','), ...lines].join('\n')}\n`;
}

function time(ms: number): string {
  return Number.isFinite(ms) ? new Date(ms).toISOString() : '';
}

function quoted(text: string): string {
  return text === '' ? '' : `"${text.replaceAll('"', '""')}"`;
}

function number(value: number, decimals: number): string {
  return Number.isFinite(value) ? value.toFixed(decimals) : '';
}

function significant(value: number): string {
  return Number.isFinite(value) ? String(Number(value.toPrecision(4))) : '';
}
