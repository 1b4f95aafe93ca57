// Words for whoever sits before the terminal: what could not be read, and how far the reading is. All on stderr.

import { placeInWords, type Problem } from '../air/index.ts';
import type { ReadProgress } from '../ingest/index.ts';

/** So many problems of one file are told one by one; the rest are counted. */
const TOLD_PER_SOURCE = 12;
const PROGRESS_EVERY_MS = 100;

export class Reporter {
  readonly #told = new Map<string, number>();
  #progressShown = false;
  #lastProgressMs = 0;

  /** A line of words. */
  say(words: string): void {
    this.#clearProgress();
    process.stderr.write(`${words}\n`);
  }

  problem(problem: Problem): void {
    const source = problem.where.source ?? '';
    const told = this.#told.get(source) ?? 0;
    this.#told.set(source, told + 1);
    if (told >= TOLD_PER_SOURCE) return;
    this.say(problemInWords(problem));
  }

  /** How far the reading is; shown only where a person watches. */
  progress({ source, bytesRead, bytesTotal }: ReadProgress): void {
    const nowMs = Date.now();
    if (!process.stderr.isTTY || nowMs - this.#lastProgressMs < PROGRESS_EVERY_MS) return;
    this.#lastProgressMs = nowMs;
    this.#progressShown = true;
    const amount =
      bytesTotal === undefined || bytesTotal === 0
        ? `${Math.round(bytesRead / 1e6)} MB`
        : `${Math.round((100 * bytesRead) / bytesTotal)} %`;
    process.stderr.write(`\r\x1b[K${source}: ${amount}`);
  }

  /** Says how many problems were not told, and leaves the terminal clean. */
  finish(): void {
    this.#clearProgress();
    for (const [source, count] of this.#told) {
      if (count > TOLD_PER_SOURCE) this.say(`${source}: and ${count - TOLD_PER_SOURCE} more of such`);
    }
  }

  #clearProgress(): void {
    if (this.#progressShown) process.stderr.write('\r\x1b[K');
    this.#progressShown = false;
  }
}

/** A problem as one line: where, what, how to mend it. */
export function problemInWords({ where, what, mend }: Problem): string {
  const place = placeInWords(where);
  return `${place === '' ? '' : `${place}: `}${what} ${mend}`;
}
