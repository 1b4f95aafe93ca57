// The real night and check columns for the tests of this room.

import { readShared } from '../support/shared.ts';

/** A column out of a check table: null becomes NaN. */
export function columnOf(values: unknown): number[] {
  return (values as (number | null)[]).map((value) => value ?? NaN);
}

/** Where a row of the real night came from, as its file writes it. */
export type NightSource = 'tower' | 'low-mode' | 'high-mode';
const NIGHT_SOURCES: Readonly<Record<string, NightSource>> = { '-1.0': 'tower', '0.0': 'low-mode', '1.0': 'high-mode' };

/** The real night's levels by time (`2013-11-08 12:00:00`), of the sources asked for. */
export function nightLevels(
  wanted: readonly NightSource[],
): Map<string, { heightAgl: number[]; speed: number[]; direction: number[] }> {
  const rows = new TextDecoder()
    .decode(readShared('real/night/combined_radar_data_qc.csv'))
    .trim()
    .split('\n')
    .slice(1);
  const times = new Map<string, { heightAgl: number[]; speed: number[]; direction: number[] }>();
  for (const row of rows) {
    const [time, height, , source, speed, direction] = row.split(',');
    if (!wanted.includes(NIGHT_SOURCES[source!]!)) continue;
    const levels = times.get(time!) ?? { heightAgl: [], speed: [], direction: [] };
    levels.heightAgl.push(Number(height));
    levels.speed.push(Number(speed));
    levels.direction.push(Number(direction));
    times.set(time!, levels);
  }
  return times;
}
