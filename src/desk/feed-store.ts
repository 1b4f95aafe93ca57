// Which profiles are at hand, feed by feed, whatever the order, number and lateness in which they came.

import { pickProfiles, VALUE_COLUMNS, type Pick, type ProfileBlock, type Station } from '../profile/index.ts';
import type { Site } from '../site/index.ts';
import { compareStations, feedNameOf, type FeedName } from './feed-name.ts';

/** What came of handing a block over. */
export interface Acceptance {
  readonly added: number;
  /** Profiles that were here already, to the last bit. */
  readonly repeated: number;
  /** Profiles of a time already held, of which the fuller one was kept. */
  readonly replaced: number;
  /** Feeds that changed. */
  readonly changed: readonly string[];
}

interface Feed {
  name: FeedName;
  readonly byTime: Map<number, Pick>;
  /** The feed as one block by time; null after a change, made again when asked for. */
  block: ProfileBlock | null;
}

/**
 * Holds profiles by feed and time. The state depends on what was accepted, never on the order of acceptance: of two
 * profiles for the same feed and time the one with more wind levels is kept, and between equals the one whose values
 * come later in number order.
 */
export class FeedStore {
  readonly #site: Site;
  readonly #feeds = new Map<string, Feed>();

  constructor(site: Site) {
    this.#site = site;
  }

  accept(block: ProfileBlock): Acceptance {
    let added = 0;
    let repeated = 0;
    let replaced = 0;
    const changed = new Set<string>();
    for (let index = 0; index < block.profileCount; index++) {
      const feed = this.#feedOf(block, index);
      const timeMs = block.timeMs[index]!;
      const held = feed.byTime.get(timeMs);
      const pick = { block, index };
      if (held !== undefined) {
        const order = comparePicks(pick, held);
        if (order.values === 0) repeated++;
        else replaced++;
        if (order.all <= 0) continue;
      } else added++;
      feed.byTime.set(timeMs, pick);
      feed.block = null;
      changed.add(feed.name.key);
    }
    return { added, repeated, replaced, changed: [...changed].sort() };
  }

  /** All feeds, by key. */
  names(): FeedName[] {
    return [...this.#feeds.values()].map((feed) => feed.name).sort((a, b) => (a.key < b.key ? -1 : 1));
  }

  /** The feed's profiles as one block, ascending in time; null for a feed that does not exist. */
  block(key: string): ProfileBlock | null {
    const feed = this.#feeds.get(key);
    if (feed === undefined) return null;
    if (feed.block === null) {
      const picks = [...feed.byTime.entries()].sort((a, b) => a[0] - b[0]).map(([, pick]) => pick);
      const block = restationed(pickProfiles(picks), feed.name.station);
      // The originals are let go: every profile now lives in the feed's own block.
      feed.byTime.clear();
      for (let index = 0; index < block.profileCount; index++) feed.byTime.set(block.timeMs[index]!, { block, index });
      feed.block = block;
    }
    return feed.block;
  }

  #feedOf(block: ProfileBlock, index: number): Feed {
    const name = feedNameOf(block, index, this.#site);
    const { key, station } = name;
    let feed = this.#feeds.get(key);
    if (feed === undefined) {
      feed = { name, byTime: new Map(), block: null };
      this.#feeds.set(key, feed);
    } else if (compareStations(station, feed.name.station) > 0) {
      feed.name = { ...feed.name, station };
      feed.block = null;
    }
    return feed;
  }
}

/** The block with one station for all its profiles, as the feed knows it. */
function restationed(block: ProfileBlock, station: Station): ProfileBlock {
  return { ...block, stations: [station], stationIndex: new Uint16Array(block.profileCount) };
}

/** Positive when a is to be preferred; `values` is 0 when both hold the same numbers. */
function comparePicks(a: Pick, b: Pick): { values: number; all: number } {
  const values = compareValues(a, b);
  // Equal values under two file names: the name first in the alphabet stays, so that order of arrival leaves no trace.
  return { values, all: values === 0 ? sourceOf(b).localeCompare(sourceOf(a)) : values };
}

function compareValues(a: Pick, b: Pick): number {
  const byLevels = windLevels(a) - windLevels(b);
  if (byLevels !== 0) return byLevels;
  for (const name of VALUE_COLUMNS) {
    const valuesA = columnOf(a, name);
    const valuesB = columnOf(b, name);
    const length = Math.min(valuesA.length, valuesB.length);
    for (let k = 0; k < length; k++) {
      if (!Object.is(valuesA[k], valuesB[k])) return numberOrder(valuesA[k]!, valuesB[k]!);
    }
    if (valuesA.length !== valuesB.length) return valuesA.length - valuesB.length;
  }
  return marksInWords(a).localeCompare(marksInWords(b));
}

function marksInWords({ block, index }: Pick): string {
  return block.mark.subarray(block.offsets[index], block.offsets[index + 1]).join();
}

function sourceOf({ block, index }: Pick): string {
  return block.sources[block.sourceIndex[index]!]!;
}

/** Missing before every number, so that more values win. */
function numberOrder(a: number, b: number): number {
  if (Number.isNaN(a)) return -1;
  if (Number.isNaN(b)) return 1;
  return a < b ? -1 : 1;
}

function windLevels({ block, index }: Pick): number {
  let count = 0;
  for (let k = block.offsets[index]!; k < block.offsets[index + 1]!; k++) if (block.speed[k]! >= 0) count++;
  return count;
}

function columnOf({ block, index }: Pick, name: (typeof VALUE_COLUMNS)[number]): Float32Array {
  const from = block.offsets[index]!;
  const to = block.offsets[index + 1]!;
  // An absent column equals one that is missing throughout.
  return block[name]?.subarray(from, to) ?? new Float32Array(to - from).fill(NaN);
}
