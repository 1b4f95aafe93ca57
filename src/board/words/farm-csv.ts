// The farm's night and record as tables to take away: keys with units, times in UTC, missing empty.

import type { FarmRecord, NightState } from '../../desk/index.ts';

type Row = readonly (readonly [key: string, cell: string])[];

/** A line a profile and turbine type. */
export function farmCsv(night: NightState): string {
  const { farm } = night;
  return csvOf(
    night.discs.flatMap(({ turbine, winds }, type) => {
      const output = farm.output.types[type]!;
      return winds.map((wind, k): Row => [
        ['time_utc', new Date(night.timeMs[k]!).toISOString()],
        ['turbine', `"${turbine.name.replaceAll('"', '""')}"`],
        ['status', wind.status],
        ['why', `"${wind.why.replaceAll('"', '""')}"`],
        ['coverage', number(wind.coverage, 3)],
        ['continued_share', number(wind.continuedShare, 3)],
        ['hub_speed_mps', number(wind.hubSpeed, 2)],
        ['hub_speed_uncertainty_mps', number(wind.uncertainty.hubSpeed, 2)],
        ['hub_direction_deg', number(wind.hubDirection, 1)],
        ['rews_mps', number(wind.equivalentSpeed, 3)],
        ['rews_veer_mps', number(wind.equivalentSpeedVeer, 3)],
        ['rews_uncertainty_mps', number(wind.uncertainty.equivalentSpeed, 3)],
        ['integral_speed_mps', number(wind.integralSpeed, 3)],
        ['shear_exponent', number(wind.shearExponent, 3)],
        ['shear_exponent_lower', number(wind.shearLower, 3)],
        ['shear_exponent_upper', number(wind.shearUpper, 3)],
        ['veer_deg', number(wind.veer, 1)],
        ['lower_tip_speed_mps', number(wind.bottom.speed, 2)],
        ['lower_tip_direction_deg', number(wind.bottom.direction, 1)],
        ['upper_tip_speed_mps', number(wind.top.speed, 2)],
        ['upper_tip_direction_deg', number(wind.top.direction, 1)],
        ['nose_height_agl_m', number(night.findings[k]!.jets[0]?.noseHeight ?? NaN, 0)],
        ['nose_in_rotor', wind.noseInRotor === null ? '' : String(wind.noseInRotor)],
        ['turbulence_intensity', number(wind.turbulence, 3)],
        ['gust_mps', number(wind.gust, 2)],
        ['air_density_kg_per_m3', number(wind.airDensity, 4)],
        ['power_kw', number(output.hubKw[k]!, 0)],
        ['power_equivalent_kw', number(output.equivalentKw[k]!, 0)],
        ['farm_power_kw', number(farm.output.hubKw[k]!, 0)],
        ['farm_power_equivalent_kw', number(farm.output.equivalentKw[k]!, 0)],
        ['farm_actual_kw', number(farm.actual?.powerKw[k] ?? NaN, 0)],
      ]);
    }),
  );
}

/** A line a profile of the record. */
export function recordCsv({ timeMs, hubKw, equivalentKw, actualKw }: FarmRecord): string {
  return csvOf(
    Array.from(timeMs, (time, k): Row => [
      ['time_utc', new Date(time).toISOString()],
      ['farm_power_kw', number(hubKw[k]!, 0)],
      ['farm_power_equivalent_kw', number(equivalentKw[k]!, 0)],
      ['farm_actual_kw', number(actualKw?.[k] ?? NaN, 0)],
    ]),
  );
}

function csvOf(rows: readonly Row[]): string {
  const head = rows[0]?.map(([key]) => key).join(',') ?? '';
  return `${[head, ...rows.map((row) => row.map(([, cell]) => cell).join(','))].join('\n')}\n`;
}

function number(value: number, decimals: number): string {
  return Number.isFinite(value) ? value.toFixed(decimals) : '';
}
