// The thermodynamic diagram: thin lines of what air does when lifted, and over them the air as measured, the parcel's way up,
// and between the two the energy, hatched one way where it drives and the other way where it holds down.

import { toHeightUnit, ZERO_CELSIUS } from '../air/index.ts';
import type { InflowScene, SceneParcel } from './inflow-scene.ts';
import {
  setFont,
  strokeLine,
  tracePoints,
  within,
  writeText,
  xPixel,
  yPixel,
  type Frame,
  type Look,
  type Pen,
} from './pen.ts';
import {
  carriedDown,
  carriedUp,
  dryAdiabat,
  mixingRatioLine,
  pressureAt,
  pseudoadiabat,
  thermodynamicPoint,
  type AirLine,
} from './thermodynamic.ts';
import { valueTicks } from './ticks.ts';

/** Mixing ratios drawn, g/kg. */
const MIXING_RATIOS = [1, 2, 4, 7, 10, 14, 18, 24];
/** Temperatures at which the drawn pseudoadiabats leave the ground, °C. */
const MOIST_STARTS = [-10, 0, 10, 16, 22, 28];
const ISOTHERM_STEP = 10;
const LINE_STEPS = 40;

export function drawDiagram(pen: Pen, frame: Frame, scene: InflowScene, look: Look): void {
  drawLayers(pen, frame, scene, look);
  within(pen, frame, () => {
    drawThinLines(pen, frame, scene, look);
    if (scene.parcel !== null) drawEnergy(pen, frame, scene.parcel, look);
    drawMeasured(pen, frame, scene, look);
    if (scene.parcel !== null) drawParcel(pen, frame, scene.parcel, look);
  });
  drawAxes(pen, frame, scene, look);
  drawNames(pen, frame, scene, look);
}

/** Spans of height, faint across the diagram. */
function drawLayers(pen: Pen, frame: Frame, { layers }: InflowScene, look: Look): void {
  pen.fillStyle = look.theme.ink;
  pen.globalAlpha = 0.06;
  for (const { bottom, top } of layers) {
    if (!(top > bottom) || bottom >= frame.yHigh) continue;
    const high = yPixel(frame, Math.min(top, frame.yHigh));
    pen.fillRect(frame.left, high, frame.width, yPixel(frame, bottom) - high);
  }
  pen.globalAlpha = 1;
}

function drawThinLines(pen: Pen, frame: Frame, { air }: InflowScene, look: Look): void {
  const { theme, ratio } = look;
  const heights = Float64Array.from({ length: LINE_STEPS + 1 }, (_, k) => (k * frame.yHigh) / LINE_STEPS);
  const stroke = (line: AirLine): void => strokeAir(pen, frame, line.heightAgl, line.temperature);
  const ground = pressureAt(air, 0);
  pen.lineWidth = ratio;
  pen.strokeStyle = theme.rule;
  for (const { at } of groundTicks(frame, look)) {
    stroke(dryAdiabat(air, at * Math.pow(100_000 / ground, 2 / 7), heights));
  }
  pen.strokeStyle = theme.soft;
  pen.globalAlpha = 0.7;
  pen.setLineDash([ratio, 4 * ratio]);
  for (const temperature of isotherms(frame))
    stroke({ heightAgl: heights, temperature: heights.map(() => temperature) });
  pen.globalAlpha = 0.45;
  pen.setLineDash([8 * ratio, 5 * ratio]);
  for (const celsius of MOIST_STARTS) stroke(pseudoadiabat(air, celsius + ZERO_CELSIUS, heights));
  pen.setLineDash([2 * ratio, 3 * ratio, 6 * ratio, 3 * ratio]);
  for (const gramPerKg of MIXING_RATIOS) stroke(mixingRatioLine(air, gramPerKg / 1000, heights));
  pen.setLineDash([]);
  pen.globalAlpha = 1;
}

/** Round temperatures at the ground that fit under the frame; `at` in K. */
function groundTicks(frame: Frame, { ratio }: Look): ReturnType<typeof valueTicks> {
  return valueTicks(frame.xLow, frame.xHigh, frame.width / ratio / 52, 1, -ZERO_CELSIUS);
}

/** Temperatures, K, whose lines cross the frame. */
function isotherms(frame: Frame): number[] {
  const step = (value: number): number => Math.ceil((value - ZERO_CELSIUS) / ISOTHERM_STEP) * ISOTHERM_STEP;
  const lines: number[] = [];
  for (let c = step(carriedUp(frame.xLow, frame.yHigh)); c <= frame.xHigh - ZERO_CELSIUS; c += ISOTHERM_STEP) {
    lines.push(c + ZERO_CELSIUS);
  }
  return lines;
}

function strokeAir(pen: Pen, frame: Frame, heights: ArrayLike<number>, temperatures: ArrayLike<number>): void {
  traceAir(pen, frame, heights, temperatures);
  pen.stroke();
}

function traceAir(pen: Pen, frame: Frame, heights: ArrayLike<number>, temperatures: ArrayLike<number>): void {
  const point = (k: number): [number, number] => thermodynamicPoint(frame, temperatures[k]!, heights[k]!);
  pen.beginPath();
  tracePoints(
    pen,
    countInView(frame, heights),
    (k) => point(k)[0],
    (k) => point(k)[1],
  );
}

