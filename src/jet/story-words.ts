// A track in a sentence: "A nocturnal jet since 21:10: nose 320 m, 17 m/s from 215 degrees, rising 40 m an hour, turning
// clockwise at the inertial rate. Certain."

import type { JetKind } from './evidence.ts';
import type { Rate } from './rates.ts';
import type { JetTrack, TrackPoint } from './track.ts';
import type { Turning } from './turning.ts';

/** How the reader wants times and numbers: each with its unit. */
export interface WordFormat {
  readonly time: (timeMs: number) => string;
  /** From metres; `320 m` unless told. */
  readonly height?: (height: number) => string;
  /** From metres a second; `17 m/s` unless told. */
  readonly speed?: (speed: number) => string;
}

const KIND_WORDS: Readonly<Record<JetKind | 'undecided', string>> = {
  nocturnal: 'A nocturnal jet',
  barrier: 'A barrier jet',
  'valley-exit': 'A valley-exit jet',
  other: 'A jet that the night does not explain',
  undecided: 'A jet of undecided kind',
};
/** Slower changes than these an hour are not worth a word. */
const WORTH_SAYING = { height: 20, speed: 0.3 };
/** Points whose median confidence is put in words. */
const LATEST = 5;

/** The sentence; `ended` tracks are told in the past. */
export function storyInWords(
  track: JetTrack,
  kind: JetKind | 'undecided',
  turning: Turning,
  format: WordFormat,
): string {
  const height = format.height ?? ((value: number) => `${10 * Math.round(value / 10)} m`);
  const speed = format.speed ?? ((value: number) => `${Math.round(value)} m/s`);
  const from = ({ noseDirection }: TrackPoint): string =>
    Number.isNaN(noseDirection) ? '' : ` from ${Math.round(noseDirection) % 360} degrees`;
  const turn = turningInWords(turning);
  const sure = certainty(track.points);
  if (track.endedMs !== null) {
    const { peak } = track;
    const at = `${speed(peak.noseSpeed)} at ${height(peak.noseHeight)}${from(peak)}`;
    const span = `${KIND_WORDS[kind]} from ${format.time(track.beganMs)} to ${format.time(track.endedMs)}`;
    const turned = turn === '' ? '' : `, ${turn}`;
    return `${span}: strongest at ${format.time(peak.timeMs)}, ${at}${turned}. It has ended.`;
  }
  const last = track.points.at(-1)!;
  const parts = [
    `nose ${height(last.noseHeight)}`,
    `${speed(last.noseSpeed)}${from(last)}`,
    clear(track.rates.height, WORTH_SAYING.height) ? change(track.rates.height, 'rising', 'sinking', height) : '',
    clear(track.rates.speed, WORTH_SAYING.speed) ? change(track.rates.speed, 'gaining', 'losing', gain(format)) : '',
    turn,
  ].filter((part) => part !== '');
  return `${KIND_WORDS[kind]} since ${format.time(track.beganMs)}: ${parts.join(', ')}. ${sure}`;
}

function clear({ perHour, uncertainty }: Rate, least: number): boolean {
  return Math.abs(perHour) > Math.max(least, uncertainty);
}

function change(rate: Rate, up: string, down: string, inUnits: (value: number) => string): string {
  return `${rate.perHour > 0 ? up : down} ${inUnits(Math.abs(rate.perHour))} an hour`;
}

/** Changes of speed are small: a decimal more than the speed itself, in the reader's unit where one is given. */
function gain({ speed }: WordFormat): (value: number) => string {
  return speed ?? ((value: number) => `${value.toFixed(1)} m/s`);
}

function turningInWords({ verdict, measuredRate }: Turning): string {
  if (verdict === null) return '';
  const sense = measuredRate > 0 ? 'clockwise' : 'anticlockwise';
  switch (verdict) {
    case 'inertial':
      return `turning ${sense} at the inertial rate`;
    case 'slower':
      return `turning ${sense}, slower than inertially`;
    case 'faster':
      return `turning ${sense}, faster than inertially`;
    case 'opposite':
      return `turning ${sense}, against the inertial sense`;
    case 'none':
      return 'hardly turning';
  }
}

/** How sure, in a word for the latest points. */
function certainty(points: readonly TrackPoint[]): string {
  const latest = points.slice(-LATEST).map(({ confidence }) => confidence);
  latest.sort((a, b) => a - b);
  const middle = latest[latest.length >> 1]!;
  if (middle >= 0.95) return 'Certain.';
  if (middle >= 0.8) return 'Very likely.';
  return middle >= 0.5 ? 'Likely.' : 'Doubtful.';
}
