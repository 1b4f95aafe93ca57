// Two instruments at one site where they overlap: how far they disagree, and whether they keep doing so.

import { directionOf, eastward, northward, signedAngle, speedOf } from '../air/index.ts';
import { completeUncertainty } from '../jet/index.ts';
import { gatherWind, windColumn, type Profile, type WindColumn } from '../profile/index.ts';

/** Two profiles of the same time and place. */
export interface ProfilePair {
  readonly better: Profile;
  readonly worse: Profile;
}

/** Mean difference at about one height, the worse instrument minus the better. */
export interface HeightDifference {
  /** m above ground, of the worse instrument's level */
  readonly height: number;
  readonly count: number;
  /** m/s */
  readonly speed: number;
  /** degrees, clockwise positive */
  readonly direction: number;
}

/** What two instruments differ by over many times: the worse minus the better. NaN where they never overlap. */
export interface Disagreement {
  /** How many times both measured in the overlap. */
  readonly times: number;
  /** m above ground, lowest and highest height compared. */
  readonly bottom: number;
  readonly top: number;
  /** Mean and scatter from time to time, m/s. */
  readonly speed: number;
  readonly speedScatter: number;
  /** Mean and scatter from time to time, degrees, clockwise positive. */
  readonly direction: number;
  readonly directionScatter: number;
  /** The direction differs to one side, time after time: an offset of the instruments, not a turn of the wind. */
  readonly steadyDirection: boolean;
  readonly steadySpeed: boolean;
  /** The mean vector difference is larger than the levels' uncertainty allows. */
  readonly beyondUncertainty: boolean;
  readonly byHeight: readonly HeightDifference[];
}

/** Steady is what shows this often at least … */
const LEAST_TIMES = 6;
/** … with a mean of so many standard errors … */
const STANDARD_ERRORS = 3;
/** … and at least this share of its own scatter, so that it nearly always points to one side. Our own choices. */
const SHARE_OF_SCATTER = 0.5;
/** Smaller offsets, m/s and degrees, matter to nobody. */
const LEAST_OFFSET = { speed: 0.2, direction: 1 };
/** m beyond the better instrument's end up to which its last level may still be compared. */
const BEYOND_END = 10;
/** m/s under which a direction says nothing. */
const LEAST_SPEED = 2;

/**
 * Compares two instruments over times at which both measured: at each level of the worse one that lies within the better
 * one's heights (or 10 m beyond), with the better wind interpolated linearly in u and v.
 * @param stated standard uncertainty of a profile's speeds where somebody states it, m/s; NaN where not
 */
export function measureDisagreement(
  pairs: readonly ProfilePair[],
  stated: (profile: Profile) => number = () => NaN,
): Disagreement {
  const perTime: { speed: number; direction: number; excess: number }[] = [];
  const heights = new Map<number, { speed: number[]; direction: number[] }>();
  for (const pair of pairs) {
    const differences = compare(pair, stated);
    if (differences.length === 0) continue;
    const directions = differences.map((at) => at.direction).filter((value) => !Number.isNaN(value));
    perTime.push({
      speed: mean(differences.map((at) => at.speed)),
      direction: directions.length === 0 ? NaN : mean(directions),
      excess: mean(differences.map((at) => at.vector - at.uncertainty)),
    });
    for (const at of differences) {
      const key = Math.round(at.height);
      const known = heights.get(key) ?? { speed: [], direction: [] };
      known.speed.push(at.speed);
      if (!Number.isNaN(at.direction)) known.direction.push(at.direction);
      heights.set(key, known);
    }
  }
  const byHeight = [...heights]
    .sort(([a], [b]) => a - b)
    .map(([height, known]) => ({
      height,
      count: known.speed.length,
      speed: mean(known.speed),
      direction: mean(known.direction),
    }));
  const speeds = perTime.map((at) => at.speed);
  const directions = perTime.map((at) => at.direction).filter((value) => !Number.isNaN(value));
  return {
    times: perTime.length,
    bottom: byHeight[0]?.height ?? NaN,
    top: byHeight.at(-1)?.height ?? NaN,
    speed: mean(speeds),
    speedScatter: scatter(speeds),
    direction: mean(directions),
    directionScatter: scatter(directions),
    steadyDirection: isSteady(directions, LEAST_OFFSET.direction),
    steadySpeed: isSteady(speeds, LEAST_OFFSET.speed),
    beyondUncertainty: mean(perTime.map((at) => at.excess)) > 0,
    byHeight,
  };
}

