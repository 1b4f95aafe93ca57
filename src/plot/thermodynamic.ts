// The house's own thermodynamic diagram: height above ground is its upright axis, shared with the wind beside it, and
// temperature runs across, carried to the ground at the dry rate: T + (g/cp) z. Air that is neutral when dry stands upright,
// an inversion leans far to the right, and with height as an axis a kelvin over a kilometre is the same energy everywhere,
// about 35 J/kg. That suits the night's lowest kilometres, where a diagram by pressure squeezes what matters into a corner.

import { EPSILON, GRAVITY, HEAT_CAPACITY_DRY, KAPPA, saturationVapourPressure, ZERO_CELSIUS } from '../air/index.ts';
import { lnEquivalent, saturatedTemperature } from '../storm/index.ts';
import { yPixel, yValue, type Frame } from './pen.ts';

/** K/m by which temperature is leant: the rate at which dry air cools as it rises, g/cp. */
export const LEAN = GRAVITY / HEAT_CAPACITY_DRY;

/** Where a temperature, K, at a height, m above ground, lies across: K at the ground. */
export function carriedDown(temperature: number, height: number): number {
  return temperature + LEAN * height;
}

/** The temperature, K, at a height, m above ground, of a place across: `carriedDown` undone. */
export function carriedUp(across: number, height: number): number {
  return across - LEAN * height;
}

/** Device pixels of a temperature at a height, the frame's x in K at the ground. */
export function thermodynamicPoint(frame: Frame, temperature: number, height: number): [x: number, y: number] {
  const across = (carriedDown(temperature, height) - frame.xLow) / (frame.xHigh - frame.xLow);
  return [frame.left + across * frame.width, yPixel(frame, height)];
}

/** Temperature, K, and height, m above ground, at device pixels: `thermodynamicPoint` undone. */
export function thermodynamicValue(frame: Frame, x: number, y: number): [temperature: number, height: number] {
  const height = yValue(frame, y);
  const across = frame.xLow + ((x - frame.left) / frame.width) * (frame.xHigh - frame.xLow);
  return [carriedUp(across, height), height];
}

/** Columns that tell the pressure by height. */
export interface PressureColumns {
  /** m above ground, ascending */
  readonly heightAgl: ArrayLike<number>;
  /** Pa, falling */
  readonly pressure: ArrayLike<number>;
}

/** Pressure, Pa, at a height, m above ground: its logarithm linear between levels; NaN above them; on down to the ground. */
export function pressureAt({ heightAgl, pressure }: PressureColumns, height: number): number {
  const last = heightAgl.length - 1;
  if (last < 1 || !(height <= heightAgl[last]!)) return NaN;
  let low = 0;
  let high = last;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (heightAgl[middle]! <= height) low = middle;
    else high = middle;
  }
  const share = (height - heightAgl[low]!) / (heightAgl[high]! - heightAgl[low]!);
  return pressure[low]! * Math.pow(pressure[high]! / pressure[low]!, share);
}

/** A line of the diagram: temperatures, K, at heights, m above ground. */
export interface AirLine {
  readonly heightAgl: Float64Array;
  readonly temperature: Float64Array;
}

/** Temperature of dry air of a potential temperature (K at 1000 hPa) by height. */
export function dryAdiabat(columns: PressureColumns, theta: number, heights: Float64Array): AirLine {
  return lineOf(heights, (height) => theta * Math.pow(pressureAt(columns, height) / 100_000, KAPPA));
}

/** Temperature, K, at which air of a mixing ratio (kg/kg) is saturated, by height (Bolton 1980, eq. 10 and 11). */
export function mixingRatioLine(columns: PressureColumns, mixingRatio: number, heights: Float64Array): AirLine {
  return lineOf(heights, (height) => {
    const vapour = (mixingRatio * pressureAt(columns, height)) / (EPSILON + mixingRatio);
    const logarithm = Math.log(vapour / 611.2);
    return (243.5 * logarithm) / (17.67 - logarithm) + ZERO_CELSIUS;
  });
}

/** Temperature of saturated air that rises from the lowest height with a temperature, K, and rains out on its way. */
export function pseudoadiabat(columns: PressureColumns, temperature: number, heights: Float64Array): AirLine {
  const pressure = pressureAt(columns, heights[0]!);
  const wanted = lnEquivalent(temperature, pressure, saturationVapourPressure(temperature));
  let guess = temperature;
  return lineOf(heights, (height) => {
    const here = pressureAt(columns, height);
    if (Number.isNaN(here)) return NaN;
    guess = saturatedTemperature(wanted, here, guess);
    return guess;
  });
}

function lineOf(heightAgl: Float64Array, temperatureAt: (height: number) => number): AirLine {
  return { heightAgl, temperature: heightAgl.map(temperatureAt) };
}
