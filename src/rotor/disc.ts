// The swept disc of a turbine and its parts between two heights.

/** A rotor's swept disc, m; heights above ground. */
export interface Disc {
  readonly hubHeight: number;
  readonly rotorDiameter: number;
}

/** Height of the lower tip, m above ground. */
export function bottomTip(disc: Disc): number {
  return disc.hubHeight - disc.rotorDiameter / 2;
}

/** Height of the upper tip, m above ground. */
export function topTip(disc: Disc): number {
  return disc.hubHeight + disc.rotorDiameter / 2;
}

/**
 * Area of the part of the disc between two heights, by plane geometry as IEC 61400-12-1:2017 uses it: F(top) - F(bottom)
 * with F(y) = y sqrt(R2 - y2) + R2 asin(y/R), y the height over the hub.
 * @param bottom m above ground; may be -Infinity
 * @param top m above ground; may be Infinity
 * @returns m2, from 0 to the whole disc; NaN in, NaN out; 0 when `top` does not lie above `bottom`
 */
export function segmentArea(disc: Disc, bottom: number, top: number): number {
  const radius = disc.rotorDiameter / 2;
  const low = clamp(bottom - disc.hubHeight, radius);
  const high = clamp(top - disc.hubHeight, radius);
  if (low >= high) return 0;
  return areaBelow(high, radius) - areaBelow(low, radius);
}

/** Share of the disc's area below a height, 0 to 1; NaN in, NaN out. */
export function shareBelow(disc: Disc, height: number): number {
  const sine = clamp((2 * (height - disc.hubHeight)) / disc.rotorDiameter, 1);
  return 0.5 + (sine * Math.sqrt(1 - sine * sine) + Math.asin(sine)) / Math.PI;
}

function areaBelow(y: number, radius: number): number {
  return y * Math.sqrt(radius * radius - y * y) + radius * radius * Math.asin(y / radius);
}

function clamp(y: number, radius: number): number {
  return Math.max(-radius, Math.min(radius, y));
}
