// Profiles whose time cannot be true: a clock that was never set, or a date far outside what can have been measured.

import type { Problem } from '../air/index.ts';
import { pickProfiles, type ProfileBlock } from '../profile/index.ts';
import type { ReadOptions } from './format.ts';

const DAY_MS = 86_400_000;

/** Why a time cannot be true, in words; undefined when it can. NaN is a wrong time. */
function wrongTime(
  timeMs: number,
  { limits, referenceTimeMs }: Pick<ReadOptions, 'limits' | 'referenceTimeMs'>,
): string | undefined {
  if (!Number.isFinite(timeMs)) return 'no time could be read';
  if (timeMs >= 0 && timeMs < DAY_MS) return 'a clock that was never set starts on this day';
  if (timeMs < limits.earliestMs) return 'nobody measured so early';
  if (timeMs >= limits.latestMs) return 'it lies in the far future';
  if (referenceTimeMs !== undefined && timeMs > referenceTimeMs + DAY_MS) return 'it lies in the future';
  return undefined;
}

/**
 * The block without profiles whose time cannot be true; says so in `problems`, one entry for all of a kind.
 * @param profilesBefore of the same file in earlier blocks, to number the profile in the file
 * @returns the block itself when all times can be true
 */
export function withoutWrongTimes(
  block: ProfileBlock,
  source: string,
  options: Pick<ReadOptions, 'limits' | 'referenceTimeMs'>,
  problems: Problem[],
  profilesBefore: number,
): ProfileBlock {
  const kept: number[] = [];
  const wrong = new Map<string, { first: number; count: number }>();
  for (let index = 0; index < block.profileCount; index++) {
    const why = wrongTime(block.timeMs[index]!, options);
    if (why === undefined) {
      kept.push(index);
      continue;
    }
    const seen = wrong.get(why);
    if (seen === undefined) wrong.set(why, { first: index, count: 1 });
    else seen.count++;
  }
  if (wrong.size === 0) return block;
  for (const [why, { first, count }] of wrong) {
    const which = count === 1 ? 'A profile was' : `${count} profiles were`;
    problems.push({
      code: 'ingest/wrong-time',
      what: `${which} left out for the time ${timeInWords(block.timeMs[first]!)}: ${why}.`,
      mend: 'Correct the clock of the instrument or the time in the file.',
      where: { source, record: profilesBefore + first + 1 },
    });
  }
  return pickProfiles(kept.map((index) => ({ block, index })));
}

function timeInWords(timeMs: number): string {
  // Beyond the years that a date can hold, the bare number must do.
  return Math.abs(timeMs) <= 8.64e15 ? new Date(timeMs).toISOString() : String(timeMs);
}
