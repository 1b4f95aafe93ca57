// The page of moisture: asks the worker for the moist night and holds its answer.

import type { MoistureState } from '../../desk/index.ts';
import type { Board } from './board.svelte.ts';

interface Wish {
  readonly atMs: number;
  readonly feed: string;
  readonly criteria: string;
  readonly humidityFrom: string;
}

export class MoistNight {
  /** Null until the first answer and where nothing is open. */
  state = $state.raw<MoistureState | null>(null);
  /** Station that alone lends humidity; empty: the least uncertain. */
  humidityFrom = $state('');

  readonly #board: Board;
  #wanted: Wish | null = null;
  #asking = false;

  constructor(board: Board) {
    this.#board = board;
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
