// Why a ramp happened, from evidence that the caller hands over: turbine states, the jet's tracks, sunrise, the wind at hub.

import { veerBetween } from '../air/index.ts';
import type { JetTrack, TrackPoint } from '../jet/index.ts';
import { bottomTip, topTip, type Disc } from './disc.ts';
import type { TurbineState } from './fleet-power.ts';
import type { Ramp } from './ramps.ts';

export type RampCauseName =
  | 'shutdown'
  | 'restart'
  | 'jet-onset'
  | 'nose-descends'
  | 'nose-rises'
  | 'jet-decay'
  | 'wind-shift'
  | 'wind-rises'
  | 'wind-falls'
  | 'unknown';

export interface RampCause {
  readonly cause: RampCauseName;
  /** 0 to 1: how firmly the evidence speaks for it. Our own ordering, no probability. */
  readonly weight: number;
  /** For people, in pieces: a number is a moment, UTC ms, to be put on the reader's clock. */
  readonly pieces: readonly (string | number)[];
}

/** A moment on somebody's clock, in words. */
export type ClockWords = (timeMs: number) => string;

/** The nose of one jet through time, as the tracks of the jet room tell it. */
export type NoseTrack = Pick<JetTrack, 'beganMs' | 'endedMs'> & {
  readonly points: readonly Pick<TrackPoint, 'timeMs' | 'noseHeight' | 'noseSpeed'>[];
};

/** Series run in parallel with `timeMs`. */
export interface RampEvidence {
  readonly disc: Disc;
  readonly timeMs: ArrayLike<number>;
  readonly hubSpeed: ArrayLike<number>;
  readonly hubDirection: ArrayLike<number>;
  readonly state: readonly TurbineState[];
  readonly tracks: readonly NoseTrack[];
  readonly sunrisesMs: readonly number[];
}

const MINUTE = 60_000;
/** The forming of a jet and sunrise are felt at the hub with delay: looked for so long before a ramp. Our own choices. */
const ONSET_BEFORE = 90 * MINUTE;
const SUNRISE_BEFORE = 240 * MINUTE;
/** The end of a jet aloft is felt at the hub as mixing reaches down: looked for so long before a ramp. */
const END_BEFORE = 60 * MINUTE;
/** The nose is compared from so long before the ramp's begin. */
const NOSE_BEFORE = 20 * MINUTE;
/** A turn of the hub's wind this large, degrees, is a shift; twice this speaks for it fully. */
const SHIFT = 30;
/** A nose that lost this much speed, m/s, decays. */
const DECAY = 2;

/**
 * Causes of a ramp, the firmest first; `unknown` alone where no evidence speaks.
 * @example causeInWords(causesOfRamp(ramp, evidence)[0])
 */
export function causesOfRamp(ramp: Ramp, evidence: RampEvidence): RampCause[] {
  const found = [
    ...stops(ramp, evidence),
    ...evidence.tracks.flatMap((track) => [
      ...onset(ramp, track),
      ...crossing(ramp, track, evidence.disc),
      ...decay(ramp, track, evidence.sunrisesMs),
    ]),
    ...shift(ramp, evidence),
    ...change(ramp, evidence),
  ].sort((a, b) => b.weight - a.weight);
  return found.length > 0 ? found : [{ cause: 'unknown', weight: 0, pieces: ['nothing measured here explains it'] }];
}

/** `the jet formed at 21:40 UTC` */
export function causeInWords({ pieces }: RampCause, clock: ClockWords = utcClock): string {
  return pieces.map((piece) => (typeof piece === 'number' ? clock(piece) : piece)).join('');
}

/** The ramp and its firmest cause in one sentence. */
export function rampInWords(ramp: Ramp, causes: readonly RampCause[], clock: ClockWords = utcClock): string {
  const minutes = Math.round((ramp.endMs - ramp.startMs) / MINUTE);
  const moved = ramp.sense === 'up' ? 'rose' : 'fell';
  const size = `${Math.abs(ramp.changeKw / 1000).toFixed(1)} MW (${Math.round(100 * Math.abs(ramp.changeShare))} % of capacity)`;
  return `Output ${moved} by ${size} in ${minutes} min from ${clock(ramp.startMs)}: ${causeInWords(causes[0]!, clock)}.`;
}

function stops(ramp: Ramp, { timeMs, state }: RampEvidence): RampCause[] {
  const [from, to] = [indexBefore(timeMs, ramp.startMs), indexBefore(timeMs, ramp.endMs)];
  const wanted: TurbineState = 'stopped-high-wind';
  const stopped = (k: number): boolean => state[k] === wanted;
  for (let k = from + 1; k <= to; k++) {
    if (ramp.sense === 'down' && stopped(k) && !stopped(k - 1)) {
      return [{ cause: 'shutdown', weight: 1, pieces: ['high-wind shutdown at ', timeMs[k]!] }];
    }
    if (ramp.sense === 'up' && !stopped(k) && stopped(k - 1)) {
      return [{ cause: 'restart', weight: 1, pieces: ['restart after high wind at ', timeMs[k]!] }];
    }
  }
  return [];
}

