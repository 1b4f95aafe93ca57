// The archive's tables out of files of the browser, portion by portion, so that ten years need no more room than a few rows.

import Papa from 'papaparse';
import { Cancelled, type Problem } from '../../air/index.ts';
import {
  ArchiveTableReader,
  archiveTableKind,
  readArchiveAbout,
  type ArchiveAbout,
  type ArchiveTableKind,
  type ArchiveView,
  TransportTableReader,
  type TableCell,
  type TransportHistory,
} from '../../desk/index.ts';
import type { OpenFile } from './protocol.ts';

/** Characters of text handed on together, about. */
const PIECE = 2 ** 20;
/** Rows of a Parquet file taken together. */
const PORTION = 10_000;
const LARGEST_ABOUT = 2 ** 20;

type Container = 'csv' | 'parquet' | 'json';

interface TableFile {
  readonly file: OpenFile;
  readonly kind: ArchiveTableKind | 'about';
  readonly container: Container;
  readonly columns: readonly string[];
}

/** What a file of a scan's result holds; null for a file that is none. */
export async function archiveFileOf(file: OpenFile): Promise<TableFile | null> {
  const { blob } = file;
  const start = await blob.slice(0, 4).text();
  if (start === 'PAR1') {
    const columns = await parquetColumns(blob).catch(() => []);
    const kind = archiveTableKind(columns);
    return kind === null ? null : { file, kind, container: 'parquet', columns };
  }
  if (start.trimStart().startsWith('{')) {
    if (blob.size > LARGEST_ABOUT || readArchiveAbout(await blob.text()) === null) return null;
    return { file, kind: 'about', container: 'json', columns: [] };
  }
  const LONGEST_HEADING = 2 ** 16;
  const columns = rowsOf((await blob.slice(0, LONGEST_HEADING).text()).split('\n', 1)[0]!)[0] ?? [];
  const kind = archiveTableKind(columns);
  return kind === null ? null : { file, kind, container: 'csv', columns };
}

type RowTaker = Pick<ArchiveTableReader, 'take'>;

export interface ArchiveReading {
  readonly signal: AbortSignal;
  /** Told the bytes taken so far of all that will be read, and the table at hand. */
  readonly onProgress: (bytesRead: number, bytesTotal: number, current: string) => void;
}

/** @throws Cancelled when the signal is raised */
export async function readArchiveTables(
  files: readonly OpenFile[],
  { signal, onProgress }: ArchiveReading,
): Promise<{ views: ArchiveView[]; problems: Problem[]; transports: Map<string, TransportHistory> }> {
  const tables = (await Promise.all(files.map(archiveFileOf))).filter((table) => table !== null);
  const reader = new ArchiveTableReader();
  const transports = new TransportTableReader();
  const both: RowTaker = {
    take(rows) {
      reader.take(rows);
      transports.take(rows);
    },
  };
  const problems: Problem[] = [];
  const ordered = (['nights', 'profiles'] as const).flatMap((kind) => tables.filter((table) => table.kind === kind));
  const wanted = ordered.filter((table) => !hasTwin(table, tables));
  const bytesTotal = wanted.reduce((sum, { file }) => sum + file.blob.size, 0);
  let bytesBefore = 0;
  for (const table of wanted) {
    const { name, blob } = table.file;
    const brokenBefore = reader.broken;
    const tell = (bytes: number): void => {
      if (signal.aborted) throw new Cancelled();
      onProgress(bytesBefore + bytes, bytesTotal, name);
    };
    try {
      reader.begin(table.columns);
      transports.begin(table.columns);
      await (table.container === 'parquet' ? readParquet(blob, both, tell) : readCsv(blob, both, tell));
    } catch (error) {
      if (error instanceof Cancelled) throw error;
      problems.push(unreadable(name, error));
    }
    if (reader.broken > brokenBefore) problems.push(brokenRows(name, reader.broken - brokenBefore));
    bytesBefore += blob.size;
  }
  return { views: reader.views(await aboutOf(tables)), problems, transports: transports.histories() };
}

/** A scan writes each table twice; the CSV is left aside where the same table is at hand as Parquet. */
function hasTwin(table: TableFile, tables: readonly TableFile[]): boolean {
  const stem = ({ file }: TableFile): string => file.name.replace(/\.[^.]*$/u, '');
  return (
    table.container === 'csv' &&
    tables.some((other) => other.container === 'parquet' && other.kind === table.kind && stem(other) === stem(table))
  );
}

