// Which files a scan reads: those named and all in the folders named, each once, in order of their paths.

import { readdir, stat } from 'node:fs/promises';
import { join, resolve } from 'node:path';
import type { Problem } from '../../air/index.ts';
import { pathProblem } from '../inputs.ts';

export interface ScanFile {
  /** As it was named, or below the folder that was named. */
  readonly path: string;
  /** From the root of the file system: what tells files apart. */
  readonly fullPath: string;
  readonly size: number;
  readonly mtimeMs: number;
  /** It was named itself, not found in a folder: then it must be readable. */
  readonly named: boolean;
}

export interface FoundFiles {
  readonly files: readonly ScanFile[];
  readonly problems: readonly Problem[];
}

/**
 * Finds the files, hidden ones left out.
 * @param leaveOut a folder that is no input although it may lie in one: where the result goes
 */
export async function findFiles(paths: readonly string[], leaveOut: string): Promise<FoundFiles> {
  const files = new Map<string, ScanFile>();
  const problems: Problem[] = [];
  const outside = resolve(leaveOut);

  async function visit(path: string, named: boolean): Promise<void> {
    const fullPath = resolve(path);
    if (fullPath === outside) return;
    try {
      const entry = await stat(path);
      if (entry.isDirectory()) {
        for (const name of (await readdir(path)).sort())
          if (!name.startsWith('.')) await visit(join(path, name), false);
      } else if (entry.isFile()) {
        const known = files.get(fullPath);
        files.set(fullPath, {
          path: known !== undefined && known.path < path ? known.path : path,
          fullPath,
          size: entry.size,
          mtimeMs: entry.mtimeMs,
          named: named || known?.named === true,
        });
      }
    } catch (error) {
      problems.push(pathProblem(path, error as NodeJS.ErrnoException));
    }
  }

  for (const path of paths) await visit(path, true);
  return { files: [...files.values()].sort((a, b) => (a.fullPath < b.fullPath ? -1 : 1)), problems };
}
