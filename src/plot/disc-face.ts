// A rotor disc seen from the front, true to scale over its ground: a slice for each height, its colour the speed, its
// direction an arrow.

import { strokeLine, writeText, type Look, type Pen } from './pen.ts';
import { scaleColour, type ColourScale, type ValueRange } from './scales.ts';

/** A slice of the disc; heights in m above the turbine's ground. */
export interface FaceSlice {
  readonly bottom: number;
  readonly top: number;
  /** Of the level that speaks for it; may lie outside the slice. */
  readonly height: number;
  /** m/s */
  readonly speed: number;
  /** degrees; NaN where not known */
  readonly direction: number;
  /** Not measured but continued by a power law: hatched. */
  readonly continued: boolean;
  /** Written beside the slice where there is room: height, speed, direction, instrument. */
  readonly label: string;
}

export interface DiscFace {
  readonly hubHeight: number;
  readonly rotorDiameter: number;
  /** From the ground up; what of the disc no slice covers stays empty. */
  readonly slices: readonly FaceSlice[];
  /** m; NaN where there is no nose, with what is written at it. */
  readonly nose: number;
  readonly noseLabel: string;
  /** Above and below these heights, m, nothing is measured: the levels nearest speak for it, which is shown. */
  readonly measuredFrom: number;
  readonly measuredTo: number;
}

/** Where the face is drawn, device pixels. */
export interface FaceBox {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

/** CSS pixels: room for what is written to the right of the disc, a line of it, and around. */
const LABELS = 216;
const LINE = 17;
const MARGIN = 10;
/** Picture above the disc, as a part of its upper tip's height. */
const HEADROOM = 1.06;

/** CSS pixels of height that the picture needs to fill a width, its labels beside it. */
export function faceHeight({ hubHeight, rotorDiameter }: DiscFace, width: number): number {
  const highest = (hubHeight + rotorDiameter / 2) * HEADROOM;
  return ((width - LABELS - MARGIN) / rotorDiameter) * highest + 2 * MARGIN;
}

/** Draws the disc on its tower, the nose as a dashed line across, and the labels to the right. */
export function drawDiscFace(
  pen: Pen,
  box: FaceBox,
  face: DiscFace,
  look: Look,
  speed: { readonly scale: ColourScale; readonly range: ValueRange },
): void {
  const { theme, ratio } = look;
  const { hubHeight, rotorDiameter } = face;
  const highest = (hubHeight + rotorDiameter / 2) * HEADROOM;
  const room = box.height - 2 * MARGIN * ratio;
  const scale = Math.min(room / highest, (box.width - (LABELS + MARGIN) * ratio) / rotorDiameter);
  const ground = box.top + MARGIN * ratio + room;
  const y = (height: number): number => ground - height * scale;
  const radius = (rotorDiameter / 2) * scale;
  const centre = box.left + radius + MARGIN * 0.5 * ratio;
  const right = centre + radius;

  pen.strokeStyle = theme.rule;
  pen.lineWidth = ratio;
  strokeLine(pen, box.left, ground, box.left + box.width, ground);
  pen.strokeStyle = theme.soft;
  pen.lineWidth = 3 * ratio;
  strokeLine(pen, centre, ground, centre, y(hubHeight));

  pen.save();
  pen.beginPath();
  pen.arc(centre, y(hubHeight), radius, 0, 2 * Math.PI);
  pen.clip();
  for (const slice of face.slices) {
    const colour = scaleColour(speed.scale, speed.range, slice.speed);
    if (colour === null) continue;
    pen.fillStyle = `rgb(${colour.join(' ')})`;
    pen.fillRect(centre - radius, y(slice.top), 2 * radius, y(slice.bottom) - y(slice.top));
  }
  const low = hubHeight - rotorDiameter / 2;
  const high = hubHeight + rotorDiameter / 2;
  hatch(pen, centre - radius, y(Math.min(high, face.measuredFrom)), 2 * radius, y(low), look);
  hatch(pen, centre - radius, y(high), 2 * radius, y(Math.max(low, face.measuredTo)), look);
  pen.restore();

  pen.strokeStyle = theme.ink;
  pen.lineWidth = 1.5 * ratio;
  pen.beginPath();
  pen.arc(centre, y(hubHeight), radius, 0, 2 * Math.PI);
  pen.stroke();
  pen.fillStyle = theme.ink;
  pen.beginPath();
  pen.arc(centre, y(hubHeight), 3 * ratio, 0, 2 * Math.PI);
  pen.fill();

  if (face.nose >= 0 && face.nose <= highest) {
    pen.lineWidth = 1.5 * ratio;
    pen.setLineDash([6 * ratio, 4 * ratio]);
    strokeLine(pen, box.left, y(face.nose), right + 6 * ratio, y(face.nose));
    pen.setLineDash([]);
    writeText(pen, look, face.noseLabel, box.left + 2 * ratio, y(face.nose) - 5 * ratio, {
      colour: theme.ink,
      rimmed: true,
    });
  }
  labelSlices(pen, face, look, { x: right + 12 * ratio, y, low, high });
}

/** Level by level, the nearest to the hub first, each where it has a line to itself. */
function labelSlices(
  pen: Pen,
  { slices, hubHeight }: DiscFace,
  look: Look,
  at: { readonly x: number; readonly y: (height: number) => number; readonly low: number; readonly high: number },
): void {
  const { theme, ratio } = look;
  const byNearness = [...slices].sort((a, b) => Math.abs(a.height - hubHeight) - Math.abs(b.height - hubHeight));
  const taken: number[] = [];
  for (const slice of byNearness) {
    const line = at.y(Math.min(at.high, Math.max(at.low, slice.height)));
    if (taken.some((other) => Math.abs(other - line) < LINE * ratio)) continue;
    taken.push(line);
    drawArrow(pen, at.x + 6 * ratio, line, slice.direction, look);
    writeText(pen, look, slice.label, at.x + 20 * ratio, line, { colour: theme.ink, baseline: 'middle' });
  }
}

/** The way the wind blows, north up. */
function drawArrow(pen: Pen, x: number, y: number, direction: number, { theme, ratio }: Look): void {
  if (Number.isNaN(direction)) return;
  pen.save();
  pen.translate(x, y);
  pen.rotate((direction * Math.PI) / 180);
  pen.strokeStyle = theme.ink;
  pen.lineWidth = 1.25 * ratio;
  pen.beginPath();
  pen.moveTo(0, -6 * ratio);
  pen.lineTo(0, 6 * ratio);
  pen.moveTo(-2.5 * ratio, 2 * ratio);
  pen.lineTo(0, 6 * ratio);
  pen.lineTo(2.5 * ratio, 2 * ratio);
  pen.stroke();
  pen.restore();
}

/** Slanting hairlines over a band, none where it has no height. */
function hatch(pen: Pen, left: number, top: number, width: number, bottom: number, { theme, ratio }: Look): void {
  if (!(bottom - top > ratio)) return;
  pen.save();
  pen.beginPath();
  pen.rect(left, top, width, bottom - top);
  pen.clip();
  pen.strokeStyle = theme.ground;
  pen.lineWidth = 1.5 * ratio;
  const step = 8 * ratio;
  for (let x = left - (bottom - top); x < left + width; x += step) {
    pen.beginPath();
    pen.moveTo(x, bottom);
    pen.lineTo(x + (bottom - top), top);
    pen.stroke();
  }
  pen.restore();
}
