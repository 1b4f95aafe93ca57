// Output of a fleet through a series of times: by hub height and by the rotor-equivalent wind, with high-wind shutdown.

import type { TurbineType } from '../site/index.ts';
import { bestSpeed, type DiscWind } from './disc-wind.ts';
import { normaliseSpeed, powerFromCurve } from './power.ts';

/** What a turbine does at one time. */
export type TurbineState = 'turning' | 'below-cut-in' | 'stopped-high-wind' | 'not-assessable';

/** What of the wind on a disc its power is reckoned from. */
export type ReckonedWind = Pick<
  DiscWind,
  'status' | 'hubSpeed' | 'equivalentSpeed' | 'equivalentSpeedVeer' | 'airDensity'
>;

/** Output of one turbine of a type through the series; lists run in parallel with the winds given. */
export interface TypeOutput {
  readonly turbine: TurbineType;
  /** kW of one turbine by the hub-height wind; NaN where not assessable. */
  readonly hubKw: Float64Array;
  /** kW of one turbine by the rotor-equivalent wind. */
  readonly equivalentKw: Float64Array;
  readonly state: readonly TurbineState[];
}

/** Output of the farm; NaN where any of its types is not assessable. */
export interface FarmOutput {
  readonly types: readonly TypeOutput[];
  /** kW the farm can yield at most, as its curves say, before the factor. */
  readonly ratedKw: number;
  readonly hubKw: Float64Array;
  readonly equivalentKw: Float64Array;
  /** kW that the shape of the profile adds (or takes, negative) against hub-height reckoning. */
  readonly differenceKw: Float64Array;
  /** Factor that both outputs carry. */
  readonly factor: number;
  /** Why no output can be given at all; empty otherwise. */
  readonly why: string;
  /** What the numbers hold and do not hold, in words. */
  readonly about: string;
}

/** Rated power of one turbine, kW: the greatest of its curve; NaN without a curve. */
export function ratedPower(turbine: TurbineType): number {
  return turbine.powerCurve === null ? NaN : Math.max(...turbine.powerCurve.powerKw);
}

/**
 * Whether a turbine turns after this wind: it stops above its cut-out speed and, once stopped, starts again below its
 * restart speed. Where the site states none, cut-out is the curve's last speed and restart the cut-out.
 * @param turning whether it turned before
 * @param speed m/s at the hub; NaN leaves it as it was
 */
export function keepsTurning(turbine: TurbineType, turning: boolean, speed: number): boolean {
  if (Number.isNaN(speed)) return turning;
  const cutOut = Number.isNaN(turbine.cutOut) ? (turbine.powerCurve?.speed.at(-1) ?? Infinity) : turbine.cutOut;
  const restart = Number.isNaN(turbine.restart) ? cutOut : turbine.restart;
  if (turning) return speed <= cutOut;
  return restart < cutOut ? speed < restart : speed <= cutOut;
}

/**
 * Output of one turbine of a type through the night. Speeds are brought to the density of the curve where the air's own is
 * known (IEC 61400-12-1:2017, pitch regulation); stopping is decided by the hub's wind as it is, and up to the cut-out the
 * curve's last power is held.
 * @param winds in order of time; stopping remembers the one before
 * @param turnedBefore whether it turned before the first of them
 */
export function typeOutput(turbine: TurbineType, winds: readonly ReckonedWind[], turnedBefore = true): TypeOutput {
  const hubKw = new Float64Array(winds.length).fill(NaN);
  const equivalentKw = new Float64Array(winds.length).fill(NaN);
  const state: TurbineState[] = [];
  let turning = turnedBefore;
  winds.forEach((wind, k) => {
    turning = keepsTurning(turbine, turning, wind.hubSpeed);
    const curve = turbine.powerCurve;
    if (curve === null || wind.status !== 'ok') {
      state.push('not-assessable');
      return;
    }
    const power = (speed: number): number => {
      if (!turning || speed < turbine.cutIn) return 0;
      const normalised = Number.isNaN(wind.airDensity)
        ? speed
        : normaliseSpeed(speed, wind.airDensity, curve.airDensity);
      return powerFromCurve(curve, Math.min(normalised, curve.speed.at(-1)!));
    };
    hubKw[k] = power(wind.hubSpeed);
    equivalentKw[k] = power(bestSpeed(wind));
    state.push(!turning ? 'stopped-high-wind' : equivalentKw[k] > 0 ? 'turning' : 'below-cut-in');
  });
  return { turbine, hubKw, equivalentKw, state };
}

