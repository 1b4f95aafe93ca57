// The rows of a table as they stream in, each an array of cells, with the line each batch begins at.

import Papa from 'papaparse';
import { DuskveerError, throwIfCancelled, type Problem } from '../../air/index.ts';
import type { ByteSource } from '../source.ts';
import type { Table } from './table.ts';

/** Bytes decoded and parsed at once. */
const PIECE = 256 * 1024;
/** A single row longer than this many characters is no row. */
const LONGEST_ROW = 2 ** 20;
/** Whole ones only: the end of a line cut off by the end of a piece is yet to come. */
const COMMENT_LINES = /^(?:#|%|!|\/\/).*\n/gmu;

export interface Rows {
  readonly cells: readonly (readonly string[])[];
  /** Line of the first row, from one; rows follow line by line. Comments are rows of one empty cell. */
  readonly firstLine: number;
  /** The last row stands at the end of the file without a line end. */
  readonly cutShort: boolean;
}

/**
 * Streams the rows below the heading.
 * @param problems takes the note of a quotation mark that is never closed
 * @throws DuskveerError `ingest/csv-row-too-long` where no line end comes
 * @throws Cancelled
 */
export async function* rowsOf(
  source: ByteSource,
  table: Table,
  signal: AbortSignal | undefined,
  problems: Problem[],
): AsyncGenerator<Rows> {
  const decoder = new TextDecoder(table.encoding);
  let text = '';
  let carriage = '';
  let line = 1;
  let quoting = true;

  const take = (more: string, last: boolean): Rows | null => {
    let fresh = carriage + more;
    carriage = '';
    if (!last && fresh.endsWith('\r')) {
      // Half of a line end: the other half may come with the next piece.
      carriage = '\r';
      fresh = fresh.slice(0, -1);
    }
    text += fresh.includes('\r') ? fresh.replace(/\r\n?/gu, '\n') : fresh;
    while (line <= table.lastHeadLine) {
      const end = text.indexOf('\n');
      if (end < 0) {
        if (text.length > LONGEST_ROW) throw tooLong(source.name, line);
        if (!last) return null;
      }
      text = end < 0 ? '' : text.slice(end + 1);
      line++;
    }
    const cutShort = last && !text.endsWith('\n');
    if (/(?:^|\n)(?:#|%|!|\/\/)/u.test(text)) text = (last ? `${text}\n` : text).replace(COMMENT_LINES, '\n');
    let parsed = parse(text, table.delimiter, quoting, !last);
    if (quoting && parsed.unclosed(last)) {
      quoting = false;
      const where = { source: source.name, line: line + parsed.rows.length - (last ? 1 : 0) };
      problems.push({
        code: 'ingest/csv-quote-open',
        what: 'A quotation mark is opened here and never closed; from here on quotation marks are taken as they stand.',
        mend: 'Remove the stray quotation mark.',
        where,
      });
      parsed = parse(text, table.delimiter, quoting, !last);
    }
    if (text.length - parsed.cursor > LONGEST_ROW) throw tooLong(source.name, line + parsed.rows.length);
    text = text.slice(parsed.cursor);
    if (parsed.rows.length === 0) return null;
    const rows = { cells: parsed.rows, firstLine: line, cutShort };
    line += parsed.lines;
    return rows;
  };

  for await (const piece of source.stream()) {
    for (let at = 0; at < piece.length; at += PIECE) {
      throwIfCancelled(signal);
      const rows = take(decoder.decode(piece.subarray(at, at + PIECE), { stream: true }), false);
      if (rows !== null) yield rows;
    }
  }
  const rows = take(decoder.decode(), true);
  if (rows !== null) yield rows;
}

interface Parsed {
  readonly rows: string[][];
  /** Characters used up. */
  readonly cursor: number;
  /** Lines used up: more than rows where quoted cells hold line ends. */
  readonly lines: number;
  unclosed(last: boolean): boolean;
}

function parse(text: string, delimiter: string, quoting: boolean, ignoreLastRow: boolean): Parsed {
  const parser = new Papa.Parser({ delimiter, newline: '\n', ...(quoting ? {} : { fastMode: true }) });
  const { data, errors, meta } = parser.parse(text, 0, ignoreLastRow) as Papa.ParseResult<string[]>;
  const cursor = ignoreLastRow ? meta.cursor : text.length;
  const quoted = quoting && text.includes('"');
  return {
    rows: data,
    cursor,
    lines: quoted ? countLineEnds(text, cursor) : data.length,
    unclosed: (last) =>
      quoted && (last ? errors.some(({ code }) => code === 'MissingQuotes') : text.length - cursor > LONGEST_ROW),
  };
}

function countLineEnds(text: string, end: number): number {
  let count = 0;
  for (let at = text.indexOf('\n'); at >= 0 && at < end; at = text.indexOf('\n', at + 1)) count++;
  return count;
}

function tooLong(source: string, line: number): DuskveerError {
  return new DuskveerError({
    code: 'ingest/csv-row-too-long',
    what: `No line end comes within ${LONGEST_ROW} characters.`,
    mend: 'From here on this is no table of text: check the file, or read what comes before only.',
    where: { source, line },
  });
}
