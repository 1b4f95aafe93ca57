// The profiles of all paths, block after block, with whatever was wrong told on stderr.

import type { ProfileBlock } from '../profile/index.ts';
import { readProfiles } from '../ingest/index.ts';
import type { Site } from '../site/index.ts';
import { EXIT, UsageError } from './command.ts';
import { inputsOf, type Input } from './inputs.ts';
import { OutputClosed } from './output.ts';
import { Reporter } from './reporter.ts';

/**
 * Reads every path and hands each block on as soon as it is there; no more than one is held.
 * @returns exit code: well, or someUnread when an input named on the command line had a problem
 * @throws UsageError when there is no path
 */
export async function forEachBlock(
  paths: readonly string[],
  site: Site,
  take: (block: ProfileBlock) => Promise<void>,
): Promise<number> {
  if (paths.length === 0) throw new UsageError('It needs at least one file or folder, or - for stdin.');
  const reporter = new Reporter();
  let unread = false;
  try {
    for await (const input of inputsOf(paths)) {
      if ('code' in input) {
        reporter.problem(input);
        unread = true;
      } else if (await readInput(input, site, reporter, take)) unread = true;
    }
  } catch (error) {
    if (!(error instanceof OutputClosed)) throw error;
  } finally {
    reporter.finish();
  }
  return unread ? EXIT.someUnread : EXIT.well;
}

/** @returns whether something in it could not be read */
async function readInput(
  input: Input,
  site: Site,
  reporter: Reporter,
  take: (block: ProfileBlock) => Promise<void>,
): Promise<boolean> {
  let unread = false;
  const options = {
    site,
    referenceTimeMs: Date.now(),
    onProgress: (progress: Parameters<Reporter['progress']>[0]) => reporter.progress(progress),
  };
  for await (const { block, problems } of readProfiles(input.source, options)) {
    for (const problem of problems) {
      // A folder may hold a README and a site file beside the data: those are passed over, not unread.
      const foreign = !input.named && problem.code === 'ingest/unknown-format';
      if (foreign) reporter.say(`${input.source.name}: passed over, no known format`);
      else {
        reporter.problem(problem);
        unread = true;
      }
    }
    if (block.profileCount > 0) await take(block);
  }
  return unread;
}
