// Continuity in height: does a value fit the levels below and above it in its own profile? For soundings and other profiles
// that stand alone; where profiles come minutes apart, continuity in time and height together knows better. The test is that of profiler and
// radar-wind quality control since the 1980s, a gate held against its neighbours (for example Brewster & Schlatter 1986,
// from memory); the limits are common practice, without source.

import { eastward, northward } from '../air/index.ts';
import { MARK, REJECTING, type ProfileBlock } from '../profile/index.ts';
import { LONGEST_GAP_MS, REACH } from './nodes.ts';
import { median, type Series, type Screened } from './series.ts';
import { FEWEST_PROFILES } from './time-continuity.ts';

/** Least departure from the line between the neighbours that can be wrong, m/s ... */
const LEAST = 6;
/** ... so many standard deviations of the profile's own roughness ... */
const ROUGHNESS = 6;
/** ... and this much more for each metre to the farther neighbour, 1/s: the line says less the longer it is. */
const PER_METRE = 0.03;
/** The lowest and the highest level have a neighbour on one side only: they may differ from it by so much more. */
const AT_END = 1.5;
const SHEAR_AT_END = 0.1;
/** Departures of noise of standard deviation 1 from the mean of two neighbours have a median length of sqrt(1.5 x 2 ln 2). */
const MEDIAN_OF_NOISE = Math.sqrt(3 * Math.LN2);
const FEWEST_LEVELS = 3;

/** Adds `vertical-jump` to levels of lone profiles that stand out from those below and above, the worst first. */
export function verticalContinuity({ block, series }: Screened, marks: Uint32Array): void {
  const column = new Column();
  for (const i of series.flatMap((one) => loneProfiles(block, one))) {
    column.fill(block, marks, block.offsets[i]!, block.offsets[i + 1]!);
    if (column.levels.length < FEWEST_LEVELS) continue;
    const limit = Math.max(LEAST, ROUGHNESS * column.roughness());
    for (let worst = column.worst(limit); worst >= 0; worst = column.worst(limit)) {
      marks[column.levels[worst]!]! |= MARK['vertical-jump'];
      column.remove(worst);
    }
  }
}

/** Profiles that no time continuity can judge: two others are not near enough in time. */
function loneProfiles(block: ProfileBlock, { profiles }: Series): readonly number[] {
  if (profiles.length < FEWEST_PROFILES) return profiles;
  const time = (at: number): number => block.timeMs[profiles[at]!]!;
  return profiles.filter((_, at) => {
    let near = 0;
    for (let d = -REACH; d <= REACH; d++) {
      const other = at + d;
      if (d === 0 || other < 0 || other >= profiles.length) continue;
      if (Math.abs(time(other) - time(at)) <= LONGEST_GAP_MS) near++;
    }
    return near < FEWEST_PROFILES - 1;
  });
}

class Column {
  levels: number[] = [];
  #z: number[] = [];
  #u: number[] = [];
  #v: number[] = [];

  fill(block: ProfileBlock, marks: Uint32Array, start: number, end: number): void {
    this.levels = [];
    this.#z = [];
    this.#u = [];
    this.#v = [];
    for (let k = start; k < end; k++) {
      const u = eastward(block.speed[k]!, block.direction[k]!);
      if ((marks[k]! & REJECTING) !== 0 || Number.isNaN(u) || Number.isNaN(block.heightAgl[k]!)) continue;
      this.levels.push(k);
      this.#z.push(block.heightAgl[k]!);
      this.#u.push(u);
      this.#v.push(northward(block.speed[k]!, block.direction[k]!));
    }
  }

  remove(at: number): void {
    for (const list of [this.levels, this.#z, this.#u, this.#v]) list.splice(at, 1);
  }

  /** Standard deviation of a component about the line between neighbours, m/s. */
  roughness(): number {
    const departures: number[] = [];
    for (let k = 1; k < this.levels.length - 1; k++) departures.push(this.#departure(k));
    return departures.length < 8 ? 1 : median(departures) / MEDIAN_OF_NOISE;
  }

  /** The level that is farthest beyond its limit; -1: none is. */
  worst(limit: number): number {
    const z = this.#z;
    const last = this.levels.length - 1;
    if (last < FEWEST_LEVELS - 1) return -1;
    let worst = -1;
    let most = 1;
    for (let k = 0; k <= last; k++) {
      const isEnd = k === 0 || k === last;
      const reach = isEnd
        ? Math.abs(z[k]! - z[k === 0 ? 1 : last - 1]!)
        : Math.max(z[k + 1]! - z[k]!, z[k]! - z[k - 1]!);
      const allowed = isEnd ? AT_END * limit + SHEAR_AT_END * reach : limit + PER_METRE * reach;
      const excess = (isEnd ? this.#distance(k, k === 0 ? 1 : last - 1) : this.#departure(k)) / allowed;
      if (excess > most) {
        most = excess;
        worst = k;
      }
    }
    return worst;
  }

  #distance(a: number, b: number): number {
    return Math.hypot(this.#u[a]! - this.#u[b]!, this.#v[a]! - this.#v[b]!);
  }

  /** Distance of an inner level from the line between its neighbours, m/s. */
  #departure(k: number): number {
    const z = this.#z;
    const share = z[k + 1]! > z[k - 1]! ? (z[k]! - z[k - 1]!) / (z[k + 1]! - z[k - 1]!) : 0.5;
    const u = this.#u[k - 1]! + share * (this.#u[k + 1]! - this.#u[k - 1]!);
    const v = this.#v[k - 1]! + share * (this.#v[k + 1]! - this.#v[k - 1]!);
    return Math.hypot(this.#u[k]! - u, this.#v[k]! - v);
  }
}
