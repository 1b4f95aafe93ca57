// How thick the core of a jet is: where the speed has fallen halfway from the nose to the minimum above it.

import { between } from './column.ts';
import type { NoseColumn } from './nose.ts';

export interface JetCore {
  /** m above ground; NaN where the nose has no fall-off */
  readonly bottom: number;
  readonly top: number;
  /** Speed at its bounds, m/s: the mean of the nose and of the minimum above it. */
  readonly threshold: number;
  /** The speed does not fall to the threshold below the nose: the bottom is the lowest level. */
  readonly bottomIsBound: boolean;
}

/** Bounds of the core, linear in height between levels. */
export function coreOf(column: NoseColumn, nose: number, minimum: number): JetCore {
  const { heightAgl, speed, count } = column;
  const threshold = (speed[nose]! + speed[minimum]!) / 2;
  if (!(speed[nose]! > threshold)) return { bottom: NaN, top: NaN, threshold: NaN, bottomIsBound: false };
  const bound = (beyond: number, within: number): number =>
    between(heightAgl[within]!, heightAgl[beyond]!, (speed[within]! - threshold) / (speed[within]! - speed[beyond]!));
  let upper = nose + 1;
  while (upper < count && speed[upper]! > threshold) upper++;
  let lower = nose - 1;
  while (lower >= 0 && speed[lower]! > threshold) lower--;
  return {
    bottom: lower >= 0 ? bound(lower, lower + 1) : heightAgl[0]!,
    top: bound(upper, upper - 1),
    threshold,
    bottomIsBound: lower < 0,
  };
}
