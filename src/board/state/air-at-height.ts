// The values of air, parcel and wind at one height of the inflow's picture.

import { directionOf, speedOf } from '../../air/index.ts';
import type { DrawnTrace, InflowState } from '../../desk/index.ts';
import { pressureAt, windAtHeight } from '../../plot/index.ts';
import type { AirAtHeight } from '../words/inflow.ts';

export function airAtHeight(
  { columns, hodograph }: InflowState,
  trace: DrawnTrace | undefined,
  height: number,
): AirAtHeight {
  const wind = windAtHeight(hodograph, height);
  const [u, v] = wind ?? [NaN, NaN];
  const air = (values: Float64Array): number => between(columns.heightAgl, values, height);
  const parcel = (values: Float64Array | undefined): number =>
    trace === undefined || values === undefined ? NaN : between(trace.heightAgl, values, height);
  const { heightAgl } = columns;
  return {
    height,
    pressure: height >= (heightAgl[0] ?? Infinity) - GROUND ? pressureAt(columns, height) : NaN,
    temperature: air(columns.temperature),
    dewPoint: air(columns.dewPoint),
    parcel: parcel(trace?.temperature),
    parcelVirtual: parcel(trace?.virtualTemperature),
    speed: speedOf(u, v),
    direction: directionOf(u, v),
  };
}

/** So far below its lowest level a pressure may be carried on, m. */
const GROUND = 50;

/** Linear between ascending heights; NaN outside them. */
function between(heights: Float64Array, values: Float64Array, height: number): number {
  const last = heights.length - 1;
  if (last < 0 || !(height >= heights[0]!) || !(height <= heights[last]!)) return NaN;
  let k = 0;
  while (k + 1 < last && heights[k + 1]! < height) k++;
  if (last === 0) return values[0]!;
  const share = (height - heights[k]!) / (heights[k + 1]! - heights[k]!);
  return values[k]! + share * (values[k + 1]! - values[k]!);
}
