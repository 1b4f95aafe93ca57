// Turbine discs, true to scale on the height axis, and their bands across a panel.

import { strokeLine, within, yPixel, type Frame, type Look, type Pen } from './pen.ts';

/** One turbine type, m above ground. */
export interface Disc {
  readonly name: string;
  readonly hubHeight: number;
  readonly rotorDiameter: number;
}

/** Bands from lower to upper tip across the frame, faint, with dotted edges. */
export function drawDiscBands(pen: Pen, frame: Frame, discs: readonly Disc[], { theme, ratio }: Look): void {
  within(pen, frame, () => {
    for (const { hubHeight, rotorDiameter } of discs) {
      const top = yPixel(frame, hubHeight + rotorDiameter / 2);
      const bottom = yPixel(frame, hubHeight - rotorDiameter / 2);
      pen.globalAlpha = 0.07;
      pen.fillStyle = theme.ink;
      pen.fillRect(frame.left, top, frame.width, bottom - top);
      pen.globalAlpha = 0.5;
      pen.strokeStyle = theme.ink;
      pen.lineWidth = ratio;
      pen.lineCap = 'butt';
      pen.setLineDash([ratio, 4 * ratio]);
      for (const y of [top, bottom]) strokeLine(pen, frame.left, y, frame.left + frame.width, y);
      pen.setLineDash([]);
    }
    pen.globalAlpha = 1;
  });
}

/**
 * Turbines standing left of the frame: tower, hub, and the disc seen from the side, so that its height is to scale.
 * Types stand side by side, the first nearest the frame.
 */
export function drawDiscs(pen: Pen, frame: Frame, discs: readonly Disc[], { theme, ratio }: Look): void {
  pen.strokeStyle = theme.ink;
  pen.fillStyle = theme.ink;
  pen.lineWidth = 1.5 * ratio;
  pen.lineCap = 'butt';
  discs.forEach(({ hubHeight, rotorDiameter }, k) => {
    const x = frame.left - (9 + 13 * k) * ratio;
    const ground = yPixel(frame, Math.max(0, frame.yLow));
    const hub = yPixel(frame, hubHeight);
    const radius = Math.abs(yPixel(frame, hubHeight + rotorDiameter / 2) - hub);
    // A view that begins above the hub or ends below it shows no turbine.
    if (hub > ground || hub < frame.top) return;
    strokeLine(pen, x, ground, x, hub);
    pen.beginPath();
    pen.ellipse(x, hub, Math.min(4 * ratio, radius), radius, 0, 0, 2 * Math.PI);
    pen.stroke();
    pen.beginPath();
    pen.arc(x, hub, 1.75 * ratio, 0, 2 * Math.PI);
    pen.fill();
  });
}
