// What an invented radiosonde reports, as CSV: one ascent, a level about every 50 m.

import { dewPointOf, directionOf, speedOf, ZERO_CELSIUS } from '../../src/air/index.ts';
import { momentsOf, type AtmospherePlan } from './atmosphere.ts';
import { Chance } from './chance.ts';
import { isoSeconds } from './clock.ts';

export interface SondePlan {
  readonly seed: number;
  readonly station: string;
  readonly latitude: number;
  readonly longitude: number;
  /** m above sea level */
  readonly elevation: number;
  readonly launchMs: number;
  /** m above ground at which the balloon bursts */
  readonly top: number;
}

export function sondeCsv(atmosphere: AtmospherePlan, plan: SondePlan): string {
  const chance = new Chance(plan.seed);
  const heights = [0];
  for (let height = 20; height < plan.top; height += 45 + 10 * chance.next()) heights.push(Math.round(height));
  const [moment] = [...momentsOf(atmosphere, [plan.launchMs])];
  const lines = [
    'station,latitude,longitude,elevation_m,time,height_amsl_m,pressure_hpa,temperature_c,dewpoint_c,speed_mps,direction_deg',
  ];
  const place = [plan.station, plan.latitude, plan.longitude, plan.elevation, isoSeconds(plan.launchMs)].join(',');
  moment!.air(heights).forEach(({ pressure, temperature, specificHumidity }, k) => {
    // At the ground the wind is that of the mast's height.
    const wind = moment!.wind(Math.max(10, heights[k]!));
    const u = wind.u + 0.15 * chance.normal();
    const v = wind.v + 0.15 * chance.normal();
    lines.push(
      [
        place,
        plan.elevation + heights[k]!,
        (pressure / 100).toFixed(1),
        (temperature - ZERO_CELSIUS).toFixed(1),
        (Math.min(dewPointOf(specificHumidity, pressure), temperature) - ZERO_CELSIUS).toFixed(1),
        speedOf(u, v).toFixed(1),
        Math.round(directionOf(u, v)) % 360,
      ].join(','),
    );
  });
  return `${lines.join('\n')}\n`;
}
