// A scan from the paths to the tables: what is done already stays, the rest is read by the threads, then all is joined.

import { mkdir, readFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { Problem } from '../../air/index.ts';
import { EXIT, UsageError } from '../command.ts';
import { problemInWords } from '../reporter.ts';
import { findFiles, type ScanFile } from './files.ts';
import { Journal, type JournalEntry } from './journal.ts';
import { readPart, type Part } from './part.ts';
import { durationInWords, ScanProgress } from './progress.ts';
import { markOf, type ScanQuestion } from './question.ts';
import { runThreads } from './threads.ts';
import { writeResult, type FileProblem, type Totals } from './write-result.ts';

/** How often a part that lost bytes on disk is made again before the disk is given up. */
const MOST_ATTEMPTS = 3;

/**
 * @param alreadyFound problems that stand in the tables with those of the files
 * @returns the exit code
 */
export async function runScan(
  paths: readonly string[],
  out: string,
  question: ScanQuestion,
  workers: number,
  alreadyFound: readonly Problem[],
): Promise<number> {
  const beganMs = performance.now();
  const journal = await openJournal(out, question);
  const { files, problems: unopened } = await findFiles(paths, out);
  const problems = [...alreadyFound, ...unopened];
  for (const problem of problems) say(problemInWords(problem));
  say(countInWords(files.length, files.filter((file) => journal.entryOf(file) === undefined).length));

  const stop = stopOnSignal();
  try {
    for (let attempt = 1; ; attempt++) {
      const todo = files.filter((file) => journal.entryOf(file) === undefined);
      const failed = await readFiles(todo, question, workers, journal, stop.signal);
      if (stop.signal.aborted) {
        say('Stopped. Call it again to go on: what is done is kept.');
        return EXIT.failed;
      }
      const entries = files.flatMap((file) => journal.entryOf(file) ?? []);
      say('Writing the tables.');
      const load = loadFrom(journal);
      try {
        const ofFiles = await problemsOf(files, journal, load);
        const all = [...problems.map(pathProblem), ...failed, ...ofFiles];
        const totals = await writeResult(out, question, entries, load, all);
        await journal.keepOnly(entries);
        const unread = problems.length + failed.length + entries.filter((entry) => entry.unread).length;
        tell(out, files.length, unread, totals);
        say(`Done in ${durationInWords(performance.now() - beganMs)}.`);
        return unread > 0 ? EXIT.someUnread : EXIT.well;
      } catch (error) {
        if (!(error instanceof DamagedPart) || attempt === MOST_ATTEMPTS) throw error;
        journal.forget(error.part);
      }
    }
  } finally {
    stop.release();
  }
}

function say(words: string): void {
  process.stderr.write(`${words}\n`);
}

async function openJournal(out: string, question: ScanQuestion): Promise<Journal> {
  const folder = join(out, 'parts');
  try {
    await mkdir(folder, { recursive: true });
    return await Journal.open(folder, markOf(JSON.stringify(question)), await programMark());
  } catch (error) {
    throw new UsageError(`The folder ${out} cannot be made or written to (${(error as Error).message}).`, {
      cause: error,
    });
  }
}

/** What the parts depend on besides input and options: the code that made them. */
async function programMark(): Promise<string> {
  // The names of all that the thread's program loads carry digests, so its own text stands for all of it.
  return markOf(await readFile(join(import.meta.dirname, 'scan-worker.js'), 'utf8'));
}

/** A part whose bytes are not what was written. */
class DamagedPart extends Error {
  readonly part: string;

  constructor(part: string) {
    super(`The part ${part} is damaged.`);
    this.part = part;
  }
}

function loadFrom(journal: Journal): (part: string) => Promise<Part> {
  return async (part) => {
    const content = await readPart(journal.partPath(part));
    if (content === null) throw new DamagedPart(part);
    return content;
  };
}

/** @returns the files that could not be worked on, in order of their names */
async function readFiles(
  files: readonly ScanFile[],
  question: ScanQuestion,
  workers: number,
  journal: Journal,
  signal: AbortSignal,
): Promise<FileProblem[]> {
  const failed: FileProblem[] = [];
  const bytes = files.reduce((sum, { size }) => sum + size, 0);
  const progress = new ScanProgress(process.stderr, files.length, bytes, () => performance.now());
  const partPath = (file: ScanFile): string => journal.partPath(journal.partOf(file));
  const events = {
    onBytes: (file: ScanFile, taken: number) => progress.bytes(file.fullPath, taken),
    async onDone(file: ScanFile, result: Parameters<Journal['add']>[1]) {
      await journal.add(file, result);
      progress.done(file.fullPath, file.size);
      if (result.unread) progress.say(`${file.path}: not all of it could be read; see problems.csv`);
    },
    onFailed(file: ScanFile, words: string) {
      failed.push({
        file: file.path,
        place: '',
        code: 'relay/thread-failed',
        what: `The file could not be worked on (${words}).`,
        mend: 'Scan it again by itself; if it fails again, split it by day or month.',
        unread: true,
      });
      progress.done(file.fullPath, file.size);
      progress.say(`${file.path}: could not be worked on (${words}).`);
    },
  };
  await runThreads(workers, files, question, partPath, events, signal);
  progress.clear();
  return failed.sort((a, b) => (a.file < b.file ? -1 : 1));
}

/** The problems within the files, in order of the files. */
async function problemsOf(
  files: readonly ScanFile[],
  journal: Journal,
  load: (part: string) => Promise<Part>,
): Promise<FileProblem[]> {
  const problems: FileProblem[] = [];
  for (const file of files) {
    const entry: JournalEntry | undefined = journal.entryOf(file);
    if (entry === undefined || entry.problems === 0) continue;
    for (const problem of (await load(entry.part)).problems) problems.push({ file: file.path, ...problem });
  }
  return problems;
}

function pathProblem({ where, code, what, mend }: Problem): FileProblem {
  return { file: where.source ?? '', place: '', code, what, mend, unread: true };
}

function tell(out: string, files: number, unread: number, totals: Totals): void {
  const { profiles, assessable, withJet, jets, nights } = totals;
  const line = { out, files, unread, profiles, assessable, with_jet: withJet, jets, nights };
  process.stdout.write(`${JSON.stringify(line)}\n`);
}

function countInWords(files: number, waiting: number): string {
  const count = files === 1 ? '1 file' : `${files} files`;
  return waiting === files ? `${count} to read.` : `${count}, ${waiting} of them to read; the others are done already.`;
}

/** Ctrl-C and the like let the scan end in good order; a second one ends it at once. */
function stopOnSignal(): { signal: AbortSignal; release: () => void } {
  const controller = new AbortController();
  const stop = (): void => {
    release();
    controller.abort();
  };
  const release = (): void => {
    process.off('SIGINT', stop);
    process.off('SIGTERM', stop);
  };
  process.on('SIGINT', stop);
  process.on('SIGTERM', stop);
  return { signal: controller.signal, release };
}
