// How far the scan is and how long it will take: one line that renews itself for a person, a plain line now and then for a log.

const SHOW_EVERY_MS = 200;
const LOG_EVERY_MS = 10_000;
/** Before this, ms, a guess at the time left is worth nothing. */
const FIRST_GUESS_MS = 2_000;

export interface ProgressStream {
  readonly isTTY?: boolean;
  write(text: string): unknown;
}

export class ScanProgress {
  readonly #stream: ProgressStream;
  readonly #now: () => number;
  readonly #files: number;
  readonly #bytes: number;
  readonly #beganMs: number;
  readonly #taken = new Map<string, number>();
  #filesDone = 0;
  #bytesDone = 0;
  #lastMs: number;
  #shown = false;

  /** @param files and bytes still to be read @param now clock, ms */
  constructor(stream: ProgressStream, files: number, bytes: number, now: () => number) {
    this.#stream = stream;
    this.#files = files;
    this.#bytes = bytes;
    this.#now = now;
    this.#beganMs = now();
    this.#lastMs = this.#beganMs;
  }

  /** So many bytes of a file are read. */
  bytes(path: string, bytes: number): void {
    this.#taken.set(path, bytes);
    this.#show();
  }

  /** A file is done. @param size its bytes */
  done(path: string, size: number): void {
    this.#taken.delete(path);
    this.#filesDone++;
    this.#bytesDone += size;
    this.#show();
  }

  /** A line of words that stays. */
  say(words: string): void {
    this.clear();
    this.#stream.write(`${words}\n`);
  }

  /** Leaves the terminal clean. */
  clear(): void {
    if (this.#shown) this.#stream.write('\r\u001b[K');
    this.#shown = false;
  }

  #show(): void {
    const nowMs = this.#now();
    const watched = this.#stream.isTTY === true;
    if (nowMs - this.#lastMs < (watched ? SHOW_EVERY_MS : LOG_EVERY_MS)) return;
    this.#lastMs = nowMs;
    const words = this.#words(nowMs - this.#beganMs);
    if (!watched) this.#stream.write(`${words}\n`);
    else {
      this.#stream.write(`\r\u001b[K${words}`);
      this.#shown = true;
    }
  }

  #words(elapsedMs: number): string {
    let taken = this.#bytesDone;
    for (const bytes of this.#taken.values()) taken += bytes;
    const share = this.#bytes === 0 ? 1 : Math.min(1, taken / this.#bytes);
    const place = `${this.#filesDone} of ${this.#files} files, ${Math.floor(100 * share)} %`;
    if (elapsedMs < FIRST_GUESS_MS || share === 0) return place;
    return `${place}, about ${durationInWords((elapsedMs * (1 - share)) / share)} left`;
  }
}

/** A duration as one says it: `40 s`, `12 min`, `3 h 20 min`. */
export function durationInWords(ms: number): string {
  const seconds = Math.round(ms / 1000);
  if (seconds < 90) return `${seconds} s`;
  const minutes = Math.round(seconds / 60);
  if (minutes < 90) return `${minutes} min`;
  return `${Math.floor(minutes / 60)} h ${minutes % 60} min`;
}
