import { readProfiles, bytesSource, type ReadOptions } from '../../../src/ingest/index.ts';
import { profilesOf, type Profile } from '../../../src/profile/index.ts';
import type { Problem } from '../../../src/air/index.ts';

/** All profiles and problems of some bytes, by way of the front door. */
export async function readBytes(
  name: string,
  bytes: Uint8Array,
  options: Partial<ReadOptions> = {},
): Promise<{ profiles: Profile[]; problems: Problem[]; formats: Set<string> }> {
  const profiles: Profile[] = [];
  const problems: Problem[] = [];
  const formats = new Set<string>();
  for await (const reading of readProfiles(bytesSource(name, bytes), options)) {
    profiles.push(...profilesOf(reading.block));
    problems.push(...reading.problems);
    formats.add(reading.format);
  }
  return { profiles, problems, formats };
}
