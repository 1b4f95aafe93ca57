// Which files are done, and where their parts lie: a line of JSON a file, added when its part is whole. A scan that was
// stopped finds its way from here.

import { appendFile, readdir, readFile, rename, rm, stat, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { Instrument } from '../../profile/index.ts';
import type { ScanFile } from './files.ts';
import { markOf } from './question.ts';

export interface JournalEntry {
  /** Name of the part; made of all that the result depends on. */
  readonly part: string;
  readonly path: string;
  readonly size: number;
  readonly mtime_ms: number;
  readonly options: string;
  readonly program: string;
  /** Length of the part, bytes. */
  readonly bytes: number;
  /** Whether something in the file could not be read, and how many problems its part tells. */
  readonly unread: boolean;
  readonly problems: number;
  /** Whether the trouble may pass, as with a disk that cannot be reached: then the next scan tries again. */
  readonly retry: boolean;
  readonly feeds: readonly PartFeed[];
}

/** What a part holds of one feed. */
export interface PartFeed {
  readonly key: string;
  /** Missing coordinates are null. */
  readonly station: Readonly<
    Record<'id' | 'name', string> & Record<'latitude' | 'longitude' | 'elevation', number | null>
  >;
  readonly instrument: Instrument;
  readonly rows: number;
  readonly first_ms: number;
  readonly last_ms: number;
}

/** What a file came to. */
export type TaskResult = Pick<JournalEntry, 'bytes' | 'unread' | 'problems' | 'retry' | 'feeds'>;

const NAME = 'journal.jsonl';

export class Journal {
  readonly #folder: string;
  readonly #options: string;
  readonly #program: string;
  readonly #entries = new Map<string, JournalEntry>();

  private constructor(folder: string, options: string, program: string) {
    this.#folder = folder;
    this.#options = options;
    this.#program = program;
  }

  /**
   * Opens the journal of a folder of parts, or begins one.
   * @param options mark of all options that the rows depend on
   * @param program mark of the program's version
   */
  static async open(folder: string, options: string, program: string): Promise<Journal> {
    const journal = new Journal(folder, options, program);
    const text = await readFile(join(folder, NAME), 'utf8').catch(() => '');
    for (const line of text.split('\n')) {
      const entry = entryOf(line);
      if (entry === null || entry.retry) continue;
      const whole = await stat(join(folder, entry.part)).catch(() => null);
      if (whole?.size === entry.bytes) journal.#entries.set(entry.part, entry);
    }
    // Written anew, so that no torn last line stands before the next one.
    await journal.#write([...journal.#entries.values()]);
    return journal;
  }

  /** Name that the part of a file has; another one as soon as the file, the options or the program change. */
  partOf(file: ScanFile): string {
    const { fullPath, size, mtimeMs } = file;
    return `${markOf(fullPath, file.path, String(size), String(mtimeMs), String(file.named), this.#options, this.#program)}.part`;
  }

  partPath(part: string): string {
    return join(this.#folder, part);
  }

  /** The entry of a file that is done; undefined otherwise. */
  entryOf(file: ScanFile): JournalEntry | undefined {
    return this.#entries.get(this.partOf(file));
  }

  /** Forgets a part that turned out to be damaged. */
  forget(part: string): void {
    this.#entries.delete(part);
  }

  /** Notes that the part of a file is whole. */
  async add(file: ScanFile, result: TaskResult): Promise<JournalEntry> {
    const entry: JournalEntry = {
      part: this.partOf(file),
      path: file.fullPath,
      size: file.size,
      mtime_ms: file.mtimeMs,
      options: this.#options,
      program: this.#program,
      ...result,
    };
    this.#entries.set(entry.part, entry);
    await appendFile(join(this.#folder, NAME), `${JSON.stringify(entry)}\n`);
    return entry;
  }

  /** Keeps these entries and their parts, in this order, and removes all others. */
  async keepOnly(entries: readonly JournalEntry[]): Promise<void> {
    await this.#write(entries);
    const kept = new Set([NAME, ...entries.map(({ part }) => part)]);
    for (const name of await readdir(this.#folder)) {
      if (!kept.has(name) && /\.(?:part|unfinished)$/u.test(name)) await rm(join(this.#folder, name), { force: true });
    }
  }

  async #write(entries: readonly JournalEntry[]): Promise<void> {
    const path = join(this.#folder, NAME);
    await writeFile(`${path}.unfinished`, entries.map((entry) => `${JSON.stringify(entry)}\n`).join(''));
    await rename(`${path}.unfinished`, path);
  }
}

/** A line of the journal; null for one that was torn. */
function entryOf(line: string): JournalEntry | null {
  try {
    const entry = JSON.parse(line) as JournalEntry;
    return typeof entry.part === 'string' && Array.isArray(entry.feeds) ? entry : null;
  } catch {
    return null;
  }
}
