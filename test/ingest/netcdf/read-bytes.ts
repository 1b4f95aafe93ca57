// Reads bytes through the front door and gathers everything that comes.

import type { Problem } from '../../../src/air/index.ts';
import { bytesSource, readProfiles, type ReadOptions } from '../../../src/ingest/index.ts';
import type { ProfileBlock } from '../../../src/profile/index.ts';

export async function readBytes(
  name: string,
  bytes: Uint8Array,
  options: Partial<ReadOptions> = {},
): Promise<{ blocks: ProfileBlock[]; problems: Problem[]; format: string }> {
  const blocks: ProfileBlock[] = [];
  const problems: Problem[] = [];
  let format = '';
  for await (const reading of readProfiles(bytesSource(name, bytes), options)) {
    if (reading.block.profileCount > 0) blocks.push(reading.block);
    problems.push(...reading.problems);
    format = reading.format;
  }
  return { blocks, problems, format };
}
