// The parts of all files joined feed by feed in order of time, so much at a time as overlaps in time and no more.

import type { FeedName, FeedRows } from '../../desk/index.ts';
import { compareStations, mergeRows } from '../../desk/index.ts';
import type { JournalEntry } from './journal.ts';
import type { Part } from './part.ts';

/** A stretch of a feed's time in one part. */
interface Stretch {
  readonly part: string;
  readonly firstMs: number;
  readonly lastMs: number;
}

/** Parts held at once, for those that hold several feeds. */
const PARTS_HELD = 8;

/** A feed of the archive and its rows, ascending in time, portion by portion. */
export interface JoinedFeed {
  readonly feed: FeedName;
  readonly portions: () => AsyncGenerator<FeedRows>;
}

/** All feeds by key. @param load the part of that name */
export function joinParts(entries: readonly JournalEntry[], load: (part: string) => Promise<Part>): JoinedFeed[] {
  const feeds = new Map<string, { feed: FeedName; stretches: Stretch[] }>();
  for (const { part, feeds: held } of entries) {
    for (const { key, station, instrument, first_ms: firstMs, last_ms: lastMs } of held) {
      const number = (value: number | null): number => value ?? NaN;
      const feed: FeedName = {
        key,
        instrument,
        station: {
          ...station,
          latitude: number(station.latitude),
          longitude: number(station.longitude),
          elevation: number(station.elevation),
        },
      };
      const known = feeds.get(key);
      if (known === undefined) feeds.set(key, { feed, stretches: [{ part, firstMs, lastMs }] });
      else {
        known.stretches.push({ part, firstMs, lastMs });
        if (compareStations(feed.station, known.feed.station) > 0) known.feed = feed;
      }
    }
  }
  const held = holding(load);
  return [...feeds.values()]
    .sort((a, b) => (a.feed.key < b.feed.key ? -1 : 1))
    .map(({ feed, stretches }) => ({ feed, portions: () => portionsOf(feed, stretches, held) }));
}

async function* portionsOf(
  feed: FeedName,
  stretches: readonly Stretch[],
  load: (part: string) => Promise<Part>,
): AsyncGenerator<FeedRows> {
  for (const overlapping of clustersOf(stretches)) {
    const rows: FeedRows[] = [];
    for (const { part } of overlapping) rows.push((await load(part)).feeds.find((held) => held.feed.key === feed.key)!);
    yield { ...mergeRows(rows), feed };
  }
}

/** Stretches in order of time, those together that overlap. */
function clustersOf(stretches: readonly Stretch[]): Stretch[][] {
  const ordered = [...stretches].sort((a, b) => a.firstMs - b.firstMs || (a.part < b.part ? -1 : 1));
  const clusters: Stretch[][] = [];
  let lastMs = -Infinity;
  for (const stretch of ordered) {
    if (stretch.firstMs <= lastMs) clusters.at(-1)!.push(stretch);
    else clusters.push([stretch]);
    lastMs = Math.max(lastMs, stretch.lastMs);
  }
  return clusters;
}

function holding(load: (part: string) => Promise<Part>): (part: string) => Promise<Part> {
  const held = new Map<string, Part>();
  return async (name) => {
    let part = held.get(name);
    if (part === undefined) {
      part = await load(name);
      if (held.size >= PARTS_HELD) held.delete(held.keys().next().value!);
      held.set(name, part);
    }
    return part;
  };
}
