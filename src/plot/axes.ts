// Axes drawn by the house itself, for saved pictures: the same lines, numbers and words that the page's charts show.

import { toHeightUnit, type HeightUnit } from '../air/index.ts';
import { strokeLine, writeText, xPixel, yPixel, type Frame, type Look, type Pen } from './pen.ts';
import { timeTicks, valueTicks } from './ticks.ts';

export interface AxesStyle {
  readonly timeZone: string;
  readonly heightUnit: HeightUnit;
  /** CSS pixels between the height numbers and the frame, where the discs stand; 8 unless told. */
  readonly gap?: number;
}

/** Hairlines at round times and heights across the frame. */
export function drawGridLines(pen: Pen, frame: Frame, look: Look, { timeZone, heightUnit }: AxesStyle): void {
  pen.strokeStyle = look.theme.ink;
  pen.globalAlpha = 0.1;
  pen.lineWidth = look.ratio;
  for (const { at } of timesOf(frame, look, timeZone)) {
    const x = xPixel(frame, at);
    strokeLine(pen, x, frame.top, x, frame.top + frame.height);
  }
  for (const { at } of heightsOf(frame, look, heightUnit)) {
    const y = yPixel(frame, at);
    strokeLine(pen, frame.left, y, frame.left + frame.width, y);
  }
  pen.globalAlpha = 1;
}

/** Times under the frame, heights to its left, and what the heights are. */
export function drawAxisText(pen: Pen, frame: Frame, look: Look, { timeZone, heightUnit, gap = 8 }: AxesStyle): void {
  const { ratio } = look;
  const below = frame.top + frame.height + 20 * ratio;
  for (const { at, label } of timesOf(frame, look, timeZone)) {
    writeText(pen, look, label, xPixel(frame, at), below, { align: 'center' });
  }
  const right = frame.left - gap * ratio;
  for (const { at, label } of heightsOf(frame, look, heightUnit)) {
    writeText(pen, look, label, right, yPixel(frame, at), { align: 'right', baseline: 'middle' });
  }
  pen.save();
  pen.translate(right - 50 * ratio, frame.top + frame.height / 2);
  pen.rotate(-Math.PI / 2);
  writeText(pen, look, `height above ground, ${heightUnit}`, 0, 0, { align: 'center' });
  pen.restore();
}

const timesOf = (frame: Frame, { ratio }: Look, timeZone: string): ReturnType<typeof timeTicks> =>
  timeTicks(frame.xLow, frame.xHigh, frame.width / ratio / 74, timeZone);

const heightsOf = (frame: Frame, { ratio }: Look, unit: HeightUnit): ReturnType<typeof valueTicks> =>
  valueTicks(frame.yLow, frame.yHigh, frame.height / ratio / 60, toHeightUnit(1, unit));
