// The whole picture of the inflow, what lies over it at the cursor, and the sheet to take away.

import { writeText, strokeLine, yPixel, type Look, type Pen } from './pen.ts';
import { drawDiagram } from './draw-diagram.ts';
import { drawInflowWind, type SpeedColours } from './draw-inflow-wind.ts';
import { inflowFrames, type InflowFrames, type InflowScene } from './inflow-scene.ts';
import { drawStormHodograph, type StormHodograph } from './storm-hodograph.ts';
import { thermodynamicPoint } from './thermodynamic.ts';

/** Draws diagram, barbs and speed on a canvas of this size, device pixels. @returns where they stand */
export function drawInflow(
  pen: Pen,
  size: { readonly width: number; readonly height: number },
  scene: InflowScene,
  look: Look,
  colours: SpeedColours,
): InflowFrames {
  const frames = inflowFrames({ left: 0, top: 0, ...size }, scene, look);
  pen.fillStyle = look.theme.ground;
  pen.fillRect(0, 0, size.width, size.height);
  drawDiagram(pen, frames.diagram, scene, look);
  drawInflowWind(pen, frames, scene, look, colours);
  return frames;
}

/** Values at the cursor; NaN where there is none. */
export interface CursorValues {
  /** m above ground */
  readonly height: number;
  /** K */
  readonly temperature: number;
  readonly dewPoint: number;
  readonly parcelVirtual: number;
  /** m/s */
  readonly speed: number;
}

/** A line across all three at a height, with a dot on each curve; drawn on a clear canvas over the picture. */
export function drawInflowCursor(pen: Pen, { diagram, speed }: InflowFrames, at: CursorValues, look: Look): void {
  const { theme, ratio } = look;
  const y = yPixel(diagram, at.height);
  pen.strokeStyle = theme.soft;
  pen.lineWidth = ratio;
  strokeLine(pen, diagram.left, y, speed.left + speed.width, y);
  const dot = (x: number): void => {
    if (Number.isNaN(x)) return;
    pen.beginPath();
    pen.arc(x, y, 4 * ratio, 0, 2 * Math.PI);
    pen.fillStyle = theme.ground;
    pen.fill();
    pen.lineWidth = 2 * ratio;
    pen.strokeStyle = theme.ink;
    pen.stroke();
  };
  for (const temperature of [at.temperature, at.dewPoint, at.parcelVirtual]) {
    dot(thermodynamicPoint(diagram, temperature, at.height)[0]);
  }
  dot(speed.left + (at.speed / speed.xHigh) * speed.width);
}

export interface InflowSheet {
  readonly title: string;
  /** What it rests on, a line each. */
  readonly lines: readonly string[];
  /** The caution that every report carries. */
  readonly foot: string;
  readonly scene: InflowScene;
  readonly hodograph: StormHodograph;
  readonly colours: SpeedColours;
}

const MARGIN = 24;

/** Diagram and hodograph with all that is needed to read them years later. */
export function drawInflowSheet(
  pen: Pen,
  size: { readonly width: number; readonly height: number },
  sheet: InflowSheet,
  look: Look,
): void {
  const { theme, ratio } = look;
  const left = MARGIN * ratio;
  pen.fillStyle = theme.ground;
  pen.fillRect(0, 0, size.width, size.height);
  writeText(pen, look, sheet.title, left, (MARGIN + 14) * ratio, { size: 18, weight: 600, colour: theme.ink });
  sheet.lines.forEach((line, k) => writeText(pen, look, line, left, (MARGIN + 36 + 18 * k) * ratio));
  const top = (MARGIN + 44 + 18 * sheet.lines.length) * ratio;
  const height = size.height - top - (MARGIN + 30) * ratio;
  const wide = 0.6 * (size.width - 2 * left);
  const frames = inflowFrames({ left: left - 10 * ratio, top, width: wide, height }, sheet.scene, look);
  drawDiagram(pen, frames.diagram, sheet.scene, look);
  drawInflowWind(pen, frames, sheet.scene, look, sheet.colours);
  drawStormHodograph(
    pen,
    sheet.hodograph,
    { left: left + wide + 16 * ratio, top, width: size.width - 2 * left - wide - 16 * ratio, height },
    look,
  );
  const footTop = size.height - (MARGIN + 10) * ratio;
  pen.strokeStyle = theme.rule;
  pen.lineWidth = ratio;
  strokeLine(pen, left, footTop, size.width - left, footTop);
  writeText(pen, look, sheet.foot, left, footTop + 18 * ratio, { size: 12 });
}

/** The sheet as a PNG file; runs on the page and in a worker. */
export async function inflowPng(
  size: { readonly width: number; readonly height: number },
  sheet: InflowSheet,
  look: Look,
): Promise<Blob> {
  const canvas = new OffscreenCanvas(size.width, size.height);
  drawInflowSheet(canvas.getContext('2d') as unknown as Pen, size, sheet, look);
  return await canvas.convertToBlob({ type: 'image/png' });
}