async function aboutOf(tables: readonly TableFile[]): Promise<ArchiveAbout | null> {
  const table = tables.find(({ kind }) => kind === 'about');
  return table === undefined ? null : readArchiveAbout(await table.file.blob.text());
}

async function readCsv(blob: Blob, reader: RowTaker, tell: (bytes: number) => void): Promise<void> {
  const pieces = blob.stream().getReader();
  const decoder = new TextDecoder();
  let text = '';
  let headed = false;
  let bytes = 0;
  for (;;) {
    const { done, value } = await pieces.read();
    bytes += value?.length ?? 0;
    text += done ? decoder.decode() : decoder.decode(value, { stream: true });
    if (!done && text.length < PIECE) continue;
    const end = done ? text.length : endOfLastRow(text);
    const rows = rowsOf(text.slice(0, end));
    text = text.slice(end);
    reader.take(headed ? rows : rows.slice(1));
    headed ||= rows.length > 0;
    tell(bytes);
    if (done) return;
    await breath();
  }
}

function rowsOf(text: string): string[][] {
  return Papa.parse<string[]>(text, { delimiter: ',', skipEmptyLines: true }).data;
}

/** Behind the last line end that stands in no quotes. */
function endOfLastRow(text: string): number {
  const quotesIn = (from: number, to: number): number => {
    let count = 0;
    for (let at = text.indexOf('"', from); at >= 0 && at < to; at = text.indexOf('"', at + 1)) count++;
    return count;
  };
  let end = text.lastIndexOf('\n') + 1;
  let quotes = quotesIn(0, end);
  while (end > 0 && quotes % 2 === 1) {
    const earlier = text.lastIndexOf('\n', end - 2) + 1;
    quotes -= quotesIn(earlier, end);
    end = earlier;
  }
  return end;
}

/** The library for Parquet is fetched when the first such file comes. */
const parquet = (): Promise<typeof import('hyparquet')> => import('hyparquet');

function bytesOf(blob: Blob): { byteLength: number; slice: (from: number, to?: number) => Promise<ArrayBuffer> } {
  return { byteLength: blob.size, slice: (from, to) => blob.slice(from, to).arrayBuffer() };
}

async function parquetColumns(blob: Blob): Promise<string[]> {
  const { parquetMetadataAsync, parquetSchema } = await parquet();
  return parquetSchema(await parquetMetadataAsync(bytesOf(blob))).children.map(({ element }) => element.name);
}

async function readParquet(blob: Blob, reader: RowTaker, tell: (bytes: number) => void): Promise<void> {
  const { parquetMetadataAsync, parquetReadObjects, parquetSchema } = await parquet();
  const file = bytesOf(blob);
  const metadata = await parquetMetadataAsync(file);
  const columns = parquetSchema(metadata).children.map(({ element }) => element.name);
  let rowStart = 0;
  for (const group of metadata.row_groups) {
    const rowEnd = rowStart + Number(group.num_rows);
    const rows = await parquetReadObjects({ file, metadata, rowStart, rowEnd });
    for (let from = 0; from < rows.length; from += PORTION) {
      const part = rows.slice(from, from + PORTION);
      reader.take(part.map((row) => columns.map((name) => row[name] as TableCell)));
      tell(((rowStart + from + part.length) / Number(metadata.num_rows)) * blob.size);
      await breath();
    }
    rowStart = rowEnd;
  }
}

/** Lets the worker hear what the page says meanwhile. */
export function breath(): Promise<void> {
  return new Promise((resolve) => {
    const { port1, port2 } = new MessageChannel();
    port1.onmessage = () => {
      port1.close();
      resolve();
    };
    port2.postMessage(null);
  });
}

function brokenRows(name: string, count: number): Problem {
  return {
    code: 'board/table-rows-broken',
    what: `${count === 1 ? 'A row' : `${count} rows`} of ${name} ${count === 1 ? 'is' : 'are'} cut short or without a time and left out.`,
    mend: 'Call scan again and drop its tables once it says that it is done.',
    where: { source: name },
  };
}

function unreadable(name: string, error: unknown): Problem {
  return {
    code: 'board/table-unreadable',
    what: `The table ${name} cannot be read to its end (${error instanceof Error ? error.message : String(error)}).`,
    mend: 'Call scan again and drop its tables once it says that it is done, or drop the CSV instead.',
    where: { source: name },
  };
}
