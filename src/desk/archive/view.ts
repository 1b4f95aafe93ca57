// An archive as a page shows it: the figures of each feed and its nights in short, from open profiles or from the tables.

import { ArchiveTally, figureRows, solarClock, type ArchiveFigures } from './figures.ts';
import { nightsOfRows } from './night-number.ts';
import { nightRows, type NightRow } from './nights.ts';
import type { FeedRows } from './rows.ts';

/** What a page tells of a night. */
export type ArchiveNight = Pick<
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
>;

export interface ArchiveView {
  /** Key of the feed. */
  readonly key: string;
  readonly stationName: string;
  readonly instrument: string;
  /** Whether the station's position is known: hours are then the sun's own, else UTC. */
  readonly isPlaced: boolean;
  /** Names of the turbine types, in the order of the figures. */
  readonly discs: readonly string[];
  readonly figures: ArchiveFigures;
  readonly nights: readonly ArchiveNight[];
}

/** The view of a feed's rows. @param rows ascending in time @param discs names of the turbine types */
export function archiveView(rows: FeedRows, discs: readonly string[]): ArchiveView {
  const { station, key, instrument } = rows.feed;
  const nights = nightRows(rows);
  const tally = new ArchiveTally(discs.length);
  tally.addRows(figureRows(rows, nightsOfRows(rows.profiles.timeMs, station).dark), solarClock(station.longitude));
  tally.addNights(nights);
  return {
    key,
    stationName: station.name,
    instrument,
    isPlaced: Number.isFinite(station.longitude),
    discs,
    figures: tally.figures(),
    nights,
  };
}
