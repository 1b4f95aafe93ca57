// Does the wind turn as the Earth makes it turn? At each height the winds since dusk are held against an oscillation: at
// the inertial rate of the latitude, and at the rate that fits them best.

import { coriolisParameter, speedOf } from '../air/index.ts';
import type { Profile } from '../profile/index.ts';
import { fitOscillation, type FittedOscillation } from './oscillation.ts';
import { windAtHeights, type WindVector } from './wind-at.ts';

/** Inertial: the rates agree. Slower and faster have the same sense, opposite the other; none hardly turns at all. */
export type TurningVerdict = 'inertial' | 'slower' | 'faster' | 'opposite' | 'none';

export interface Turning {
  /** m above ground */
  readonly height: number;
  readonly status: 'told' | 'not-assessable';
  /** Reason in words; empty when told. */
  readonly why: string;
  /** The oscillation at the inertial rate; time zero is `sinceMs`. NaN throughout when there is none to fit. */
  readonly fit: FittedOscillation;
  /** Rates in degrees an hour, clockwise positive: what the latitude makes, what fits best, and that one's uncertainty. */
  readonly inertialRate: number;
  readonly measuredRate: number;
  readonly uncertainty: number;
  readonly verdict: TurningVerdict | null;
  /** Last speed over the geostrophic speed; NaN where that is not known. */
  readonly supergeostrophic: number;
}

export interface TurningOptions {
  /** Degrees; NaN when not known. */
  readonly latitude: number;
  /** Dusk: from when on winds count, ms. */
  readonly sinceMs: number;
  /** Geostrophic or free-atmosphere speed, m/s; NaN when not known. */
  readonly geostrophicSpeed: number;
}

const HOUR_MS = 3600_000;
const DEGREES_AN_HOUR = (3600 * 180) / Math.PI;
/** An inertial turn smaller than this over the record, degrees, is too little to be told from anything. Our own choice. */
const LEAST_TURN = 40;
const LEAST_WINDS = 6;
/** Rates looked at: up to so many times the inertial one, either way. */
const WIDEST = 3;
const STEPS = 60;
/** Departures smaller than this times the scatter turn unseen. */
const LEAST_DEPARTURE = 1;

/** How the wind has turned at each height since dusk. Profiles of one station, ascending in time. */
export function turningAt(
  profiles: readonly Profile[],
  heights: readonly number[],
  options: TurningOptions,
): Turning[] {
  const since = profiles.filter(({ timeMs }) => timeMs >= options.sinceMs);
  const winds = since.map((profile) => windAtHeights(profile, heights));
  const timeS = since.map(({ timeMs }) => (timeMs - options.sinceMs) / 1000);
  return heights.map((height, k) =>
    turningOf(
      height,
      timeS,
      winds.map((at) => at[k]!),
      options,
    ),
  );
}

function turningOf(
  height: number,
  timeS: readonly number[],
  winds: readonly WindVector[],
  options: TurningOptions,
): Turning {
  const f = coriolisParameter(options.latitude);
  const u = winds.map((wind) => wind.u);
  const v = winds.map((wind) => wind.v);
  const known = timeS.filter((_, k) => Number.isFinite(u[k]! + v[k]!));
  const fit = fitOscillation(timeS, u, v, f);
  const last = winds.findLast((wind) => Number.isFinite(wind.u + wind.v));
  const inertialRate = f * DEGREES_AN_HOUR;
  const plain = {
    height,
    fit,
    inertialRate,
    supergeostrophic: last === undefined ? NaN : speedOf(last.u, last.v) / options.geostrophicSpeed,
  };
  const untold = (why: string): Turning => ({
    ...plain,
    status: 'not-assessable',
    why,
    measuredRate: NaN,
    uncertainty: NaN,
    verdict: null,
  });
  if (Number.isNaN(f)) return untold('The latitude of the station is not known.');
  if (known.length < LEAST_WINDS) {
    return untold(`Only ${known.length} winds at ${Math.round(height)} m since dusk; ${LEAST_WINDS} are needed.`);
  }
  const hours = ((known.at(-1)! - known[0]!) * 1000) / HOUR_MS;
  const turn = Math.abs(inertialRate) * hours;
  if (turn < LEAST_TURN) {
    return untold(
      `In ${hours.toFixed(1)} h an inertial turn at this latitude is ${Math.round(turn)} degrees: too little to be told.`,
    );
  }
  const { rate, uncertainty, fitted } = bestRate(timeS, u, v, f);
  if (!(Math.hypot(fitted.departureU, fitted.departureV) > LEAST_DEPARTURE * fitted.rms)) {
    return untold(`At ${Math.round(height)} m the wind has hardly changed since dusk.`);
  }
  const measuredRate = rate * DEGREES_AN_HOUR;
  return {
    ...plain,
    status: 'told',
    why: '',
    measuredRate,
    uncertainty: uncertainty * DEGREES_AN_HOUR,
    verdict: verdictOf(measuredRate, uncertainty * DEGREES_AN_HOUR, inertialRate),
  };
}

/** The turning that leaves the least residual, and how far from it the residual stays as good. */
function bestRate(
  timeS: readonly number[],
  u: readonly number[],
  v: readonly number[],
  f: number,
): { rate: number; uncertainty: number; fitted: FittedOscillation } {
  const square = (turning: number): number => fitOscillation(timeS, u, v, turning).rms ** 2;
  const step = (WIDEST * Math.abs(f)) / STEPS;
  // Not through nought, where the model has no turning at all: half steps either side.
  const rates = Array.from({ length: 2 * STEPS }, (_, k) => (k - STEPS + 0.5) * step);
  const squares = rates.map(square);
  let best = 0;
  squares.forEach((value, k) => {
    if (value < squares[best]!) best = k;
  });
  const rate = refine(rates, squares, best);
  const fitted = fitOscillation(timeS, u, v, rate);
  // One standard deviation: the residual may grow by its own share for one of the 2 n - 5 degrees of freedom.
  const allowed = fitted.rms ** 2 * (1 + 1 / Math.max(1, 2 * fitted.used - 5));
  const within = rates.filter((_, k) => squares[k]! <= allowed);
  const width = within.length > 0 ? Math.max(...within) - Math.min(...within) : 0;
  return { rate, uncertainty: Math.max(width / 2, step / 2), fitted };
}

/** Vertex of the parabola through the least square and its neighbours. */
function refine(rates: readonly number[], squares: readonly number[], best: number): number {
  if (best === 0 || best === rates.length - 1) return rates[best]!;
  const [before, here, after] = [squares[best - 1]!, squares[best]!, squares[best + 1]!];
  const bend = before - 2 * here + after;
  const offset = bend > 0 ? (0.5 * (before - after)) / bend : 0;
  return rates[best]! + offset * (rates[best]! - rates[best - 1]!);
}

/** A difference of less than this share of the inertial rate is agreement: the pressure field, too, changes in a night. */
const AGREEMENT = 0.3;
/** Less than this share of the inertial rate is hardly a turn. */
const HARDLY = 0.15;

function verdictOf(measured: number, uncertainty: number, inertial: number): TurningVerdict {
  const ratio = measured / inertial;
  const doubt = Math.max(AGREEMENT, (2 * uncertainty) / Math.abs(inertial));
  if (Math.abs(ratio - 1) <= doubt) return 'inertial';
  if (Math.abs(ratio) < HARDLY) return 'none';
  if (ratio < 0) return 'opposite';
  return ratio < 1 ? 'slower' : 'faster';
}
