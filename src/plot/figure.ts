// What the figures of an archive share: the room they are given, text that stands on a colour, and the sheet to take away.

import { contrastOf, type Bytes } from './colour.ts';
import { setFont, strokeLine, writeText, type Frame, type Look, type Pen } from './pen.ts';
import type { Theme } from './theme.ts';

/** Device pixels that a figure may use, its numbers and words included. */
export interface Area {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

/** The colour of a theme that is read best on this one. */
export function inkOn(colour: Bytes, theme: Theme): string {
  return contrastOf(colour, theme.groundBytes) >= contrastOf(colour, theme.inkBytes) ? theme.ground : theme.ink;
}

/** A frame within an area: margins in CSS pixels. */
export function frameWithin(
  area: Area,
  margins: { readonly left: number; readonly right: number; readonly top: number; readonly bottom: number },
  values: Pick<Frame, 'xLow' | 'xHigh' | 'yLow' | 'yHigh'>,
  { ratio }: Look,
): Frame {
  return {
    left: area.left + margins.left * ratio,
    top: area.top + margins.top * ratio,
    width: Math.max(1, area.width - (margins.left + margins.right) * ratio),
    height: Math.max(1, area.height - (margins.top + margins.bottom) * ratio),
    ...values,
  };
}

/** A figure as a picture to take away: all that is needed to read it years later stands on it. */
export interface FigureSheet {
  readonly title: string;
  /** What it rests on. */
  readonly source: string;
  /** The caution that every report carries. */
  readonly foot: string;
  readonly draw: (pen: Pen, area: Area) => void;
}

const MARGIN = 24;
const HEAD = 36;
const LINE = 18;

/** Draws the whole sheet; sizes in device pixels. */
export function drawFigureSheet(
  pen: Pen,
  { width, height }: { readonly width: number; readonly height: number },
  sheet: FigureSheet,
  look: Look,
): void {
  const { theme, ratio } = look;
  const left = MARGIN * ratio;
  const room = width - 2 * left;
  pen.fillStyle = theme.ground;
  pen.fillRect(0, 0, width, height);
  writeText(pen, look, sheet.title, left, (MARGIN + 14) * ratio, { size: 18, weight: 600, colour: theme.ink });
  const source = linesOf(pen, look, sheet.source, room);
  source.forEach((line, k) => writeText(pen, look, line, left, (MARGIN + 36 + LINE * k) * ratio, { size: 12 }));
  const foot = linesOf(pen, look, sheet.foot, room);
  const footTop = height - (MARGIN + LINE * foot.length) * ratio;
  const top = (MARGIN + HEAD + LINE * source.length) * ratio;
  sheet.draw(pen, { left, top, width: room, height: footTop - 12 * ratio - top });
  pen.strokeStyle = theme.rule;
  pen.lineWidth = ratio;
  strokeLine(pen, left, footTop, width - left, footTop);
  foot.forEach((line, k) => writeText(pen, look, line, left, footTop + LINE * (k + 1) * ratio, { size: 12 }));
}

/** Breaks a text between words so that each line fits. */
function linesOf(pen: Pen, look: Look, text: string, room: number): string[] {
  setFont(pen, look, 12);
  const lines: string[] = [];
  for (const word of text.split(' ')) {
    const longer = `${lines.at(-1) ?? ''} ${word}`.trimStart();
    if (lines.length > 0 && pen.measureText(longer).width <= room) lines[lines.length - 1] = longer;
    else lines.push(word);
  }
  return lines;
}
