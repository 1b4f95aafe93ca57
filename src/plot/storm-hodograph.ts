// The large hodograph: where the wind goes at each height, how storms and clusters would move among it, and the air that
// streams into a storm with the motion chosen. Fitted to what it shows; the calm point need not be its middle.

import { toHeightUnit, toSpeedUnit, type HeightUnit, type SpeedUnit } from '../air/index.ts';
import type { SceneWind } from './inflow-scene.ts';
import { setFont, strokeLine, within, writeText, type Frame, type Look, type Pen } from './pen.ts';
import { scaleColour, type ColourScale, type ValueRange } from './scales.ts';

/** A motion or wind that is named on the hodograph: m/s eastward and northward. */
export interface NamedVector {
  readonly name: string;
  readonly u: number;
  readonly v: number;
  /** `arrow` from the calm point, a `dot`, or the storm's motion that a hand may move. */
  readonly mark: 'arrow' | 'dot' | 'motion';
}

export interface StormHodograph {
  readonly wind: SceneWind;
  /** m above ground: wind above this was measured earlier and is dashed. */
  readonly windTop: number;
  /** m above ground: nothing above is drawn. */
  readonly ceiling: number;
  readonly nose: { readonly height: number; readonly u: number; readonly v: number } | null;
  /** Those with a NaN are left out. */
  readonly vectors: readonly NamedVector[];
  /** m above ground: the layer whose inflow is shaded. */
  readonly shaded: { readonly bottom: number; readonly top: number } | null;
  readonly speedUnit: SpeedUnit;
  readonly heightUnit: HeightUnit;
  readonly colours: { readonly scale: ColourScale; readonly range: ValueRange };
}

/** Where winds lie, and back. */
export interface WindPlane {
  readonly point: (u: number, v: number) => [x: number, y: number];
  readonly wind: (x: number, y: number) => [u: number, v: number];
  /** Device pixels to a metre per second. */
  readonly scale: number;
}

/** Heights that are named on the line, m or ft above ground. */
const NAMED_HEIGHTS: Readonly<Record<HeightUnit, readonly number[]>> = {
  m: [500, 1000, 2000, 3000, 4000, 6000, 8000, 10_000],
  ft: [1000, 3000, 6000, 10_000, 15_000, 20_000, 30_000],
};
const LEAST_SPAN = 16;

/** Fits all that is drawn into a box of device pixels, one scale for both axes; the motion that is dragged does not move it. */
export function windPlane(
  { wind, ceiling, vectors }: StormHodograph,
  box: { readonly left: number; readonly top: number; readonly width: number; readonly height: number },
  { ratio }: Look,
): WindPlane {
  let [west, east, south, north] = [0, 0, 0, 0];
  const widen = (u: number, v: number): void => {
    if (Number.isNaN(u) || Number.isNaN(v)) return;
    [west, east, south, north] = [Math.min(west, u), Math.max(east, u), Math.min(south, v), Math.max(north, v)];
  };
  for (let k = 0; k < wind.count && wind.heightAgl[k]! <= ceiling; k++) widen(wind.u[k]!, wind.v[k]!);
  for (const { u, v, mark } of vectors) if (mark !== 'motion') widen(u, v);
  const margin = 30 * ratio;
  const spanU = Math.max(LEAST_SPAN, east - west);
  const spanV = Math.max(LEAST_SPAN, north - south);
  const scale = Math.max(0.1, Math.min((box.width - 3 * margin) / spanU, (box.height - 2 * margin) / spanV));
  const x0 = box.left + box.width / 2 - (scale * (east + west)) / 2;
  const y0 = box.top + box.height / 2 + (scale * (north + south)) / 2;
  return {
    scale,
    point: (u, v) => [x0 + scale * u, y0 - scale * v],
    wind: (x, y) => [(x - x0) / scale, (y0 - y) / scale],
  };
}

type Box = Pick<Frame, 'left' | 'top' | 'width' | 'height'>;