/** Levels up to the first above the picture: what lies beyond need not be drawn. */
function countInView(frame: Frame, heights: ArrayLike<number>): number {
  let count = 0;
  while (count < heights.length && heights[count]! <= frame.yHigh) count++;
  return Math.min(heights.length, count + 1);
}

/** Temperature whole, dew point in long strokes. */
function drawMeasured(pen: Pen, frame: Frame, { air }: InflowScene, look: Look): void {
  const { theme, ratio } = look;
  pen.lineJoin = 'round';
  pen.lineCap = 'butt';
  pen.strokeStyle = theme.ink;
  pen.lineWidth = 2.5 * ratio;
  strokeAir(pen, frame, air.heightAgl, air.temperature);
  pen.lineWidth = 2 * ratio;
  pen.setLineDash([11 * ratio, 4 * ratio]);
  strokeAir(pen, frame, air.heightAgl, air.dewPoint);
  pen.setLineDash([]);
}

function drawParcel(pen: Pen, frame: Frame, parcel: SceneParcel, look: Look): void {
  const { theme, ratio } = look;
  pen.strokeStyle = theme.ground;
  pen.lineWidth = 4 * ratio;
  strokeAir(pen, frame, parcel.heightAgl, parcel.virtualTemperature);
  pen.strokeStyle = theme.ink;
  pen.lineWidth = 1.5 * ratio;
  pen.setLineDash([3 * ratio, 3 * ratio]);
  strokeAir(pen, frame, parcel.heightAgl, parcel.virtualTemperature);
  pen.setLineDash([]);
}

/** Between the virtual temperatures, as the energies are reckoned. */
function drawEnergy(pen: Pen, frame: Frame, parcel: SceneParcel, look: Look): void {
  const { heightAgl, virtualTemperature, surroundings, lfc, el } = parcel;
  const count = countInView(frame, heightAgl);
  const top = Number.isNaN(el) ? Infinity : el;
  for (const sign of [1, -1]) {
    pen.save();
    pen.beginPath();
    for (let k = 1; k < count; k++) {
      const middle = (heightAgl[k]! + heightAgl[k - 1]!) / 2;
      // What counts: positive area above the level of free convection, negative area up to it.
      const counts = sign > 0 ? middle >= lfc && middle <= top : !(middle >= lfc);
      const excess =
        (virtualTemperature[k]! + virtualTemperature[k - 1]! - surroundings[k]! - surroundings[k - 1]!) / 2;
      if (!counts || !(excess * sign > 0)) continue;
      pen.moveTo(...thermodynamicPoint(frame, surroundings[k - 1]!, heightAgl[k - 1]!));
      pen.lineTo(...thermodynamicPoint(frame, surroundings[k]!, heightAgl[k]!));
      pen.lineTo(...thermodynamicPoint(frame, virtualTemperature[k]!, heightAgl[k]!));
      pen.lineTo(...thermodynamicPoint(frame, virtualTemperature[k - 1]!, heightAgl[k - 1]!));
      pen.closePath();
    }
    pen.clip();
    hatch(pen, frame, sign, look);
    pen.restore();
  }
}

/** Rising to the right where energy drives, falling and closer where it holds down. */
function hatch(pen: Pen, frame: Frame, sign: number, { theme, ratio }: Look): void {
  const apart = (sign > 0 ? 7 : 4.5) * ratio;
  const { left, top, width, height } = frame;
  pen.strokeStyle = theme.ink;
  pen.globalAlpha = sign > 0 ? 0.5 : 0.8;
  pen.lineWidth = ratio;
  pen.beginPath();
  for (let at = -height; at < width; at += apart) {
    const [from, to] = sign > 0 ? [top + height, top] : [top, top + height];
    pen.moveTo(left + at, from);
    pen.lineTo(left + at + height, to);
  }
  pen.stroke();
  pen.globalAlpha = 1;
}