function onset(ramp: Ramp, track: NoseTrack): RampCause[] {
  if (ramp.sense !== 'up' || track.beganMs < ramp.startMs - ONSET_BEFORE || track.beganMs > ramp.endMs) return [];
  return [{ cause: 'jet-onset', weight: 0.8, pieces: ['the jet formed at ', track.beganMs] }];
}

/** The nose moving through a tip or through the hub between shortly before the ramp and its end. */
function crossing(ramp: Ramp, track: NoseTrack, disc: Disc): RampCause[] {
  const last = pointBefore(track, ramp.endMs);
  if (last === undefined) return [];
  const began = (pointBefore(track, ramp.startMs - NOSE_BEFORE) ?? track.points[0]!).noseHeight;
  const ended = last.noseHeight;
  const marks = [topTip(disc), disc.hubHeight, bottomTip(disc)];
  const names = ["the disc's upper tip", 'hub height', "the disc's lower tip"];
  const crossed = marks.flatMap((mark, k) => ((began - mark) * (ended - mark) < 0 ? [names[k]!] : []));
  if (crossed.length === 0) return [];
  const heights = `from ${Math.round(began)} to ${Math.round(ended)} m`;
  const through = crossed.length === 1 ? crossed[0]! : 'the disc';
  const descends = ended < began;
  return [
    {
      cause: descends ? 'nose-descends' : 'nose-rises',
      weight: 0.9,
      pieces: [`the nose ${descends ? 'came down' : 'rose'} through ${through} (${heights})`],
    },
  ];
}

function decay(ramp: Ramp, track: NoseTrack, sunrisesMs: readonly number[]): RampCause[] {
  if (ramp.sense !== 'down' || track.beganMs > ramp.startMs) return [];
  const before = pointBefore(track, ramp.startMs);
  const lost = before === undefined ? 0 : before.noseSpeed - pointBefore(track, ramp.endMs)!.noseSpeed;
  const endedMs = track.endedMs ?? Infinity;
  const ended = endedMs >= ramp.startMs - END_BEFORE && endedMs <= ramp.endMs + NOSE_BEFORE;
  if (!ended && !(lost >= DECAY)) return [];
  const how = ended ? ['the jet ended at ', endedMs] : [`the jet's nose lost ${lost.toFixed(1)} m/s`];
  const sunrise = sunrisesMs.find((at) => at <= ramp.endMs && at >= ramp.startMs - SUNRISE_BEFORE);
  if (sunrise === undefined) return [{ cause: 'jet-decay', weight: 0.7, pieces: how }];
  return [{ cause: 'jet-decay', weight: 0.85, pieces: [...how, ', after sunrise at ', sunrise] }];
}

function shift(ramp: Ramp, { timeMs, hubDirection }: RampEvidence): RampCause[] {
  const [from, to] = [indexBefore(timeMs, ramp.startMs), indexBefore(timeMs, ramp.endMs)];
  const turn = from < 0 ? NaN : veerBetween(hubDirection[from]!, hubDirection[to]!);
  if (!(Math.abs(turn) >= SHIFT)) return [];
  const pieces = [`the wind at hub height ${turn > 0 ? 'veered' : 'backed'} by ${Math.round(Math.abs(turn))}°`];
  return [{ cause: 'wind-shift', weight: Math.min(0.95, Math.abs(turn) / (2 * SHIFT)), pieces }];
}

function change(ramp: Ramp, { timeMs, hubSpeed }: RampEvidence): RampCause[] {
  const [from, to] = [indexBefore(timeMs, ramp.startMs), indexBefore(timeMs, ramp.endMs)];
  const gained = from < 0 ? NaN : hubSpeed[to]! - hubSpeed[from]!;
  const rises = ramp.sense === 'up';
  if (!(rises ? gained > 0 : gained < 0)) return [];
  const pieces = [`the wind at hub height ${rises ? 'rose' : 'fell'} by ${Math.abs(gained).toFixed(1)} m/s`];
  return [{ cause: rises ? 'wind-rises' : 'wind-falls', weight: 0.3, pieces }];
}

function pointBefore(track: NoseTrack, atMs: number): NoseTrack['points'][number] | undefined {
  return track.points.findLast((point) => point.timeMs <= atMs);
}

/** Last sample at or before a time; -1 for none. */
function indexBefore(timeMs: ArrayLike<number>, atMs: number): number {
  let index = -1;
  while (index + 1 < timeMs.length && timeMs[index + 1]! <= atMs) index++;
  return index;
}

function utcClock(timeMs: number): string {
  return `${new Date(timeMs).toISOString().slice(11, 16)} UTC`;
}
