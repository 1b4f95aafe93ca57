// Which stretch of time a profile stands for in a section, so that what was measured joins and what is missing stays open.

import { INSTRUMENTS, type ProfileBlock } from '../profile/index.ts';

/** Profiles of any blocks in order of time, each with the column it falls into. */
export interface TimeCells {
  /** One entry a profile: which block, which profile of it, which column. */
  readonly blockIndex: Uint16Array;
  readonly profileIndex: Uint32Array;
  readonly column: Uint32Array;
  /** UTC ms per column, ascending; cells never overlap. */
  readonly startMs: Float64Array;
  readonly endMs: Float64Array;
}

const SOUNDING = new Set(
  ['radiosonde', 'dropsonde', 'pilot-balloon'].map((name) => INSTRUMENTS.findIndex((i) => i === name)),
);
/** A profile stands for an hour at most where its averaging period does not say more. */
const LONGEST_GUESS_MS = 3_600_000;
const LONE_PROFILE_MS = 600_000;

/** True when the profile's levels were met one after the other on the way up or down. */
export function isSounding(block: ProfileBlock, index: number): boolean {
  return SOUNDING.has(block.instrumentIndex[index]!);
}

/**
 * Columns of a section: one per distinct time. A profile's cell ends at its time and reaches back over its averaging
 * period or the usual interval, whichever is more; a sounding's begins at its launch. A gap of less than half a cell is
 * closed, any longer one stays open. Profiles without a time are left out.
 */
export function timeCells(blocks: readonly ProfileBlock[]): TimeCells {
  const { blockIndex, profileIndex } = inOrder(blocks);
  const column = new Uint32Array(blockIndex.length);
  const times = new Float64Array(blockIndex.length);
  let columns = 0;
  for (let i = 0; i < blockIndex.length; i++) {
    const timeMs = blocks[blockIndex[i]!]!.timeMs[profileIndex[i]!]!;
    if (columns === 0 || timeMs !== times[columns - 1]) times[columns++] = timeMs;
    column[i] = columns - 1;
  }
  const startMs = times.slice(0, columns);
  const endMs = times.slice(0, columns);
  const usualMs = Math.min(LONGEST_GUESS_MS, usualInterval(startMs));
  for (let i = 0; i < blockIndex.length; i++) {
    const block = blocks[blockIndex[i]!]!;
    const at = column[i]!;
    const periodMs = 1000 * block.periodS[profileIndex[i]!]!;
    const ownMs = periodMs > usualMs ? periodMs : usualMs;
    if (isSounding(block, profileIndex[i]!)) endMs[at] = Math.max(endMs[at]!, times[at]! + ownMs);
    else startMs[at] = Math.min(startMs[at]!, times[at]! - ownMs);
  }
  joinCells(startMs, endMs);
  return { blockIndex, profileIndex, column, startMs, endMs };
}

/** Of two cells that overlap the later keeps its end; a small gap between two is closed. */
function joinCells(startMs: Float64Array, endMs: Float64Array): void {
  for (let at = 1; at < startMs.length; at++) {
    const open = startMs[at]! - endMs[at - 1]!;
    if (open < 0 && endMs[at]! <= endMs[at - 1]!) endMs[at - 1] = startMs[at]!;
    else if (open < 0.5 * (endMs[at]! - startMs[at]!)) startMs[at] = endMs[at - 1]!;
  }
}

function inOrder(blocks: readonly ProfileBlock[]): Pick<TimeCells, 'blockIndex' | 'profileIndex'> {
  const capacity = blocks.reduce((sum, block) => sum + block.profileCount, 0);
  const blockIndex = new Uint16Array(capacity);
  const profileIndex = new Uint32Array(capacity);
  let count = 0;
  let ordered = true;
  let previous = -Infinity;
  blocks.forEach((block, at) => {
    for (let index = 0; index < block.profileCount; index++) {
      const timeMs = block.timeMs[index]!;
      if (Number.isNaN(timeMs)) continue;
      ordered &&= timeMs >= previous;
      previous = timeMs;
      blockIndex[count] = at;
      profileIndex[count++] = index;
    }
  });
  const taken = { blockIndex: blockIndex.subarray(0, count), profileIndex: profileIndex.subarray(0, count) };
  if (ordered) return taken;
  const timeOf = (i: number): number => blocks[blockIndex[i]!]!.timeMs[profileIndex[i]!]!;
  const order = Uint32Array.from({ length: count }, (_, i) => i).sort((a, b) => timeOf(a) - timeOf(b) || a - b);
  return {
    blockIndex: Uint16Array.from(order, (i) => blockIndex[i]!),
    profileIndex: Uint32Array.from(order, (i) => profileIndex[i]!),
  };
}

/** Median of the steps from one time to the next. */
function usualInterval(times: Float64Array): number {
  if (times.length < 2) return LONE_PROFILE_MS;
  const steps = new Float64Array(times.length - 1);
  for (let k = 0; k < steps.length; k++) steps[k] = times[k + 1]! - times[k]!;
  steps.sort();
  return steps[steps.length >> 1]!;
}
