// The outline of a few stations on a plane: how large it is, and how near to a line.

export interface Point {
  readonly x: number;
  readonly y: number;
}

/** Outermost points, anticlockwise, points on a side left out (Andrew 1979, Inform. Process. Lett. 9). */
export function convexHull(points: readonly Point[]): Point[] {
  const sorted = [...points].sort((a, b) => a.x - b.x || a.y - b.y);
  if (sorted.length < 3) return sorted;
  return [...chain(sorted), ...chain(sorted.reverse())];
}

/** One side of the outline, its last point left for the other side to begin with. */
function chain(sorted: readonly Point[]): Point[] {
  const kept: Point[] = [];
  for (const point of sorted) {
    while (kept.length >= 2 && cross(kept.at(-2)!, kept.at(-1)!, point) <= 0) kept.pop();
    kept.push(point);
  }
  kept.pop();
  return kept;
}

/** Twice the area of a triangle, positive when anticlockwise. */
function cross(a: Point, b: Point, c: Point): number {
  return (b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x);
}

/** Area within an outline. */
export function hullArea(hull: readonly Point[]): number {
  let twice = 0;
  for (let k = 2; k < hull.length; k++) twice += cross(hull[0]!, hull[k - 1]!, hull[k]!);
  return twice / 2;
}

/** Greatest distance between two points of an outline. */
export function longestSide(hull: readonly Point[]): number {
  let longest = 0;
  for (const a of hull) for (const b of hull) longest = Math.max(longest, Math.hypot(a.x - b.x, a.y - b.y));
  return longest;
}

/** Width of the narrowest strip that holds the outline; for a triangle its least height. 0 for fewer than three points. */
export function leastWidth(hull: readonly Point[]): number {
  if (hull.length < 3) return 0;
  return Math.min(
    ...hull.map((from, k) => {
      const to = hull[(k + 1) % hull.length]!;
      const side = Math.hypot(to.x - from.x, to.y - from.y);
      return Math.max(...hull.map((point) => cross(from, to, point))) / side;
    }),
  );
}
