// Reads the archive's own tables back: the figures out of the table of profiles, the nights out of the table of nights.

import type { FigureRows } from './figures.ts';
import { STATUSES } from './rows.ts';
import { discPrefixes } from './table-parts.ts';
import { CategoryTallies, type ArchiveNight, type ArchiveView } from './view.ts';

/** `other`: of the same scan, but nothing is read out of it. */
export type ArchiveTableKind = 'profiles' | 'nights' | 'other';

/** Which of the archive's tables has these columns; null for any other. */
export function archiveTableKind(columns: readonly string[]): ArchiveTableKind | null {
  const has = (...wanted: string[]): boolean => wanted.every((name) => columns.includes(name));
  if (has('station', 'instrument', 'time', 'night', 'status', 'usable_levels', 'nose_height_agl_m')) return 'profiles';
  if (has('station', 'instrument', 'night', 'kind', 'dark_assessable', 'peak_speed_mps')) return 'nights';
  if (has('station', 'instrument', 'time', 'night', 'rank', 'nose_height_agl_m')) return 'other';
  return has('file', 'place', 'code', 'what', 'mend', 'unread') ? 'other' : null;
}

/** What the scan tells of its tables in `columns.json`, as far as the tables do not tell it themselves. */
export interface ArchiveAbout {
  readonly criteria: string;
  /** Names of the turbine types. */
  readonly discs: readonly string[];
}

/** Reads `columns.json`; null for any other text. */
export function readArchiveAbout(text: string): ArchiveAbout | null {
  try {
    const { tables, criteria, turbines } = JSON.parse(text) as {
      tables?: { profiles?: unknown };
      criteria?: { name?: unknown };
      turbines?: { name?: unknown }[];
    };
    const texts = [criteria?.name, ...(turbines ?? []).map(({ name }) => name)];
    if (tables?.profiles === undefined || !texts.every((each) => typeof each === 'string')) return null;
    const [name, ...discs] = texts;
    return { criteria: name!, discs };
  } catch {
    return null;
  }
}

/** A cell as text of a CSV file or as the value a Parquet file holds; missing is '', null or undefined. */
export type TableCell = string | number | bigint | boolean | Date | null | undefined;
type TableRow = readonly TableCell[];

interface Feed {
  stationName: string;
  readonly instrument: string;
  longitude: number;
  graded: boolean;
  discs: readonly string[];
  tallies: CategoryTallies | null;
  /** Moments and nights already taken: a table that is given twice counts once. */
  readonly times: Set<number>;
  readonly nights: Map<string, ArchiveNight>;
  /** Names of files by night. */
  readonly files: Map<string, Set<string>>;
}

/** Gathers tables in portions of rows; those of nights first, for they know where the stations are. */
export class ArchiveTableReader {
  readonly #feeds = new Map<string, Feed>();
  #columns: readonly string[] = [];
  #kind: ArchiveTableKind | null = null;
  /** Rows left out so far since they were cut short or told no time. */
  broken = 0;

  /** Begins a table. */
  begin(columns: readonly string[]): void {
    this.#columns = columns;
    this.#kind = archiveTableKind(columns);
  }

