// What every drawing is given: where to draw (a pen), how it should look, and the frame that maps values to pixels.

import type { Theme } from './theme.ts';

/**
 * The part of a 2D canvas context that the drawings use; page canvas, offscreen canvas and a recording pen in tests are
 * all of this shape. Pixels are device pixels.
 */
export type Pen = Pick<
  CanvasRenderingContext2D,
  | 'arc'
  | 'beginPath'
  | 'bezierCurveTo'
  | 'clip'
  | 'closePath'
  | 'drawImage'
  | 'ellipse'
  | 'fill'
  | 'fillRect'
  | 'fillStyle'
  | 'fillText'
  | 'font'
  | 'globalAlpha'
  | 'imageSmoothingEnabled'
  | 'lineCap'
  | 'lineJoin'
  | 'lineTo'
  | 'lineWidth'
  | 'measureText'
  | 'moveTo'
  | 'rect'
  | 'restore'
  | 'rotate'
  | 'save'
  | 'setLineDash'
  | 'stroke'
  | 'strokeRect'
  | 'strokeStyle'
  | 'strokeText'
  | 'textAlign'
  | 'textBaseline'
  | 'translate'
>;

export interface Look {
  readonly theme: Theme;
  /** Device pixels in one CSS pixel; all sizes below are CSS pixels times this. */
  readonly ratio: number;
  /** Font families, as in a style sheet. */
  readonly font: string;
}

export const FONT = "'Atkinson Hyperlegible Next Variable', 'Atkinson Hyperlegible Next', system-ui, sans-serif";

/** A rectangle of device pixels and the values at its edges. */
export interface Frame {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
  /** Values at the left and right edge: UTC ms for a section, m/s for a profile. */
  readonly xLow: number;
  readonly xHigh: number;
  /** Values at the lower and upper edge. */
  readonly yLow: number;
  readonly yHigh: number;
}

/** Pixel of a value across the frame; values beyond the edges lie outside. */
export function xPixel(frame: Frame, value: number): number {
  return frame.left + ((value - frame.xLow) / (frame.xHigh - frame.xLow)) * frame.width;
}

/** Pixel of a value up the frame. */
export function yPixel(frame: Frame, value: number): number {
  return frame.top + ((frame.yHigh - value) / (frame.yHigh - frame.yLow)) * frame.height;
}

/** Value at a pixel across the frame. */
export function xValue(frame: Frame, pixel: number): number {
  return frame.xLow + ((pixel - frame.left) / frame.width) * (frame.xHigh - frame.xLow);
}

/** Value at a pixel up the frame. */
export function yValue(frame: Frame, pixel: number): number {
  return frame.yHigh - ((pixel - frame.top) / frame.height) * (frame.yHigh - frame.yLow);
}

/** Keeps what `draw` draws inside the frame. */
export function within(pen: Pen, frame: Frame, draw: () => void): void {
  pen.save();
  pen.beginPath();
  pen.rect(frame.left, frame.top, frame.width, frame.height);
  pen.clip();
  draw();
  pen.restore();
}

/** A straight line, laid on whole device pixels where it is upright or level so that hairlines stay hairlines. */
export function strokeLine(pen: Pen, x1: number, y1: number, x2: number, y2: number): void {
  const half = (Math.round(pen.lineWidth) % 2) / 2;
  const align = (from: number, to: number): [number, number] =>
    from === to ? [Math.round(from - half) + half, Math.round(from - half) + half] : [from, to];
  const [fromX, toX] = align(x1, x2);
  const [fromY, toY] = align(y1, y2);
  pen.beginPath();
  pen.moveTo(fromX, fromY);
  pen.lineTo(toX, toY);
  pen.stroke();
}

/** A line through points, broken wherever a point is missing (NaN). Leaves the path open for `stroke`. */
export function tracePoints(pen: Pen, count: number, x: (k: number) => number, y: (k: number) => number): void {
  let open = false;
  for (let k = 0; k < count; k++) {
    const [atX, atY] = [x(k), y(k)];
    if (Number.isNaN(atX) || Number.isNaN(atY)) {
      open = false;
      continue;
    }
    if (open) pen.lineTo(atX, atY);
    else pen.moveTo(atX, atY);
    open = true;
  }
}

export interface TextStyle {
  /** CSS pixels; 13 unless told. */
  readonly size?: number;
  readonly weight?: number;
  readonly colour?: string;
  readonly align?: CanvasTextAlign;
  readonly baseline?: CanvasTextBaseline;
  /** Rims the letters with the ground, for text over a picture. */
  readonly rimmed?: boolean;
}

/** Sets the pen's font; returns it for chaining with `measureText`. */
export function setFont(pen: Pen, look: Look, size: number, weight = 400): Pen {
  pen.font = `${weight} ${size * look.ratio}px ${look.font}`;
  return pen;
}

/** Writes one line of text. */
export function writeText(pen: Pen, look: Look, text: string, x: number, y: number, style: TextStyle = {}): void {
  const { size = 13, weight = 400, colour = look.theme.soft, align = 'left', baseline = 'alphabetic' } = style;
  setFont(pen, look, size, weight);
  pen.textAlign = align;
  pen.textBaseline = baseline;
  if (style.rimmed === true) {
    pen.lineJoin = 'round';
    pen.lineWidth = 3 * look.ratio;
    pen.strokeStyle = look.theme.ground;
    pen.strokeText(text, x, y);
  }
  pen.fillStyle = colour;
  pen.fillText(text, x, y);
}
