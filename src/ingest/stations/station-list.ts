// A list of stations that the user gives, so that bulletins and files without a position find their place: a table with
// headings, or the list that goes with the IGRA archive.

import { DuskveerError, type Problem } from '../../air/index.ts';
import type { Station } from '../../profile/index.ts';
import { numberIn, saysMissing } from '../csv/cells.ts';
import type { Meaning } from '../csv/headings.ts';
import { rowsOf } from '../csv/rows.ts';
import { findTable, type Table } from '../csv/table.ts';
import { headOf, looksLikeText } from '../head.ts';
import type { ByteSource } from '../source.ts';
import { degreesIn } from './degrees.ts';
import { archiveStation, isArchiveLine } from './fixed-list.ts';

export interface StationList {
  readonly stations: readonly Station[];
  readonly problems: readonly Problem[];
}

/** All stations of the world many times over; a longer table is something else. */
const MOST_STATIONS = 500_000;
/** Rows that cannot be used are told one by one up to here. */
const TOLD = 5;
/** Of a list's identifiers so many are different ones. */
const MOSTLY = 0.8;
/** A table with any of these is one of measurements. */
const MEASURED: ReadonlySet<Meaning> = new Set<Meaning>([
  ...(['time', 'epoch', 'date', 'clock', 'year', 'month', 'day', 'hour', 'minute', 'second'] as const),
  ...(['speed', 'direction', 'u', 'v', 'verticalSpeed', 'pressure', 'temperature', 'dewPoint'] as const),
  ...(['relativeHumidity', 'specificHumidity', 'mixingRatio', 'signal', 'speedUncertainty'] as const),
]);
/** How the elevation is headed, the surest first. */
const ELEVATIONS: readonly Meaning[] = ['elevation', 'heightAmsl', 'heightAgl'];

/** Columns of a table of stations, by place. */
interface ListColumns {
  readonly id: number;
  readonly name: number;
  readonly latitude: number;
  readonly longitude: number;
  readonly elevation: number;
}

/** Whether a file that begins so is a list of stations, by its headings or by the archive's columns. */
export function isStationList(head: Uint8Array): boolean {
  if (isArchiveList(head)) return true;
  const table = findTable(head, {});
  const columns = table === null ? null : columnsOf(table);
  if (table === null || columns === null) return false;
  // Where a station comes again and again, the columns that no one knows hold what was measured there.
  const ids = table.sample.map((row) => row[columns.id] ?? '').filter((id) => id !== '');
  return new Set(ids).size >= MOSTLY * ids.length;
}

/**
 * Reads a list of stations. A row that cannot be used is a problem that names it; the rest is used.
 * @throws DuskveerError `ingest/no-station-list` when the file is none
 * @throws Cancelled
 */
export async function readStationList(source: ByteSource, signal?: AbortSignal): Promise<StationList> {
  const head = await headOf(source);
  const collector = new Collector(source.name);
  if (isArchiveList(head)) await takeArchive(source, collector);
  else {
    const table = findTable(head, {});
    const columns = table === null ? null : columnsOf(table);
    if (table === null || columns === null) throw noStationList(source.name, table);
    const problems: Problem[] = [];
    for await (const { cells, firstLine } of rowsOf(source, table, signal, problems)) {
      cells.forEach((row, k) => collector.takeRow(row, firstLine + k, table, columns));
    }
    collector.problems.push(...problems);
  }
  return collector.finish();
}

function isArchiveList(head: Uint8Array): boolean {
  if (!looksLikeText(head.subarray(0, 2048))) return false;
  const [first = '', second = ''] = new TextDecoder('windows-1252').decode(head.subarray(0, 400)).split(/\r?\n/u);
  return isArchiveLine(first) && (second === '' || isArchiveLine(second));
}

async function takeArchive(source: ByteSource, collector: Collector): Promise<void> {
  const decoder = new TextDecoder('windows-1252');
  let text = '';
  let line = 0;
  const take = (lines: readonly string[]): void => {
    for (const each of lines) collector.takeArchiveLine(each, ++line);
  };
  for await (const piece of source.stream()) {
    const lines = (text + decoder.decode(piece, { stream: true })).split(/\r?\n/u);
    text = lines.pop()!.slice(0, 1000);
    take(lines);
  }
  if (text.trim() !== '') take([text]);
}

/** The columns of a list of stations; null where the table is none. */
function columnsOf({ columns }: Table): ListColumns | null {
  const meanings = columns.map(({ heading }) => heading?.meaning);
  if (meanings.some((meaning) => meaning !== undefined && MEASURED.has(meaning))) return null;
  const place = (meaning: Meaning): number => meanings.indexOf(meaning);
  const [id, second] = [...meanings.keys()].filter((k) => meanings[k] === 'station');
  const name = place('name') >= 0 ? place('name') : (second ?? -1);
  const found = { name, latitude: place('latitude'), longitude: place('longitude') };
  if (found.latitude < 0 || found.longitude < 0 || (id === undefined && name < 0)) return null;
  const elevation = ELEVATIONS.map(place).find((at) => at >= 0) ?? -1;
  return { id: id ?? name, ...found, elevation };
}

