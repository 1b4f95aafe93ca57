// How unsteady the wind at the hub is, where an instrument near it says so.

import { REJECTING, type Profile } from '../profile/index.ts';

export interface Gustiness {
  /** Standard deviation over mean speed within the averaging period; NaN where nobody near the hub measures it. */
  readonly turbulence: number;
  /** m/s, strongest gust of the period near the hub; NaN where nobody measures it. */
  readonly gust: number;
}

/** m: a level this near the hub speaks for it. Our own choice: turbulence changes slowly with height. */
const NEAR = 30;

/** Turbulence and gust of the level nearest to a height that carries them. */
export function gustinessAt(profile: Profile, heightAgl: number): Gustiness {
  const deviation = nearest(profile, profile.speedDeviation, heightAgl);
  const gust = nearest(profile, profile.gust, heightAgl);
  const speed = deviation < 0 ? NaN : profile.speed[deviation]!;
  return {
    turbulence: speed > 0 ? profile.speedDeviation![deviation]! / speed : NaN,
    gust: gust < 0 ? NaN : profile.gust![gust]!,
  };
}

/** Index of the nearest usable level with a value, within reach; -1 for none. */
function nearest(profile: Profile, column: Float32Array | null, heightAgl: number): number {
  let best = -1;
  let least = NEAR;
  for (let k = 0; k < profile.levelCount && column !== null; k++) {
    if ((profile.mark[k]! & REJECTING) !== 0 || !(column[k]! >= 0)) continue;
    const distance = Math.abs(profile.heightAgl[k]! - heightAgl);
    if (distance > least) continue;
    best = k;
    least = distance;
  }
  return best;
}
