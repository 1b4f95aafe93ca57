// What the page Rotor looks at: which type, the night or the whole record, and the record as the worker reckons it.

import type { FarmRecord } from '../../desk/index.ts';
import type { Board } from './board.svelte.ts';

export type RotorSpan = 'night' | 'record';

export class RotorView {
  readonly #board: Board;
  /** Index of the turbine type among the site's. */
  chosen = $state(0);
  span = $state<RotorSpan>('night');
  record = $state.raw<FarmRecord | null>(null);
  reckoning = $state(false);
  #questions = 0;

  constructor(board: Board) {
    this.#board = board;
  }

  /** Asks for the record; an answer that a newer question has overtaken is dropped. */
  async fetchRecord(feed: string, atMs: number): Promise<void> {
    const question = ++this.#questions;
    this.reckoning = true;
    const record = await this.#board.worker.farmRecord(feed, atMs);
    if (question !== this.#questions) return;
    this.record = record;
    this.reckoning = false;
  }
}
