// The disc and the night's power as one picture to take away, with all that is needed to read it later.

import { drawDiscFace, type DiscFace } from './disc-face.ts';
import { strokeLine, writeText, type Look, type Pen } from './pen.ts';
import type { ColourScale, ValueRange } from './scales.ts';

export interface RotorSheet {
  readonly title: string;
  /** What it says in a sentence or two, a line each. */
  readonly lines: readonly string[];
  readonly face: DiscFace;
  readonly speed: { readonly scale: ColourScale; readonly range: ValueRange };
  /** The chart of power as it stands on the page, and the names of its lines. */
  readonly chart: CanvasImageSource & { readonly width: number; readonly height: number };
  readonly chartTitle: string;
  readonly foot: string;
}

/** CSS pixels. */
const WIDTH = 1280;
const MARGIN = 24;
const LINE = 20;
const FACE = { width: 500, height: 420 };

/** Draws the sheet; the height that it needs comes from `sheetHeight`. */
export function drawRotorSheet(pen: Pen, sheet: RotorSheet, look: Look): void {
  const { theme, ratio } = look;
  const height = sheetHeight(sheet);
  pen.fillStyle = theme.ground;
  pen.fillRect(0, 0, WIDTH * ratio, height * ratio);
  const at = (x: number): number => x * ratio;
  writeText(pen, look, sheet.title, at(MARGIN), at(MARGIN + 14), { size: 18, weight: 600, colour: theme.ink });
  sheet.lines.forEach((line, k) =>
    writeText(pen, look, line, at(MARGIN), at(MARGIN + 40 + LINE * k), { size: 14, colour: theme.ink }),
  );
  const top = MARGIN + 56 + LINE * sheet.lines.length;
  const box = { left: at(MARGIN), top: at(top), width: at(FACE.width), height: at(FACE.height) };
  drawDiscFace(pen, box, sheet.face, look, sheet.speed);

  const left = MARGIN + FACE.width + 28;
  writeText(pen, look, sheet.chartTitle, at(left), at(top + 12), { weight: 600, colour: theme.ink });
  const room = { width: WIDTH - left - MARGIN, height: FACE.height - 24 };
  const shrink = Math.min(at(room.width) / sheet.chart.width, at(room.height) / sheet.chart.height);
  const [wide, tall] = [sheet.chart.width * shrink, sheet.chart.height * shrink];
  pen.drawImage(sheet.chart, at(left), at(top + 24), wide, tall);

  const footTop = height - MARGIN - 18;
  pen.strokeStyle = theme.rule;
  pen.lineWidth = ratio;
  strokeLine(pen, at(MARGIN), at(footTop), at(WIDTH - MARGIN), at(footTop));
  writeText(pen, look, sheet.foot, at(MARGIN), at(footTop + 18), { size: 12 });
}

/** The sheet as a PNG file. */
export async function rotorPng(sheet: RotorSheet, look: Look): Promise<Blob> {
  const canvas = new OffscreenCanvas(WIDTH * look.ratio, sheetHeight(sheet) * look.ratio);
  drawRotorSheet(canvas.getContext('2d') as unknown as Pen, sheet, look);
  return await canvas.convertToBlob({ type: 'image/png' });
}

function sheetHeight(sheet: RotorSheet): number {
  return MARGIN + 56 + LINE * sheet.lines.length + FACE.height + 60;
}
