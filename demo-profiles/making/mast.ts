// What an invented mast reports, as CSV: ten-minute means at a few heights.

import { directionOf, relativeHumidityOf, speedOf, ZERO_CELSIUS } from '../../src/air/index.ts';
import { momentsOf, type AtmospherePlan } from './atmosphere.ts';
import { Chance } from './chance.ts';
import { isoSeconds } from './clock.ts';

export interface MastPlan {
  readonly seed: number;
  readonly station: string;
  readonly heights: readonly number[];
  readonly timesMs: readonly number[];
}

export function mastCsv(atmosphere: AtmospherePlan, plan: MastPlan): string {
  const chance = new Chance(plan.seed);
  const lines = [
    'station,time,height_agl_m,speed_mps,direction_deg,temperature_c,relative_humidity_percent,pressure_hpa',
  ];
  for (const moment of momentsOf(atmosphere, plan.timesMs)) {
    const air = moment.air(plan.heights);
    plan.heights.forEach((height, k) => {
      const wind = moment.wind(height);
      const u = wind.u + 0.08 * chance.normal();
      const v = wind.v + 0.08 * chance.normal();
      const { pressure, temperature, specificHumidity } = air[k]!;
      lines.push(
        [
          plan.station,
          isoSeconds(moment.timeMs),
          height,
          speedOf(u, v).toFixed(2),
          (Number(directionOf(u, v).toFixed(1)) % 360).toFixed(1),
          (temperature - ZERO_CELSIUS + 0.05 * chance.normal()).toFixed(2),
          (100 * relativeHumidityOf(specificHumidity, temperature, pressure)).toFixed(1),
          (pressure / 100).toFixed(2),
        ].join(','),
      );
    });
  }
  return `${lines.join('\n')}\n`;
}
