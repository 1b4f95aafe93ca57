// The measured wind nearest to a time and height, for barbs and for what stands under the cursor.

import { REJECTING, type ProfileBlock } from '../profile/index.ts';
import { timeCells, type TimeCells } from './time-cells.ts';

/** A measured wind: no value of it is interpolated. */
export interface MeasuredWind {
  readonly timeMs: number;
  /** m above ground */
  readonly height: number;
  readonly speed: number;
  /** degrees, from; NaN where only the speed is known */
  readonly direction: number;
}

/** Finds profiles by time and levels by height. */
export class WindLookup {
  readonly #blocks: readonly ProfileBlock[];
  readonly #cells: TimeCells;

  constructor(blocks: readonly ProfileBlock[]) {
    this.#blocks = blocks;
    this.#cells = timeCells(blocks);
  }

  /** The profile whose time is nearest, if it is no further off than `withinMs`. */
  profileNear(timeMs: number, withinMs: number): { block: ProfileBlock; index: number } | null {
    const { blockIndex, profileIndex } = this.#cells;
    const timeOf = (i: number): number => this.#blocks[blockIndex[i]!]!.timeMs[profileIndex[i]!]!;
    let low = 0;
    let high = blockIndex.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (timeOf(middle) < timeMs) low = middle + 1;
      else high = middle;
    }
    let best = -1;
    for (const i of [low - 1, low]) {
      if (i < 0 || i >= blockIndex.length) continue;
      if (best < 0 || Math.abs(timeOf(i) - timeMs) < Math.abs(timeOf(best) - timeMs)) best = i;
    }
    if (best < 0 || Math.abs(timeOf(best) - timeMs) > withinMs) return null;
    return { block: this.#blocks[blockIndex[best]!]!, index: profileIndex[best]! };
  }

  /** The usable wind of a profile nearest to a height, if it is no further off than `within` m. */
  static levelNear(block: ProfileBlock, index: number, height: number, within: number): MeasuredWind | null {
    let best = -1;
    for (let k = block.offsets[index]!; k < block.offsets[index + 1]!; k++) {
      if ((block.mark[k]! & REJECTING) !== 0 || Number.isNaN(block.speed[k]!)) continue;
      const away = Math.abs(block.heightAgl[k]! - height);
      if (away <= within && (best < 0 || away < Math.abs(block.heightAgl[best]! - height))) best = k;
    }
    if (best < 0) return null;
    return {
      timeMs: block.timeMs[index]!,
      height: block.heightAgl[best]!,
      speed: block.speed[best]!,
      direction: block.direction[best]!,
    };
  }
}
