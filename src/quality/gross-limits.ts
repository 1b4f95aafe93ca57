// Gross limits: is a value one that the atmosphere can have at all?
//
// The limits are common practice, without source: wide enough that no real jet, tornado-free gust front or polar night is
// lost, narrow enough to catch unit slips, decoding slips and lone wild gates.

import { MARK } from '../profile/index.ts';
import type { Screened } from './series.ts';

/** Highest credible speed, m/s, at a height above ground: 60 at the ground, growing to 150 at 10 km and above. */
export function highestSpeed(heightAgl: number): number {
  return Math.min(150, 60 + 0.009 * Math.max(0, heightAgl));
}

const HIGHEST_VERTICAL_SPEED = 30;
const HIGHEST_PRESSURE = 110_000;
const LOWEST_TEMPERATURE = 170;
const HIGHEST_TEMPERATURE = 335;
const HIGHEST_HUMIDITY = 0.045;

/**
 * Adds `impossible` where wind, vertical speed or pressure is beyond its limit, and `air-impossible` where only temperature
 * or humidity is. Missing values pass.
 */
export function grossLimits({ block }: Screened, marks: Uint32Array): void {
  const { heightAgl, speed, direction, verticalSpeed, pressure, temperature, specificHumidity } = block;
  for (let k = 0; k < marks.length; k++) {
    if (
      speed[k]! < 0 ||
      speed[k]! > highestSpeed(heightAgl[k]!) ||
      direction[k]! < 0 ||
      direction[k]! > 360 ||
      (verticalSpeed !== null && Math.abs(verticalSpeed[k]!) > HIGHEST_VERTICAL_SPEED) ||
      (pressure !== null && (pressure[k]! <= 0 || pressure[k]! > HIGHEST_PRESSURE))
    ) {
      marks[k]! |= MARK.impossible;
    }
    if (
      (temperature !== null && (temperature[k]! < LOWEST_TEMPERATURE || temperature[k]! > HIGHEST_TEMPERATURE)) ||
      (specificHumidity !== null && (specificHumidity[k]! < 0 || specificHumidity[k]! > HIGHEST_HUMIDITY))
    ) {
      marks[k]! |= MARK['air-impossible'];
    }
  }
}
