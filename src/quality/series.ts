// Profiles of one instrument at one station in order of time: what screens that look at neighbours walk along.

import type { ProfileBlock } from '../profile/index.ts';
import type { Site } from '../site/index.ts';

export interface Series {
  readonly stationId: string;
  /** Index into INSTRUMENTS. */
  readonly instrument: number;
  /** Profile indices, ascending in time. */
  readonly profiles: readonly number[];
  /** Usual time from one to the next, ms; NaN for fewer than two. */
  readonly stepMs: number;
}

/** What a screen looks at. */
export interface Screened {
  readonly block: ProfileBlock;
  readonly series: readonly Series[];
  readonly site: Site;
}

/** All series of a block. Their order and that of equal times rest on content alone, not on the block's order. */
export function seriesOf(block: ProfileBlock): Series[] {
  const groups = new Map<string, number[]>();
  for (let i = 0; i < block.profileCount; i++) {
    const key = `${block.stations[block.stationIndex[i]!]!.id}\u0000${block.instrumentIndex[i]!}`;
    const group = groups.get(key);
    if (group === undefined) groups.set(key, [i]);
    else group.push(i);
  }
  return [...groups]
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([key, members]) => {
      const [stationId, instrument] = key.split('\u0000') as [string, string];
      const profiles = members.sort((a, b) => block.timeMs[a]! - block.timeMs[b]! || compareContent(block, a, b));
      return { stationId, instrument: Number(instrument), profiles, stepMs: usualStep(block, profiles) };
    });
}

/** An order of two profiles by what they hold; 0 only for profiles alike in every height, speed and direction. */
export function compareContent(block: ProfileBlock, a: number, b: number): number {
  const [startA, startB] = [block.offsets[a]!, block.offsets[b]!];
  const length = block.offsets[a + 1]! - startA;
  const other = block.offsets[b + 1]! - startB;
  if (length !== other) return length - other;
  for (const column of [block.heightAgl, block.speed, block.direction]) {
    for (let k = 0; k < length; k++) {
      const difference = compareNumbers(column[startA + k]!, column[startB + k]!);
      if (difference !== 0) return difference;
    }
  }
  return 0;
}

/** Missing comes first. */
function compareNumbers(a: number, b: number): number {
  if (Number.isNaN(a)) return Number.isNaN(b) ? 0 : -1;
  if (Number.isNaN(b)) return 1;
  return a - b;
}

function usualStep(block: ProfileBlock, profiles: readonly number[]): number {
  const steps: number[] = [];
  for (let i = 1; i < profiles.length; i++) {
    const step = block.timeMs[profiles[i]!]! - block.timeMs[profiles[i - 1]!]!;
    if (step > 0) steps.push(step);
  }
  return median(steps);
}

/** The value below which a share of the values lies; they are moved about. NaN for none. */
export function quantile(values: number[] | Float64Array, share: number): number {
  if (values.length === 0) return NaN;
  return smallest(values, Math.min(values.length - 1, Math.floor(share * values.length)));
}

/** The value that would stand at a place if the values were in order (Hoare's selection: only the part around it is sorted). */
function smallest(values: number[] | Float64Array, place: number): number {
  let low = 0;
  let high = values.length - 1;
  while (low < high) {
    const pivot = values[(low + high) >> 1]!;
    let i = low;
    let j = high;
    while (i <= j) {
      while (values[i]! < pivot) i++;
      while (values[j]! > pivot) j--;
      if (i > j) break;
      const swapped = values[i]!;
      values[i++] = values[j]!;
      values[j--] = swapped;
    }
    if (place <= j) high = j;
    else if (place >= i) low = i;
    else break;
  }
  return values[place]!;
}

/** The middle one of the values, which are moved about; NaN for none. */
export function median(values: number[]): number {
  return quantile(values, 0.5);
}
