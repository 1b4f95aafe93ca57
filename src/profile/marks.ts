// Quality marks: a bit for each thing that can be wrong with a level. The value itself always stays.

export interface MarkMeaning {
  readonly bit: number;
  readonly name: string;
  /**
   * `reject`: the level is left out of every computation. `reject-air`: its temperature and humidity are, its wind is not.
   * `doubt`: it stays in and lowers confidence. `note`: only told.
   */
  readonly effect: 'reject' | 'reject-air' | 'doubt' | 'note';
  readonly words: string;
}

// The order is the bit order and is stored in files: append, never reorder.
const MEANINGS = [
  ['no-height', 'reject', 'the level has no height and none can be worked out'],
  ['out-of-order', 'note', 'the file held this level out of order of height'],
  ['doubled', 'reject', 'another level of the same height comes first'],
  ['impossible', 'reject', 'a value lies outside what the atmosphere can do'],
  ['below-ground', 'reject', 'the level lies below the station'],
  ['source-rejects', 'reject', 'the source itself marks the value as bad or substituted'],
  ['source-doubts', 'doubt', 'the source itself marks the value as doubtful'],
  ['low-signal', 'reject', 'the signal or the consensus is too weak to carry wind'],
  ['vertical-jump', 'reject', 'the value does not fit the levels below and above'],
  ['time-jump', 'reject', 'the value does not fit the profiles before and after'],
  ['clutter', 'reject', 'lowest gates, fixed echoes or the outgoing pulse'],
  ['precipitation', 'doubt', 'the vertical speed shows falling rain or snow'],
  ['migrants-likely', 'doubt', 'migrating birds may carry the signal'],
  ['migrants-certain', 'reject', 'migrating birds carry the signal'],
  ['pendulum', 'doubt', 'the sonde swings or the balloon stalls'],
  ['superseded', 'reject', 'a later correction replaces the profile'],
  ['clock', 'doubt', 'the clock of the source jumped'],
  ['few-beams', 'doubt', 'the wind rests on few beams or soundings or on a poor fit'],
  ['air-impossible', 'reject-air', 'temperature or humidity lies outside what the atmosphere can do'],
  ['air-source-rejects', 'reject-air', 'the source itself marks temperature or humidity as bad'],
  ['height-worked-out', 'note', 'the height was worked out from the pressure'],
  ['contested', 'doubt', 'the value agrees with some gates around it and contradicts the larger part'],
  ['descent', 'reject', 'the sonde was falling again, far from its ascent'],
] as const;

export type MarkName = (typeof MEANINGS)[number][0];

export const MARKS: readonly MarkMeaning[] = MEANINGS.map(([name, effect, words], index) => ({
  bit: 1 << index,
  name,
  effect,
  words,
}));

/** Bit of a mark by its name. */
export const MARK = Object.fromEntries(MARKS.map((mark) => [mark.name, mark.bit])) as Record<MarkName, number>;

const bitsWith = (effect: MarkMeaning['effect']): number =>
  MARKS.reduce((bits, mark) => (mark.effect === effect ? bits | mark.bit : bits), 0);

/** Any of these bits takes the level out of every computation. */
export const REJECTING = bitsWith('reject');
/** Any of these bits takes the level's temperature and humidity out of every computation. */
export const REJECTING_AIR = REJECTING | bitsWith('reject-air');
/** Any of these bits lowers confidence. */
export const DOUBTING = bitsWith('doubt');

/** Names of all marks set in the bits, lowest first. */
export function markNames(bits: number): MarkName[] {
  return MEANINGS.filter((_, index) => (bits & (1 << index)) !== 0).map(([name]) => name);
}