function drawAxes(pen: Pen, frame: Frame, { air, heightUnit }: InflowScene, look: Look): void {
  const { theme, ratio } = look;
  const bottom = frame.top + frame.height;
  pen.strokeStyle = theme.rule;
  pen.lineWidth = ratio;
  strokeLine(pen, frame.left, bottom, frame.left + frame.width, bottom);
  strokeLine(pen, frame.left, frame.top, frame.left, bottom);
  for (const { at, label } of groundTicks(frame, look)) {
    writeText(pen, look, label, xPixel(frame, at), bottom + 16 * ratio, { align: 'center' });
  }
  const foot = 'temperature °C, carried to the ground';
  writeText(pen, look, foot, frame.left + frame.width / 2, bottom + 34 * ratio, { align: 'center' });
  const heights = valueTicks(0, frame.yHigh, frame.height / ratio / 52, toHeightUnit(1, heightUnit));
  for (const { at, label } of heights) {
    const y = yPixel(frame, at);
    // The pressure rides small below its height.
    const pressure = pressureAt(air, at);
    const higher = Number.isNaN(pressure) || at === 0 ? 0 : 6 * ratio;
    writeText(
      pen,
      look,
      at === heights.at(-1)!.at ? `${label} ${heightUnit}` : label,
      frame.left - 8 * ratio,
      y - higher,
      {
        align: 'right',
        baseline: 'middle',
        colour: theme.ink,
      },
    );
    if (higher === 0) continue;
    const words = `${(pressure / 100).toFixed(0)} hPa`;
    writeText(pen, look, words, frame.left - 8 * ratio, y + 7 * ratio, {
      align: 'right',
      baseline: 'middle',
      size: 11,
    });
  }
  const top = frame.top - 8 * ratio;
  // Lines of one temperature are named where they leave the picture at the top.
  let free = frame.left;
  for (const temperature of isotherms(frame)) {
    const x = xPixel(frame, carriedDown(temperature, frame.yHigh));
    if (x < free || x > frame.left + frame.width) continue;
    const celsius = Math.round(temperature - ZERO_CELSIUS);
    writeText(pen, look, `${celsius < 0 ? `−${-celsius}` : celsius} °C`, x, top, { size: 11, align: 'center' });
    free = x + 48 * ratio;
  }
}

/** Names of lines, layers and of the heights that a parcel passes. */
function drawNames(pen: Pen, frame: Frame, { air, parcel, layers }: InflowScene, look: Look): void {
  const { theme, ratio } = look;
  const right = frame.left + frame.width - 6 * ratio;
  const taken: number[] = [];
  const put = (text: string, x: number, y: number, style: Parameters<typeof writeText>[5]): void => {
    let at = Math.min(Math.max(y, frame.top + 9 * ratio), frame.top + frame.height - 9 * ratio);
    for (let turn = 0; turn < 6 && taken.some((other) => Math.abs(other - at) < 15 * ratio); turn++) at -= 15 * ratio;
    taken.push(at);
    writeText(pen, look, text, x, at, { size: 12, baseline: 'middle', rimmed: true, ...style });
  };
  if (parcel !== null) {
    const { el, lfc, lcl } = parcel;
    // Where air is free as soon as it is cloud one line tells both.
    const together = Math.abs(yPixel(frame, lfc) - yPixel(frame, lcl)) < 15 * ratio;
    const marks: [string, number][] = [
      ['equilibrium (EL)', el],
      [together ? 'condensation (LCL), free convection (LFC)' : 'free convection (LFC)', lfc],
      ['condensation (LCL)', together ? NaN : lcl],
    ];
    for (const [words, height] of marks) {
      if (Number.isNaN(height)) continue;
      const above = height > frame.yHigh;
      const y = above ? frame.top + 9 * ratio : yPixel(frame, height);
      pen.strokeStyle = theme.ink;
      pen.lineWidth = ratio;
      if (!above) strokeLine(pen, right - 14 * ratio, y, right + 6 * ratio, y);
      put(above ? `${words} above the picture` : words, above ? right : right - 18 * ratio, y, {
        align: 'right',
        colour: theme.ink,
      });
    }
  }
  for (const { name, bottom, top } of layers) {
    if (!(top > bottom) || bottom >= frame.yHigh) continue;
    const middle = (bottom + Math.min(top, frame.yHigh)) / 2;
    // A name beside a band too thin to be seen would only be in the way.
    if (yPixel(frame, bottom) - yPixel(frame, top) < 7 * ratio) continue;
    put(name, right, yPixel(frame, middle), { align: 'right' });
  }
  nameLine(pen, frame, air.heightAgl, air.temperature, 'temperature', 0.62, 'left', look);
  nameLine(pen, frame, air.heightAgl, air.dewPoint, 'dew point', 0.5, 'left', look);
  if (parcel !== null) {
    nameLine(pen, frame, parcel.heightAgl, parcel.virtualTemperature, `${parcel.name} parcel`, 0.8, 'right', look);
  }
}

/** Beside a line, at a share of the picture's height or at the line's highest level below that. */
function nameLine(
  pen: Pen,
  frame: Frame,
  heights: ArrayLike<number>,
  temperatures: ArrayLike<number>,
  name: string,
  share: number,
  side: 'left' | 'right',
  look: Look,
): void {
  let level = -1;
  for (let k = 0; k < heights.length && heights[k]! <= share * frame.yHigh; k++) {
    if (!Number.isNaN(temperatures[k]!)) level = k;
  }
  if (level < 0) return;
  const [x, y] = thermodynamicPoint(frame, temperatures[level]!, heights[level]!);
  const wide = setFont(pen, look, 12, 600).measureText(name).width + 9 * look.ratio;
  // On the side asked for where there is room.
  const fits = side === 'left' ? x - wide > frame.left : x + wide < frame.left + frame.width;
  const rightward = (side === 'right') === fits;
  const style = { colour: look.theme.ink, baseline: 'middle', rimmed: true, weight: 600, size: 12 } as const;
  writeText(pen, look, name, x + (rightward ? 8 : -8) * look.ratio, y, {
    ...style,
    align: rightward ? 'left' : 'right',
  });
}
