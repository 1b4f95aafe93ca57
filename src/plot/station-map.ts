// A small plain map of a few stations: north up, true to scale, the wind at each as a barb.

import { directionOf, EARTH_RADIUS, signedAngle, speedOf, type SpeedUnit } from '../air/index.ts';
import { drawBarb } from './barbs.ts';
import { setFont, strokeLine, writeText, type Look, type Pen } from './pen.ts';

export interface MapStation {
  readonly name: string;
  /** degrees */
  readonly latitude: number;
  readonly longitude: number;
  /** m/s, eastward and northward; NaN where there is no wind. */
  readonly u: number;
  readonly v: number;
}

export interface StationMap {
  readonly stations: readonly MapStation[];
  /** Written in the middle, a line each. */
  readonly words: readonly string[];
  readonly speedUnit: SpeedUnit;
}

/** Device pixels of the whole map. */
export interface MapPlace {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

/** CSS pixels round the stations: barbs and names stand there. */
const MARGIN = { side: 64, top: 46, bottom: 58 };
const BARB = 34;
/** A map no wider than this, m, is drawn as if it were: stations on one spot would have no scale. */
const LEAST_SPAN = 1000;

/** Draws the stations that have a position. */
export function drawStationMap(pen: Pen, map: StationMap, place: MapPlace, look: Look): void {
  const { theme, ratio } = look;
  const stations = map.stations.filter(({ latitude, longitude }) => Number.isFinite(latitude + longitude));
  if (stations.length === 0) {
    writeText(pen, look, 'no station has a position', place.left + place.width / 2, place.top + place.height / 2, {
      align: 'center',
    });
    return;
  }
  const { points, pixelsPerMetre, middle } = laidOut(stations, place, ratio);
  pen.strokeStyle = theme.rule;
  pen.lineWidth = ratio;
  pen.beginPath();
  for (const k of aroundMiddle(points)) pen.lineTo(points[k]!.x, points[k]!.y);
  pen.closePath();
  pen.stroke();
  map.words.forEach((line, k) => {
    const y = middle.y + (k - (map.words.length - 1) / 2) * 18 * ratio;
    const style = {
      align: 'center',
      baseline: 'middle',
      rimmed: true,
      colour: k === 0 ? theme.ink : theme.soft,
    } as const;
    writeText(pen, look, line, middle.x, y, { ...style, weight: k === 0 ? 600 : 400 });
  });
  stations.forEach((station, k) => drawStation(pen, station, points[k]!, map.speedUnit, place, look));
  drawScaleBar(pen, place, pixelsPerMetre, look);
  drawNorth(pen, place, look);
}

interface Spot {
  readonly x: number;
  readonly y: number;
}

/** Equidistant about the middle: good to a per cent within a few hundred kilometres. */
function laidOut(
  stations: readonly MapStation[],
  { left, top, width, height }: MapPlace,
  ratio: number,
): { points: Spot[]; pixelsPerMetre: number; middle: Spot } {
  const degree = (EARTH_RADIUS * Math.PI) / 180;
  const meanLatitude = stations.reduce((sum, { latitude }) => sum + latitude, 0) / stations.length;
  const first = stations[0]!;
  const east = stations.map(
    ({ longitude }) => degree * Math.cos((meanLatitude * Math.PI) / 180) * signedAngle(longitude - first.longitude),
  );
  const north = stations.map(({ latitude }) => degree * (latitude - first.latitude));
  const [west, south] = [Math.min(...east), Math.min(...north)];
  const [wide, high] = [Math.max(...east) - west, Math.max(...north) - south];
  const room = {
    width: width - 2 * MARGIN.side * ratio,
    height: height - (MARGIN.top + MARGIN.bottom) * ratio,
  };
  const pixelsPerMetre = Math.min(room.width / Math.max(wide, LEAST_SPAN), room.height / Math.max(high, LEAST_SPAN));
  const x0 = left + MARGIN.side * ratio + (room.width - wide * pixelsPerMetre) / 2;
  const y0 = top + MARGIN.top * ratio + (room.height + high * pixelsPerMetre) / 2;
  const points = east.map((x, k) => ({
    x: x0 + (x - west) * pixelsPerMetre,
    y: y0 - (north[k]! - south) * pixelsPerMetre,
  }));
  const mean = (of: (spot: Spot) => number): number => points.reduce((sum, spot) => sum + of(spot), 0) / points.length;
  return { points, pixelsPerMetre, middle: { x: mean(({ x }) => x), y: mean(({ y }) => y) } };
}

/** The stations' order round their middle, so that the outline does not cross itself. */
function aroundMiddle(points: readonly Spot[]): number[] {
  const x = points.reduce((sum, point) => sum + point.x, 0) / points.length;
  const y = points.reduce((sum, point) => sum + point.y, 0) / points.length;
  const angle = (k: number): number => Math.atan2(points[k]!.y - y, points[k]!.x - x);
  return [...points.keys()].sort((a, b) => angle(a) - angle(b));
}

function drawStation(
  pen: Pen,
  { name, latitude, u, v }: MapStation,
  { x, y }: Spot,
  unit: SpeedUnit,
  place: MapPlace,
  look: Look,
): void {
  const { theme, ratio } = look;
  const speed = speedOf(u, v);
  const hemisphere = latitude < 0 ? 'south' : 'north';
  drawBarb(pen, x, y, speed, directionOf(u, v), look, { hemisphere, unit, length: BARB });
  pen.fillStyle = theme.ink;
  pen.beginPath();
  pen.arc(x, y, 3.5 * ratio, 0, 2 * Math.PI);
  pen.fill();
  // The shaft points to where the wind comes from; the name stands on the other side.
  const above = !(v < 0);
  const wide = setFont(pen, look, 13, 600).measureText(name).width / 2;
  const within = Math.min(Math.max(x, place.left + wide), place.left + place.width - wide);
  const line = (text: string, row: number, colour: string, weight: number): void =>
    writeText(pen, look, text, within, y + (above ? -12 - 16 * (1 - row) : 24 + 16 * row) * ratio, {
      align: 'center',
      colour,
      weight,
      rimmed: true,
    });
  line(name, 0, theme.ink, 600);
  if (Number.isNaN(speed)) line('no wind here', 1, theme.soft, 400);
}

/** The longest round length that fits a third of the width. */
function drawScaleBar(pen: Pen, place: MapPlace, pixelsPerMetre: number, look: Look): void {
  const { theme, ratio } = look;
  const longest = place.width / 3 / pixelsPerMetre;
  const decade = 10 ** Math.floor(Math.log10(longest));
  const metres = decade * ([5, 2].find((step) => step * decade <= longest) ?? 1);
  const [x, y] = [place.left + 8 * ratio, place.top + place.height - 10 * ratio];
  const end = x + metres * pixelsPerMetre;
  pen.strokeStyle = theme.soft;
  pen.lineWidth = ratio;
  strokeLine(pen, x, y, end, y);
  strokeLine(pen, x, y - 4 * ratio, x, y);
  strokeLine(pen, end, y - 4 * ratio, end, y);
  const words = metres >= 1000 ? `${metres / 1000} km` : `${metres} m`;
  writeText(pen, look, words, (x + end) / 2, y - 7 * ratio, { size: 12, align: 'center' });
}

function drawNorth(pen: Pen, place: MapPlace, look: Look): void {
  const { theme, ratio } = look;
  const [x, y] = [place.left + place.width - 14 * ratio, place.top + place.height - 10 * ratio];
  pen.strokeStyle = theme.soft;
  pen.lineWidth = ratio;
  strokeLine(pen, x, y, x, y - 22 * ratio);
  writeText(pen, look, 'N', x, y - 27 * ratio, { size: 12, align: 'center' });
}