/** Pairs of profiles whose times differ by no more than a tolerance, ms; each is used once at most. Both ascend in time. */
export function pairInTime(better: readonly Profile[], worse: readonly Profile[], toleranceMs: number): ProfilePair[] {
  const pairs: ProfilePair[] = [];
  let next = 0;
  for (const profile of better) {
    while (next < worse.length && worse[next]!.timeMs < profile.timeMs - toleranceMs) next++;
    const candidate = worse[next];
    if (candidate === undefined) break;
    if (candidate.timeMs > profile.timeMs + toleranceMs) continue;
    pairs.push({ better: profile, worse: candidate });
    next++;
  }
  return pairs;
}

interface Difference {
  readonly height: number;
  readonly speed: number;
  readonly direction: number;
  /** Length of the vector difference, and the uncertainty of it, m/s. */
  readonly vector: number;
  readonly uncertainty: number;
}

function compare({ better, worse }: ProfilePair, stated: (profile: Profile) => number): Difference[] {
  const reference = usable(better, stated(better));
  const other = usable(worse, stated(worse));
  const differences: Difference[] = [];
  for (let k = 0; k < other.count; k++) {
    const height = other.heightAgl[k]!;
    const at = windAtHeight(reference, height);
    const u = eastward(other.speed[k]!, other.direction[k]!);
    const v = northward(other.speed[k]!, other.direction[k]!);
    const vector = speedOf(u - at.u, v - at.v);
    if (Number.isNaN(vector)) continue;
    const speed = speedOf(at.u, at.v);
    const weak = speed < LEAST_SPEED || other.speed[k]! < LEAST_SPEED;
    differences.push({
      height,
      speed: other.speed[k]! - speed,
      direction: weak ? NaN : signedAngle(other.direction[k]! - directionOf(at.u, at.v)),
      vector,
      uncertainty: Math.SQRT2 * Math.hypot(at.uncertainty, other.speedUncertainty[k]!),
    });
  }
  return differences;
}

function usable(profile: Profile, stated: number): WindColumn {
  const column = gatherWind(profile, windColumn(profile.levelCount));
  completeUncertainty(column, profile.instrument, stated);
  return column;
}

function windAtHeight(column: WindColumn, height: number): { u: number; v: number; uncertainty: number } {
  const last = column.count - 1;
  const at = (k: number): { u: number; v: number; uncertainty: number } => ({
    u: eastward(column.speed[k]!, column.direction[k]!),
    v: northward(column.speed[k]!, column.direction[k]!),
    uncertainty: column.speedUncertainty[k]!,
  });
  if (last < 0 || height < column.heightAgl[0]! - BEYOND_END || height > column.heightAgl[last]! + BEYOND_END) {
    return { u: NaN, v: NaN, uncertainty: NaN };
  }
  if (height <= column.heightAgl[0]!) return at(0);
  if (height >= column.heightAgl[last]!) return at(last);
  let above = 1;
  while (column.heightAgl[above]! < height) above++;
  const [low, high] = [at(above - 1), at(above)];
  const weight = (height - column.heightAgl[above - 1]!) / (column.heightAgl[above]! - column.heightAgl[above - 1]!);
  return {
    u: low.u * (1 - weight) + high.u * weight,
    v: low.v * (1 - weight) + high.v * weight,
    uncertainty: Math.max(low.uncertainty, high.uncertainty),
  };
}

function isSteady(values: readonly number[], least: number): boolean {
  const size = Math.abs(mean(values));
  const spread = scatter(values);
  return (
    values.length >= LEAST_TIMES &&
    size >= (STANDARD_ERRORS * spread) / Math.sqrt(values.length) &&
    size >= SHARE_OF_SCATTER * spread &&
    size >= least
  );
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

function scatter(values: readonly number[]): number {
  const centre = mean(values);
  return Math.sqrt(values.reduce((sum, value) => sum + (value - centre) ** 2, 0) / (values.length - 1));
}
