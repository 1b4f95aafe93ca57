// Lines on stdout, whole and in order, at the pace of whoever reads them.

import type { Writable } from 'node:stream';

/** Whoever read the output has gone: nothing more needs doing, and nothing went wrong. */
export class OutputClosed extends Error {}

/** The output cannot be written: no such folder, no room, no right. */
export class OutputFailed extends Error {}

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
    await this.put(text);
  }

  /** Text or bytes as they are. @throws OutputClosed when the reader has gone */
  async put(piece: string | Uint8Array): Promise<void> {
    if (piece.length > 0 && !this.#closed && !this.#stream.write(piece)) await this.#drained();
    // Lets the error of a closed pipe arrive before more is written into it.
    else await new Promise(setImmediate);
    if (this.#failure !== null) throw new OutputFailed(this.#failure.message, { cause: this.#failure });
    if (this.#closed) throw new OutputClosed();
  }

  /** Until there is room again, or nobody left to make any. */
  #drained(): Promise<void> {
    return new Promise((resolve) => {
      const done = (): void => {
        this.#stream.off('drain', done).off('close', done);
        resolve();
      };
      this.#stream.on('drain', done).on('close', done);
    });
  }
}
