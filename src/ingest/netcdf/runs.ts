// Tables stored as netCDF: one long dimension along which time stays the same while height rises, again and again.

import type { Layout } from './layout.ts';

/**
 * The same layout read as one profile after the other, where times and heights show that it is that.
 * A sonde's ascent is none: its heights go on rising as time goes on.
 * @param time as stored @param height as stored, same length
 * @returns null where the levels are one profile
 */
export function layoutByRuns(layout: Layout, time: ArrayLike<number>, height: ArrayLike<number>): Layout | null {
  const starts = [0];
  let fallsBack = 0;
  for (let k = 1; k < time.length; k++) {
    if (time[k] === time[k - 1]) continue;
    starts.push(k);
    if (height[k]! <= height[k - 1]!) fallsBack++;
  }
  // Each new time begins below where the last one ended, give or take a few that end early.
  if (starts.length < 2 || starts.length === time.length || fallsBack < 0.9 * (starts.length - 1)) return null;
  return {
    ...layout,
    profileDimensions: [`${layout.levelDimension!} (runs)`],
    profileShape: [starts.length],
    levelCount: 0,
    ragged: { offsets: Uint32Array.from([...starts, time.length]), order: null },
  };
}
