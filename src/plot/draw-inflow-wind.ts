// Beside the diagram, on its height axis: barbs, and the speed by height; what a sounding added aloft is dashed.

import { directionOf, speedOf, toSpeedUnit } from '../air/index.ts';
import { drawBarb } from './barbs.ts';
import type { InflowFrames, InflowScene } from './inflow-scene.ts';
import { strokeLine, tracePoints, within, writeText, xPixel, yPixel, type Frame, type Look, type Pen } from './pen.ts';
import { scaleColour, type ColourScale, type ValueRange } from './scales.ts';
import { valueTicks } from './ticks.ts';

/** Colours of the speed, as on the section. */
export interface SpeedColours {
  readonly scale: ColourScale;
  readonly range: ValueRange;
}

export function drawInflowWind(
  pen: Pen,
  { barbs, speed }: InflowFrames,
  scene: InflowScene,
  look: Look,
  colours: SpeedColours,
): void {
  drawBarbs(pen, barbs, scene, look);
  drawSpeed(pen, speed, scene, look, colours);
}

function drawBarbs(pen: Pen, frame: Frame, { wind, hemisphere, speedUnit }: InflowScene, look: Look): void {
  const apart = 30 * look.ratio;
  let last = Infinity;
  for (let k = 0; k < wind.count && wind.heightAgl[k]! <= frame.yHigh; k++) {
    const y = yPixel(frame, wind.heightAgl[k]!);
    if (last - y < apart) continue;
    last = y;
    const [u, v] = [wind.u[k]!, wind.v[k]!];
    drawBarb(pen, frame.left + frame.width / 2, y, speedOf(u, v), directionOf(u, v), look, {
      hemisphere,
      unit: speedUnit,
      length: 23,
    });
  }
}

function drawSpeed(
  pen: Pen,
  frame: Frame,
  { wind, windTop, nose, speedUnit, layers }: InflowScene,
  look: Look,
  { scale, range }: SpeedColours,
): void {
  const { theme, ratio } = look;
  const bottom = frame.top + frame.height;
  const speedAt = (k: number): number => speedOf(wind.u[k]!, wind.v[k]!);
  pen.fillStyle = theme.ink;
  pen.globalAlpha = 0.06;
  for (const layer of layers) {
    if (!(layer.top > layer.bottom) || layer.bottom >= frame.yHigh) continue;
    const high = yPixel(frame, Math.min(layer.top, frame.yHigh));
    pen.fillRect(frame.left, high, frame.width, yPixel(frame, layer.bottom) - high);
  }
  pen.globalAlpha = 1;
  pen.strokeStyle = theme.rule;
  pen.lineWidth = ratio;
  for (const { at, label } of valueTicks(0, frame.xHigh, frame.width / ratio / 40, toSpeedUnit(1, speedUnit))) {
    const x = xPixel(frame, at);
    strokeLine(pen, x, frame.top, x, bottom);
    writeText(pen, look, label, x, bottom + 16 * ratio, { align: 'center' });
  }
  strokeLine(pen, frame.left, bottom, frame.left + frame.width, bottom);
  writeText(pen, look, `wind ${speedUnit}`, frame.left + frame.width / 2, bottom + 34 * ratio, { align: 'center' });
  within(pen, frame, () => {
    pen.strokeStyle = theme.ink;
    pen.lineWidth = 2 * ratio;
    let own = 0;
    while (own < wind.count && wind.heightAgl[own]! <= windTop) own++;
    const x = (k: number): number => xPixel(frame, speedAt(k));
    const y = (k: number): number => yPixel(frame, wind.heightAgl[k]!);
    pen.beginPath();
    tracePoints(pen, own, x, y);
    pen.stroke();
    if (own < wind.count) {
      const from = Math.max(0, own - 1);
      pen.strokeStyle = theme.soft;
      pen.lineWidth = 1.5 * ratio;
      pen.setLineDash([4 * ratio, 4 * ratio]);
      pen.beginPath();
      tracePoints(
        pen,
        wind.count - from,
        (k) => x(from + k),
        (k) => y(from + k),
      );
      pen.stroke();
      pen.setLineDash([]);
    }
    drawDots(pen, frame, wind, own, speedAt, look, { scale, range });
    if (nose === null) return;
    pen.beginPath();
    pen.arc(xPixel(frame, nose.speed), yPixel(frame, nose.height), 7 * ratio, 0, 2 * Math.PI);
    pen.strokeStyle = theme.ink;
    pen.lineWidth = 1.5 * ratio;
    pen.stroke();
  });
  if (nose !== null && nose.height <= frame.yHigh) {
    const style = {
      align: 'right',
      baseline: 'middle',
      rimmed: true,
      colour: theme.ink,
      weight: 600,
      size: 12,
    } as const;
    writeText(pen, look, 'nose', xPixel(frame, nose.speed) - 11 * ratio, yPixel(frame, nose.height), style);
  }
}

function drawDots(
  pen: Pen,
  frame: Frame,
  wind: InflowScene['wind'],
  count: number,
  speedAt: (k: number) => number,
  { theme, ratio }: Look,
  { scale, range }: SpeedColours,
): void {
  let last = Infinity;
  for (let k = 0; k < count; k++) {
    const y = yPixel(frame, wind.heightAgl[k]!);
    const colour = scaleColour(scale, range, speedAt(k));
    // Levels of a fine sounding would merge into a bar.
    if (colour === null || last - y < 5 * ratio) continue;
    last = y;
    pen.fillStyle = `rgb(${colour.join(' ')})`;
    pen.strokeStyle = theme.ground;
    pen.lineWidth = 1.25 * ratio;
    pen.beginPath();
    pen.arc(xPixel(frame, speedAt(k)), y, 3.5 * ratio, 0, 2 * Math.PI);
    pen.fill();
    pen.stroke();
  }
}
