// The sentence at the head of the page: what a good colleague would say first, in the reader's units.

import { toHeightUnit } from '../../air/index.ts';
import type { NightState } from '../../desk/index.ts';
import type { JetKind, JetStory, JetTrack, TrackPoint, TurningVerdict } from '../../jet/index.ts';
import type { DisplayUnits } from '../../site/index.ts';
import { STALE_INTERVALS } from './answers.ts';
import { compassWords, heightText, inHundred, plain, speedText } from './numbers.ts';
import { durationWords, type TimeWords } from './time.ts';

/** A piece of a sentence; `strong` carries the figures, `call` what needs a person. */
export interface Piece {
  readonly text: string;
  readonly weight?: 'strong' | 'call';
}

/** A nose that moves less than this, m an hour, stays where it is. */
const STEADY_HEIGHT = 15;
/** A nose on the levels and one on the smoothed profile are the same when they are nearer than this, m. */
const LEAST_NEARNESS = 100;

export function story(night: NightState, stepMs: number, units: DisplayUnits, times: TimeWords): Piece[] {
  const last = night.timeMs.length - 1;
  if (last < 0) {
    return [{ text: `No profile of ${night.feed.station.name} in this night up to ${times.clock(night.atMs)}.` }];
  }
  const ageMs = night.atMs - night.timeMs[last]!;
  const stale = ageMs > STALE_INTERVALS * stepMs;
  const pieces: Piece[] = [];
  if (stale) pieces.push({ text: `The last profile is ${durationWords(ageMs)} old. `, weight: 'call' });
  if (night.migrants[last] === true) {
    pieces.push({ text: 'Migrating birds may carry the signal: check with another instrument. ', weight: 'call' });
  }
  const [first] = storiesInOrder(night);
  if (first?.track.endedMs === null) {
    pieces.push(...trackPieces(first, noseNow(night, first.track), units, times, stale));
  } else pieces.push(...noTrackPieces(night, times));
  return pieces;
}

type Nose = Pick<TrackPoint, 'noseHeight' | 'noseSpeed' | 'noseDirection'>;

/** The nose that the answers below the picture show, where it is the track's; else the track's own last point. */
function noseNow(night: NightState, track: JetTrack): Nose {
  const point = track.points.at(-1)!;
  const jet = night.findings.at(-1)?.jets[0];
  const same = point.timeMs === night.timeMs.at(-1) && jet !== undefined;
  const near = same && Math.abs(jet.noseHeight - point.noseHeight) < Math.max(LEAST_NEARNESS, 3 * point.heightSpread);
  return near ? jet : point;
}

/** The jets of the night, as a list would name them: those that last first, strongest first, then the newest ended. */
export function storiesInOrder({ stories }: NightState): JetStory[] {
  const rank = ({ track }: JetStory): number =>
    track.endedMs === null ? track.points.at(-1)!.noseSpeed : track.endedMs - 1e15;
  return [...stories].sort((a, b) => rank(b) - rank(a));
}

/** Name of a story among others: `The jet since 21:10`, `The jet from 21:10 to 04:30`. */
export function storyTitle({ track }: JetStory, times: TimeWords): string {
  const began = times.clock(track.beganMs);
  return track.endedMs === null ? `The jet since ${began}` : `The jet from ${began} to ${times.clock(track.endedMs)}`;
}

const KIND_WORDS: Readonly<Record<JetKind | 'undecided', string>> = {
  nocturnal: 'A nocturnal jet',
  barrier: 'A barrier jet',
  'valley-exit': 'A valley-exit jet',
  other: 'A low-level jet that the night does not explain',
  undecided: 'A low-level jet',
};

function trackPieces(story: JetStory, nose: Nose, units: DisplayUnits, times: TimeWords, stale: boolean): Piece[] {
  const { track } = story;
  const { confidence, timeMs } = track.points.at(-1)!;
  const { noseHeight, noseSpeed, noseDirection } = nose;
  const from = compassWords(noseDirection);
  return [
    {
      text: `${KIND_WORDS[story.kind]} since ${times.clock(track.beganMs)}${stale ? `, last seen at ${times.clock(timeMs)}` : ''}: nose at `,
    },
    { text: `${heightText(noseHeight, units)} ${units.height}`, weight: 'strong' },
    { text: ', ' },
    { text: `${speedText(noseSpeed, units)} ${units.speed}`, weight: 'strong' },
    {
      text: `${from === '' ? '' : ` from the ${from}`}, ${PHASE_WORDS[track.phase]}${heightWords(track, units)}${turningWords(story)}; ${inHundred(confidence)} sure.`,
    },
  ];
}

/** A jet that is steady in strength may yet rise or sink. */
const PHASE_WORDS: Readonly<Record<JetTrack['phase'], string>> = {
  building: 'building',
  steady: 'steady in strength',
  easing: 'easing',
  ended: 'ended',
};

const TURNING_WORDS: Readonly<Record<TurningVerdict, string>> = {
  inertial: 'at the inertial rate',
  slower: 'slower than the inertial rate',
  faster: 'faster than the inertial rate',
  opposite: 'against the inertial sense',
  none: '',
};

function turningWords({ turning }: JetStory): string {
  if (turning.status !== 'told' || turning.verdict === null || turning.verdict === 'none') return '';
  return `, turning ${turning.measuredRate > 0 ? 'clockwise' : 'anticlockwise'} ${TURNING_WORDS[turning.verdict]}`;
}

function heightWords({ rates }: JetTrack, units: DisplayUnits): string {
  const { perHour, uncertainty } = rates.height;
  if (!(Math.abs(perHour) > Math.max(STEADY_HEIGHT, uncertainty))) return '';
  const size = plain(Math.abs(toHeightUnit(perHour, units.height)), 0);
  return `, ${perHour > 0 ? 'rising' : 'sinking'} ${size} ${units.height} an hour`;
}

function noTrackPieces(night: NightState, times: TimeWords): Piece[] {
  const finding = night.findings.at(-1)!;
  const ended = night.tracks.filter(({ endedMs }) => endedMs !== null).sort((a, b) => b.endedMs! - a.endedMs!)[0];
  const before = ended === undefined ? '' : ` The last one ended at ${times.clock(ended.endedMs!)}.`;
  if (finding.status === 'not-assessable') {
    return [{ text: `Whether there is a jet cannot be said. ${finding.why}${before}` }];
  }
  if (finding.status === 'jet') {
    return [
      { text: `No lasting jet; a nose shows at ${times.clock(night.timeMs.at(-1)!)} but has not held.${before}` },
    ];
  }
  return [{ text: `No low-level jet. ${finding.why}${before}` }];
}
