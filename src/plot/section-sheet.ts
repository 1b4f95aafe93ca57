// A section as a picture to take away: all that is needed to read it years later stands on it.

import type { HeightUnit } from '../air/index.ts';
import { drawAxisText, drawGridLines } from './axes.ts';
import { drawLegend, type Legend } from './legend.ts';
import { setFont, strokeLine, writeText, type Frame, type Look, type Pen } from './pen.ts';
import { discsWidth, drawSectionOver, drawSectionUnder, type SectionScene } from './section-scene.ts';
import type { SectionExtent } from './section-extent.ts';

export interface SectionSheet {
  /** Place and night. */
  readonly title: string;
  /** What was measured with what, and how old it was. */
  readonly source: string;
  /** The caution that every report carries. */
  readonly foot: string;
  readonly legend: Legend;
  readonly heightUnit: HeightUnit;
  readonly extent: SectionExtent;
  readonly scene: SectionScene;
}

/** Device pixels of a whole sheet. */
export interface SheetSize {
  readonly width: number;
  readonly height: number;
}

const MARGIN = 24;
const LEGEND_WIDTH = 220;

/** Where the section lies on a sheet: paint its picture for this frame first (`viewOf`). */
export function sheetFrame(size: SheetSize, sheet: SectionSheet, { ratio }: Look): Frame {
  const left = (MARGIN + 76 + discsWidth(sheet.scene.discs.length)) * ratio;
  const top = (MARGIN + 56) * ratio;
  const { startMs, endMs, bottom, top: highest } = sheet.extent;
  return {
    left,
    top,
    width: size.width - left - (MARGIN + 8) * ratio,
    height: size.height - top - (MARGIN + 128) * ratio,
    xLow: startMs,
    xHigh: endMs,
    yLow: bottom,
    yHigh: highest,
  };
}

/** Draws the whole sheet. */
export function drawSectionSheet(pen: Pen, size: SheetSize, sheet: SectionSheet, look: Look): void {
  const { theme, ratio } = look;
  const frame = sheetFrame(size, sheet, look);
  const left = MARGIN * ratio;
  const axes = {
    timeZone: sheet.scene.timeZone,
    heightUnit: sheet.heightUnit,
    gap: 8 + discsWidth(sheet.scene.discs.length),
  };
  pen.fillStyle = theme.ground;
  pen.fillRect(0, 0, size.width, size.height);
  writeText(pen, look, sheet.title, left, (MARGIN + 14) * ratio, { size: 18, weight: 600, colour: theme.ink });
  writeText(pen, look, sheet.source, left, (MARGIN + 36) * ratio);

  drawSectionUnder(pen, frame, sheet.scene, look);
  drawGridLines(pen, frame, look, axes);
  drawSectionOver(pen, frame, sheet.scene, look);
  drawAxisText(pen, frame, look, axes);

  const legendTop = frame.top + frame.height + 78 * ratio;
  drawLegend(pen, frame.left, legendTop, LEGEND_WIDTH * ratio, sheet.legend, look);
  const wide = setFont(pen, look, 12).measureText(sheet.legend.unit).width;
  const words = frame.left + (LEGEND_WIDTH + 24) * ratio + wide;
  writeText(pen, look, sheet.legend.words, words, legendTop + 9 * ratio, { size: 12 });

  const footTop = size.height - (MARGIN + 18) * ratio;
  pen.strokeStyle = theme.rule;
  pen.lineWidth = ratio;
  strokeLine(pen, left, footTop, size.width - left, footTop);
  const clock = `Times on the clock of ${sheet.scene.timeZone}.`;
  writeText(pen, look, sheet.foot, left, footTop + 18 * ratio, { size: 12 });
  writeText(pen, look, clock, size.width - left, footTop + 18 * ratio, { size: 12, align: 'right' });
}

/** The sheet as a PNG file; runs on the page and in a worker. */
export async function sectionPng(size: SheetSize, sheet: SectionSheet, look: Look): Promise<Blob> {
  const canvas = new OffscreenCanvas(size.width, size.height);
  drawSectionSheet(canvas.getContext('2d') as unknown as Pen, size, sheet, look);
  return await canvas.convertToBlob({ type: 'image/png' });
}
