// From the paths on the command line to byte sources: files, folders with all that is in them, stdin.

import { createReadStream, createWriteStream } from 'node:fs';
import { lstat, mkdtemp, readdir, rm, stat } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import type { Problem } from '../air/index.ts';
import type { ByteSource } from '../ingest/index.ts';

export interface Input {
  readonly source: ByteSource;
  /** UTC, ms, when it was written: where a code tells only the day of the month, this tells the rest. */
  readonly writtenMs: number | undefined;
  /** It was named itself, not found in a folder: then it must be readable. */
  readonly named: boolean;
}

export interface Inputs {
  readonly inputs: readonly Input[];
  /** Paths that cannot be opened. */
  readonly problems: readonly Problem[];
  /** Clears away what was laid down for the reading. */
  readonly close: () => Promise<void>;
}

/** Paths may be files, folders (all files in them, in order of name, hidden ones left out) and `-` for stdin. */
export async function openInputs(paths: readonly string[]): Promise<Inputs> {
  const inputs: Input[] = [];
  const problems: Problem[] = [];
  const laidDown: string[] = [];
  for (const path of paths) {
    if (path === '-') inputs.push(await fromStdin(laidDown));
    else await addPath(path, true, inputs, problems);
  }
  const close = async (): Promise<void> => {
    for (const folder of laidDown) await rm(folder, { recursive: true, force: true });
  };
  return { inputs, problems, close };
}

async function addPath(path: string, named: boolean, inputs: Input[], problems: Problem[]): Promise<void> {
  try {
    const entry = await stat(path);
    if (entry.isDirectory()) {
      // A link within a folder may lead back up to it: only links named on the command line are followed.
      if (!named && (await lstat(path)).isSymbolicLink()) return;
      for (const name of (await readdir(path)).sort()) {
        if (!name.startsWith('.')) await addPath(join(path, name), false, inputs, problems);
      }
    } else if (named || entry.isFile()) {
      const source = fileSource(path, path, entry.isFile() ? entry.size : undefined);
      inputs.push({ source, writtenMs: writtenMs(entry), named });
    }
  } catch (error) {
    problems.push(pathProblem(path, error as NodeJS.ErrnoException));
  }
}

/** Readers take the bytes more than once; stdin comes once, so it is laid down in a file meanwhile. */
async function fromStdin(laidDown: string[]): Promise<Input> {
  const folder = await mkdtemp(join(tmpdir(), 'duskveer-'));
  laidDown.push(folder);
  const file = join(folder, 'stdin');
  await pipeline(process.stdin, createWriteStream(file));
  return { source: fileSource('stdin', file, (await stat(file)).size), writtenMs: Date.now(), named: true };
}

/** Unpackers that keep no times leave files from 1970 or 1980: those were never written then. */
const EARLIEST_FILE_MS = Date.UTC(2000, 0, 1);

/** When a file was written; undefined where the file system does not truly know. */
export function writtenMs({ mtimeMs }: { readonly mtimeMs: number }): number | undefined {
  return mtimeMs >= EARLIEST_FILE_MS ? mtimeMs : undefined;
}

/** The file's bytes, by whatever name messages shall call it. */
export function fileSource(name: string, path: string, size: number | undefined): ByteSource {
  return { name, size, stream: () => createReadStream(path, { highWaterMark: 1 << 18 }) };
}

/** Why a path cannot be read, in words. */
export function pathProblem(path: string, error: NodeJS.ErrnoException): Problem {
  const reasons: Record<string, [what: string, mend: string]> = {
    ENOENT: ['There is no such file or folder.', 'Check the spelling and where you stand.'],
    EACCES: ['This user may not read it.', 'Ask its owner for the right to read, or copy it where you may.'],
  };
  const [what, mend] = reasons[error.code ?? ''] ?? [
    `It cannot be opened (${error.message}).`,
    'Copy it to another disk.',
  ];
  return { code: 'relay/path', what, mend, where: { source: path } };
}
