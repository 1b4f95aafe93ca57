// The hodograph: the wind at each height as a point, eastward across and northward up, joined from the ground upward.

import { eastward, northward, toSpeedUnit, type SpeedUnit } from '../air/index.ts';
import { REJECTING, type Profile } from '../profile/index.ts';
import { tracePoints, writeText, type Look, type Pen } from './pen.ts';

/** A path of winds through time at one height or along the nose; NaN breaks it. */
export interface WindPath {
  /** m/s */
  readonly speed: ArrayLike<number>;
  /** degrees, from */
  readonly direction: ArrayLike<number>;
}

export interface HodographData {
  /** Only levels up to `ceiling` are drawn. */
  readonly profile: Profile | null;
  /** m above ground */
  readonly ceiling: number;
  /** The nose since dusk, drawn thin. */
  readonly trail?: WindPath | null;
  /** Fitted turning about an equilibrium wind, drawn dashed. */
  readonly turning?: WindPath | null;
  /** The nose now, ringed. */
  readonly nose?: { readonly speed: number; readonly direction: number } | null;
}

export interface HodographPlace {
  /** Device pixels of the middle and of the outer ring. */
  readonly x: number;
  readonly y: number;
  readonly radius: number;
  readonly unit: SpeedUnit;
  /** Wind at the outer ring in the reader's unit; fitted to the data unless given. */
  readonly outer?: number;
}

/** Speeds, in the reader's unit, that the rings stand at; the last is the outer one. */
function hodographRings(fastest: number, unit: SpeedUnit): number[] {
  const shown = toSpeedUnit(fastest, unit);
  const step = [2, 5, 10, 20, 50].find((candidate) => shown <= 5 * candidate) ?? 100;
  const count = Math.max(2, Math.ceil(shown / step - 1e-9));
  return Array.from({ length: count }, (_, k) => (k + 1) * step);
}

/** Where winds lie on a hodograph, for what is laid over it, such as the wind under the cursor. */
export interface HodographScale {
  /** Speeds of the rings in the reader's unit; the last is the outer one. */
  readonly rings: readonly number[];
  /** Device pixels of a wind: m/s and degrees it comes from. */
  readonly point: (speed: number, direction: number) => [x: number, y: number];
}

export function hodographScale(data: HodographData, place: HodographPlace): HodographScale {
  const winds = data.profile === null ? [] : windsOf(data.profile, data.ceiling);
  const rings = ringsFor(data, winds, place);
  const scale = place.radius / rings[rings.length - 1]!;
  return {
    rings,
    point: (speed, direction) => {
      const shown = toSpeedUnit(speed, place.unit) * scale;
      return [place.x + eastward(shown, direction), place.y - northward(shown, direction)];
    },
  };
}

export function drawHodograph(pen: Pen, data: HodographData, place: HodographPlace, look: Look): void {
  const { theme, ratio } = look;
  const winds = data.profile === null ? [] : windsOf(data.profile, data.ceiling);
  const { rings, point } = hodographScale(data, place);
  drawRings(pen, rings, place, look);
  if (data.trail !== null && data.trail !== undefined) {
    strokePath(pen, data.trail, point, theme.soft, ratio);
  }
  if (data.turning !== null && data.turning !== undefined) {
    pen.setLineDash([5 * ratio, 4 * ratio]);
    strokePath(pen, data.turning, point, theme.ink, ratio);
  }
  pen.setLineDash([]);
  drawWinds(pen, winds, data.ceiling, point, look);
  if (data.nose !== null && data.nose !== undefined) {
    const [x, y] = point(data.nose.speed, data.nose.direction);
    pen.beginPath();
    pen.arc(x, y, 4 * ratio, 0, 2 * Math.PI);
    pen.fillStyle = theme.ink;
    pen.fill();
    pen.lineWidth = 1.5 * ratio;
    pen.strokeStyle = theme.ground;
    pen.stroke();
  }
}

