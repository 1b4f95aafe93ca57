// Gross limits: is a value one that the atmosphere can have at all?
//
// The limits are common practice, without source: wide enough that no real jet, tornado-free gust front or polar night is
// lost, narrow enough to catch unit slips, decoding slips and lone wild gates.

import { standardHeight } from '../air/index.ts';
import { MARK, type ProfileBlock } from '../profile/index.ts';
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
 * How far the height of a pressure in the standard atmosphere may lie from the level's own height above sea level: 1300 m,
 * so that the deepest cyclones and strongest highs pass, and 15 % for air as cold as the poles' or as warm as the tropics'.
 */
const HEIGHT_OFF = 1300;
const HEIGHT_OFF_SHARE = 0.15;
/** Ground lies between these heights above sea level, m, where nobody says how high. */
const LOWEST_GROUND = -450;
const HIGHEST_GROUND = 5600;

/**
 * Adds `impossible` where wind, vertical speed or pressure is beyond its limit or the pressure grossly contradicts the
 * height, and `air-impossible` where only temperature or humidity is. Missing values pass.
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
  if (pressure !== null) contradictedHeights(block, pressure, marks);
}

/** Wrong units of height or pressure, and levels that slipped, by the standard atmosphere. */
function contradictedHeights(
  { offsets, stations, stationIndex, profileCount, heightAgl }: ProfileBlock,
  pressure: Float32Array,
  marks: Uint32Array,
): void {
  for (let i = 0; i < profileCount; i++) {
    const { elevation } = stations[stationIndex[i]!]!;
    const [lowest, highest] = Number.isNaN(elevation) ? [LOWEST_GROUND, HIGHEST_GROUND] : [elevation, elevation];
    for (let k = offsets[i]!; k < offsets[i + 1]!; k++) {
      const expected = standardHeight(pressure[k]!);
      const height = heightAgl[k]!;
      const off = HEIGHT_OFF + HEIGHT_OFF_SHARE * Math.max(0, height);
      if (expected < height + lowest - off || expected > height + highest + off) marks[k]! |= MARK.impossible;
    }
  }
}
