// From wind speed to power, by the turbine's own curve, and the air density that the curve was made for.

import { REFERENCE_DENSITY } from '../air/index.ts';

/**
 * Power by linear interpolation in a table: 0 below the first and above the last tabulated speed, which themselves count
 * (usual with IEC 61400-12-1 curves).
 * @param curve speeds in m/s, ascending, and powers in kW
 * @param speed m/s; NaN stays NaN
 * @returns kW
 */
export function powerFromCurve(
  curve: { readonly speed: readonly number[]; readonly powerKw: readonly number[] },
  speed: number,
): number {
  if (Number.isNaN(speed)) return NaN;
  const last = curve.speed.length - 1;
  if (last < 0 || !(speed >= curve.speed[0]!) || !(speed <= curve.speed[last]!)) return 0;
  let low = 0;
  let high = last;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (curve.speed[middle]! <= speed) low = middle;
    else high = middle;
  }
  const span = curve.speed[high]! - curve.speed[low]!;
  const weight = span > 0 ? (speed - curve.speed[low]!) / span : 1;
  return curve.powerKw[low]! * (1 - weight) + curve.powerKw[high]! * weight;
}

/**
 * Speed that would carry the same power at the reference density: V (rho/rho0)^(1/3), IEC 61400-12-1:2017 for pitch-regulated
 * turbines.
 * @param density kg/m3
 * @param reference kg/m3 the curve was made for
 */
export function normaliseSpeed(speed: number, density: number, reference: number = REFERENCE_DENSITY): number {
  return speed * Math.cbrt(density / reference);
}

/** Power at the reference density: P rho0/rho, IEC 61400-12-1:2017 for stall-regulated turbines. */
export function normalisePower(powerKw: number, density: number, reference: number = REFERENCE_DENSITY): number {
  return (powerKw * reference) / density;
}
