// What each feed delivered and what of it was lost, for the page that shows the feeds.

import { DOUBTING, INSTRUMENTS, MARKS, REJECTING, type Instrument, type MarkName } from '../profile/index.ts';
import type { ProfileBlock } from '../profile/index.ts';

export interface FeedScreening {
  /** Name of the file or feed. */
  readonly source: string;
  readonly stationId: string;
  readonly instrument: Instrument;
  readonly profiles: number;
  /** UTC, ms: latest valid time. */
  readonly lastTimeMs: number;
  readonly levels: number;
  /** Levels that came with a speed. */
  readonly windLevels: number;
  /** Of these, the ones that computations leave out. */
  readonly rejected: number;
  /** Of these, the ones that stay in with lowered confidence. */
  readonly doubted: number;
  /** Levels, with wind or without, by mark; marks that occur only. */
  readonly byMark: Readonly<Partial<Record<MarkName, number>>>;
  /** A sentence for each mark that occurs, the commonest first. */
  readonly words: readonly string[];
}

/** Counts marks by source, station and instrument, in order of their names. */
export function tallyFeeds(block: ProfileBlock): FeedScreening[] {
  const groups = new Map<string, number[]>();
  for (let i = 0; i < block.profileCount; i++) {
    const key = [
      block.sources[block.sourceIndex[i]!]!,
      block.stations[block.stationIndex[i]!]!.id,
      INSTRUMENTS[block.instrumentIndex[i]!]!,
    ].join('\u0000');
    const group = groups.get(key);
    if (group === undefined) groups.set(key, [i]);
    else group.push(i);
  }
  return [...groups.entries()]
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([key, profiles]) => tally(block, key, profiles));
}

function tally(block: ProfileBlock, key: string, profiles: readonly number[]): FeedScreening {
  const [source, stationId, instrument] = key.split('\u0000') as [string, string, Instrument];
  const counts = new Array<number>(MARKS.length).fill(0);
  let [levels, windLevels, rejected, doubted] = [0, 0, 0, 0];
  let lastTimeMs = -Infinity;
  for (const i of profiles) {
    lastTimeMs = Math.max(lastTimeMs, block.timeMs[i]!);
    const end = block.offsets[i + 1]!;
    for (let k = block.offsets[i]!; k < end; k++) {
      const bits = block.mark[k]!;
      levels++;
      if (!Number.isNaN(block.speed[k]!)) {
        windLevels++;
        if ((bits & REJECTING) !== 0) rejected++;
        else if ((bits & DOUBTING) !== 0) doubted++;
      }
      for (let b = 0, rest = bits; rest !== 0; b++, rest >>>= 1) if ((rest & 1) !== 0) counts[b]!++;
    }
  }
  const occurring = MARKS.map((mark, b) => ({ mark, count: counts[b]! })).filter(({ count }) => count > 0);
  occurring.sort((a, b) => b.count - a.count);
  return {
    source,
    stationId,
    instrument,
    profiles: profiles.length,
    lastTimeMs,
    levels,
    windLevels,
    rejected,
    doubted,
    byMark: Object.fromEntries(occurring.map(({ mark, count }) => [mark.name, count])),
    words: occurring.map(({ mark, count }) => `${count} of ${levels} levels: ${mark.words}.`),
  };
}
