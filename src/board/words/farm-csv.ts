// The farm's night as a table to take away: a line a profile and turbine type, keys with units, times in UTC.

import type { NightState } from '../../desk/index.ts';

const HEAD = [
  'time_utc',
  'turbine',
  'status',
  'coverage',
  'hub_speed_mps',
  'hub_direction_deg',
  'rews_mps',
  'rews_veer_mps',
  'shear_exponent',
  'veer_deg',
  'nose_in_rotor',
  'power_kw',
  'power_equivalent_kw',
];

export function farmCsv(night: NightState): string {
  const lines = [HEAD.join(',')];
  night.discs.forEach(({ turbine, winds }, type) => {
    const output = night.farm.output.types[type]!;
    winds.forEach((wind, k) => {
      const cells = [
        new Date(night.timeMs[k]!).toISOString(),
        `"${turbine.name.replaceAll('"', '""')}"`,
        wind.status,
        number(wind.coverage, 3),
        number(wind.hubSpeed, 2),
        number(wind.hubDirection, 1),
        number(wind.equivalentSpeed, 3),
        number(wind.equivalentSpeedVeer, 3),
        number(wind.shearExponent, 3),
        number(wind.veer, 1),
        wind.noseInRotor === null ? '' : String(wind.noseInRotor),
        number(output.hubKw[k]!, 0),
        number(output.equivalentKw[k]!, 0),
      ];
      lines.push(cells.join(','));
    });
  });
  return `${lines.join('\n')}\n`;
}

/** Missing is an empty cell. */
function number(value: number, decimals: number): string {
  return Number.isFinite(value) ? value.toFixed(decimals) : '';
}
