// Takes the rows of a table one by one, puts their levels together to profiles and hands out blocks of them.

import { parseUnit, type ParsedUnit, type Problem } from '../../air/index.ts';
import { INSTRUMENTS, type Instrument, type ProfileBlock, type Station } from '../../profile/index.ts';
import { siteStation, type Site } from '../../site/index.ts';
import { stationBySite, type KnownStations } from '../site-station.ts';
import { assumedUnit } from './assumed-units.ts';
import { isFill, numberIn, saysMissing } from './cells.ts';
import type { LevelMeaning } from './headings.ts';
import { LevelStore } from './level-store.ts';
import type { Plan } from './plan.ts';
import type { RowTime } from './row-time.ts';
import type { Rows } from './rows.ts';
import type { Table } from './table.ts';
import { toProfiles, type ProfileHead } from './to-profiles.ts';
import { Unreadable } from './unreadable.ts';

/** Levels held before profiles are handed out. */
const BATCH = 100_000;
/** Values looked at to find a unit. */
const LOOK = 4096;

/** A collector serves one table. */
export class Collector {
  readonly #table: Table;
  readonly #plan: Plan;
  readonly #time: RowTime;
  readonly #known: KnownStations;
  readonly #source: string;
  readonly #fileStation: string;
  readonly #store: LevelStore;
  readonly #unreadable: Unreadable;
  readonly #columnOf: ReadonlyMap<LevelMeaning, number>;
  #units: Map<LevelMeaning, ParsedUnit> | null = null;
  #notes: readonly string[] = [];

  #heads: ProfileHead[] = [];
  #groups = new Map<string, number>();
  readonly #handedOut = new Set<string>();
  #lastTime = NaN;
  #lastPlace = '';
  #lastGroup = -1;
  /** Rows that go back to a profile left before. */
  #returns = 0;
  #rows = 0;
  readonly #stations = new Map<string, Station>();

