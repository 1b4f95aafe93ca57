// The nose between the levels: a parabola through the level and its two neighbours.

/** Height (m) and speed (m/s) of a vertex, or of the level itself where no parabola through it has one. */
export interface Refined {
  readonly height: number;
  readonly speed: number;
}

/**
 * Vertex of the parabola through levels k - 1, k and k + 1, where k is not slower than either. Never further away than the
 * nearer neighbour: across a wide gap a parabola invents a peak. At an edge of the column, or where the three lie on a
 * line, the level itself.
 */
export function refineNose(heightAgl: ArrayLike<number>, speed: ArrayLike<number>, count: number, k: number): Refined {
  const height = heightAgl[k]!;
  const peak = speed[k]!;
  if (k < 1 || k > count - 2) return { height, speed: peak };
  const lower = heightAgl[k - 1]! - height;
  const upper = heightAgl[k + 1]! - height;
  const lowerChange = (speed[k - 1]! - peak) / lower;
  const upperChange = (speed[k + 1]! - peak) / upper;
  const curvature = (upperChange - lowerChange) / (upper - lower);
  if (!(curvature < 0)) return { height, speed: peak };
  const slope = lowerChange - curvature * lower;
  const reach = Math.min(upper, -lower);
  const offset = Math.min(reach, Math.max(-reach, -slope / (2 * curvature)));
  return { height: height + offset, speed: peak + (slope + curvature * offset) * offset };
}
