// An invented atmosphere that instruments can look at: wind of the column, its eddies, and the state of the air.

import type { Wind } from './air-column.ts';
import { airAt, type Air, type AirPlan } from './air-state.ts';
import { Chance, Wandering } from './chance.ts';

export interface AtmospherePlan extends AirPlan {
  readonly seed: number;
  /** The wind without eddies at heights above ground, m, as it stands at each of the times (ascending, UTC ms). */
  winds(timesMs: readonly number[]): Iterable<(heightAgl: number) => Wind>;
  /** How strongly day's heating stirs the air, 0 to 1. */
  convection(timeMs: number): number;
  /** Deviation of the eddies in each component, m/s, at a time. */
  eddies(timeMs: number): number;
}

/** The wind and the air at one time. */
export interface Moment {
  readonly timeMs: number;
  /** m/s, eastward and northward, with eddies */
  wind(heightAgl: number): Wind;
  /** at ascending heights, m above ground */
  air(heights: readonly number[]): Air[];
}

/** The atmosphere at the asked times, ascending. */
export function* momentsOf(plan: AtmospherePlan, timesMs: readonly number[]): Generator<Moment> {
  const chance = new Chance(plan.seed);
  const wanderingU = new Wandering(chance);
  const wanderingV = new Wandering(chance);
  // Eddies are counted from midnight UTC of the first day, so that every instrument meets the same ones.
  const dayMs = Math.floor(timesMs[0]! / 86_400_000) * 86_400_000;
  let index = 0;
  for (const windAt of plan.winds(timesMs)) {
    const timeMs = timesMs[index++]!;
    const hours = (timeMs - dayMs) / 3_600_000;
    yield {
      timeMs,
      wind(heightAgl) {
        const mean = windAt(heightAgl);
        // Eddies cannot be larger than the ground lets them.
        const size = plan.eddies(timeMs) * Math.min(1, 0.3 + heightAgl / 150);
        return {
          u: mean.u + size * wanderingU.at(heightAgl, hours),
          v: mean.v + size * wanderingV.at(heightAgl, hours),
        };
      },
      air: (heights) => airAt(plan, heights, timeMs),
    };
  }
}
