// From the paths on the command line to byte sources: files, folders with all that is in them, stdin.

import { createReadStream, createWriteStream } from 'node:fs';
import { mkdtemp, readdir, rm, stat } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import type { Problem } from '../air/index.ts';
import type { ByteSource } from '../ingest/index.ts';

export interface Input {
  readonly source: ByteSource;
  /** It was named itself, not found in a folder: then it must be readable. */
  readonly named: boolean;
}

/** Paths may be files, folders (all files in them, in order of name, hidden ones left out) and `-` for stdin. */
export async function* inputsOf(paths: readonly string[]): AsyncGenerator<Input | Problem> {
  for (const path of paths) {
    if (path === '-') yield* fromStdin();
    else yield* fromPath(path);
  }
}

async function* fromPath(path: string): AsyncGenerator<Input | Problem> {
  try {
    const entry = await stat(path);
    if (entry.isDirectory()) yield* fromFolder(path);
    else yield { source: fileSource(path, path, entry.isFile() ? entry.size : undefined), named: true };
  } catch (error) {
    yield pathProblem(path, error as NodeJS.ErrnoException);
  }
}

async function* fromFolder(folder: string): AsyncGenerator<Input | Problem> {
  const entries = await readdir(folder, { withFileTypes: true });
  for (const entry of entries.sort((a, b) => (a.name < b.name ? -1 : 1))) {
    if (entry.name.startsWith('.')) continue;
    const path = join(folder, entry.name);
    try {
      const { size } = await stat(path);
      if (entry.isDirectory()) yield* fromFolder(path);
      else if (entry.isFile()) yield { source: fileSource(path, path, size), named: false };
    } catch (error) {
      yield pathProblem(path, error as NodeJS.ErrnoException);
    }
  }
}

/** Readers may take the bytes more than once; stdin comes once, so it is laid down in a file meanwhile. */
async function* fromStdin(): AsyncGenerator<Input> {
  const folder = await mkdtemp(join(tmpdir(), 'duskveer-'));
  try {
    const file = join(folder, 'stdin');
    await pipeline(process.stdin, createWriteStream(file));
    yield { source: fileSource('stdin', file, (await stat(file)).size), named: true };
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

function fileSource(name: string, path: string, size: number | undefined): ByteSource {
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
