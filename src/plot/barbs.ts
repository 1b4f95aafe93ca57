// Wind barbs after the WMO convention (WMO-No. 485, Appendix II-4): the shaft points to where the wind comes from, a half
// feather is 5 kt or 2.5 m/s, a whole one twice that, a pennant ten times. Feathers stand on the side of low pressure: to
// the right of the shaft seen from its foot in the northern hemisphere, to the left in the southern.

import { KNOT, type SpeedUnit } from '../air/index.ts';
import type { Look, Pen } from './pen.ts';

export interface Feathers {
  readonly pennants: number;
  readonly whole: number;
  readonly half: number;
  /** Below half a metre per second or one knot there is no direction, only a ring. */
  readonly calm: boolean;
}

const CALM_BELOW = 0.5;

/** Feathers of a speed (m/s), rounded to the nearest half feather; readers of knots and miles get feathers of 5 kt. */
export function feathersOf(speed: number, unit: SpeedUnit = 'm/s'): Feathers {
  const step = unit === 'kt' || unit === 'mph' ? 5 * KNOT : 2.5;
  const halves = Math.round(speed / step);
  return {
    pennants: Math.floor(halves / 10),
    whole: Math.floor((halves % 10) / 2),
    half: halves % 2,
    calm: speed < CALM_BELOW,
  };
}

export interface BarbStyle {
  readonly hemisphere: 'north' | 'south';
  readonly unit?: SpeedUnit;
  /** Length of the shaft, CSS pixels; 22 unless told. */
  readonly length?: number;
  /** Ink unless told. */
  readonly colour?: string;
  /** Rims the barb with the ground, for barbs over a picture. */
  readonly rimmed?: boolean;
}

/**
 * Draws a barb with its foot at a pixel. Nothing is drawn for a NaN speed, nor for a NaN direction unless it is calm.
 * @param speed m/s
 * @param direction degrees, where the wind comes from
 */
export function drawBarb(
  pen: Pen,
  x: number,
  y: number,
  speed: number,
  direction: number,
  look: Look,
  { hemisphere, unit = 'm/s', length = 22, colour = look.theme.ink, rimmed = false }: BarbStyle,
): void {
  if (Number.isNaN(speed)) return;
  const feathers = feathersOf(speed, unit);
  if (!feathers.calm && Number.isNaN(direction)) return;
  const turned = hemisphere === 'north' ? 1 : -1;
  const stroke = (strokeColour: string, width: number): void => {
    pen.strokeStyle = strokeColour;
    pen.fillStyle = strokeColour;
    pen.lineWidth = width * look.ratio;
    strokeBarb(pen, x, y, direction, feathers, turned, length * look.ratio);
  };
  pen.lineCap = 'round';
  pen.lineJoin = 'round';
  if (rimmed) {
    pen.globalAlpha = 0.55;
    stroke(look.theme.ground, 3.25);
    pen.globalAlpha = 1;
  }
  stroke(colour, 1.25);
}

/** @param side 1 where feathers stand to the right of the shaft seen from its foot, -1 to the left */
function strokeBarb(
  pen: Pen,
  x: number,
  y: number,
  direction: number,
  { pennants, whole, half, calm }: Feathers,
  side: number,
  size: number,
): void {
  if (calm) {
    pen.beginPath();
    pen.arc(x, y, 0.16 * size, 0, 2 * Math.PI);
    pen.stroke();
    return;
  }

  // Along the shaft, outward, and the way the feathers stand out from it; screen y points down.
  const angle = (direction * Math.PI) / 180;
  const [alongX, alongY] = [Math.sin(angle), -Math.cos(angle)];
  const [outX, outY] = [-alongY * side, alongX * side];
  const point = (along: number, out: number): [number, number] => [
    x + (along * alongX + out * outX) * size,
    y + (along * alongY + out * outY) * size,
  ];
  const line = (from: [number, number], to: [number, number]): void => {
    pen.beginPath();
    pen.moveTo(...from);
    pen.lineTo(...to);
    pen.stroke();
  };
  line([x, y], point(1, 0));

  const spacing = 0.15;
  let along = 1;
  for (let k = 0; k < pennants; k++) {
    pen.beginPath();
    pen.moveTo(...point(along, 0));
    pen.lineTo(...point(along, 0.42));
    pen.lineTo(...point(along - 0.2, 0));
    pen.closePath();
    pen.fill();
    pen.stroke();
    along -= 0.2;
  }
  if (pennants > 0) along -= 0.06;
  for (let k = 0; k < whole; k++) {
    line(point(along, 0), point(along + 0.14, 0.42));
    along -= spacing;
  }
  if (half === 1) {
    // Alone at the end it could be taken for a whole feather, so it stands in a little.
    if (pennants + whole === 0) along -= spacing;
    line(point(along, 0), point(along + 0.07, 0.21));
  }
}