class Collector {
  readonly problems: Problem[] = [];
  readonly #source: string;
  readonly #stations = new Map<string, Station>();
  #unusable = 0;

  constructor(source: string) {
    this.#source = source;
  }

  takeRow(row: readonly string[], line: number, table: Table, columns: ListColumns): void {
    const text = (place: number): string => (row[place] ?? '').trim();
    if (row.every((cell) => cell.trim() === '')) return;
    const id = text(columns.id);
    if (id === '') {
      this.#tell(line, 'The row has no identifier.', 'Give every station the identifier that its reports carry.');
      return;
    }
    const latitude = degreesIn(text(columns.latitude), table.decimalComma);
    const longitude = degreesIn(text(columns.longitude), table.decimalComma);
    if (!(Math.abs(latitude) <= 90) || !(Math.abs(longitude) <= 360)) {
      const written = shown(`${text(columns.latitude)}, ${text(columns.longitude)}`);
      this.#tell(
        line,
        `The position “${written}” of station ${shown(id)} cannot be read or lies not on Earth; the row is left out.`,
        'Write latitude and longitude in degrees, north and east positive: 52.50,-8.25.',
      );
      return;
    }
    const height = text(columns.elevation).replace(/(?<=\d)\s*(?:m|ft)$/u, '');
    const written = numberIn(height, table.decimalComma);
    const elevation = written * (table.columns[columns.elevation]?.heading?.unit?.scale ?? 1);
    const isHeight = elevation >= -500 && elevation <= 9000;
    if (!isHeight && !saysMissing(height) && !(written <= -998)) {
      const what = `The elevation “${shown(height)}” of station ${shown(id)} is none; taken as not known.`;
      this.#tell(line, what, 'Write it in metres above sea level, or with the unit in the heading: elevation_ft.');
    }
    const name = columns.name < 0 ? '' : text(columns.name);
    this.#add(
      {
        id,
        name: name === '' ? id : name,
        latitude,
        longitude: longitude > 180 ? longitude - 360 : longitude,
        elevation: isHeight ? elevation : NaN,
      },
      line,
    );
  }

  takeArchiveLine(text: string, line: number): void {
    if (text.trim() === '') return;
    if (isArchiveLine(text)) this.#add(archiveStation(text), line);
    else {
      const what = 'The line has not the columns of the archive’s station list; passed over.';
      this.#tell(line, what, 'Fetch the list from the archive again.');
    }
  }

  finish(): StationList {
    if (this.#unusable > TOLD) {
      this.problems.push({
        code: 'ingest/station-row',
        what: `${this.#unusable - TOLD} more rows cannot be used as they stand.`,
        mend: 'Mend them in the same way.',
        where: { source: this.#source },
      });
    }
    if (this.#stations.size === 0 && this.problems.length === 0) {
      this.problems.push({
        code: 'ingest/station-list-empty',
        what: 'The list names no station.',
        mend: 'Write a row a station below the headings.',
        where: { source: this.#source },
      });
    }
    return { stations: [...this.#stations.values()], problems: this.problems };
  }

  /** @throws DuskveerError when there are more than the world has */
  #add(station: Station, line: number): void {
    const known = this.#stations.get(station.id);
    if (known === undefined) this.#stations.set(station.id, station);
    else if (known.latitude !== station.latitude || known.longitude !== station.longitude) {
      const what = `Station ${shown(station.id)} stands a second time, elsewhere; the first row counts.`;
      this.#tell(line, what, 'Keep one row a station.');
    }
    if (this.#stations.size <= MOST_STATIONS) return;
    throw new DuskveerError({
      code: 'ingest/station-list-too-long',
      what: `The list names more than ${MOST_STATIONS} stations.`,
      mend: 'Check that it is the right file; keep the stations that the reports come from.',
      where: { source: this.#source, line },
    });
  }

  #tell(line: number, what: string, mend: string): void {
    this.#unusable++;
    if (this.#unusable > TOLD) return;
    this.problems.push({ code: 'ingest/station-row', what, mend, where: { source: this.#source, line } });
  }
}

function noStationList(source: string, table: Table | null): DuskveerError {
  const headings = (table?.columns ?? []).map(({ text }) => text).join(', ');
  return new DuskveerError({
    code: 'ingest/no-station-list',
    what: `This is no list of stations${headings === '' ? '' : `: its headings are ${shown(headings)}`}.`,
    mend: 'Give a table with the headings identifier,name,latitude,longitude,elevation and a row a station.',
    where: { source, line: 1 },
  });
}

/** A foreign text, fit to stand in a message. */
function shown(text: string): string {
  const plain = text.replace(/[\p{Cc}\p{Cf}\ufffd]/gu, '·').trim();
  return plain.length > 60 ? `${plain.slice(0, 60)}…` : plain;
}
