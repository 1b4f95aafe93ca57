// A folder of invented tables for the scan: a lidar on a plain, a file a day.

import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

const STEP_MS = 600_000;
const START_MS = Date.UTC(2023, 2, 1);

/** Writes `days` files; each day's table overlaps the next by one profile. */
export function writeDays(folder: string, days: number, profilesADay = 144): void {
  mkdirSync(folder, { recursive: true });
  for (let day = 0; day < days; day++) writeFileSync(join(folder, `${dayName(day)}.csv`), dayTable(day, profilesADay));
}

export function dayName(day: number): string {
  return `plain-${String(day).padStart(3, '0')}`;
}

export function dayTable(day: number, profilesADay: number, extraSpeed = 0): string {
  const lines = ['station,latitude,longitude,time,height,speed,direction'];
  for (let k = 0; k <= profilesADay; k++) {
    const timeMs = START_MS + day * 86_400_000 + (k * 144 * STEP_MS) / profilesADay;
    // By day no jet, in the second half of the night one.
    const jet = Math.max(0, 14 * Math.sin((2 * Math.PI * (timeMs - START_MS)) / 86_400_000 - 0.7));
    for (let z = 40; z <= 1000; z += 60) {
      const speed = 7 + extraSpeed + jet * Math.exp(-(((z - 340) / 220) ** 2)) + z / 2000;
      const time = new Date(timeMs).toISOString();
      lines.push(`north-plain,40.1,-100.2,${time},${z},${speed.toFixed(2)},${(190 + z / 40).toFixed(1)}`);
    }
  }
  return `${lines.join('\n')}\n`;
}
