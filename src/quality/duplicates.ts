// Duplicates and corrections: of several reports of one profile the best one counts. Common practice, without source.

import { MARK, REJECTING, type ProfileBlock } from '../profile/index.ts';
import { compareContent, type Screened } from './series.ts';

/** Two profiles of the same time are the same report if so much of the smaller one's heights is in the other. */
const SAME_HEIGHTS = 0.7;
/** m */
const SAME_HEIGHT = 1;

/**
 * Adds `superseded` to all levels of a profile when the block holds a later correction of it, a fuller report of the same
 * time, or the same once more. Profiles of one time on different heights, as of a profiler's two modes, stay side by side.
 */
export function duplicates({ block, series }: Screened, marks: Uint32Array): void {
  for (const { profiles } of series) {
    for (let from = 0; from < profiles.length;) {
      let to = from + 1;
      while (to < profiles.length && block.timeMs[profiles[to]!] === block.timeMs[profiles[from]!]) to++;
      if (to - from > 1) keepBest(block, marks, profiles.slice(from, to));
      from = to;
    }
  }
}

function keepBest(block: ProfileBlock, marks: Uint32Array, sameTime: readonly number[]): void {
  const source = (i: number): string => block.sources[block.sourceIndex[i]!]!;
  const best = [...sameTime].sort(
    (a, b) =>
      block.revision[b]! - block.revision[a]! ||
      usable(block, marks, b) - usable(block, marks, a) ||
      compareContent(block, b, a) ||
      (source(a) < source(b) ? -1 : 1),
  );
  const kept: number[] = [];
  for (const i of best) {
    if (kept.some((other) => sameReport(block, other, i))) {
      for (let k = block.offsets[i]!; k < block.offsets[i + 1]!; k++) marks[k]! |= MARK.superseded;
    } else kept.push(i);
  }
}

function usable(block: ProfileBlock, marks: Uint32Array, i: number): number {
  let count = 0;
  for (let k = block.offsets[i]!; k < block.offsets[i + 1]!; k++) {
    if (!Number.isNaN(block.speed[k]!) && (marks[k]! & REJECTING) === 0) count++;
  }
  return count;
}

function sameReport(block: ProfileBlock, a: number, b: number): boolean {
  const { offsets, heightAgl } = block;
  const end = offsets[a + 1]!;
  let j = offsets[a]!;
  let shared = 0;
  for (let k = offsets[b]!; k < offsets[b + 1]!; k++) {
    while (j < end && heightAgl[j]! < heightAgl[k]! - SAME_HEIGHT) j++;
    if (j < end && Math.abs(heightAgl[j]! - heightAgl[k]!) <= SAME_HEIGHT) shared++;
  }
  const smaller = Math.min(end - offsets[a]!, offsets[b + 1]! - offsets[b]!);
  return shared >= SAME_HEIGHTS * smaller;
}
