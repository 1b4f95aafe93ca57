// Wind as a vector and as speed and direction. Directions are degrees, clockwise from north, where the wind comes from
// (WMO-No. 8, Part I, chapter 5).

const RADIANS = Math.PI / 180;
/** Below this speed, m/s, a vector has no direction worth the name. */
export const CALM_SPEED = 1e-9;

/** Eastward component, m/s. Calm gives 0 whatever the direction; NaN in, NaN out. */
export function eastward(speed: number, direction: number): number {
  return speed === 0 ? 0 : -speed * Math.sin(direction * RADIANS);
}

/** Northward component, m/s. Calm gives 0 whatever the direction; NaN in, NaN out. */
export function northward(speed: number, direction: number): number {
  return speed === 0 ? 0 : -speed * Math.cos(direction * RADIANS);
}

/** Speed of a vector, m/s. */
export function speedOf(u: number, v: number): number {
  return Math.sqrt(u * u + v * v);
}

/** Direction the vector comes from, degrees in [0, 360); NaN when calm. */
export function directionOf(u: number, v: number): number {
  if (!(speedOf(u, v) >= CALM_SPEED)) return NaN;
  const degrees = Math.atan2(-u, -v) / RADIANS;
  const turned = degrees < 0 ? degrees + 360 : degrees;
  return turned >= 360 ? 0 : turned;
}

/** Any angle brought into (-180, 180], degrees; the short way round, clockwise positive. */
export function signedAngle(degrees: number): number {
  const turned = degrees % 360;
  if (turned > 180) return turned - 360;
  if (turned <= -180) return turned + 360;
  return turned;
}

/** Turn from one direction to another by the short way, degrees in (-180, 180], clockwise positive. */
export function veerBetween(fromDirection: number, toDirection: number): number {
  return signedAngle(toDirection - fromDirection);
}

/** Any direction brought into [0, 360), degrees. */
export function normalDirection(degrees: number): number {
  const turned = degrees % 360;
  return turned < 0 ? turned + 360 : turned;
}
