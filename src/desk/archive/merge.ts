// Rows of one feed out of many files, in one order and each time once, whatever the order in which the files came.

import { compareStations } from '../feed-name.ts';
import {
  DISC_COLUMNS,
  discColumns,
  jetColumns,
  jetOffsets,
  profileColumns,
  type DiscColumns,
  type FeedRows,
  type JetColumns,
  type ProfileColumns,
} from './rows.ts';

/** A row by its place: which of the parts, and which row of it. */
export interface RowPicks {
  readonly part: Uint32Array;
  readonly row: Uint32Array;
}

/**
 * One feed's rows, ascending in time. Of several rows of one time the one with the later correction is kept, then the one
 * with more levels, then the one whose numbers come later in order: the result does not depend on the order of the parts.
 * @param parts one at least, all of the same feed
 */
export function mergeRows(parts: readonly FeedRows[]): FeedRows {
  const only = parts.length === 1 ? parts[0]! : undefined;
  if (only !== undefined && ascends(only.profiles.timeMs)) return only;
  const count = parts.reduce((sum, { profiles }) => sum + profiles.timeMs.length, 0);
  const part = new Uint32Array(count);
  const row = new Uint32Array(count);
  const time = new Float64Array(count);
  let at = 0;
  parts.forEach(({ profiles }, p) => {
    part.fill(p, at, at + profiles.timeMs.length);
    time.set(profiles.timeMs, at);
    for (let r = 0; r < profiles.timeMs.length; r++) row[at++] = r;
  });
  const offsets = parts.map(({ profiles }) => jetOffsets(profiles));
  const order = Uint32Array.from({ length: count }, (_, k) => k);
  order.sort(
    (a, b) =>
      time[a]! - time[b]! ||
      compareRows(parts[part[b]!]!, offsets[part[b]!]!, row[b]!, parts[part[a]!]!, offsets[part[a]!]!, row[a]!),
  );
  const kept = order.filter((k, i) => i === 0 || time[k] !== time[order[i - 1]!]);
  return pickRows(parts, { part: kept.map((k) => part[k]!), row: kept.map((k) => row[k]!) });
}

function ascends(time: Float64Array): boolean {
  for (let k = 1; k < time.length; k++) if (!(time[k]! > time[k - 1]!)) return false;
  return true;
}

/** The picked rows in the order given, with the best of the parts' stations. */
export function pickRows(parts: readonly FeedRows[], picks: RowPicks): FeedRows {
  const count = picks.row.length;
  const feed = parts.map((part) => part.feed).reduce((a, b) => (compareStations(b.station, a.station) > 0 ? b : a));
  const profiles = profileColumns(count);
  for (const name of Object.keys(profiles) as (keyof ProfileColumns)[]) {
    gatherInto(
      profiles[name],
      parts.map((part) => part.profiles[name]),
      picks,
    );
  }
  const sources = renumber(
    parts.map((part) => part.sources),
    profiles.source,
    picks.part,
  );
  const reasons = renumber(
    parts.map((part) => part.reasons),
    profiles.why,
    picks.part,
    [''],
  );
  const discs = parts[0]!.discs.map((_, i) => {
    const disc = discColumns(count);
    for (const name of DISC_COLUMNS) {
      gatherInto(
        disc[name],
        parts.map((part) => part.discs[i]![name]),
        picks,
      );
    }
    return disc;
  });
  return { feed, sources, reasons, profiles, jets: pickJets(parts, picks), discs };
}

function pickJets(parts: readonly FeedRows[], picks: RowPicks): JetColumns {
  const offsets = parts.map(({ profiles }) => jetOffsets(profiles));
  const part: number[] = [];
  const row: number[] = [];
  for (let k = 0; k < picks.row.length; k++) {
    const own = offsets[picks.part[k]!]!;
    for (let jet = own[picks.row[k]!]!; jet < own[picks.row[k]! + 1]!; jet++) {
      part.push(picks.part[k]!);
      row.push(jet);
    }
  }
  const jets = jetColumns(row.length);
  const jetPicks = { part: Uint32Array.from(part), row: Uint32Array.from(row) };
  for (const name of Object.keys(jets) as (keyof JetColumns)[]) {
    gatherInto(
      jets[name],
      parts.map((one) => one.jets[name]),
      jetPicks,
    );
  }
  return jets;
}

type Column = ProfileColumns[keyof ProfileColumns] | JetColumns[keyof JetColumns];

function gatherInto(out: Column, columns: readonly Column[], { part, row }: RowPicks): void {
  for (let k = 0; k < row.length; k++) out[k] = columns[part[k]!]![row[k]!]!;
}

/** One list of words for all parts, in order of the alphabet after those that come `first`; `index` is changed to fit it. */
function renumber(
  lists: readonly (readonly string[])[],
  index: Uint16Array | Uint32Array,
  part: Uint32Array,
  first: readonly string[] = [],
): string[] {
  const rest = [...new Set(lists.flat())].filter((words) => !first.includes(words)).sort();
  const all = [...first, ...rest];
  const place = new Map(all.map((words, k) => [words, k]));
  const places = lists.map((list) => list.map((words) => place.get(words)!));
  for (let k = 0; k < index.length; k++) index[k] = places[part[k]!]![index[k]!]!;
  return all;
}

/** Positive when row a is to be preferred to row b of the same time. */
function compareRows(
  a: FeedRows,
  offsetsA: Uint32Array,
  rowA: number,
  b: FeedRows,
  offsetsB: Uint32Array,
  rowB: number,
): number {
  for (const name of ['revision', 'windLevels', 'usableLevels', 'status', 'jetCount', 'top', 'confidence'] as const) {
    const order = compareNumbers(a.profiles[name][rowA]!, b.profiles[name][rowB]!);
    if (order !== 0) return order;
  }
  for (let jet = 0; jet < a.profiles.jetCount[rowA]!; jet++) {
    for (const name of Object.keys(a.jets) as (keyof JetColumns)[]) {
      const order = compareNumbers(a.jets[name][offsetsA[rowA]! + jet]!, b.jets[name][offsetsB[rowB]! + jet]!);
      if (order !== 0) return order;
    }
  }
  for (let i = 0; i < a.discs.length; i++) {
    for (const name of DISC_COLUMNS satisfies readonly (keyof DiscColumns)[]) {
      const order = compareNumbers(a.discs[i]![name][rowA]!, b.discs[i]![name][rowB]!);
      if (order !== 0) return order;
    }
  }
  // Alike in all that counts: the file first in the alphabet is named.
  const [sourceA, sourceB] = [a.sources[a.profiles.source[rowA]!]!, b.sources[b.profiles.source[rowB]!]!];
  return sourceA < sourceB ? 1 : sourceA > sourceB ? -1 : 0;
}

/** Missing before every number. */
function compareNumbers(a: number, b: number): number {
  if (Number.isNaN(a)) return Number.isNaN(b) ? 0 : -1;
  return Number.isNaN(b) ? 1 : a - b;
}
