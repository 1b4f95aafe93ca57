// The site file named on the command line.

import { readFile } from 'node:fs/promises';
import { PLAIN_SITE, readSite, type Site } from '../site/index.ts';
import { UsageError } from './command.ts';
import { pathProblem } from './inputs.ts';
import { problemInWords } from './reporter.ts';

/** Lines for the help of every command that takes one. */
export const SITE_OPTION = { site: { type: 'string' } } as const;

/**
 * The site of a file, or the plain one where none is named.
 * @throws UsageError naming everything that is wrong with the file
 */
export async function siteOf(path: string | undefined): Promise<Site> {
  if (path === undefined) return PLAIN_SITE;
  let text: string;
  try {
    text = await readFile(path, 'utf8');
  } catch (error) {
    throw new UsageError(problemInWords(pathProblem(path, error as NodeJS.ErrnoException)), { cause: error });
  }
  const { site, problems } = readSite(text, path);
  if (site === null) throw new UsageError(problems.map(problemInWords).join('\n'));
  return site;
}
