// An invented atmosphere that instruments can look at: wind of the column, its eddies, and the state of the air.

import { windAt, windThroughTime, type Weather, type Wind } from './air-column.ts';
import { airAt, type Air, type AirPlan } from './air-state.ts';
import { Chance, Wandering } from './chance.ts';

export interface AtmospherePlan extends Weather, AirPlan {
  readonly seed: number;
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
  for (const column of windThroughTime(plan, timesMs)) {
    const timeMs = timesMs[index++]!;
    const hours = (timeMs - dayMs) / 3_600_000;
    yield {
      timeMs,
      wind(heightAgl) {
        const mean = windAt(column, heightAgl);
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
