// Made-up profiles for the screens.

import {
  BlockBuilder,
  profileAt,
  type Instrument,
  type LevelInput,
  type ProfileBlock,
} from '../../src/profile/index.ts';
import { randomFrom } from '../support/random.ts';

export const MINUTE_MS = 60_000;
/** An evening at no place in particular. */
export const START_MS = Date.UTC(2031, 9, 4, 20);

export interface Made {
  readonly levels: LevelInput;
  readonly timeMs: number;
  readonly instrument?: Instrument;
  readonly source?: string;
  readonly revision?: number;
  readonly station?: string;
  readonly latitude?: number;
  readonly longitude?: number;
}

export function blockOf(profiles: readonly Made[]): ProfileBlock {
  const builder = new BlockBuilder();
  for (const { levels, timeMs, instrument, source, revision, station, latitude, longitude } of profiles) {
    const id = station ?? 'heron-moss';
    builder.add({
      station: { id, name: id, latitude: latitude ?? 47, longitude: longitude ?? 3, elevation: 120 },
      source: source ?? 'feed',
      instrument: instrument ?? 'wind-profiler',
      revision: revision ?? 0,
      timeMs,
      levels,
    });
  }
  return builder.finish();
}

/** Marks of the i-th profile, lowest level first. */
export const marksOf = (block: ProfileBlock, i: number): number[] => [...profileAt(block, i).mark];

/** A night of a jet that grows: gates every 60 m, profiles every 10 minutes, noise of the given standard deviation. */
export function jetNight(profiles: number, noise: number, seed = 7): { made: Made[]; u: number[][]; v: number[][] } {
  const random = randomFrom(seed);
  const gauss = (): number => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
  const heights = Array.from({ length: 40 }, (_, g) => 100 + 60 * g);
  const u: number[][] = [];
  const v: number[][] = [];
  const made = Array.from({ length: profiles }, (_, i) => {
    const strength = 6 + (8 * i) / profiles;
    const turn = (i / profiles) * 0.6;
    u.push(heights.map((z) => strength * Math.exp(-(((z - 420) / 350) ** 2)) * Math.cos(turn) + 3 + noise * gauss()));
    v.push(
      heights.map((z) => strength * Math.exp(-(((z - 420) / 350) ** 2)) * Math.sin(turn) + z / 500 + noise * gauss()),
    );
    return { timeMs: START_MS + i * 10 * MINUTE_MS, levels: { heightAgl: heights, u: u[i]!, v: v[i]! } };
  });
  return { made, u, v };
}
