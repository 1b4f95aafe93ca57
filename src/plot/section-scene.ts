// Everything that stands on the section, in its order: the same on the page and in a saved picture.

import type { LightSpan, SpeedUnit } from '../air/index.ts';
import { drawDiscBands, drawDiscs, type Disc } from './disc.ts';
import { drawNightStrip } from './night-strip.ts';
import { setFont, strokeLine, within, writeText, xPixel, yPixel, type Frame, type Look, type Pen } from './pen.ts';
import { drawSectionBarbs, pickBarbs, type BarbTiles } from './section-barbs.ts';
import type { SectionPicture } from './section-picture.ts';
import { drawThread, type Thread } from './thread.ts';
import { timeText } from './ticks.ts';
import type { WindLookup } from './wind-lookup.ts';

/** Something ahead that needs a person: a frame in time and height with a few words above it. */
export interface Call {
  readonly startMs: number;
  readonly endMs: number;
  /** m above ground */
  readonly bottom: number;
  readonly top: number;
  readonly words: string;
}

export interface SectionScene {
  /** Painted sections, lowest first: what was observed, and the outlook. */
  readonly pictures: readonly SectionPicture[];
  /** Winds to pick barbs from; null for none. */
  readonly winds: WindLookup | null;
  readonly barbTiles?: BarbTiles;
  readonly hemisphere: 'north' | 'south';
  readonly speedUnit: SpeedUnit;
  readonly discs: readonly Disc[];
  readonly threads: readonly Thread[];
  readonly calls: readonly Call[];
  /** Day, dusk and night under the time axis. */
  readonly light: readonly LightSpan[];
  /** The now line; NaN for none, as on a night long past. */
  readonly nowMs: number;
  /** A second line of words at the now line: what lies to its right. */
  readonly aheadWords?: string;
  readonly timeZone: string;
}

/** CSS pixels under the frame: the time axis' numbers, the strip, its words. */
export const STRIP_BELOW = 28;
export const STRIP_HEIGHT = 10;
export const ROOM_BELOW = 62;

/** CSS pixels that so many discs take between the height numbers and the frame. */
export function discsWidth(count: number): number {
  return count === 0 ? 0 : 6 + 13 * count;
}

/** What lies under the grid lines: the picture and the discs' bands. */
export function drawSectionUnder(pen: Pen, frame: Frame, scene: SectionScene, look: Look): void {
  for (const picture of scene.pictures) picture.draw(pen, frame);
  drawDiscBands(pen, frame, scene.discs, look);
}

/** What stands over the grid lines, and the discs and the strip outside the frame. */
export function drawSectionOver(pen: Pen, frame: Frame, scene: SectionScene, look: Look): void {
  const { theme, ratio } = look;
  pen.save();
  if (scene.winds !== null) {
    const winds = pickBarbs(scene.winds, frame, look, scene.barbTiles);
    drawSectionBarbs(pen, frame, winds, look, { hemisphere: scene.hemisphere, unit: scene.speedUnit, rimmed: true });
  }
  within(pen, frame, () => {
    for (const thread of scene.threads) drawThread(pen, frame, thread, look);
    for (const call of scene.calls) drawCall(pen, frame, call, look);
  });
  drawDiscs(pen, frame, scene.discs, look);
  const stripTop = frame.top + frame.height + STRIP_BELOW * ratio;
  drawNightStrip(pen, frame, stripTop, scene.light, look, {
    timeText: (timeMs) => timeText(timeMs, scene.timeZone, 'HH:mm'),
    height: STRIP_HEIGHT,
  });
  if (scene.nowMs >= frame.xLow && scene.nowMs <= frame.xHigh) {
    const x = xPixel(frame, scene.nowMs);
    pen.strokeStyle = theme.ink;
    pen.lineWidth = 1.5 * ratio;
    strokeLine(pen, x, frame.top, x, stripTop + STRIP_HEIGHT * ratio);
    drawNowWords(pen, frame, x, scene, look);
    const observed = scene.threads.find((thread) => thread.kind === 'observed');
    if (observed !== undefined) drawThreadEnd(pen, frame, observed, scene.nowMs, look);
  }
  pen.restore();
}

function drawNowWords(pen: Pen, frame: Frame, x: number, scene: SectionScene, look: Look): void {
  const { ratio, theme } = look;
  const words = `now ${timeText(scene.nowMs, scene.timeZone, 'HH:mm')}`;
  // Where the line stands near the right edge the words go to its left.
  const rightward = frame.left + frame.width - x > 170 * ratio;
  const align = rightward ? 'left' : 'right';
  const at = x + (rightward ? 7 : -7) * ratio;
  const style = { align, rimmed: true } as const;
  writeText(pen, look, words, at, frame.top + 17 * ratio, { ...style, colour: theme.ink, weight: 600 });
  if (scene.aheadWords === undefined) return;
  writeText(pen, look, scene.aheadWords, at, frame.top + 34 * ratio, style);
}

/** A ring where the thread meets the now line, if its last point is that recent. */
function drawThreadEnd(pen: Pen, frame: Frame, thread: Thread, nowMs: number, { theme, ratio }: Look): void {
  let last = thread.timeMs.length - 1;
  while (last >= 0 && (thread.timeMs[last]! > nowMs || Number.isNaN(thread.height[last]!))) last--;
  if (last < 0 || nowMs - thread.timeMs[last]! > thread.joinMs) return;
  pen.beginPath();
  pen.arc(xPixel(frame, thread.timeMs[last]!), yPixel(frame, thread.height[last]!), 5 * ratio, 0, 2 * Math.PI);
  pen.fillStyle = theme.ink;
  pen.fill();
  pen.lineWidth = 1.5 * ratio;
  pen.strokeStyle = theme.ground;
  pen.stroke();
}

function drawCall(pen: Pen, frame: Frame, call: Call, look: Look): void {
  const { ratio, theme } = look;
  if (call.endMs <= frame.xLow || call.startMs >= frame.xHigh) return;
  const left = xPixel(frame, call.startMs);
  const top = yPixel(frame, call.top);
  pen.strokeStyle = theme.call;
  pen.lineWidth = 1.5 * ratio;
  pen.strokeRect(left, top, xPixel(frame, call.endMs) - left, yPixel(frame, call.bottom) - top);
  // Near the right edge the words begin further left rather than be cut off.
  const wide = setFont(pen, look, 13, 600).measureText(call.words).width;
  const at = Math.max(frame.left, Math.min(left, frame.left + frame.width - wide - 4 * ratio));
  writeText(pen, look, call.words, at, top - 6 * ratio, { colour: theme.call, weight: 600, rimmed: true });
}