  /** Takes rows of the table begun. */
  take(rows: readonly TableRow[]): void {
    if (this.#kind !== 'nights' && this.#kind !== 'profiles') return;
    const [station, instrument, moment] = ['station', 'instrument', this.#kind === 'nights' ? 'night' : 'time'].map(
      (name) => this.#columns.indexOf(name),
    ) as [number, number, number];
    const byFeed = new Map<string, TableRow[]>();
    for (const cells of rows) {
      // A table that is still being written, or was cut, ends in the middle of a row.
      if (cells.length < this.#columns.length || !Number.isFinite(timeOf(cells[moment]))) {
        this.broken++;
        continue;
      }
      const key = `${textOf(cells[station])}/${textOf(cells[instrument])}`;
      const known = byFeed.get(key);
      if (known === undefined) byFeed.set(key, [cells]);
      else known.push(cells);
    }
    for (const [key, ofFeed] of byFeed) {
      const feed = this.#feedOf(key, textOf(ofFeed[0]![station]), textOf(ofFeed[0]![instrument]));
      if (this.#kind === 'nights') this.#takeNights(feed, ofFeed);
      else this.#takeProfiles(feed, ofFeed);
    }
  }

  /** A view a feed, by key. */
  views(about: ArchiveAbout | null): ArchiveView[] {
    const prefixes = discPrefixes((about?.discs ?? []).map((name) => ({ ...ANY_DISC, name })));
    const named = (prefix: string): string => about?.discs[prefixes.indexOf(prefix)] ?? prefix.replaceAll('_', ' ');
    return [...this.#feeds.entries()]
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([key, feed]) => {
        const nights = [...feed.nights.values()]
          .map((night) => ({ ...night, files: [...(feed.files.get(night.night) ?? [])].filter((name) => name !== '') }))
          .sort((a, b) => (a.night < b.night ? -1 : 1));
        const tallies = feed.tallies ?? new CategoryTallies(0);
        tallies.addNights(nights);
        const { stationName, instrument, longitude, graded, discs } = feed;
        return {
          key,
          stationName,
          instrument,
          longitude,
          criteria: about?.criteria ?? '',
          discs: discs.map(named),
          figures: tallies.figures(graded),
          nights,
        };
      });
  }

  #feedOf(key: string, station: string, instrument: string): Feed {
    let feed = this.#feeds.get(key);
    if (feed === undefined) {
      feed = {
        stationName: station,
        instrument,
        longitude: NaN,
        graded: false,
        discs: [],
        tallies: null,
        times: new Set(),
        nights: new Map(),
        files: new Map(),
      };
      this.#feeds.set(key, feed);
    }
    return feed;
  }

  #takeNights(feed: Feed, rows: readonly TableRow[]): void {
    const at = (name: string): number => this.#columns.indexOf(name);
    const name = textOf(rows[0]![at('station_name')]);
    if (name !== '') feed.stationName = name;
    feed.longitude = numberOf(rows[0]![at('longitude_deg')]);
    for (const cells of rows) {
      const number = (column: string): number => numberOf(cells[at(column)]);
      const time = (column: string): number => timeOf(cells[at(column)]);
      const night = textOf(cells[at('night')]);
      const category = number('category');
      if (!Number.isNaN(category)) feed.graded = true;
      feed.nights.set(night, {
        night,
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
        files: [],
      });
    }
  }

  #takeProfiles(feed: Feed, all: readonly TableRow[]): void {
    const at = (name: string): number => this.#columns.indexOf(name);
    const [time, night, file, status, dark] = ['time', 'night', 'file', 'status', 'sun_down'].map(at) as [
      number,
      number,
      number,
      number,
      number,
    ];
    const rows = all.filter((cells) => {
      const timeMs = timeOf(cells[time]);
      if (feed.times.has(timeMs)) return false;
      feed.times.add(timeMs);
      const files = feed.files.get(textOf(cells[night]));
      if (files === undefined) feed.files.set(textOf(cells[night]), new Set([textOf(cells[file])]));
      else files.add(textOf(cells[file]));
      return true;
    });
    const ENDING = '_rews_mps';
    const prefixes = this.#columns.filter((name) => name.endsWith(ENDING)).map((name) => name.slice(0, -ENDING.length));
    // A second scan with other turbine types: its figures of the rotor would not add up with the first one's.
    const joins = feed.tallies === null || feed.discs.join() === prefixes.join();
    if (feed.tallies === null) feed.discs = prefixes;
    const numbers = (name: string): Float64Array => {
      const place = at(name);
      return Float64Array.from(rows, (cells) => numberOf(cells[place]));
    };
    const category = numbers('category');
    const columns: FigureRows = {
      timeMs: Float64Array.from(rows, (cells) => timeOf(cells[time])),
      status: Uint8Array.from(rows, (cells) =>
        Math.max(
          0,
          STATUSES.findIndex((each) => each === cells[status]),
        ),
      ),
      category,
      dark: Uint8Array.from(rows, (cells) => Number(cells[dark] === true || cells[dark] === 'yes')),
      noseHeight: numbers('nose_height_agl_m'),
      noseSpeed: numbers('nose_speed_mps'),
      noseDirection: numbers('nose_direction_deg'),
      discs: (joins ? prefixes : []).map((prefix) => ({
        equivalentSpeed: numbers(`${prefix}${ENDING}`),
        shearExponent: numbers(`${prefix}_shear_exponent`),
        veer: numbers(`${prefix}_veer_deg`),
      })),
    };
    feed.graded ||= category.some((each) => !Number.isNaN(each));
    feed.tallies ??= new CategoryTallies(feed.discs.length);
    feed.tallies.addRows(columns, feed.longitude);
  }
}

/** Prefixes hang on the names alone. */
const ANY_DISC = { hubHeight: NaN, rotorDiameter: NaN, groundElevation: NaN };

function textOf(cell: TableCell): string {
  return typeof cell === 'string' ? cell : '';
}

function numberOf(cell: TableCell): number {
  return cell === undefined || cell === null || cell === '' ? NaN : Number(cell);
}

/** UTC ms. */
export function timeOf(cell: TableCell): number {
  if (cell instanceof Date) return cell.getTime();
  return typeof cell === 'string' && cell !== '' ? Date.parse(cell) : NaN;
}
