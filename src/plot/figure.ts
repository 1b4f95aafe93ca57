// What the figures of an archive share: the room they are given, text that stands on a colour, and the sheet to take away.

import { contrastOf, type Bytes } from './colour.ts';
import { strokeLine, writeText, type Frame, type Look, type Pen } from './pen.ts';
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
const HEAD = 56;
const FOOT = 34;

/** Draws the whole sheet; sizes in device pixels. */
export function drawFigureSheet(
  pen: Pen,
  { width, height }: { readonly width: number; readonly height: number },
  sheet: FigureSheet,
  look: Look,
): void {
  const { theme, ratio } = look;
  const left = MARGIN * ratio;
  pen.fillStyle = theme.ground;
  pen.fillRect(0, 0, width, height);
  writeText(pen, look, sheet.title, left, (MARGIN + 14) * ratio, { size: 18, weight: 600, colour: theme.ink });
  writeText(pen, look, sheet.source, left, (MARGIN + 36) * ratio);
  sheet.draw(pen, {
    left,
    top: (MARGIN + HEAD) * ratio,
    width: width - 2 * left,
    height: height - (2 * MARGIN + HEAD + FOOT) * ratio,
  });
  const footTop = height - (MARGIN + 18) * ratio;
  pen.strokeStyle = theme.rule;
  pen.lineWidth = ratio;
  strokeLine(pen, left, footTop, width - left, footTop);
  writeText(pen, look, sheet.foot, left, footTop + 18 * ratio, { size: 12 });
}
