// Lines on stdout, whole and in order, at the pace of whoever reads them.

import { once } from 'node:events';
import type { Writable } from 'node:stream';

/** Whoever read the output has gone: nothing more needs doing, and nothing went wrong. */
export class OutputClosed extends Error {}

const PIECE_CHARACTERS = 1 << 16;

/** Gathers lines into large pieces; `write` waits when the reader is slow. */
export class LineWriter {
  readonly #stream: Writable;
  #pending = '';
  #closed = false;
  #failure: Error | null = null;

  constructor(stream: Writable) {
    this.#stream = stream;
    stream.on('error', (error: NodeJS.ErrnoException) => {
      this.#closed = true;
      if (error.code !== 'EPIPE') this.#failure = error;
    });
  }

  /** @throws OutputClosed when the reader has gone */
  async write(value: unknown): Promise<void> {
    this.#pending += `${JSON.stringify(value)}\n`;
    if (this.#pending.length >= PIECE_CHARACTERS) await this.flush();
  }

  /** Hands on what is gathered. @throws OutputClosed when the reader has gone */
  async flush(): Promise<void> {
    const text = this.#pending;
    this.#pending = '';
    if (text !== '' && !this.#closed && !this.#stream.write(text)) {
      await Promise.race([once(this.#stream, 'drain'), once(this.#stream, 'close')]).catch(() => undefined);
    } else {
      // Lets the error of a closed pipe arrive before more is written into it.
      await new Promise(setImmediate);
    }
    if (this.#failure !== null) throw this.#failure;
    if (this.#closed) throw new OutputClosed();
  }
}
