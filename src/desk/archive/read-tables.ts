// Reads the archive's own tables back: the figures out of the table of profiles, the nights out of the table of nights.

import Papa from 'papaparse';
import { ArchiveTally, solarClock, type FigureRows } from './figures.ts';
import { STATUSES } from './rows.ts';
import type { ArchiveNight, ArchiveView } from './view.ts';

export type ArchiveTableKind = 'profiles' | 'nights';

/** Which of the archive's tables begins with this line; null for any other text. */
export function archiveTableKind(heading: string): ArchiveTableKind | null {
  const names = heading.trim().split(',');
  const has = (...wanted: string[]): boolean => wanted.every((name) => names.includes(name));
  if (has('station', 'instrument', 'time', 'night', 'status', 'usable_levels', 'nose_height_agl_m')) return 'profiles';
  if (has('station', 'instrument', 'night', 'kind', 'dark_assessable', 'peak_speed_mps')) return 'nights';
  return null;
}

interface Feed {
  stationName: string;
  readonly instrument: string;
  longitude: number;
  tally: ArchiveTally | null;
  discs: readonly string[];
  readonly nights: ArchiveNight[];
}

/** Gathers tables, given in pieces of whole lines; those of nights first, for they know where the stations are. */
export class ArchiveTableReader {
  readonly #feeds = new Map<string, Feed>();
  #names: readonly string[] = [];
  #kind: ArchiveTableKind | null = null;

  /** Begins a table. @param heading its first line */
  begin(heading: string): void {
    this.#names = heading.trim().split(',');
    this.#kind = archiveTableKind(heading);
  }

  /** Takes lines of the table begun. */
  take(lines: string): void {
    const { data } = Papa.parse<string[]>(lines, { delimiter: ',', skipEmptyLines: true });
    const column = (name: string): number => this.#names.indexOf(name);
    const byFeed = new Map<string, string[][]>();
    const [station, instrument] = [column('station'), column('instrument')];
    for (const cells of data) {
      // A line cut short by a writer still at work.
      if (cells.length < this.#names.length) continue;
      const key = `${cells[station]!}/${cells[instrument]!}`;
      const known = byFeed.get(key);
      if (known === undefined) byFeed.set(key, [cells]);
      else known.push(cells);
    }
    for (const [key, rows] of byFeed) {
      const feed = this.#feedOf(key, rows[0]![station]!, rows[0]![instrument]!);
      if (this.#kind === 'nights') this.#takeNights(feed, rows, column);
      else if (this.#kind === 'profiles') this.#takeProfiles(feed, rows, column);
    }
  }

  /** A view a feed, by key. */
  views(): ArchiveView[] {
    return [...this.#feeds.entries()]
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([key, { stationName, instrument, longitude, tally, discs, nights }]) => {
        const whole = tally ?? new ArchiveTally(0);
        whole.addNights(nights);
        return {
          key,
          stationName,
          instrument,
          isPlaced: Number.isFinite(longitude),
          discs,
          figures: whole.figures(),
          nights,
        };
      });
  }

  #feedOf(key: string, station: string, instrument: string): Feed {
    let feed = this.#feeds.get(key);
    if (feed === undefined) {
      feed = { stationName: station, instrument, longitude: NaN, tally: null, discs: [], nights: [] };
      this.#feeds.set(key, feed);
    }
    return feed;
  }

  #takeNights(feed: Feed, rows: readonly string[][], column: (name: string) => number): void {
    const [first] = rows;
    feed.stationName = first![column('station_name')] ?? feed.stationName;
    feed.longitude = numberOf(first![column('longitude_deg')]);
    for (const cells of rows) {
      const number = (name: string): number => numberOf(cells[column(name)]);
      const time = (name: string): number => timeOf(cells[column(name)]);
      const category = number('category');
      feed.nights.push({
        night: cells[column('night')]!,
        sunsetMs: time('sunset'),
        sunriseMs: time('sunrise'),
        profiles: number('profiles'),
        assessable: number('assessable'),
        jets: number('with_jet'),
        darkAssessable: number('dark_assessable'),
        firstJetMs: time('first_jet'),
        lastJetMs: time('last_jet'),
        onsetMs: time('onset'),
        endMs: time('end'),
        peakMs: time('peak_time'),
        peakSpeed: number('peak_speed_mps'),
        peakHeight: number('peak_height_agl_m'),
        peakDirection: number('peak_direction_deg'),
        category: Number.isNaN(category) ? -1 : category,
      });
    }
  }

  #takeProfiles(feed: Feed, rows: readonly string[][], column: (name: string) => number): void {
    const ENDING = '_rews_mps';
    feed.discs = this.#names.filter((name) => name.endsWith(ENDING)).map((name) => name.slice(0, -ENDING.length));
    const numbers = (name: string): Float64Array => {
      const at = column(name);
      return Float64Array.from(rows, (cells) => numberOf(cells[at]));
    };
    const [time, status, dark] = [column('time'), column('status'), column('sun_down')];
    const columns: FigureRows = {
      timeMs: Float64Array.from(rows, (cells) => timeOf(cells[time])),
      status: Uint8Array.from(rows, (cells) =>
        Math.max(0, STATUSES.indexOf(cells[status] as (typeof STATUSES)[number])),
      ),
      dark: Uint8Array.from(rows, (cells) => Number(cells[dark] === 'yes')),
      noseHeight: numbers('nose_height_agl_m'),
      noseSpeed: numbers('nose_speed_mps'),
      noseDirection: numbers('nose_direction_deg'),
      discs: feed.discs.map((prefix) => ({
        equivalentSpeed: numbers(`${prefix}${ENDING}`),
        shearExponent: numbers(`${prefix}_shear_exponent`),
        veer: numbers(`${prefix}_veer_deg`),
      })),
    };
    feed.tally ??= new ArchiveTally(feed.discs.length);
    feed.tally.addRows(columns, solarClock(feed.longitude));
  }
}

function numberOf(text: string | undefined): number {
  return text === undefined || text === '' ? NaN : Number(text);
}

function timeOf(text: string | undefined): number {
  return text === undefined || text === '' ? NaN : Date.parse(text);
}
