// When moist air at an upstream station gets here: along the straight way, with the wind measured at the transport level.

import { bearingTo, distanceBetween, speedOf } from '../air/index.ts';
import type { Station } from '../profile/index.ts';

/** Wind at the transport level (the jet's nose, or where the flux is greatest) over one station of the way. */
export interface WayWind {
  readonly station: Station;
  /** UTC, ms */
  readonly timeMs: number;
  /** m/s, eastward and northward */
  readonly u: number;
  readonly v: number;
  /** Standard uncertainty of each component, m/s; spread over the hour and over the layer belongs to it. */
  readonly uncertainty: number;
}

/** Air on its way. Times are UTC ms; NaN where `status` is not `on-its-way`. */
export interface Arrival {
  readonly status: 'on-its-way' | 'passes-by' | 'not-assessable';
  readonly why: string;
  readonly from: string;
  readonly to: string;
  /** m */
  readonly distance: number;
  readonly departsMs: number;
  readonly arrivesMs: number;
  /** Bounds: one standard deviation of the wind along the way. */
  readonly earliestMs: number;
  /** Infinity where the wind may as well stand still. */
  readonly latestMs: number;
  /** m/s along the way, mean over distance in the sense that distance over it is the travel time */
  readonly speed: number;
  /** m by which the air passes the station on the left (negative) or right, were the wind to stay */
  readonly missBy: number;
  /** Stations whose wind was used, in the order of the way. */
  readonly measuredAt: readonly string[];
}

/** A wind that points further from the way than this, degrees, carries the air past. */
const WIDEST = 45;
/** m/s along the way under which there is no arrival to speak of. */
const LEAST_SPEED = 1;
/** Winds further off the way than this share of its length do not speak for it. Our own choice. */
const OFF_THE_WAY = 0.25;

/**
 * Travel time from the upstream station, from `departsMs` on, with the winds given: linear along the way between the
 * stations that measured, constant beyond them. The bounds come from the winds' uncertainty and, where several stations
 * measured, from their scatter about the mean.
 * @param winds at least the one of the upstream station; others count where they lie beside the way
 */
export function arrivalOf(upstream: Station, target: Station, winds: readonly WayWind[], departsMs: number): Arrival {
  const distance = distanceBetween(upstream, target);
  const bearing = bearingTo(upstream, target);
  const refuse = (status: Arrival['status'], why: string, missBy = NaN): Arrival => ({
    status,
    why,
    from: upstream.id,
    to: target.id,
    distance,
    departsMs,
    arrivesMs: NaN,
    earliestMs: NaN,
    latestMs: NaN,
    speed: NaN,
    missBy,
    measuredAt: [],
  });
  if (!(distance > 0)) return refuse('not-assessable', 'the stations have no two positions');
  const marks = marksOnTheWay(upstream, distance, bearing, winds);
  if (marks.length === 0) return refuse('not-assessable', 'no wind at the transport level on the way');

  const mean = meanOf(marks);
  const off = mean.off;
  const missBy = distance * Math.tan((off * Math.PI) / 180);
  if (Math.abs(off) > WIDEST) {
    return refuse(
      'passes-by',
      `the wind blows ${Math.round(Math.abs(off))}° off the way`,
      Math.abs(off) < 90 ? missBy : NaN,
    );
  }
  if (mean.along < LEAST_SPEED) return refuse('not-assessable', 'the wind along the way is too weak');
  const spread = spreadOf(marks, mean.along);
  const travel = (shift: number): number => 1000 * travelSeconds(marks, distance, shift);
  const arrivesMs = departsMs + travel(0);
  return {
    ...refuse('on-its-way', ''),
    arrivesMs,
    earliestMs: departsMs + travel(spread),
    latestMs: departsMs + travel(-spread),
    speed: distance / ((arrivesMs - departsMs) / 1000),
    missBy,
    measuredAt: marks.map((mark) => mark.id),
  };
}

interface Mark {
  readonly id: string;
  /** m from the upstream station along the way */
  readonly at: number;
  /** m/s along the way and to the right of it */
  readonly along: number;
  readonly across: number;
  readonly uncertainty: number;
}

function marksOnTheWay(upstream: Station, distance: number, bearing: number, winds: readonly WayWind[]): Mark[] {
  const way = (bearing * Math.PI) / 180;
  const marks: Mark[] = [];
  for (const { station, u, v, uncertainty } of winds) {
    if (Number.isNaN(u) || Number.isNaN(v)) continue;
    const far = distanceBetween(upstream, station);
    const angle = far > 0 ? ((bearingTo(upstream, station) - bearing) * Math.PI) / 180 : 0;
    const at = far * Math.cos(angle);
    if (!(Math.abs(far * Math.sin(angle)) <= OFF_THE_WAY * distance && at >= 0 && at <= distance * 1.01)) continue;
    const along = u * Math.sin(way) + v * Math.cos(way);
    const across = u * Math.cos(way) - v * Math.sin(way);
    marks.push({ id: station.id, at, along, across, uncertainty });
  }
  return marks.sort((a, b) => a.at - b.at);
}

function meanOf(marks: readonly Mark[]): { along: number; off: number } {
  const along = marks.reduce((sum, mark) => sum + mark.along, 0) / marks.length;
  const across = marks.reduce((sum, mark) => sum + mark.across, 0) / marks.length;
  return { along, off: (Math.atan2(across, along) * 180) / Math.PI };
}

function spreadOf(marks: readonly Mark[], mean: number): number {
  const measured = marks.reduce((sum, mark) => sum + mark.uncertainty, 0) / marks.length;
  if (marks.length === 1) return measured;
  const scatter = marks.reduce((sum, mark) => sum + (mark.along - mean) ** 2, 0) / (marks.length - 1);
  return speedOf(measured, Math.sqrt(scatter / marks.length));
}

/** Integral of dx over V(x), V linear between marks and held beyond them; Infinity where V comes to a stand. */
function travelSeconds(marks: readonly Mark[], distance: number, shift: number): number {
  let seconds = 0;
  const pass = (length: number, from: number, to: number): void => {
    if (length <= 0) return;
    if (!(from > 0 && to > 0)) seconds = Infinity;
    else if (Math.abs(to - from) < 1e-9 * from) seconds += length / from;
    else seconds += (length * Math.log(to / from)) / (to - from);
  };
  const [first, last] = [marks[0]!, marks.at(-1)!];
  pass(first.at, first.along + shift, first.along + shift);
  for (let k = 1; k < marks.length; k++) {
    const [a, b] = [marks[k - 1]!, marks[k]!];
    pass(b.at - a.at, a.along + shift, b.along + shift);
  }
  pass(distance - last.at, last.along + shift, last.along + shift);
  return seconds;
}
