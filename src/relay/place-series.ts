// The profiles of all paths place by place and in time order, the instruments of one place joined: for what a farm's
// machines remember from one profile to the next.

import {
  FeedStore,
  joinSeries,
  standTogether,
  type FeedName,
  type FeedSeries,
  type JoinedSeries,
} from '../desk/index.ts';
import type { StationList } from '../ingest/index.ts';
import { profilesOf, type Profile, type ProfileBlock } from '../profile/index.ts';
import type { Site } from '../site/index.ts';
import { readPaths } from './blocks.ts';
import { Reporter } from './reporter.ts';

/** A wind at a place. */
export interface PlaceProfile {
  /** As joined for the discs. */
  readonly wind: Profile;
  /** As the feed that stands for the place measured it, for its jet; null where another instrument measured alone. */
  readonly own: Profile | null;
}

export interface Place {
  /** Of the feed that reaches highest: its station stands for the place. */
  readonly feed: FeedName;
  /** Ascending in time. */
  readonly profiles: readonly PlaceProfile[];
  /** What was joined and by how much the instruments disagree, in words; empty for a lone instrument. */
  readonly words: readonly string[];
}

/**
 * Reads every path and gives place after place. All profiles are held until all are read; one that came twice counts once.
 * @param screened screens each block as it is read
 */
export async function readPlaces(
  paths: readonly string[],
  site: Site,
  screened: (block: ProfileBlock) => ProfileBlock,
  stations?: StationList,
): Promise<{ readonly code: number; readonly places: readonly Place[] }> {
  const store = new FeedStore(site);
  const code = await readPaths(paths, site, {
    ...(stations === undefined ? {} : { stations }),
    take: (block) => {
      store.accept(screened(block));
      return Promise.resolve();
    },
  });
  const feeds = store.names().map((feed) => ({ feed, profiles: [...profilesOf(store.block(feed.key)!)] }));
  return { code, places: placesOf(feeds, site) };
}

function placesOf(feeds: readonly FeedSeries[], site: Site): Place[] {
  const highestFirst = [...feeds].sort((a, b) => topOf(b) - topOf(a));
  const taken = new Set<FeedSeries>();
  const places: Place[] = [];
  for (const base of highestFirst) {
    if (taken.has(base)) continue;
    const others = highestFirst.filter((other) => !taken.has(other) && standTogether(base.feed, other.feed));
    taken.add(base);
    others.forEach((other) => taken.add(other));
    places.push(placeOf(base, joinSeries(base, others, site)));
  }
  return places.sort((a, b) => (a.feed.key < b.feed.key ? -1 : 1));
}

function placeOf(base: FeedSeries, { joined, left }: JoinedSeries): Place {
  const profiles = joined.map(({ profile }, k): PlaceProfile => ({ wind: profile, own: base.profiles[k]! }));
  // What another instrument measured while the first was out is told as it is.
  const alone = left.map((profile): PlaceProfile => ({ wind: profile, own: null }));
  const words = joined.findLast(({ joins }) => joins.length > 0)?.joins.map((join) => join.words) ?? [];
  return {
    feed: base.feed,
    profiles: [...profiles, ...alone].sort((a, b) => a.wind.timeMs - b.wind.timeMs),
    words,
  };
}

/** m: median of the profiles' highest levels. */
function topOf({ profiles }: FeedSeries): number {
  const tops = profiles.map(({ heightAgl, levelCount }) => heightAgl[levelCount - 1] ?? 0).sort((a, b) => a - b);
  return tops[tops.length >> 1] ?? 0;
}

/** Says on stderr which instruments a place's winds are joined of. */
export function tellJoin({ feed, words }: Place): void {
  const reporter = new Reporter();
  for (const each of words) reporter.say(`${feed.station.id}: ${each}`);
}