export function drawStormHodograph(pen: Pen, measured: StormHodograph, box: Box, look: Look): void {
  const hodograph = { ...measured, wind: calmed(measured.wind) };
  const plane = windPlane(hodograph, box, look);
  const frame = { ...box, xLow: 0, xHigh: 1, yLow: 0, yHigh: 1 };
  const words = new Words(pen, box, look);
  within(pen, frame, () => {
    drawRings(pen, hodograph, plane, box, look);
    drawShaded(pen, hodograph, plane, look);
    drawArrows(pen, hodograph, plane, look);
    drawWind(pen, hodograph, plane, look);
    nameHeights(pen, hodograph, plane, words, look);
  });
  for (const { name, u, v, mark } of hodograph.vectors) {
    if (Number.isNaN(u) || Number.isNaN(v)) continue;
    words.put(name, ...plane.point(u, v), mark === 'motion' ? 17 : 9, {
      colour: look.theme.ink,
      weight: 600,
      size: 12,
    });
  }
}

/** Above this height, m above ground, levels closer than this, m, are drawn as their mean: their noise would hide the line. */
const CALMED_FROM = 1500;
const CALMED_DEPTH = 200;

function calmed(wind: SceneWind): SceneWind {
  const columns = { heightAgl: [] as number[], u: [] as number[], v: [] as number[] };
  let k = 0;
  while (k < wind.count) {
    const from = wind.heightAgl[k]!;
    const sum = { heightAgl: 0, u: 0, v: 0 };
    let members = 0;
    do {
      for (const key of ['heightAgl', 'u', 'v'] as const) sum[key] += wind[key][k]!;
      members++;
      k++;
    } while (from >= CALMED_FROM && k < wind.count && wind.heightAgl[k]! < from + CALMED_DEPTH);
    for (const key of ['heightAgl', 'u', 'v'] as const) columns[key].push(sum[key] / members);
  }
  return { count: columns.u.length, ...columns };
}

/** Rings of speed about the calm point, named along the east; the compass says where wind goes. */
function drawRings(pen: Pen, { speedUnit }: StormHodograph, plane: WindPlane, box: Box, look: Look): void {
  const { theme, ratio } = look;
  const [x0, y0] = plane.point(0, 0);
  const shown = toSpeedUnit(1, speedUnit);
  const reach = Math.hypot(box.width, box.height) / plane.scale;
  const step = [2, 5, 10, 20, 50, 100].find((one) => (one / shown) * plane.scale >= 42 * ratio) ?? 200;
  pen.strokeStyle = theme.rule;
  pen.lineWidth = ratio;
  for (let speed = step; speed / shown < reach; speed += step) {
    const radius = (speed / shown) * plane.scale;
    pen.beginPath();
    pen.arc(x0, y0, radius, 0, 2 * Math.PI);
    pen.stroke();
    const below = { size: 11, baseline: 'top', align: 'center' } as const;
    if (x0 + radius < box.left + box.width - 12 * ratio) {
      writeText(pen, look, String(speed), x0 + radius, y0 + 3 * ratio, below);
    } else if (x0 - radius > box.left + 12 * ratio)
      writeText(pen, look, String(speed), x0 - radius, y0 + 3 * ratio, below);
  }
  strokeLine(pen, box.left, y0, box.left + box.width, y0);
  strokeLine(pen, x0, box.top, x0, box.top + box.height);
  writeText(pen, look, 'toward N', x0 + 5 * ratio, box.top + 4 * ratio, { size: 11, baseline: 'top' });
  writeText(pen, look, 'toward E', box.left + box.width - 4 * ratio, y0 - 5 * ratio, { size: 11, align: 'right' });
}

/** The area between a storm's motion and the wind of the layer that feeds it: half its helicity. */
function drawShaded(pen: Pen, { wind, shaded, vectors }: StormHodograph, plane: WindPlane, { theme }: Look): void {
  const motion = vectors.find(({ mark }) => mark === 'motion');
  if (shaded === null || motion === undefined || Number.isNaN(motion.u)) return;
  pen.beginPath();
  pen.moveTo(...plane.point(motion.u, motion.v));
  let any = false;
  for (let k = 0; k < wind.count; k++) {
    if (wind.heightAgl[k]! < shaded.bottom || wind.heightAgl[k]! > shaded.top) continue;
    pen.lineTo(...plane.point(wind.u[k]!, wind.v[k]!));
    any = true;
  }
  if (!any) return;
  pen.closePath();
  pen.globalAlpha = 0.13;
  pen.fillStyle = theme.ink;
  pen.fill();
  pen.globalAlpha = 1;
}

