// The profiles of all paths, block after block, with whatever was wrong told on stderr.

import type { ProfileBlock } from '../profile/index.ts';
import { readProfiles, type ReadOptions, type StationList } from '../ingest/index.ts';
import type { Site } from '../site/index.ts';
import { EXIT, UsageError } from './command.ts';
import { openInputs, type Input } from './inputs.ts';
import { OutputClosed } from './output.ts';
import { Reporter } from './reporter.ts';

export interface Reading {
  /** Takes each block as soon as it is there; no more than one is held. */
  readonly take: (block: ProfileBlock) => Promise<void>;
  /** Sees every block of every path before the first is taken: then all is read twice. */
  readonly survey?: (block: ProfileBlock) => void;
  /** The user's own list of stations; what is wrong with it is told first. */
  readonly stations?: StationList;
}

/**
 * Reads every path.
 * @returns exit code: well, or someUnread when something in a path could not be read
 * @throws UsageError when there is no path
 */
export async function readPaths(
  paths: readonly string[],
  site: Site,
  { take, survey, stations }: Reading,
): Promise<number> {
  if (paths.length === 0) throw new UsageError('It needs at least one file or folder, or - for stdin.');
  const { inputs, problems: unopened, close } = await openInputs(paths);
  const problems = [...(stations?.problems ?? []), ...unopened];
  const reporter = new Reporter();
  const known = { site, stationList: stations?.stations ?? [] };
  try {
    for (const problem of problems) reporter.problem(problem);
    if (survey !== undefined) await surveyInputs(inputs, known, survey);
    let unread = problems.length > 0;
    for (const input of inputs) if (await readInput(input, known, reporter, take)) unread = true;
    return unread ? EXIT.someUnread : EXIT.well;
  } catch (error) {
    if (error instanceof OutputClosed) return EXIT.well;
    throw error;
  } finally {
    reporter.finish();
    await close();
  }
}

async function surveyInputs(
  inputs: readonly Input[],
  known: Partial<ReadOptions>,
  survey: (block: ProfileBlock) => void,
): Promise<void> {
  for (const { source, writtenMs } of inputs) {
    const options = { ...known, referenceTimeMs: writtenMs };
    for await (const { block } of readProfiles(source, options)) if (block.profileCount > 0) survey(block);
  }
}

/** @returns whether something in it could not be read */
async function readInput(
  input: Input,
  known: Partial<ReadOptions>,
  reporter: Reporter,
  take: (block: ProfileBlock) => Promise<void>,
): Promise<boolean> {
  let unread = false;
  const options = { ...known, referenceTimeMs: input.writtenMs, onProgress: reporter.progress.bind(reporter) };
  for await (const { block, problems } of readProfiles(input.source, options)) {
    for (const problem of problems) {
      // A folder may hold a README and a site file beside the data: those are passed over, not unread.
      const foreign = !input.named && problem.code === 'ingest/unknown-format';
      if (foreign) reporter.say(`${input.source.name}: passed over, no known format`);
      else reporter.problem(problem);
      if (!foreign && problem.mild !== true) unread = true;
    }
    if (block.profileCount > 0) await take(block);
  }
  return unread;
}
