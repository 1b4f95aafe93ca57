// One input file from its bytes to its rows, as a thread of the scan does it.

import { createReadStream } from 'node:fs';
import { placeInWords, type Problem } from '../../air/index.ts';
import { archiveRows, mergeRows, type FeedRows } from '../../desk/index.ts';
import { readProfiles, type ByteSource } from '../../ingest/index.ts';
import { concatBlocks, type ProfileBlock } from '../../profile/index.ts';
import { writtenMs } from '../inputs.ts';
import type { ScanFile } from './files.ts';
import type { Part, ScanProblem } from './part.ts';
import type { ScanQuestion } from './question.ts';

/** So many levels are judged together; files of many small reports are gathered up to here. */
const LEVELS_TOGETHER = 2 ** 20;
/** So many problems of one file are told one by one; the rest are counted. */
const MOST_PROBLEMS = 100;

/** @param onBytes told how many bytes of the file have been taken so far */
export async function scanFile(
  file: ScanFile,
  question: ScanQuestion,
  onBytes: (bytes: number) => void,
): Promise<Part> {
  const problems: ScanProblem[] = [];
  const feeds = new Map<string, FeedRows[]>();
  let pending: ProfileBlock[] = [];
  let levels = 0;
  const judge = (): void => {
    if (pending.length === 0) return;
    for (const rows of archiveRows(concatBlocks(pending), { ...question, source: file.path })) {
      const known = feeds.get(rows.feed.key);
      if (known === undefined) feeds.set(rows.feed.key, [rows]);
      else known.push(rows);
    }
    pending = [];
    levels = 0;
  };

  const source: ByteSource = {
    name: file.path,
    size: file.size,
    stream: () => createReadStream(file.fullPath, { highWaterMark: 1 << 20 }),
  };
  const readings = readProfiles(source, {
    site: question.site,
    stationList: question.stationList,
    // When a report tells only the day of the month, its file's age tells the rest.
    referenceTimeMs: writtenMs(file),
    onProgress: ({ bytesRead }) => onBytes(bytesRead),
  });
  for await (const reading of readings) {
    for (const problem of reading.problems) problems.push(told(problem, file));
    if (reading.block.profileCount === 0) continue;
    if (levels > 0 && levels + reading.block.mark.length > LEVELS_TOGETHER) judge();
    pending.push(reading.block);
    levels += reading.block.mark.length;
  }
  judge();
  return {
    feeds: [...feeds.values()].map(mergeRows).sort((a, b) => (a.feed.key < b.feed.key ? -1 : 1)),
    problems: shortened(problems),
  };
}

function told(problem: Problem, file: ScanFile): ScanProblem {
  // A folder may hold a README and a site file beside the data: those are passed over, not unread.
  const foreign = !file.named && problem.code === 'ingest/unknown-format';
  const place = placeInWords(problem.where);
  const within = place.startsWith(`${file.path}, `) ? place.slice(file.path.length + 2) : place;
  return {
    place: within === file.path ? '' : within,
    code: problem.code,
    what: problem.what,
    mend: foreign ? 'Passed over, as it was found in a folder.' : problem.mend,
    unread: !foreign && problem.mild !== true,
  };
}

function shortened(problems: readonly ScanProblem[]): readonly ScanProblem[] {
  if (problems.length <= MOST_PROBLEMS) return problems;
  const rest = problems.slice(MOST_PROBLEMS);
  const more: ScanProblem = {
    place: '',
    code: 'relay/more-problems',
    what: `There are ${rest.length} more problems in this file.`,
    mend: 'Mend the first ones and scan again.',
    unread: rest.some(({ unread }) => unread),
  };
  return [...problems.slice(0, MOST_PROBLEMS), more];
}