/**
 * Output of the farm: types times their counts times the site's factor.
 * @param types outputs of equal length, as `typeOutput` gives them
 * @param factor what the farm yields of the sum of its curves
 */
export function farmOutput(types: readonly TypeOutput[], factor = 1): FarmOutput {
  const length = types[0]?.hubKw.length ?? 0;
  const sum = (column: 'hubKw' | 'equivalentKw'): Float64Array =>
    Float64Array.from({ length }, (_, k) =>
      types.reduce(
        (total, type) => (type.turbine.count > 0 ? total + type.turbine.count * type[column][k]! : total),
        0,
      ),
    ).map((value) => value * factor);
  const hubKw = sum('hubKw');
  const equivalentKw = sum('equivalentKw');
  return {
    types,
    ratedKw: types.reduce(
      (total, { turbine }) => (turbine.count > 0 ? total + turbine.count * ratedPower(turbine) : total),
      0,
    ),
    hubKw,
    equivalentKw,
    differenceKw: equivalentKw.map((value, k) => value - hubKw[k]!),
    factor,
    why: whyNoFarm(types),
    about: farmAbout(factor),
  };
}

function whyNoFarm(types: readonly TypeOutput[]): string {
  const standing = types.filter((type) => type.turbine.count > 0);
  if (standing.length === 0) return 'the site has no turbines';
  const bare = standing.filter((type) => type.turbine.powerCurve === null).map((type) => type.turbine.name);
  return bare.length === 0 ? '' : `no power curve for ${bare.join(', ')}`;
}

function farmAbout(factor: number): string {
  const missing = 'Wakes, availability and curtailment are not in it';
  if (factor === 1) return `${missing}.`;
  return `${missing}, but for the site's one factor of ${factor.toFixed(3)}.`;
}

/** The factor that brings the sum of the curves to the farm's own level. */
export interface FactorFit {
  /** NaN where nothing could be fitted, then `why` tells. */
  readonly factor: number;
  /** Standard error of it. */
  readonly uncertainty: number;
  /** kW: root mean square of what is left. */
  readonly residualKw: number;
  readonly used: number;
  readonly why: string;
}

/** Fewer pairs than a night's half hours carry no factor. Our own choice. */
const LEAST_PAIRS = 12;

/**
 * Fits the farm's factor: least squares through the origin of actual on reckoned output.
 * @param reckonedKw farm output before any factor
 * @param actualKw same times; pairs with a missing value are passed over
 */
export function fitFarmFactor(reckonedKw: ArrayLike<number>, actualKw: ArrayLike<number>): FactorFit {
  let [used, products, squares, actualSquares] = [0, 0, 0, 0];
  for (let k = 0; k < reckonedKw.length; k++) {
    const [reckoned, actual] = [reckonedKw[k]!, actualKw[k]!];
    if (!Number.isFinite(reckoned) || !Number.isFinite(actual)) continue;
    used++;
    products += reckoned * actual;
    squares += reckoned * reckoned;
    actualSquares += actual * actual;
  }
  const nothing = { factor: NaN, uncertainty: NaN, residualKw: NaN, used };
  if (used < LEAST_PAIRS) return { ...nothing, why: `only ${used} times with both outputs, ${LEAST_PAIRS} are needed` };
  if (!(squares > 0)) return { ...nothing, why: 'the reckoned output is zero throughout' };
  const factor = products / squares;
  const left = Math.max(0, actualSquares - factor * products);
  return {
    factor,
    uncertainty: Math.sqrt(left / (used - 1) / squares),
    residualKw: Math.sqrt(left / used),
    used,
    why: '',
  };
}
