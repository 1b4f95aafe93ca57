// The fast kernel: the wind on many discs out of one profile, profile after profile, without allocating.

import { directionOf, eastward, northward, shearExponent, signedAngle, speedOf } from '../air/index.ts';
import type { WindColumn } from '../profile/index.ts';
import type { Disc } from './disc.ts';
import { planDisc, type Between, type DiscPlan } from './plan.ts';

/**
 * Wind on each disc of a fleet, one value a disc in every column. Where `plans[i].why` is not empty every column but
 * `coverage` holds NaN. The columns are reused by the next scan: copy what must last.
 */
export interface FleetWind {
  readonly plans: readonly DiscPlan[];
  /** Part of the disc between lowest and highest level, 0 to 1. */
  readonly coverage: Float64Array;
  /** m/s and degrees, of the vector interpolated linearly to the hub; of the speeds where no direction is known. */
  readonly hubSpeed: Float64Array;
  readonly hubDirection: Float64Array;
  /** Rotor-equivalent speed, m/s, without and with veer. */
  readonly equivalentSpeed: Float64Array;
  readonly equivalentSpeedVeer: Float64Array;
  /** Exponent of the least-squares power law over the levels from tip to tip that are not calm. */
  readonly shearExponent: Float64Array;
  /** Turn from the lower to the upper tip, degrees in (-180, 180], clockwise positive; NaN unless both lie in the data. */
  readonly veer: Float64Array;
  /** The same per 100 m over the covered part of the disc. */
  readonly veerPer100M: Float64Array;
}

/** The usable levels as the last scan saw them, for finer work on the same profile. */
export interface ScannedLevels {
  count: number;
  heightAgl: Float64Array;
  speed: Float64Array;
  direction: Float64Array;
  /** m/s eastward and northward, filled only where a disc of the fleet asks for it; NaN where no direction is known */
  u: Float64Array;
  v: Float64Array;
  /** Position in the wind column that was scanned. */
  column: Uint32Array;
  /** Whether the levels carry directions; without them there is no veer. */
  directed: boolean;
}

const OUT_COLUMNS = [
  'coverage',
  'hubSpeed',
  'hubDirection',
  'equivalentSpeed',
  'equivalentSpeedVeer',
  'shearExponent',
  'veer',
  'veerPer100M',
] as const;
type OutColumns = Record<(typeof OUT_COLUMNS)[number], Float64Array>;

/**
 * Scans profiles for the wind on the discs of a fleet. Slice shares and fit weights are kept as long as the heights stay
 * the same, so a fixed-gate instrument pays for them once.
 */
