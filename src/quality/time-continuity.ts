// Continuity in time and height: does a value fit the profiles before and after? After the idea of Weber & Wuertz (1991,
// NOAA Tech. Memo. ERL WPL-206): points that agree with their neighbours join into regions, the largest region is right,
// the rest is held against it. Ours grows the region by prediction from its edge, so that a patch of bad gates inside a
// layer, as migrating birds leave it, does not creep in by its mildest members.

import { MARK } from '../profile/index.ts';
import { noiseOf } from './noise.ts';
import { lengthOf, LONGEST_GAP_MS, nodesOf, REACH, type Nodes } from './nodes.ts';
import { predict, type Prediction } from './predict.ts';
import type { Screened } from './series.ts';

/** Two gates of like height agree within so many standard deviations of a component ... */
const AGREEING = 2.6;
/** ... and this much for each second between them, m/s2: 1 m/s in half an hour. */
const CHANGE = 1 / 1800;
/** A seed agrees with this share of the gates of like height around it, of which there are so many at least. */
const SEED_SHARE = 0.8;
const FEWEST_NEIGHBOURS = 3;
/** Seeds one above the other join across this shear at most, 1/s: the strongest of a stable surface layer. */
const STRONGEST_SHEAR = 0.12;
/** A gate fits its prediction within so many standard deviations, and this at least, m/s. */
const FITTING = 3.2;
const LEAST_FIT = 2;
/** Nothing this near its prediction is called wrong, however little fits, m/s: the wind itself wavers so much. */
const LEAST_WRONG = 3;
/** What still fits while the region grows, in steps: the best fitting first. */
const LIMITS = [0.5, 0.7, 0.9];
/** A region that fills this share of its profiles is weather, a front, not a patch. */
const WEATHER_SHARE = 0.6;
/** So many profiles near in time are needed to tell which of them is wrong. */
export const FEWEST_PROFILES = 3;
/** Fewer seeds are no region: each is judged for itself. */
const SMALLEST_REGION = 8;
const MOST_ROUNDS = 40;
const SPAN = 2 * REACH + 1;
/** A layer of the newest profiles has company in so many gates, each within this shear of the next, 1/s. */
const LAYER_GATES = 4;
const LAYER_SHEAR = 0.04;

/** What is held of a node; `fits` also where nothing speaks against it. */
const VERDICT = { contradicts: 0, fits: 1, contested: 2 } as const;

/**
 * Adds `time-jump` to levels that contradict the largest consistent region of their series and have no company of their own;
 * with company, a smaller region or a layer of the newest profiles, they are `contested`: what is new is not yet wrong.
 */
export function timeContinuity({ block, series }: Screened, marks: Uint32Array): void {
  for (const one of series) {
    if (one.profiles.length < FEWEST_PROFILES) continue;
    const nodes = nodesOf(block, marks, one);
    const verdicts = new Continuity(nodes).judge();
    for (let n = 0; n < nodes.count; n++) {
      if (verdicts[n] === VERDICT.contradicts) marks[nodes.level[n]!]! |= MARK['time-jump'];
      else if (verdicts[n] === VERDICT.contested) marks[nodes.level[n]!]! |= MARK.contested;
    }
  }
}

class Continuity {
  readonly #nodes: Nodes;
  /** Standard deviation of a component at each node, m/s. */
  readonly #noise: Float64Array;
  /** 1: trusted. */
  readonly #member: Uint8Array;
  /** Last known misses of each node, and whether its surroundings have changed since. */
  readonly #missed: Float64Array;
  readonly #isOld: Uint8Array;
  readonly #prediction: Prediction = { u: NaN, v: NaN, distance: NaN };

  constructor(nodes: Nodes) {
    this.#nodes = nodes;
    const noise = noiseOf(nodes);
    this.#noise = new Float64Array(nodes.count);
    for (let n = 0; n < nodes.count; n++) this.#noise[n] = noise(nodes.height[n]!);
    this.#member = new Uint8Array(nodes.count);
    this.#missed = new Float64Array(nodes.count);
    this.#isOld = new Uint8Array(nodes.count).fill(1);
  }

