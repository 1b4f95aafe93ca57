// Which winds get a barb on a section: measured ones only, about one to a tile of pixels.

import { drawBarb, type BarbStyle } from './barbs.ts';
import { xPixel, yPixel, type Frame, type Look, type Pen } from './pen.ts';
import { WindLookup, type MeasuredWind } from './wind-lookup.ts';

export interface BarbTiles {
  /** CSS pixels from barb to barb; 64 and 56 unless told. */
  readonly across?: number;
  readonly up?: number;
  /** A single wind speaks for this long at most, ms; where tiles are longer no barbs are drawn. 3 h unless told. */
  readonly longestMs?: number;
}

const MINUTE_MS = 60_000;
const TIMES_MS = [1, 2, 5, 10, 20, 30, 60, 120, 180, 360, 720, 1440].map((minutes) => minutes * MINUTE_MS);
const HEIGHTS = [5, 10, 20, 25, 50, 75, 100, 125, 150, 200, 250, 300, 400, 500, 750, 1000, 1500, 2000];
const THREE_HOURS_MS = 180 * MINUTE_MS;

/**
 * Picks a wind for each tile: of the profile nearest to the tile's middle, the usable level nearest to it, if it lies in
 * the tile. Tiles hold to round times and heights, so that barbs keep their places while the view moves.
 */
export function pickBarbs(winds: WindLookup, frame: Frame, look: Look, tiles: BarbTiles = {}): MeasuredWind[] {
  const { across = 64, up = 56, longestMs = THREE_HOURS_MS } = tiles;
  const tileMs = roundUp((across * look.ratio * (frame.xHigh - frame.xLow)) / frame.width, TIMES_MS);
  const tileHeight = roundUp((up * look.ratio * (frame.yHigh - frame.yLow)) / frame.height, HEIGHTS);
  const picked: MeasuredWind[] = [];
  if (!(tileMs <= longestMs)) return picked;
  const firstTile = Math.ceil(frame.xLow / tileMs - 0.5);
  let lastMs = -Infinity;
  for (let tile = firstTile; (tile + 0.5) * tileMs <= frame.xHigh; tile++) {
    const middleMs = (tile + 0.5) * tileMs;
    const profile = winds.profileNear(middleMs, tileMs / 2);
    if (profile === null) continue;
    // Profiles on either side of a tile's edge would run into each other.
    const timeMs = profile.block.timeMs[profile.index]!;
    if (timeMs - lastMs < 0.6 * tileMs) continue;
    lastMs = timeMs;
    let lastHeight = -Infinity;
    for (let row = Math.floor(frame.yLow / tileHeight); row * tileHeight < frame.yHigh; row++) {
      const middle = (row + 0.5) * tileHeight;
      const wind = WindLookup.levelNear(profile.block, profile.index, middle, tileHeight / 2);
      // The same for levels.
      if (wind === null || wind.height - lastHeight < 0.6 * tileHeight) continue;
      picked.push(wind);
      lastHeight = wind.height;
    }
  }
  return picked;
}

function roundUp(value: number, steps: readonly number[]): number {
  return steps.find((step) => step >= value) ?? value;
}

/** Draws barbs at their times and heights, kept clear of the frame's edges. */
export function drawSectionBarbs(
  pen: Pen,
  frame: Frame,
  winds: readonly MeasuredWind[],
  look: Look,
  style: BarbStyle,
): void {
  const margin = ((style.length ?? 22) * look.ratio) / 2;
  for (const wind of winds) {
    const x = xPixel(frame, wind.timeMs);
    const y = yPixel(frame, wind.height);
    if (x < frame.left + margin || x > frame.left + frame.width - margin) continue;
    if (y < frame.top + margin || y > frame.top + frame.height - margin) continue;
    drawBarb(pen, x, y, wind.speed, wind.direction, look, style);
  }
}
