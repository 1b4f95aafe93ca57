// Wind that turns about an equilibrium at a steady rate: the inertial oscillation of Blackadar (1957, Bull. Amer. Meteor.
// Soc. 38), about the equilibrium wind of van de Wiel et al. (2010, J. Atmos. Sci. 67). Written with complex numbers,
// W = u + iv: W(t) = Weq + A exp(-i f t), f the Coriolis parameter; clockwise where f is positive.

/** An oscillation: its equilibrium and its departure from it at time zero, m/s eastward and northward. */
export interface Oscillation {
  readonly equilibriumU: number;
  readonly equilibriumV: number;
  readonly departureU: number;
  readonly departureV: number;
  /** f, 1/s: radians a second by which the departure turns clockwise. */
  readonly turning: number;
}

/** A fitted oscillation; numbers are NaN where none can be fitted. */
export interface FittedOscillation extends Oscillation {
  /** Root of the mean squared vector residual, m/s. */
  readonly rms: number;
  /** Winds that were complete. */
  readonly used: number;
}

/** The wind so many seconds on, m/s. */
export function oscillatingWind(oscillation: Oscillation, seconds: number): { u: number; v: number } {
  const { equilibriumU, equilibriumV, departureU, departureV, turning } = oscillation;
  const cosine = Math.cos(turning * seconds);
  const sine = -Math.sin(turning * seconds);
  return {
    u: equilibriumU + departureU * cosine - departureV * sine,
    v: equilibriumV + departureU * sine + departureV * cosine,
  };
}

/**
 * The greatest speed of the oscillation, m/s, and when it is first reached, s after time zero. Without turning the speed
 * stays what it is, and without equilibrium or departure it never changes: the time is NaN then.
 */
export function greatestSpeed(oscillation: Oscillation): { speed: number; afterS: number } {
  const { equilibriumU, equilibriumV, departureU, departureV, turning } = oscillation;
  const equilibrium = Math.hypot(equilibriumU, equilibriumV);
  const departure = Math.hypot(departureU, departureV);
  if (turning === 0) {
    return { speed: Math.hypot(equilibriumU + departureU, equilibriumV + departureV), afterS: NaN };
  }
  const speed = equilibrium + departure;
  if (!(equilibrium > 0 && departure > 0)) return { speed, afterS: NaN };
  const period = (2 * Math.PI) / Math.abs(turning);
  const angle = Math.atan2(departureV, departureU) - Math.atan2(equilibriumV, equilibriumU);
  const after = (angle / turning) % period;
  return { speed, afterS: after < 0 ? after + period : after };
}

/**
 * Fits equilibrium and departure to winds by complex least squares, the turning being given.
 * @param timeS seconds; time zero is where the departure is meant
 * @param u m/s, same length; a wind with a missing component is passed over, as are non-finite times
 * @param turning f, 1/s
 * @returns NaN throughout with fewer than two different times or without turning
 */
export function fitOscillation(
  timeS: ArrayLike<number>,
  u: ArrayLike<number>,
  v: ArrayLike<number>,
  turning: number,
): FittedOscillation {
  const complete: number[] = [];
  for (let k = 0; k < timeS.length; k++) if (Number.isFinite(timeS[k]! + u[k]! + v[k]!)) complete.push(k);
  const used = complete.length;
  const mean = (value: (k: number) => number): number => complete.reduce((sum, k) => sum + value(k), 0) / used;
  const cosine = (k: number): number => Math.cos(turning * timeS[k]!);
  const sine = (k: number): number => -Math.sin(turning * timeS[k]!);
  const meanCosine = mean(cosine);
  const meanSine = mean(sine);
  // Against the mean of the turning unit vector, so that short records stay well conditioned.
  let norm = 0;
  let alongU = 0;
  let alongV = 0;
  for (const k of complete) {
    const c = cosine(k) - meanCosine;
    const s = sine(k) - meanSine;
    norm += c * c + s * s;
    alongU += u[k]! * c + v[k]! * s;
    alongV += v[k]! * c - u[k]! * s;
  }
  const differ = complete.some((k) => timeS[k] !== timeS[complete[0]!]);
  if (!differ || turning === 0 || !(norm > 0)) {
    return { equilibriumU: NaN, equilibriumV: NaN, departureU: NaN, departureV: NaN, turning, rms: NaN, used };
  }
  const departureU = alongU / norm;
  const departureV = alongV / norm;
  const equilibriumU = mean((k) => u[k]!) - (departureU * meanCosine - departureV * meanSine);
  const equilibriumV = mean((k) => v[k]!) - (departureU * meanSine + departureV * meanCosine);
  const fitted = { equilibriumU, equilibriumV, departureU, departureV, turning };
  const square = mean((k) => {
    const wind = oscillatingWind(fitted, timeS[k]!);
    return (u[k]! - wind.u) ** 2 + (v[k]! - wind.v) ** 2;
  });
  return { ...fitted, rms: Math.sqrt(square), used };
}
