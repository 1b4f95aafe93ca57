// How noisy a series is, from the differences of neighbours: most pairs are sound, however wild a few gates are.

import { lengthOf, REACH, type Nodes } from './nodes.ts';
import { quantile } from './series.ts';

/** Height of a layer that gets a noise figure of its own, m. */
const LAYER = 500;
/** Layers with fewer pairs share one figure. */
const FEWEST_PAIRS = 40;
/** The quantile that is taken: low, so that a third of bad pairs does no harm. */
const QUANTILE = 0.35;
/** That quantile of the length of the difference of two vectors whose components have standard deviation 1 (Rayleigh). */
const OF_UNIT = 2 * Math.sqrt(-Math.log(1 - QUANTILE));
/**
 * Bounds of the standard deviation of a component, m/s: none is worth reading if worse, and no two ten-minute means a gate
 * apart agree better, however exact the instrument: the air is gusty, merged instruments do not see the same air, and
 * sources that fill every other time from its neighbours look smoother than they are.
 */
const LEAST = 0.6;
const MOST = 2;

/** Standard deviation of a wind component, m/s, as a function of height above ground, m. */
export function noiseOf(nodes: Nodes): (height: number) => number {
  const { count, like, u, v, height } = nodes;
  const span = 2 * REACH + 1;
  const differences = new Float64Array(count);
  const layers = new Int32Array(count);
  const pairs: number[] = [];
  let all = 0;
  for (let n = 0; n < count; n++) {
    const next = like[n * span + REACH + 1]!;
    if (next < 0) continue;
    differences[all] = lengthOf(u[next]! - u[n]!, v[next]! - v[n]!);
    const layer = Math.max(0, Math.floor(height[n]! / LAYER));
    layers[all++] = layer;
    pairs[layer] = (pairs[layer] ?? 0) + 1;
  }
  const deviation = (values: Float64Array): number => {
    const figure = quantile(values, QUANTILE) / OF_UNIT;
    return Number.isNaN(figure) ? 1 : Math.min(MOST, Math.max(LEAST, figure));
  };
  const figures = Array.from(pairs, (held: number | undefined, layer) => {
    if (held === undefined || held < FEWEST_PAIRS) return NaN;
    const own = new Float64Array(held);
    let at = 0;
    for (let k = 0; k < all; k++) if (layers[k] === layer) own[at++] = differences[k]!;
    return deviation(own);
  });
  const whole = deviation(differences.subarray(0, all));
  return (at) => {
    const figure = figures[Math.max(0, Math.floor(at / LAYER))] ?? NaN;
    return Number.isNaN(figure) ? whole : figure;
  };
}