  constructor(table: Table, plan: Plan, time: RowTime, known: KnownStations, source: string, fileStation: string) {
    this.#table = table;
    this.#plan = plan;
    this.#time = time;
    this.#known = known;
    this.#source = source;
    this.#fileStation = fileStation;
    this.#store = new LevelStore([
      ...plan.quantities.keys(),
      ...(plan.layout === 'wide' ? (['heightAgl'] as const) : []),
    ]);
    this.#columnOf = new Map(this.#store.meanings.map((meaning, index) => [meaning, index]));
    this.#unreadable = new Unreadable(source);
  }

  /** Takes rows; a block of finished profiles when there are enough, else null. */
  take(rows: Rows): ProfileBlock | null {
    const last = rows.cells.length - 1;
    for (let k = 0; k <= last; k++) {
      const row = rows.cells[k]!;
      if (row.length === 1 && row[0]!.trim() === '') continue;
      const line = rows.firstLine + k;
      if (row.length < this.#table.columns.length && rows.cutShort && k === last) {
        this.#unreadable.cutShort(line);
        continue;
      }
      if (row.length !== this.#table.columns.length)
        this.#unreadable.width(line, row.length, this.#table.columns.length);
      this.#takeRow(row, line);
    }
    // Rows sorted by height first come back to every profile again and again: then all must be held to the end.
    if (this.#store.count < BATCH || this.#returns * 10 > this.#rows) return null;
    return this.#handOut(this.#heads.length - 1);
  }

  /** The profiles that are left. */
  finish(): ProfileBlock | null {
    return this.#heads.length === 0 ? null : this.#handOut(this.#heads.length);
  }

  /** What could not be read, once all is taken. */
  problems(): Problem[] {
    return this.#unreadable.problems();
  }

  #takeRow(row: readonly string[], line: number): void {
    const timeMs = this.#time.read(row);
    if (Number.isNaN(timeMs)) {
      this.#unreadable.time(line, this.#time.written(row));
      return;
    }
    this.#rows++;
    const place = this.#placeKey(row);
    let group = this.#lastGroup;
    if (timeMs !== this.#lastTime || place !== this.#lastPlace || group < 0) {
      this.#lastTime = timeMs;
      this.#lastPlace = place;
      group = this.#groupOf(row, place, timeMs, line);
      this.#lastGroup = group;
    } else if (this.#plan.layout === 'wide') this.#unreadable.repeat(line);
    for (const level of this.#plan.levels) this.#takeLevel(row, level, group, line);
  }

  #takeLevel(row: readonly string[], level: Plan['levels'][number], group: number, line: number): void {
    const at = this.#store.next(group);
    if (!Number.isNaN(level.height)) this.#store.columns[this.#columnOf.get('heightAgl')!]![at] = level.height;
    for (const { meaning, cell } of level.cells) {
      const text = row[cell];
      if (text === undefined || text === '') continue;
      const value = numberIn(text, this.#table.decimalComma);
      if (Number.isNaN(value)) {
        if (!saysMissing(text)) this.#unreadable.cell(line, this.#table.columns[cell]!.text, text);
      } else if (isFill(value, meaning)) this.#heads[group]!.filled = true;
      else this.#store.columns[this.#columnOf.get(meaning)!]![at] = value;
    }
  }

  #placeKey(row: readonly string[]): string {
    const { station, name, latitude, longitude } = this.#plan.once;
    const key = station ?? name;
    if (key !== undefined) return row[key] ?? '';
    return latitude === undefined ? '' : `${row[latitude] ?? ''} ${row[longitude ?? latitude] ?? ''}`;
  }

  #groupOf(row: readonly string[], place: string, timeMs: number, line: number): number {
    const key = `${timeMs} ${place}`;
    const known = this.#groups.get(key);
    if (known !== undefined) {
      this.#returns++;
      return known;
    }
    if (this.#handedOut.has(key)) this.#unreadable.repeat(line);
    const group = this.#heads.length;
    this.#groups.set(key, group);
    const station = this.#stationOf(row);
    this.#heads.push({
      station,
      instrument: this.#instrumentOf(row, station),
      timeMs,
      periodS: this.#once(row, 'period'),
      filled: false,
    });
    return group;
  }

  #stationOf(row: readonly string[]): Station {
    const { once } = this.#plan;
    const { stated } = this.#table;
    const text = (meaning: 'station' | 'name'): string =>
      ((once[meaning] === undefined ? stated[meaning] : row[once[meaning]]) ?? '').trim();
    const id = text('station') || text('name') || this.#fileStation;
    const [latitude, longitude, elevation] = (['latitude', 'longitude', 'elevation'] as const).map((meaning) =>
      this.#once(row, meaning),
    ) as [number, number, number];
    const key = `${id} ${latitude} ${longitude} ${elevation}`;
    let station = this.#stations.get(key);
    if (station === undefined) {
      const wrong =
        !(Math.abs(latitude) <= 90 || Number.isNaN(latitude)) ||
        !(Math.abs(longitude) <= 360 || Number.isNaN(longitude));
      if (wrong) this.#unreadable.position(id);
      station = stationBySite(this.#known, {
        id,
        name: text('name') || id,
        latitude: wrong ? NaN : latitude,
        longitude: wrong ? NaN : longitude > 180 ? longitude - 360 : longitude,
        elevation,
      });
      this.#stations.set(key, station);
    }
    return station;
  }

  #instrumentOf(row: readonly string[], station: Station): Instrument {
    const cell = this.#plan.once.instrument;
    const said = ((cell === undefined ? this.#table.stated.instrument : row[cell]) ?? '').trim().toLowerCase();
    const named = INSTRUMENTS.find((instrument) => instrument === said.replace(/[\s_]/gu, '-'));
    return siteStation(this.#known.site, station.id)?.instrument ?? named ?? 'unknown';
  }

  /** A number that stands once a profile, in its unit or the common one; NaN where there is none. */
  #once(row: readonly string[], meaning: 'latitude' | 'longitude' | 'elevation' | 'period'): number {
    const cell = this.#plan.once[meaning];
    const text = cell === undefined ? this.#table.stated[meaning] : row[cell];
    if (text === undefined) return NaN;
    const value = numberIn(text.replace(/\s*(?:m|°|s)$/u, ''), this.#table.decimalComma);
    const unit = cell === undefined ? null : this.#table.columns[cell]!.heading!.unit;
    // A fill value there is no place on Earth.
    if (Math.abs(value) >= 9999 || value === -999) return NaN;
    return value * (unit?.scale ?? 1);
  }

  #handOut(groupCount: number): ProfileBlock | null {
    if (groupCount <= 0) return null;
    this.#units ??= this.#decideUnits();
    const heads = this.#heads.slice(0, groupCount);
    const block = toProfiles(this.#store.takeOut(groupCount), heads, this.#units, this.#source, this.#notes);
    this.#heads = this.#heads.slice(groupCount);
    const left = new Map<string, number>();
    for (const [key, group] of this.#groups) {
      if (group >= groupCount) left.set(key, group - groupCount);
      else this.#handedOut.add(key);
    }
    this.#groups = left;
    this.#lastGroup = this.#heads.length === 0 ? -1 : this.#lastGroup - groupCount;
    return block;
  }

  #decideUnits(): Map<LevelMeaning, ParsedUnit> {
    const units = new Map<LevelMeaning, ParsedUnit>();
    const taken: string[] = [];
    for (const [meaning, stated] of this.#plan.quantities) {
      if (stated !== null) {
        units.set(meaning, stated);
        continue;
      }
      const { unit, words } = assumedUnit(meaning, this.#store.peek(meaning, LOOK));
      units.set(meaning, unit);
      if (words !== '') taken.push(words);
    }
    if (this.#plan.layout === 'wide') units.set('heightAgl', parseUnit('m')!);
    const notes = [...this.#plan.notes, ...timeNotes(this.#time, this.#plan, this.#known.site)];
    if (taken.length > 0) notes.push(`Units not stated, taken from the values: ${taken.join(', ')}.`);
    this.#notes = notes;
    return units;
  }
}

function timeNotes(time: RowTime, plan: Plan, site: Site): string[] {
  const { zoneless, epoch, ambiguousDays } = time.findings;
  const notes: string[] = [];
  if (zoneless && plan.zone !== 'utc') {
    const local = plan.zone === 'local' && site.fileTimeZone === 'UTC';
    notes.push(
      local
        ? 'The heading says local time, but the site file does not say which ("file_time_zone"): taken as UTC.'
        : `Times carry no zone: taken as ${site.fileTimeZone}.`,
    );
  }
  if (epoch) notes.push('Times are numbers: taken as seconds since 1970.');
  if (ambiguousDays)
    notes.push('Dates with strokes: it was decided from all of them which of day and month comes first.');
  return notes;
}
