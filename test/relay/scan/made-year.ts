// A year of invented nights as twelve netCDF files: a lidar of a few gates on a plain, every ten minutes, with jets on some
// nights, mostly in summer, lost profiles, and days on which the instrument stood still.

import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { writeNetcdf } from '../../../src/ingest/index.ts';
import { BlockBuilder, type Station } from '../../../src/profile/index.ts';
import { randomFrom } from '../../support/random.ts';

const STATION: Station = { id: 'reed-fen', name: 'Reed Fen', latitude: 41, longitude: -98, elevation: 480 };
const HOUR_MS = 3_600_000;
const STEP_MS = 600_000;
const DAY_MS = 24 * HOUR_MS;
const YEAR = 2023;
/** What the mean sun at 98 W is behind UTC: 6 h 32 min. */
const BEHIND_MS = (98 / 15) * HOUR_MS;
const HEIGHTS = Array.from({ length: 12 }, (_, k) => 40 + 60 * k);

interface Night {
  /** m/s that the nose stands out; 0 on a night without. */
  readonly strength: number;
  readonly nose: number;
  readonly direction: number;
  /** Hours after noon. */
  readonly from: number;
  readonly to: number;
}

export interface MadeYear {
  readonly profiles: number;
  /** Dates of the evenings of nights with a jet in the files. */
  readonly jetNights: readonly string[];
}

/** Writes `year-01.nc` to `year-12.nc`. */
export function writeYear(folder: string): MadeYear {
  mkdirSync(folder, { recursive: true });
  const random = randomFrom(2023);
  const nights = new Map<number, Night | null>();
  const nightOf = (number: number): Night | null => {
    let night = nights.get(number);
    if (night === undefined) {
      const summer = 0.5 - 0.5 * Math.cos((2 * Math.PI * (number % 365.25)) / 365.25);
      const strength = random() < 0.1 + 0.6 * summer ? 8 + 8 * random() : 0;
      const from = 9 + 2 * random();
      night = {
        strength,
        nose: 280 + 160 * random(),
        direction: 185 + 40 * random(),
        from,
        to: from + 5 + 3 * random(),
      };
      // The instrument stands still now and then.
      if (random() < 0.04) night = null;
      nights.set(number, night);
    }
    return night;
  };
  const withJet = new Set<string>();
  let profiles = 0;
  for (let month = 0; month < 12; month++) {
    const builder = new BlockBuilder();
    for (let timeMs = Date.UTC(YEAR, month, 1) + STEP_MS; timeMs <= Date.UTC(YEAR, month + 1, 1); timeMs += STEP_MS) {
      // Days since 1970 of the evening that the night begins with, and the hours since its noon by the sun.
      const sinceNoon = timeMs - BEHIND_MS - DAY_MS / 2;
      const number = Math.floor(sinceNoon / DAY_MS);
      const hours = (sinceNoon - number * DAY_MS) / HOUR_MS;
      const night = nightOf(number);
      const lost = random() < 0.05;
      if (night === null) continue;
      const blows = night.strength > 0 && hours >= night.from && hours <= night.to;
      const speed = HEIGHTS.map((z) => {
        if (lost) return NaN;
        const jet = blows ? night.strength * Math.exp(-(((z - night.nose) / 130) ** 2)) : 0;
        return Math.round(100 * (5 + z / 900 + jet + 0.2 * random())) / 100;
      });
      builder.add({
        station: STATION,
        source: 'year',
        instrument: 'lidar',
        timeMs,
        periodS: 600,
        levels: { heightAgl: HEIGHTS, speed, direction: HEIGHTS.map((z) => night.direction + z / 60) },
      });
      profiles++;
      if (blows && !lost) withJet.add(new Date(number * DAY_MS).toISOString().slice(0, 10));
    }
    writeFileSync(join(folder, `year-${String(month + 1).padStart(2, '0')}.nc`), writeNetcdf([builder.finish()]));
  }
  return { profiles, jetNights: [...withJet].sort() };
}