function drawWind(
  pen: Pen,
  { wind, windTop, ceiling, colours, nose }: StormHodograph,
  plane: WindPlane,
  look: Look,
): void {
  const { theme, ratio } = look;
  pen.lineCap = 'round';
  for (let k = 1; k < wind.count && wind.heightAgl[k]! <= ceiling; k++) {
    const own = wind.heightAgl[k]! <= windTop;
    const speed = (Math.hypot(wind.u[k]!, wind.v[k]!) + Math.hypot(wind.u[k - 1]!, wind.v[k - 1]!)) / 2;
    const colour = scaleColour(colours.scale, colours.range, speed);
    pen.strokeStyle = colour === null || !own ? theme.soft : `rgb(${colour.join(' ')})`;
    pen.lineWidth = (own ? 3.5 : 1.5) * ratio;
    pen.setLineDash(own ? [] : [4 * ratio, 4 * ratio]);
    pen.beginPath();
    pen.moveTo(...plane.point(wind.u[k - 1]!, wind.v[k - 1]!));
    pen.lineTo(...plane.point(wind.u[k]!, wind.v[k]!));
    pen.stroke();
  }
  pen.setLineDash([]);
  if (nose === null) return;
  const [x, y] = plane.point(nose.u, nose.v);
  pen.beginPath();
  pen.arc(x, y, 7 * ratio, 0, 2 * Math.PI);
  pen.strokeStyle = theme.ink;
  pen.lineWidth = 1.5 * ratio;
  pen.stroke();
}

/** Motions: arrows from the calm point, dots, and the ring of the motion chosen. */
function drawArrows(pen: Pen, { vectors }: StormHodograph, plane: WindPlane, look: Look): void {
  const { theme, ratio } = look;
  const [x0, y0] = plane.point(0, 0);
  for (const { u, v, mark } of vectors) {
    if (Number.isNaN(u) || Number.isNaN(v)) continue;
    const [x, y] = plane.point(u, v);
    pen.strokeStyle = theme.ink;
    pen.fillStyle = theme.ink;
    pen.lineWidth = 1.25 * ratio;
    if (mark === 'arrow') {
      const length = Math.hypot(x - x0, y - y0) || 1;
      const [ax, ay] = [(x - x0) / length, (y - y0) / length];
      strokeLine(pen, x0, y0, x - 6 * ratio * ax, y - 6 * ratio * ay);
      pen.beginPath();
      pen.moveTo(x, y);
      pen.lineTo(x - (9 * ax - 4 * ay) * ratio, y - (9 * ay + 4 * ax) * ratio);
      pen.lineTo(x - (9 * ax + 4 * ay) * ratio, y - (9 * ay - 4 * ax) * ratio);
      pen.closePath();
      pen.fill();
      continue;
    }
    pen.beginPath();
    pen.arc(x, y, (mark === 'dot' ? 3.5 : 8) * ratio, 0, 2 * Math.PI);
    if (mark === 'dot') pen.fill();
    else {
      pen.lineWidth = 2.5 * ratio;
      pen.stroke();
      strokeLine(pen, x - 12 * ratio, y, x + 12 * ratio, y);
      strokeLine(pen, x, y - 12 * ratio, x, y + 12 * ratio);
    }
  }
}