export class FleetScan {
  readonly #discs: readonly Disc[];
  #plans: readonly DiscPlan[] = [];
  #plannedHeights = new Float64Array(0);
  #plannedCount = -1;
  /** Levels that any disc or fit touches: only these are turned into components. */
  #firstNeeded = 0;
  #endNeeded = 0;
  readonly #out: OutColumns;
  /** What a scan returns; the same until the heights change. */
  #wind: FleetWind;
  readonly #levels: ScannedLevels = {
    count: 0,
    heightAgl: new Float64Array(0),
    speed: new Float64Array(0),
    direction: new Float64Array(0),
    u: new Float64Array(0),
    v: new Float64Array(0),
    column: new Uint32Array(0),
    directed: false,
  };
  #logSpeed = new Float64Array(0);

  constructor(discs: readonly Disc[]) {
    this.#discs = discs;
    this.#out = Object.fromEntries(
      OUT_COLUMNS.map((name) => [name, new Float64Array(discs.length)]),
    ) as unknown as OutColumns;
    this.#wind = { plans: this.#plans, ...this.#out };
  }

  /** The levels of the last scan. */
  get levels(): Readonly<ScannedLevels> {
    return this.#levels;
  }

  /**
   * Wind on every disc. A level without direction is left out where others have one, unless it is calm.
   * @param column usable levels, ascending
   */
  scan(column: WindColumn): FleetWind {
    this.#take(column);
    this.#plan();
    this.#resolve();
    for (let index = 0; index < this.#plans.length; index++) this.#fill(index, this.#plans[index]!);
    return this.#wind;
  }

  #take(column: WindColumn): void {
    const levels = this.#levels;
    if (levels.heightAgl.length < column.count) {
      const capacity = 2 * column.count;
      for (const name of ['heightAgl', 'speed', 'direction', 'u', 'v'] as const)
        levels[name] = new Float64Array(capacity);
      levels.column = new Uint32Array(capacity);
      this.#logSpeed = new Float64Array(capacity);
    }
    let known = 0;
    for (let k = 0; k < column.count; k++) if (column.direction[k]! > -Infinity) known++;
    // Where no level has a direction the speeds alone serve; still air on every level needs none.
    let calm = column.count > 0;
    for (let k = 0; k < column.count && calm; k++) calm = column.speed[k] === 0;
    levels.directed = known > 0 || calm;
    const allServe = known === 0 || known === column.count;
    let count = 0;
    for (let k = 0; k < column.count; k++) {
      if (!allServe && !(column.direction[k]! > -Infinity) && column.speed[k] !== 0) continue;
      levels.heightAgl[count] = column.heightAgl[k]!;
      levels.speed[count] = column.speed[k]!;
      levels.direction[count] = column.direction[k]!;
      levels.column[count] = k;
      count++;
    }
    levels.count = count;
  }

  #plan(): void {
    const { count, heightAgl } = this.#levels;
    let same = count === this.#plannedCount;
    for (let k = 0; k < count && same; k++) same = heightAgl[k] === this.#plannedHeights[k];
    if (same) return;
    this.#plannedHeights = heightAgl.slice(0, count);
    this.#plannedCount = count;
    const logHeight = this.#plannedHeights.map(Math.log);
    this.#plans = this.#discs.map((disc) => planDisc(disc, heightAgl, logHeight, count));
    this.#wind = { plans: this.#plans, ...this.#out };
    this.#firstNeeded = count;
    this.#endNeeded = 0;
    for (const plan of this.#plans) {
      this.#needAround(plan.hub);
      this.#needAround(plan.bottom);
      this.#needAround(plan.top);
      this.#needAround(plan.coveredBottom);
      this.#needAround(plan.coveredTop);
      if (plan.share.length > 0) this.#need(plan.first, plan.first + plan.share.length);
      if (plan.fitWeight.length > 0) this.#need(plan.fitFirst, plan.fitFirst + plan.fitWeight.length);
    }
  }

  #needAround(at: Between): void {
    if (at.below >= 0) this.#need(at.below, Math.min(this.#levels.count, at.below + 2));
  }

  #need(first: number, end: number): void {
    this.#firstNeeded = Math.min(this.#firstNeeded, first);
    this.#endNeeded = Math.max(this.#endNeeded, end);
  }

  #resolve(): void {
    const { speed, direction, u, v, directed } = this.#levels;
    for (let k = this.#firstNeeded; k < this.#endNeeded; k++) {
      u[k] = directed ? eastward(speed[k]!, direction[k]!) : NaN;
      v[k] = directed ? northward(speed[k]!, direction[k]!) : NaN;
      this.#logSpeed[k] = Math.log(speed[k]!);
    }
  }

  #fill(index: number, plan: DiscPlan): void {
    const out = this.#out;
    const { speed, u, v, directed } = this.#levels;
    if (plan.why !== '' || !directed) for (const name of OUT_COLUMNS) out[name][index] = NaN;
    out.coverage[index] = plan.coverage;
    if (plan.why !== '') return;
    const hubU = interpolate(u, plan.hub);
    const hubV = interpolate(v, plan.hub);
    const hubSpeed = directed ? speedOf(hubU, hubV) : interpolate(speed, plan.hub);
    out.hubSpeed[index] = hubSpeed;
    out.hubDirection[index] = directionOf(hubU, hubV);
    out.shearExponent[index] = this.#shear(plan);

    let cubes = 0;
    let alongCubes = 0;
    let allCalm = true;
    for (let k = 0; k < plan.share.length; k++) {
      const level = plan.first + k;
      const levelSpeed = speed[level]!;
      if (levelSpeed > 0) allCalm = false;
      const along = (u[level]! * hubU + v[level]! * hubV) / hubSpeed;
      cubes += plan.share[k]! * levelSpeed * levelSpeed * levelSpeed;
      alongCubes += plan.share[k]! * along * along * along;
    }
    out.equivalentSpeed[index] = Math.cbrt(cubes);
    out.equivalentSpeedVeer[index] = allCalm && directed ? 0 : Math.cbrt(alongCubes);
    if (!directed) return;
    const covered = turn(u, v, plan.coveredBottom, plan.coveredTop);
    out.veer[index] = plan.isCovered ? covered : NaN;
    out.veerPer100M[index] = (100 * covered) / plan.coveredSpan;
  }

  #shear(plan: DiscPlan): number {
    if (plan.fitWeight.length === 0) return NaN;
    let exponent = 0;
    for (let k = 0; k < plan.fitWeight.length; k++) exponent += plan.fitWeight[k]! * this.#logSpeed[plan.fitFirst + k]!;
    return Number.isFinite(exponent) ? exponent : this.#shearWithoutCalm(plan);
  }

  /** The rare case of a calm level in the disc: its logarithm does not exist, the fit rests on the others. */
  #shearWithoutCalm(plan: DiscPlan): number {
    const first = plan.fitFirst;
    const end = first + plan.fitWeight.length;
    const { heightAgl, speed } = this.#levels;
    return shearExponent(heightAgl.subarray(first, end), speed.subarray(first, end)).exponent;
  }
}

/** Value at a height between levels; NaN outside them. */
export function interpolate(values: Float64Array, at: Between): number {
  if (at.below < 0) return NaN;
  if (at.weight === 0) return values[at.below]!;
  return values[at.below]! * (1 - at.weight) + values[at.below + 1]! * at.weight;
}

function turn(u: Float64Array, v: Float64Array, from: Between, to: Between): number {
  const fromDirection = directionOf(interpolate(u, from), interpolate(v, from));
  return signedAngle(directionOf(interpolate(u, to), interpolate(v, to)) - fromDirection);
}