interface LevelWind {
  readonly height: number;
  readonly speed: number;
  readonly direction: number;
}

function windsOf({ levelCount, heightAgl, speed, direction, mark }: Profile, ceiling: number): LevelWind[] {
  const winds: LevelWind[] = [];
  for (let k = 0; k < levelCount; k++) {
    const known = !Number.isNaN(speed[k]!) && (speed[k] === 0 || !Number.isNaN(direction[k]!));
    if (!known || (mark[k]! & REJECTING) !== 0 || !(heightAgl[k]! <= ceiling)) continue;
    winds.push({ height: heightAgl[k]!, speed: speed[k]!, direction: direction[k]! });
  }
  return winds;
}

function ringsFor(data: HodographData, winds: readonly LevelWind[], { outer, unit }: HodographPlace): number[] {
  if (outer !== undefined) return [outer / 3, (2 * outer) / 3, outer];
  const speeds = winds.map((wind) => wind.speed);
  for (const path of [data.trail, data.turning]) speeds.push(...Array.from(path?.speed ?? []));
  return hodographRings(Math.max(4, ...speeds.filter((speed) => !Number.isNaN(speed))), unit);
}

function drawRings(pen: Pen, rings: readonly number[], { x, y, radius }: HodographPlace, look: Look): void {
  const { theme, ratio } = look;
  const outer = rings[rings.length - 1]!;
  pen.beginPath();
  pen.arc(x, y, radius, 0, 2 * Math.PI);
  pen.fillStyle = theme.ground;
  pen.globalAlpha = 0.82;
  pen.fill();
  pen.globalAlpha = 1;
  pen.strokeStyle = theme.rule;
  pen.lineWidth = ratio;
  for (const ring of rings) {
    pen.beginPath();
    pen.arc(x, y, (ring / outer) * radius, 0, 2 * Math.PI);
    pen.stroke();
  }
  pen.beginPath();
  pen.moveTo(x - radius, y);
  pen.lineTo(x + radius, y);
  pen.moveTo(x, y - radius);
  pen.lineTo(x, y + radius);
  pen.stroke();
  // A wind toward the north comes from the south: the rim says where from, as everything else on the page does.
  const rim = radius - 4 * ratio;
  const style = { size: 11, rimmed: true } as const;
  writeText(pen, look, 'from S', x - 4 * ratio, y - rim, { ...style, align: 'right', baseline: 'top' });
  writeText(pen, look, 'from N', x - 4 * ratio, y + rim, { ...style, align: 'right' });
  writeText(pen, look, String(outer), x + rim, y - 3 * ratio, { ...style, align: 'right' });
}

function strokePath(
  pen: Pen,
  path: WindPath,
  point: (speed: number, direction: number) => [number, number],
  colour: string,
  width: number,
): void {
  const points = Array.from(path.speed, (speed, k) => point(speed, path.direction[k]!));
  pen.strokeStyle = colour;
  pen.lineWidth = width;
  pen.beginPath();
  tracePoints(
    pen,
    points.length,
    (k) => points[k]![0],
    (k) => points[k]![1],
  );
  pen.stroke();
}

/** Bold at the ground and fainter upward, so that the way up is seen. */
function drawWinds(
  pen: Pen,
  winds: readonly LevelWind[],
  ceiling: number,
  point: (speed: number, direction: number) => [number, number],
  { theme, ratio }: Look,
): void {
  pen.strokeStyle = theme.ink;
  pen.lineCap = 'round';
  for (let k = 1; k < winds.length; k++) {
    const from = winds[k - 1]!;
    const to = winds[k]!;
    const up = Math.min(1, (from.height + to.height) / 2 / ceiling);
    pen.globalAlpha = 1 - 0.6 * up;
    pen.lineWidth = (2.5 - 1.25 * up) * ratio;
    pen.beginPath();
    pen.moveTo(...point(from.speed, from.direction));
    pen.lineTo(...point(to.speed, to.direction));
    pen.stroke();
  }
  pen.globalAlpha = 1;
}
