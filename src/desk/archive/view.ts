// An archive as a page shows it: the figures of each feed and its nights in short, from open profiles or from the tables.

import { hasCategories } from '../../jet/index.ts';
import { profileRange, type ProfileBlock } from '../../profile/index.ts';
import type { FeedName } from '../feed-name.ts';
import { ArchiveTally, figureRows, solarClock, type ArchiveFigures, type FigureRows } from './figures.ts';
import { judge, type ArchiveQuestion } from './judge.ts';
import { nightsOfRows } from './night-number.ts';
import { NightGatherer, type NightRow } from './nights.ts';
import { emptyRows } from './rows.ts';

/** What a page tells of a night. */
export interface ArchiveNight extends Pick<
  NightRow,
  | 'night'
  | 'sunsetMs'
  | 'sunriseMs'
  | 'profiles'
  | 'assessable'
  | 'jets'
  | 'darkAssessable'
  | 'firstJetMs'
  | 'lastJetMs'
  | 'onsetMs'
  | 'endMs'
  | 'peakMs'
  | 'peakSpeed'
  | 'peakHeight'
  | 'peakDirection'
  | 'category'
> {
  /** Names of the files that its profiles came from, where a table tells them. */
  readonly files: readonly string[];
}

export interface ArchiveView {
  /** Key of the feed. */
  readonly key: string;
  readonly stationName: string;
  readonly instrument: string;
  /** Degrees east; where it is known the hours of the figures are the sun's own, else (NaN) UTC. */
  readonly longitude: number;
  /** Name of the criteria set; empty where nothing tells it. */
  readonly criteria: string;
  /** Names of the turbine types, in the order of the figures. */
  readonly discs: readonly string[];
  /** The k-th counts jets of category k and above only, the first all jets; one alone where there are no categories. */
  readonly figures: readonly ArchiveFigures[];
  readonly nights: readonly ArchiveNight[];
}

const CATEGORIES = 4;

/** The figures of all jets and of those of each category and above. */
export class CategoryTallies {
  readonly #tallies: readonly ArchiveTally[];

  /** @param discs how many turbine types the rows have */
  constructor(discs: number) {
    this.#tallies = Array.from({ length: CATEGORIES }, (_, least) => new ArchiveTally(discs, least));
  }

  addRows(rows: FigureRows, longitude: number): void {
    const clock = solarClock(longitude);
    for (const tally of this.#tallies) tally.addRows(rows, clock);
  }

  addNights(nights: readonly ArchiveNight[]): void {
    for (const tally of this.#tallies) tally.addNights(nights);
  }

  /** @param graded whether the criteria know categories */
  figures(graded: boolean): ArchiveFigures[] {
    return this.#tallies.slice(0, graded ? CATEGORIES : 1).map((tally) => tally.figures());
  }
}

/** So many profiles are judged between two yields: a few hundredths of a second. */
const PORTION = 200;

/**
 * What a feed's profiles say together. Yields the share done, 0 to 1, so that whoever waits can breathe and stop.
 * @param block screened, ascending in time
 */
export function* archiveOf(
  block: ProfileBlock,
  feed: FeedName,
  question: ArchiveQuestion,
): Generator<number, ArchiveView> {
  const { discs, criteria } = question;
  const gatherer = new NightGatherer(feed);
  const tallies = new CategoryTallies(discs.length);
  const rowsOfNights: NightRow[] = [];
  for (let from = 0; from < block.profileCount; from += PORTION) {
    yield from / block.profileCount;
    const part = profileRange(block, from, Math.min(block.profileCount, from + PORTION));
    const rows = { ...emptyRows(feed, discs.length), ...judge(part, question) };
    const { dark } = nightsOfRows(rows.profiles.timeMs, feed.station);
    tallies.addRows(figureRows(rows, dark), feed.station.longitude);
    rowsOfNights.push(...gatherer.add(rows));
  }
  rowsOfNights.push(...gatherer.finish());
  const nights = rowsOfNights.map(inShort);
  tallies.addNights(nights);
  return {
    key: feed.key,
    stationName: feed.station.name,
    instrument: feed.instrument,
    longitude: feed.station.longitude,
    criteria: criteria.name,
    discs: discs.map(({ name }) => name),
    figures: tallies.figures(hasCategories(criteria)),
    nights,
  };
}

function inShort(row: NightRow): ArchiveNight {
  const { night, sunsetMs, sunriseMs, profiles, assessable, jets, darkAssessable, category } = row;
  const { firstJetMs, lastJetMs, onsetMs, endMs, peakMs, peakSpeed, peakHeight, peakDirection } = row;
  return {
    night,
    sunsetMs,
    sunriseMs,
    profiles,
    assessable,
    jets,
    darkAssessable,
    firstJetMs,
    lastJetMs,
    onsetMs,
    endMs,
    peakMs,
    peakSpeed,
    peakHeight,
    peakDirection,
    category,
    files: [],
  };
}
