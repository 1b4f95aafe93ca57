// Soundings: the sonde swings below its balloon, and a balloon that stalls measures one height again and again. A sonde on a
// line of length L swings with period 2 pi sqrt(L/g), 11 to 15 s for 30 to 55 m, which at 5 m/s of ascent shows as waves of 50
// to 80 m in height (pendulum law; WMO-No. 8 asks for filtering). The limits are common practice, without source.

import { eastward, northward } from '../air/index.ts';
import { INSTRUMENTS, MARK, type Instrument, type ProfileBlock } from '../profile/index.ts';
import { median, type Screened } from './series.ts';

const SONDES: ReadonlySet<Instrument> = new Set<Instrument>(['radiosonde', 'dropsonde', 'pilot-balloon']);
/** Levels farther apart on average cannot show the swing, m. */
const WIDEST_SPACING = 15;
/** Half the height over which the swing averages out, m. */
const HALF_WAVE = 40;
/** Layer for which the swing is measured, half of it, m. */
const HALF_LAYER = 150;
/** Root of the mean square of what the average leaves, m/s. */
const SWINGING = 1.5;
const FEWEST_LEVELS = 30;
/** A stall: so many levels within this part of their usual height. */
const STALL_LEVELS = 10;
const STALL_PART = 0.2;

/** Adds `pendulum` to levels in layers where the wind swings faster than air does, and where the balloon stalls. */
export function pendulum({ block }: Screened, marks: Uint32Array): void {
  for (let i = 0; i < block.profileCount; i++) {
    if (!SONDES.has(INSTRUMENTS[block.instrumentIndex[i]!]!)) continue;
    const levels = placedLevels(block, i);
    if (levels.length < FEWEST_LEVELS) continue;
    const height = levels.map((k) => block.heightAgl[k]!);
    const spacing = median(height.slice(1).map((z, m) => z - height[m]!));
    for (const m of stalled(height, spacing)) marks[levels[m]!]! |= MARK.pendulum;
    if (spacing > WIDEST_SPACING) continue;
    const u = levels.map((k) => eastward(block.speed[k]!, block.direction[k]!));
    const v = levels.map((k) => northward(block.speed[k]!, block.direction[k]!));
    const restU = minusMean(height, u);
    const restV = minusMean(height, v);
    const square = Float64Array.from(restU, (x, m) => x * x + restV[m]! * restV[m]!);
    const swing = meanWithin(height, square, HALF_LAYER);
    swing.forEach((mean, m) => {
      if (mean > SWINGING * SWINGING) marks[levels[m]!]! |= MARK.pendulum;
    });
  }
}

function placedLevels(block: ProfileBlock, i: number): number[] {
  const levels: number[] = [];
  for (let k = block.offsets[i]!; k < block.offsets[i + 1]!; k++) {
    const hasWind = !Number.isNaN(block.speed[k]!) && !Number.isNaN(block.direction[k]!);
    if (hasWind && !Number.isNaN(block.heightAgl[k]!)) levels.push(k);
  }
  return levels;
}

function* stalled(height: readonly number[], spacing: number): Generator<number> {
  let done = 0;
  for (let m = 0; m + STALL_LEVELS <= height.length; m++) {
    if (height[m + STALL_LEVELS - 1]! - height[m]! > STALL_PART * STALL_LEVELS * spacing) continue;
    for (done = Math.max(done, m); done < m + STALL_LEVELS; done++) yield done;
  }
}

/** What is left of the values when the mean over a wave of the swing is taken away. */
function minusMean(height: readonly number[], values: readonly number[]): Float64Array {
  const mean = meanWithin(height, values, HALF_WAVE);
  return Float64Array.from(values, (value, m) => value - mean[m]!);
}

/** Mean of the values within a distance in height, for each level; heights ascend. */
function meanWithin(height: readonly number[], values: ArrayLike<number>, distance: number): Float64Array {
  const mean = new Float64Array(height.length);
  let [low, high, sum] = [0, 0, 0];
  for (let m = 0; m < height.length; m++) {
    while (high < height.length && height[high]! <= height[m]! + distance) sum += values[high++]!;
    while (height[low]! < height[m]! - distance) sum -= values[low++]!;
    mean[m] = sum / (high - low);
  }
  return mean;
}
