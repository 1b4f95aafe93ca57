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
  // Of its own, so that the means stay as they are.
  const unrest = new Chance(plan.seed + 1_000_000);
  const lines = [
    'station,time,height_agl_m,speed_mps,direction_deg,temperature_c,relative_humidity_percent,pressure_hpa,speed_std_mps,gust_mps',
  ];
  for (const moment of momentsOf(atmosphere, plan.timesMs)) {
    const air = moment.air(plan.heights);
    plan.heights.forEach((height, k) => {
      const wind = moment.wind(height);
      const u = wind.u + 0.08 * chance.normal();
      const v = wind.v + 0.08 * chance.normal();
      const { pressure, temperature, specificHumidity } = air[k]!;
      const share = (0.05 + 0.09 * atmosphere.convection(moment.timeMs)) * (1 + 25 / (25 + height));
      const deviation = Math.max(0.1, speedOf(u, v) * share * (1 + 0.15 * unrest.normal()));
      const gust = speedOf(u, v) + deviation * (2.6 + 0.4 * unrest.next());
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
          deviation.toFixed(2),
          gust.toFixed(2),
        ].join(','),
      );
    });
  }
  return `${lines.join('\n')}\n`;
}
