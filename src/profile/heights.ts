// Heights for levels that came with a pressure only.

import { GAS_CONSTANT_DRY, GRAVITY, virtualTemperature } from '../air/index.ts';

/** Columns of one profile in any order; NaN missing. Heights of any one datum, m; pressure Pa; K; kg/kg. */
export interface HeightInput {
  readonly height: ArrayLike<number>;
  readonly pressure: ArrayLike<number>;
  readonly temperature?: ArrayLike<number> | undefined;
  readonly specificHumidity?: ArrayLike<number> | undefined;
}

/** Beyond the outermost known height, levels without a temperature of their own are placed only so far away, m. */
const FARTHEST_WITHOUT_TEMPERATURE = 500;
/** Stands for the temperature of a profile that has none, K: between two known heights only ratios matter. */
const ANY_TEMPERATURE = 260;

/**
 * The heights with the missing ones worked out hydrostatically: between two known heights the thickness is shared out in
 * the proportion of the hypsometric equation (WMO-No. 8, Part I, chapter 12), temperature linear in the logarithm of
 * pressure; beyond the outermost known heights by the equation itself, where the temperature is known.
 * @returns a new column; NaN where a level has no pressure or nothing to hold on to
 */
export function withHeights(input: HeightInput): Float64Array {
  const height = Float64Array.from(input.height);
  const { pressure } = input;
  const order = [...height.keys()].filter((k) => pressure[k]! > 0);
  const known = order.filter((k) => Number.isFinite(height[k]!));
  if (known.length === 0 || known.length === order.length) return height;
  order.sort((a, b) => pressure[b]! - pressure[a]! || a - b);

  const temperatures = temperaturesAlong(input, order);
  const hasTemperature = temperatures !== null;
  /** Height of each level above the lowest by the hypsometric equation alone, in the order of pressure. */
  const thickness = new Float64Array(order.length);
  for (let i = 1; i < order.length; i++) {
    const mean = hasTemperature ? (temperatures[i]! + temperatures[i - 1]!) / 2 : ANY_TEMPERATURE;
    const layer = Math.log(pressure[order[i - 1]!]! / pressure[order[i]!]!);
    thickness[i] = thickness[i - 1]! + (GAS_CONSTANT_DRY / GRAVITY) * mean * layer;
  }

  let below = -1;
  for (let i = 0; i < order.length; i++) {
    if (!Number.isFinite(input.height[order[i]!]!)) continue;
    for (let m = below + 1; m < i; m++) {
      height[order[m]!] = below < 0 ? beyond(m, i) : between(below, m, i);
    }
    below = i;
  }
  for (let m = below + 1; m < order.length; m++) height[order[m]!] = beyond(m, below);
  return height;

  function between(low: number, m: number, high: number): number {
    const [zLow, zHigh] = [height[order[low]!]!, height[order[high]!]!];
    const whole = thickness[high]! - thickness[low]!;
    // Heights that fall while the pressure falls are no hold.
    if (!(zHigh >= zLow)) return NaN;
    return whole > 0 ? zLow + ((zHigh - zLow) * (thickness[m]! - thickness[low]!)) / whole : zLow;
  }

  function beyond(m: number, from: number): number {
    const step = thickness[m]! - thickness[from]!;
    const own = Number.isFinite(input.temperature?.[order[m]!] ?? NaN);
    const placed = hasTemperature && (own || Math.abs(step) <= FARTHEST_WITHOUT_TEMPERATURE);
    return placed ? height[order[from]!]! + step : NaN;
  }
}

/** Virtual temperature at each level of the order, filled linearly in ln p and outward with the last one; null: none known. */
function temperaturesAlong(input: HeightInput, order: readonly number[]): Float64Array | null {
  const values = Float64Array.from(order, (k) => {
    const temperature = input.temperature?.[k] ?? NaN;
    const humidity = input.specificHumidity?.[k] ?? NaN;
    return Number.isNaN(humidity) ? temperature : virtualTemperature(temperature, humidity);
  });
  const logarithm = order.map((k) => Math.log(input.pressure[k]!));
  let below = -1;
  for (let i = 0; i < values.length; i++) {
    if (Number.isNaN(values[i]!)) continue;
    for (let m = below + 1; m < i; m++) {
      if (below < 0) values[m] = values[i]!;
      else {
        const share = (logarithm[below]! - logarithm[m]!) / (logarithm[below]! - logarithm[i]!);
        values[m] = values[below]! + (values[i]! - values[below]!) * (Number.isFinite(share) ? share : 0);
      }
    }
    below = i;
  }
  if (below < 0) return null;
  values.fill(values[below]!, below + 1);
  return values;
}
