// Chosen profiles out of any blocks, put together into one block in a stated order.

import { VALUE_COLUMNS, type ProfileBlock, type ValueColumn } from './block.ts';
import { indexIn } from './index-in.ts';
import { sameStation, type Station } from './station.ts';

/** A profile by its place. */
export interface Pick {
  readonly block: ProfileBlock;
  readonly index: number;
}

/**
 * One block holding the picked profiles in the order given. Columns that none of the blocks has stay null; where only
 * some have one, the others' levels are NaN there.
 */
export function pickProfiles(picks: readonly Pick[]): ProfileBlock {
  const blocks = [...new Set(picks.map((pick) => pick.block))];
  const offsets = new Uint32Array(picks.length + 1);
  picks.forEach(({ block, index }, k) => {
    offsets[k + 1] = offsets[k]! + block.offsets[index + 1]! - block.offsets[index]!;
  });
  const levelCount = offsets[picks.length]!;

  const stations: Station[] = [];
  const sources: string[] = [];
  const stationIndex = new Uint16Array(picks.length);
  const sourceIndex = new Uint16Array(picks.length);
  // Numbered in the order of first use, so that what no picked profile uses is left behind.
  picks.forEach(({ block, index }, k) => {
    stationIndex[k] = indexIn(stations, block.stations[block.stationIndex[index]!]!, sameStation);
    sourceIndex[k] = indexIn(sources, block.sources[block.sourceIndex[index]!]!, Object.is);
  });

  const notes: Record<number, readonly string[]> = {};
  const mark = new Uint32Array(levelCount);
  picks.forEach(({ block, index }, k) => {
    mark.set(block.mark.subarray(block.offsets[index], block.offsets[index + 1]), offsets[k]);
    const said = block.notes[index];
    if (said !== undefined) notes[k] = said;
  });

  const column = (name: ValueColumn): Float32Array | null => {
    if (blocks.every((block) => block[name] === null)) return null;
    const values = new Float32Array(levelCount).fill(NaN);
    picks.forEach(({ block, index }, k) => {
      const from = block[name];
      if (from !== null) values.set(from.subarray(block.offsets[index], block.offsets[index + 1]), offsets[k]);
    });
    return values;
  };
  const columns = Object.fromEntries(VALUE_COLUMNS.map((name) => [name, column(name)])) as Record<
    ValueColumn,
    Float32Array | null
  >;

  return {
    stations,
    sources,
    profileCount: picks.length,
    offsets,
    stationIndex,
    sourceIndex,
    instrumentIndex: Uint8Array.from(picks, ({ block, index }) => block.instrumentIndex[index]!),
    timeMs: Float64Array.from(picks, ({ block, index }) => block.timeMs[index]!),
    periodS: Float32Array.from(picks, ({ block, index }) => block.periodS[index]!),
    revision: Uint8Array.from(picks, ({ block, index }) => block.revision[index]!),
    notes,
    ...columns,
    heightAgl: columns.heightAgl ?? new Float32Array(0),
    speed: columns.speed ?? new Float32Array(0),
    direction: columns.direction ?? new Float32Array(0),
    mark,
  };
}
