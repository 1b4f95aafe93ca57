// The page of moisture: asks the worker for the moist night and holds its answer.

import { proxy } from 'comlink';
import type { MoistureState } from '../../desk/index.ts';
import type { OpenFile } from '../worker/protocol.ts';
import type { Board } from './board.svelte.ts';

interface Wish {
  readonly atMs: number;
  readonly feed: string;
  readonly criteria: string;
  readonly humidityFrom: string;
}

/** A job number that no reading has. */
const TABLES_JOB = -1;

export class MoistNight {
  /** Null until the first answer and where nothing is open. */
  state = $state.raw<MoistureState | null>(null);
  /** Station that alone lends humidity; empty: the least uncertain. */
  humidityFrom = $state('');

  readonly #board: Board;
  #wanted: Wish | null = null;
  #asking = false;
  #tables: readonly OpenFile[] = [];

  constructor(board: Board) {
    this.#board = board;
  }

  /** Has the worker read the tables of a scan, which tell what is usual; then the night is asked for anew. */
  async takeTables(tables: readonly OpenFile[]): Promise<void> {
    if (tables.length === 0 || tables === this.#tables) return;
    this.#tables = tables;
    await this.#board.worker.archiveTables(
      TABLES_JOB,
      [...tables],
      proxy(() => undefined),
    );
    if (tables === this.#tables) await this.ask(this.wish);
  }

  get wish(): Wish | null {
    const { atMs, feedKey, preferences } = this.#board;
    if (feedKey === '' || !Number.isFinite(atMs)) return null;
    return { atMs, feed: feedKey, criteria: preferences.criteria, humidityFrom: this.humidityFrom };
  }

  /** Asks for what is wished; while an answer is awaited only the newest wish is kept. */
  async ask(wish: Wish | null): Promise<void> {
    this.#wanted = wish;
    if (wish === null) this.state = null;
    if (this.#asking) return;
    this.#asking = true;
    try {
      while (this.#wanted !== null) {
        const next: Wish = this.#wanted;
        this.#wanted = null;
        this.state = await this.#board.worker.moisture(next.atMs, next.feed, next.criteria, next.humidityFrom);
      }
    } finally {
      this.#asking = false;
    }
  }
}
