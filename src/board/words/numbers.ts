// Numbers as the reader wants them: their unit, a sensible number of digits, and a dash where there is none.

import { toHeightUnit, toSpeedUnit } from '../../air/index.ts';
import type { DisplayUnits } from '../../site/index.ts';

/** Missing on a page; the reason stands beside it. */
export const NONE = '–';

/** A number with fixed decimals and a true minus sign. */
export function plain(value: number, decimals: number): string {
  if (!Number.isFinite(value)) return NONE;
  const text = value.toFixed(decimals);
  const unsigned = text.replace('-', '');
  return Number(text) < 0 ? `−${unsigned}` : unsigned;
}

/** The same with its sign always shown. */
export function signed(value: number, decimals: number): string {
  const text = plain(value, decimals);
  return Number(value.toFixed(decimals)) > 0 ? `+${text}` : text;
}

export function speedText(speed: number, units: DisplayUnits): string {
  return plain(toSpeedUnit(speed, units.speed), units.speed === 'm/s' ? 1 : 0);
}

export function heightText(height: number, units: DisplayUnits): string {
  return plain(toHeightUnit(height, units.height), 0);
}

/** Degrees as the trade writes them, three figures: `005°`. Calm and missing have none. */
export function directionText(direction: number): string {
  if (!Number.isFinite(direction)) return NONE;
  return `${String(Math.round(direction) % 360).padStart(3, '0')}°`;
}

const POINTS = ['north', 'north-east', 'east', 'south-east', 'south', 'south-west', 'west', 'north-west'] as const;

/** The nearest of eight compass points in words; empty when the direction is missing. */
export function compassWords(direction: number): string {
  return Number.isFinite(direction) ? POINTS[Math.round(direction / 45) % 8]! : '';
}

/** A probability in words of a hundred: `98 in 100`; never 0 or 100, which nobody can know. */
export function inHundred(probability: number): string {
  if (!Number.isFinite(probability)) return 'unknown';
  return `${Math.min(99, Math.max(1, Math.round(probability * 100)))} in 100`;
}

/** A position as people write it: `38.200° N, 99.400° W`. */
export function positionWords(latitude: number, longitude: number): string {
  const north = `${plain(Math.abs(latitude), 3)}° ${latitude < 0 ? 'S' : 'N'}`;
  return `${north}, ${plain(Math.abs(longitude), 3)}° ${longitude < 0 ? 'W' : 'E'}`;
}