function nameHeights(
  pen: Pen,
  { wind, ceiling, heightUnit, nose }: StormHodograph,
  plane: WindPlane,
  words: Words,
  look: Look,
): void {
  const { theme, ratio } = look;
  if (nose !== null)
    words.put('nose', ...plane.point(nose.u, nose.v), 11, { colour: theme.ink, weight: 600, size: 12 });
  for (const named of NAMED_HEIGHTS[heightUnit]) {
    const height = named / toHeightUnit(1, heightUnit);
    if (height > ceiling) break;
    const at = windAtHeight(wind, height);
    if (at === null) continue;
    const [x, y] = plane.point(...at);
    pen.beginPath();
    pen.arc(x, y, 3 * ratio, 0, 2 * Math.PI);
    pen.fillStyle = theme.ground;
    pen.fill();
    pen.strokeStyle = theme.ink;
    pen.lineWidth = 1.25 * ratio;
    pen.stroke();
    const text = heightUnit === 'm' ? (named < 1000 ? `${named} m` : `${named / 1000} km`) : `${named} ft`;
    words.put(text, x, y, 6, { size: 11 });
  }
}

/** Linear in height; null outside the levels. */
export function windAtHeight({ count, heightAgl, u, v }: SceneWind, height: number): [u: number, v: number] | null {
  if (count === 0 || !(height >= heightAgl[0]!) || !(height <= heightAgl[count - 1]!)) return null;
  let k = 0;
  while (k + 1 < count && heightAgl[k + 1]! < height) k++;
  if (k + 1 >= count) return [u[k]!, v[k]!];
  const share = (height - heightAgl[k]!) / (heightAgl[k + 1]! - heightAgl[k]!);
  return [u[k]! + share * (u[k + 1]! - u[k]!), v[k]! + share * (v[k + 1]! - v[k]!)];
}

/** The wind at the cursor's height, on a clear canvas over the hodograph. */
export function drawHodographCursor(
  pen: Pen,
  plane: WindPlane,
  wind: readonly [number, number],
  { theme, ratio }: Look,
): void {
  const [x, y] = plane.point(...wind);
  pen.beginPath();
  pen.arc(x, y, 5 * ratio, 0, 2 * Math.PI);
  pen.fillStyle = theme.ground;
  pen.fill();
  pen.strokeStyle = theme.ink;
  pen.lineWidth = 2 * ratio;
  pen.stroke();
}

/** Writes beside points so that no words cover others. */
class Words {
  readonly #pen: Pen;
  readonly #box: Box;
  readonly #look: Look;
  readonly #taken: { left: number; top: number; right: number; bottom: number }[] = [];

  constructor(pen: Pen, box: Box, look: Look) {
    this.#pen = pen;
    this.#box = box;
    this.#look = look;
  }

  /** @param clear CSS pixels between point and text */
  put(
    text: string,
    x: number,
    y: number,
    clear: number,
    style: { size: number; weight?: number; colour?: string },
  ): void {
    const { ratio } = this.#look;
    const wide = setFont(this.#pen, this.#look, style.size, style.weight).measureText(text).width;
    const high = style.size * ratio;
    const off = clear * ratio;
    const places: [number, number][] = [
      [x + off, y],
      [x - off - wide, y],
      [x - wide / 2, y - off - high / 2],
      [x - wide / 2, y + off + high / 2],
      [x + 0.7 * off, y - 0.7 * off - high / 2],
      [x + 0.7 * off, y + 0.7 * off + high / 2],
      [x - 0.7 * off - wide, y - 0.7 * off - high / 2],
      [x - 0.7 * off - wide, y + 0.7 * off + high / 2],
      [x + off, y - 1.4 * high],
      [x + off, y + 1.4 * high],
    ];
    const boxes = places.map(([left, middle]) => ({
      left,
      right: left + wide,
      top: middle - 0.6 * high,
      bottom: middle + 0.6 * high,
    }));
    const { left, top, width, height } = this.#box;
    const free = boxes.findIndex(
      (one) =>
        one.left >= left &&
        one.right <= left + width &&
        one.top >= top &&
        one.bottom <= top + height &&
        !this.#taken.some(
          (other) =>
            one.left < other.right && one.right > other.left && one.top < other.bottom && one.bottom > other.top,
        ),
    );
    const index = Math.max(0, free);
    this.#taken.push(boxes[index]!);
    writeText(this.#pen, this.#look, text, places[index]![0], places[index]![1], {
      baseline: 'middle',
      rimmed: true,
      ...style,
    });
  }
}