  /** What is to be held of each node, as in VERDICT. */
  judge(): Uint8Array {
    const { count } = this.#nodes;
    const verdicts = new Uint8Array(count).fill(VERDICT.fits);
    let open = new Uint32Array(count);
    for (let n = 0; n < count; n++) open[n] = n;
    this.#regions().forEach((members, rank) => {
      // The first one meets nobody who is trusted already, and it is large.
      const rest = rank === 0 ? members : members.filter((n) => this.#member[n] === 0);
      if (rest.length === 0) return;
      if (rank > 0 && this.#contradicts(rest)) {
        for (const n of rest) verdicts[n] = VERDICT.contested;
        return;
      }
      // Before the first nothing is predicted yet that could get out of date.
      if (rank === 0) for (const n of rest) this.#member[n] = 1;
      else for (const n of rest) this.#trust(n);
      open = this.#grow(open, verdicts);
    });
    for (let n = 0; n < count; n++) {
      if (verdicts[n] === VERDICT.fits && this.#member[n] === 0 && this.#isWrong(n)) verdicts[n] = VERDICT.contradicts;
    }
    this.#spareTheNewest(verdicts);
    return verdicts;
  }

  /** Layers of the last profiles before a gap or the end that agree within themselves are contested, not wrong. */
  #spareTheNewest(verdicts: Uint8Array): void {
    const { start, timeMs } = this.#nodes;
    const last = timeMs.length - 1;
    for (let i = 0; i <= last; i++) {
      const isEnd = i === last || timeMs[i + 1]! - timeMs[i]! > LONGEST_GAP_MS;
      if (!isEnd) continue;
      for (let j = Math.max(0, i - REACH + 1); j <= i; j++) this.#spareLayers(start[j]!, start[j + 1]!, verdicts);
    }
  }

  #spareLayers(from: number, to: number, verdicts: Uint8Array): void {
    const { u, v, height } = this.#nodes;
    let first = from;
    for (let n = from; n <= to; n++) {
      const wrong = n < to && verdicts[n] === VERDICT.contradicts;
      const goesOn =
        wrong &&
        n > first &&
        lengthOf(u[n]! - u[n - 1]!, v[n]! - v[n - 1]!) <=
          AGREEING * this.#noise[n]! + LAYER_SHEAR * (height[n]! - height[n - 1]!);
      if (goesOn) continue;
      if (n - first >= LAYER_GATES) verdicts.fill(VERDICT.contested, first, n);
      first = wrong ? n : n + 1;
    }
  }

  /** Seeds joined into regions, the largest first. */
  #regions(): Uint32Array[] {
    const { count, start, profile, height, like } = this.#nodes;
    /** 1: a seed that no region has yet. */
    const free = new Uint8Array(count);
    for (let n = 0; n < count; n++) free[n] = this.#isSeed(n) ? 1 : 0;
    const regions: Uint32Array[] = [];
    const members = new Uint32Array(count);
    for (let first = 0; first < count; first++) {
      if (free[first] === 0) continue;
      members[0] = first;
      free[first] = 0;
      let held = 1;
      for (let at = 0; at < held; at++) {
        const n = members[at]!;
        for (let k = n * SPAN; k < (n + 1) * SPAN; k++) {
          const m = like[k]!;
          if (m < 0 || free[m] === 0 || !this.#agrees(n, m, this.#allowed(n, m))) continue;
          free[m] = 0;
          members[held++] = m;
        }
        const i = profile[n]!;
        for (let m = n - 1; m <= n + 1; m += 2) {
          if (m < start[i]! || m >= start[i + 1]! || free[m] === 0) continue;
          const allowed = AGREEING * this.#noise[n]! + STRONGEST_SHEAR * Math.abs(height[m]! - height[n]!);
          if (!this.#agrees(n, m, allowed)) continue;
          free[m] = 0;
          members[held++] = m;
        }
      }
      if (held >= SMALLEST_REGION) regions.push(members.slice(0, held));
    }
    return regions.sort((a, b) => b.length - a.length);
  }

  /** Whether the winds of two nodes differ by no more than that, m/s. */
  #agrees(n: number, m: number, most: number): boolean {
    const { u, v } = this.#nodes;
    return lengthOf(u[n]! - u[m]!, v[n]! - v[m]!) <= most;
  }

  /** Whether a node goes on like the gates of its height before and after. */
  #isSeed(n: number): boolean {
    const { like } = this.#nodes;
    let neighbours = 0;
    let agreeing = 0;
    for (let d = -REACH; d <= REACH; d++) {
      const m = like[n * SPAN + REACH + d]!;
      if (d === 0 || m < 0) continue;
      neighbours++;
      if (this.#agrees(n, m, this.#allowed(n, m))) agreeing++;
    }
    return neighbours >= FEWEST_NEIGHBOURS && agreeing >= SEED_SHARE * neighbours;
  }

  /** What two gates of like height may differ by, m/s. */
  #allowed(n: number, m: number): number {
    const { timeMs, profile } = this.#nodes;
    const seconds = Math.abs(timeMs[profile[n]!]! - timeMs[profile[m]!]!) / 1000;
    return AGREEING * this.#noise[n]! + CHANGE * seconds;
  }

  /** Whether a smaller region stands against the accepted ones around it without being weather of its own. */
  #contradicts(members: Uint32Array): boolean {
    let judged = 0;
    let missing = 0;
    const filled = new Map<number, number>();
    const { profile, start } = this.#nodes;
    for (const n of members) {
      filled.set(profile[n]!, (filled.get(profile[n]!) ?? 0) + 1);
      const misses = this.#misses(n);
      if (Number.isNaN(misses)) continue;
      judged++;
      if (misses > 1) missing++;
    }
    if (missing <= judged / 2) return false;
    let share = 0;
    for (const [i, gates] of filled) share += gates / (start[i + 1]! - start[i]!);
    return share / filled.size < WEATHER_SHARE;
  }

  /** Takes in what the region predicts, round by round from its edge, until nothing more fits. @returns what is left */
  #grow(nodes: Uint32Array<ArrayBuffer>, verdicts: Uint8Array): Uint32Array<ArrayBuffer> {
    let open = nodes.filter((n) => this.#member[n] === 0 && verdicts[n] === VERDICT.fits);
    for (const limit of LIMITS) {
      for (let round = 0; round < MOST_ROUNDS; round++) {
        const joining = open.filter((n) => this.#misses(n) <= limit);
        if (joining.length === 0) break;
        for (const n of joining) this.#trust(n);
        open = open.filter((n) => this.#member[n] === 0);
      }
    }
    return open;
  }

  #trust(n: number): void {
    this.#member[n] = 1;
    // The predictions around it are out of date.
    const { like, profile, start } = this.#nodes;
    for (let d = -REACH; d <= REACH; d++) {
      const centre = like[n * SPAN + REACH + d]!;
      if (centre < 0) continue;
      const i = profile[centre]!;
      const end = Math.min(start[i + 1]!, centre + REACH + 1);
      for (let m = Math.max(start[i]!, centre - REACH); m < end; m++) this.#isOld[m] = 1;
    }
  }

  /** Whether a node lies too far from its prediction; never where the region is too far away to tell. */
  #isWrong(n: number): boolean {
    const misses = this.#misses(n);
    return misses > 1 && misses * this.#fitting(n) > LEAST_WRONG;
  }

  /** Distance from its prediction at which a node still fits, m/s. */
  #fitting(n: number): number {
    return Math.max(LEAST_FIT, FITTING * this.#noise[n]!);
  }

  /** Distance of a node from its prediction as a multiple of what still fits; NaN where the region is too far away. */
  #misses(n: number): number {
    if (this.#isOld[n] === 1) {
      predict(this.#nodes, this.#member, n, this.#prediction);
      this.#missed[n] = this.#prediction.distance / this.#fitting(n);
      this.#isOld[n] = 0;
    }
    return this.#missed[n]!;
  }
}
