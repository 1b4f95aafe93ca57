// Values by height as lines, beside a section or by themselves: height up, the value across, its own ticks below.

import { toHeightUnit, type HeightUnit } from '../air/index.ts';
import { strokeLine, tracePoints, within, writeText, xPixel, yPixel, type Frame, type Look, type Pen } from './pen.ts';
import { valueTicks } from './ticks.ts';

export interface HeightLine {
  /** m above ground, ascending. */
  readonly heightAgl: ArrayLike<number>;
  readonly value: ArrayLike<number>;
  /** Standard uncertainty, drawn as a band; absent for none. */
  readonly spread?: ArrayLike<number>;
  readonly dashed?: boolean;
}

export interface HeightPanel {
  readonly lines: readonly HeightLine[];
  /** Written under the axis: what it is, with its unit. */
  readonly title: string;
  /** Shown = value * factor + offset. */
  readonly factor: number;
  readonly offset: number;
  /** A layer that is shaded, m above ground; null for none. */
  readonly layer: { readonly bottom: number; readonly top: number } | null;
  /** Whether a line stands at zero. */
  readonly zero: boolean;
  readonly heightUnit: HeightUnit;
  /** Whether the heights are written to the left. */
  readonly heights: boolean;
}

/** The range across that holds all values between two heights, with a little room; zero in it where asked for. */
export function heightPanelRange(panel: HeightPanel, bottom: number, top: number): { low: number; high: number } {
  const values: number[] = panel.zero ? [0] : [];
  for (const { heightAgl, value, spread } of panel.lines) {
    for (let k = 0; k < heightAgl.length; k++) {
      if (heightAgl[k]! < bottom || heightAgl[k]! > top || !Number.isFinite(value[k]!)) continue;
      const wide = spread?.[k] ?? 0;
      values.push(value[k]! - (wide > 0 ? wide : 0), value[k]! + (wide > 0 ? wide : 0));
    }
  }
  if (values.length < 2) return { low: 0, high: 1 };
  const [low, high] = [Math.min(...values), Math.max(...values)];
  const room = Math.max(0.06 * (high - low), 1e-12);
  return { low: panel.zero && low === 0 ? 0 : low - room, high: high + room };
}

/** @param frame its y runs over heights, its x over `heightPanelRange` */
export function drawHeightPanel(pen: Pen, frame: Frame, panel: HeightPanel, look: Look): void {
  const { theme, ratio } = look;
  const { left, top, width, height } = frame;
  if (panel.layer !== null) {
    within(pen, frame, () => {
      const upper = yPixel(frame, panel.layer!.top);
      pen.globalAlpha = 0.12;
      pen.fillStyle = theme.ink;
      pen.fillRect(left, upper, width, yPixel(frame, panel.layer!.bottom) - upper);
      pen.globalAlpha = 1;
    });
  }
  pen.strokeStyle = theme.ink;
  pen.lineWidth = ratio;
  pen.globalAlpha = 0.1;
  const across = valueTicks(frame.xLow, frame.xHigh, width / ratio / 56, panel.factor, panel.offset);
  const up = valueTicks(frame.yLow, frame.yHigh, height / ratio / 60, toHeightUnit(1, panel.heightUnit));
  for (const { at } of across) strokeLine(pen, xPixel(frame, at), top, xPixel(frame, at), top + height);
  for (const { at } of up) strokeLine(pen, left, yPixel(frame, at), left + width, yPixel(frame, at));
  pen.globalAlpha = 1;
  if (panel.zero && frame.xLow < 0) {
    pen.strokeStyle = theme.soft;
    strokeLine(pen, xPixel(frame, 0), top, xPixel(frame, 0), top + height);
  }
  within(pen, frame, () => {
    for (const line of panel.lines) drawLine(pen, frame, line, look);
  });
  const below = top + height + 20 * ratio;
  for (const { at, label } of across) writeText(pen, look, label, xPixel(frame, at), below, { align: 'center' });
  writeText(pen, look, panel.title, left + width / 2, below + 20 * ratio, { align: 'center', size: 12 });
  if (!panel.heights) return;
  for (const { at, label } of up) {
    writeText(pen, look, label, left - 8 * ratio, yPixel(frame, at), { align: 'right', baseline: 'middle' });
  }
}

function drawLine(
  pen: Pen,
  frame: Frame,
  { heightAgl, value, spread, dashed }: HeightLine,
  { theme, ratio }: Look,
): void {
  const y = (k: number): number => yPixel(frame, heightAgl[k]!);
  if (spread !== undefined) {
    pen.fillStyle = theme.ink;
    pen.globalAlpha = 0.16;
    for (let k = 1; k < heightAgl.length; k++) {
      const corners = [k - 1, k].map((j) => [value[j]! - spread[j]!, value[j]! + spread[j]!] as const);
      if (corners.flat().some((each) => !Number.isFinite(each))) continue;
      pen.beginPath();
      pen.moveTo(xPixel(frame, corners[0]![0]), y(k - 1));
      pen.lineTo(xPixel(frame, corners[0]![1]), y(k - 1));
      pen.lineTo(xPixel(frame, corners[1]![1]), y(k));
      pen.lineTo(xPixel(frame, corners[1]![0]), y(k));
      pen.closePath();
      pen.fill();
    }
    pen.globalAlpha = 1;
  }
  pen.strokeStyle = dashed === true ? theme.soft : theme.ink;
  pen.lineWidth = (dashed === true ? 1.5 : 2) * ratio;
  pen.lineJoin = 'round';
  if (dashed === true) pen.setLineDash([5 * ratio, 4 * ratio]);
  pen.beginPath();
  tracePoints(pen, heightAgl.length, (k) => xPixel(frame, value[k]!), y);
  pen.stroke();
  pen.setLineDash([]);
}
