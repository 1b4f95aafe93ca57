// Heights of an ascent's levels: lost thousands restored, what has only a pressure placed by the weight of the air.

import {
  GAS_CONSTANT_DRY,
  GRAVITY,
  specificHumidityOfDewPoint,
  standardHeight,
  virtualTemperature,
} from '../../air/index.ts';
import { withHeights, type LevelInput } from '../../profile/index.ts';
import type { CodedLevel } from './levels.ts';

/** An ascent's levels as a profile takes them, and where the ground was taken to be. */
export interface PlacedLevels {
  readonly levels: LevelInput;
  /** m above sea level; NaN where heights are relative to sea level for want of any ground. */
  readonly ground: number;
  readonly groundFrom: 'station' | 'surface level' | 'lowest level' | 'nothing';
  /** Some levels with a pressure alone had no temperatures to be placed by. */
  readonly byStandard: boolean;
}

/**
 * Places the levels.
 * @param coded by falling pressure, then by height
 * @param elevation of the station, m; NaN where not known
 */
export function placeLevels(coded: readonly CodedLevel[], elevation: number): PlacedLevels {
  const humidity = Float64Array.from(coded, (level) => specificHumidityOfDewPoint(level.dewPoint, level.pressure));
  const pressure = Float64Array.from(coded, (level) => level.pressure);
  const temperature = Float64Array.from(coded, (level) => level.temperature);
  const known = fullHeights(coded, humidity, elevation);
  const surfaceAt = surfaceOf(coded, elevation);
  if (surfaceAt >= 0 && Number.isFinite(elevation)) known[surfaceAt] = elevation;

  const heights = withHeights({ height: known, pressure, temperature, specificHumidity: humidity });
  let byStandard = false;
  for (const [k, level] of coded.entries()) {
    if (!Number.isNaN(heights[k]!) || Number.isNaN(level.pressure)) continue;
    heights[k] = standardHeight(level.pressure);
    byStandard = true;
  }

  const surfacePressure = surfaceAt < 0 ? NaN : pressure[surfaceAt]!;
  const order = [...coded.keys()]
    // Standard surfaces below the ground carry a height only; the first balloon heights may lie below it too.
    .filter((k) => !Number.isNaN(temperature[k]!) || !Number.isNaN(coded[k]!.speed))
    .filter((k) => k === surfaceAt || !(pressure[k]! > surfacePressure))
    .filter((k) => k === surfaceAt || !isSurfaceHeight(coded[k]!, elevation))
    .sort((a, b) => orLast(heights[a]!) - orLast(heights[b]!) || Number(b === surfaceAt) - Number(a === surfaceAt));
  const { ground, groundFrom } = groundOf(heights, order, surfaceAt, elevation);
  const from = Number.isNaN(ground) ? 0 : ground;
  const pick = (values: ArrayLike<number>): Float64Array => Float64Array.from(order, (k) => values[k]!);
  return {
    ground,
    groundFrom,
    byStandard,
    levels: {
      heightAgl: Float64Array.from(order, (k) => heights[k]! - from),
      pressure: pick(pressure),
      temperature: pick(temperature),
      specificHumidity: pick(humidity),
      speed: Float64Array.from(order, (k) => coded[k]!.speed),
      direction: Float64Array.from(order, (k) => coded[k]!.direction),
    },
  };
}

/**
 * Heights above sea level where the code gives them, with the thousands that it leaves out: of all heights that the
 * figures can mean the one next to where the weight of the air below puts the surface.
 */
function fullHeights(coded: readonly CodedLevel[], humidity: Float64Array, elevation: number): Float64Array {
  const heights = Float64Array.from(coded, (level) => level.height);
  let below = -1;
  let belowHeight = NaN;
  coded.forEach((level, k) => {
    let height = heights[k]!;
    const expected = below < 0 ? standardHeight(level.pressure) : belowHeight + thickness(coded, humidity, below, k);
    if (!Number.isNaN(level.shortHeight)) {
      height = level.shortHeight + level.cycle * Math.round((expected - level.shortHeight) / level.cycle);
      heights[k] = height;
    } else if (level.surface && Number.isNaN(height)) height = elevation;
    if (Number.isNaN(height) || Number.isNaN(level.pressure)) return;
    below = k;
    belowHeight = height;
  });
  return heights;
}

/** Thickness of the layer between two levels by all temperatures in it; the standard atmosphere's without any. */
function thickness(coded: readonly CodedLevel[], humidity: Float64Array, from: number, to: number): number {
  const warm: { logarithm: number; temperature: number }[] = [];
  for (let k = from; k <= to; k++) {
    const { temperature, pressure } = coded[k]!;
    if (Number.isNaN(temperature) || Number.isNaN(pressure)) continue;
    const moist = Number.isNaN(humidity[k]!) ? temperature : virtualTemperature(temperature, humidity[k]!);
    warm.push({ logarithm: Math.log(pressure), temperature: moist });
  }
  const [low, high] = [coded[from]!.pressure, coded[to]!.pressure];
  if (warm.length === 0) return standardHeight(high) - standardHeight(low);
  let sum = 0;
  let weight = 0;
  for (let k = 1; k < warm.length; k++) {
    const step = warm[k - 1]!.logarithm - warm[k]!.logarithm;
    sum += (step * (warm[k]!.temperature + warm[k - 1]!.temperature)) / 2;
    weight += step;
  }
  const mean = weight > 0 ? sum / weight : warm[0]!.temperature;
  return (GAS_CONSTANT_DRY / GRAVITY) * mean * Math.log(low / high);
}

/** Place of the surface level; of a balloon's heights the one that can only mean the ground. None: -1. */
function surfaceOf(coded: readonly CodedLevel[], elevation: number): number {
  const named = coded.findIndex((level) => level.surface);
  return named >= 0 ? named : coded.findIndex((level) => isSurfaceHeight(level, elevation));
}

/** Heights come in steps of 300 m or more: the step next to the ground is the ground. */
function isSurfaceHeight(level: CodedLevel, elevation: number): boolean {
  return Number.isNaN(level.pressure) && level.height <= elevation + 150;
}

function groundOf(
  heights: Float64Array,
  order: readonly number[],
  surfaceAt: number,
  elevation: number,
): Pick<PlacedLevels, 'ground' | 'groundFrom'> {
  if (Number.isFinite(elevation)) return { ground: elevation, groundFrom: 'station' };
  const surface = surfaceAt < 0 ? NaN : heights[surfaceAt]!;
  if (Number.isFinite(surface)) return { ground: surface, groundFrom: 'surface level' };
  const lowest = order.map((k) => heights[k]!).find((height) => Number.isFinite(height));
  return lowest === undefined ? { ground: NaN, groundFrom: 'nothing' } : { ground: lowest, groundFrom: 'lowest level' };
}

function orLast(height: number): number {
  return Number.isNaN(height) ? Infinity : height;
}
