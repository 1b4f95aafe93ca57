// Joins blocks end to end.

import type { ProfileBlock } from './block.ts';
import { pickProfiles, type Pick } from './pick.ts';

/**
 * One block of all profiles of the given blocks, in their order. The given blocks stay untouched.
 * A column is null in the result only when every block lacks it; levels of a block without it are NaN there.
 * @param blocks any number; none gives a block without profiles, one is returned as it is
 */
export function concatBlocks(blocks: readonly ProfileBlock[]): ProfileBlock {
  if (blocks.length === 1) return blocks[0]!;
  const picks: Pick[] = [];
  for (const block of blocks) for (let index = 0; index < block.profileCount; index++) picks.push({ block, index });
  return pickProfiles(picks);
}
