// A run of successive profiles of a block, without copying its levels.

import { VALUE_COLUMNS, type ProfileBlock, type ValueColumn } from './block.ts';

/** Profiles `from` up to `to` of a block as a block whose level columns are views: do not transfer it. */
export function profileRange(block: ProfileBlock, from: number, to: number): ProfileBlock {
  if (from === 0 && to === block.profileCount) return block;
  const [start, end] = [block.offsets[from]!, block.offsets[to]!];
  const columns = Object.fromEntries(
    VALUE_COLUMNS.map((name) => [name, block[name]?.subarray(start, end) ?? null]),
  ) as Pick<ProfileBlock, ValueColumn>;
  const notes: Record<number, readonly string[]> = {};
  for (const [index, said] of Object.entries(block.notes)) {
    if (Number(index) >= from && Number(index) < to) notes[Number(index) - from] = said;
  }
  return {
    ...columns,
    mark: block.mark.subarray(start, end),
    stations: block.stations,
    sources: block.sources,
    profileCount: to - from,
    offsets: block.offsets.slice(from, to + 1).map((offset) => offset - start),
    stationIndex: block.stationIndex.subarray(from, to),
    sourceIndex: block.sourceIndex.subarray(from, to),
    instrumentIndex: block.instrumentIndex.subarray(from, to),
    timeMs: block.timeMs.subarray(from, to),
    periodS: block.periodS.subarray(from, to),
    revision: block.revision.subarray(from, to),
    notes,
  };
}
