// Where the table begins in a text and how it is written: encoding, delimiter, heading line, units line, decimal comma.

import Papa from 'papaparse';
import { parseUnit } from '../../air/index.ts';
import type { ColumnMapping } from '../../site/index.ts';
import { looksLikeText } from '../head.ts';
import { readHeading, type Heading } from './headings.ts';

/** A column of the table: what its heading says, and nothing where the house does not know the heading. */
export interface Column {
  readonly text: string;
  readonly heading: Heading | null;
}

export interface Table {
  readonly encoding: string;
  readonly delimiter: string;
  readonly decimalComma: boolean;
  readonly columns: readonly Column[];
  /** From one; the lines up to here hold no data. */
  readonly lastHeadLine: number;
  /** Lines before the heading of the form `name: value`, by what the name means. */
  readonly stated: Readonly<Partial<Record<Heading['meaning'], string>>>;
  /** The first rows of data, for what must be known before reading. */
  readonly sample: readonly (readonly string[])[];
}

const DELIMITERS = [',', ';', '\t', '|'];
/** Lines among which the heading is sought. */
const HEAD_LINES = 80;
const SAMPLE_ROWS = 200;
const LONGEST_HEADING = 100_000;
const COMMENT = /^\s*(?:#|%|!|\/\/)+/u;

/** The encoding a text is in: by its byte order mark, else UTF-8 if it is sound, else the old western one. */
function encodingOf(head: Uint8Array): string {
  if (head[0] === 0xff && head[1] === 0xfe) return 'utf-16le';
  if (head[0] === 0xfe && head[1] === 0xff) return 'utf-16be';
  try {
    new TextDecoder('utf-8', { fatal: true }).decode(head, { stream: true });
    return 'utf-8';
  } catch {
    return 'windows-1252';
  }
}

/**
 * Finds the table in the first bytes of a file.
 * @param mapping the user's own headings by our column names
 * @returns null when no line looks like the heading of a table
 */
export function findTable(head: Uint8Array, mapping: ColumnMapping): Table | null {
  const encoding = encodingOf(head);
  const text = new TextDecoder(encoding).decode(head).replace(/\r\n?/gu, '\n');
  const lines = text.split('\n', HEAD_LINES + SAMPLE_ROWS);
  if (/^\s*[{[<]/u.test(text)) return null;
  const heading = findHeading(lines, mapping) ?? guessHeading(lines, head, encoding);
  if (heading === null) return null;
  const { delimiter, line, texts } = heading;
  const below = lines.slice(line).filter((row) => row.trim() !== '' && !COMMENT.test(row));
  const rows = rowsOf(below.join('\n'), delimiter);
  const unitsRow = rows[0] !== undefined && isUnitsRow(rows[0]) ? rows[0] : undefined;
  const sample = unitsRow === undefined ? rows : rows.slice(1);
  const unitsLine = unitsRow === undefined ? 0 : lines.slice(line).findIndex((row) => row.trim() !== '') + 1;
  return {
    encoding,
    delimiter,
    decimalComma: delimiter !== ',' && usesDecimalComma(sample),
    columns: texts.map((cell, k) => ({ text: cell, heading: headingOf(cell, unitsRow?.[k], mapping) })),
    lastHeadLine: line + unitsLine,
    stated: statedIn(lines.slice(0, line - 1)),
    sample,
  };
}

interface FoundHeading {
  readonly delimiter: string;
  /** From one. */
  readonly line: number;
  readonly texts: readonly string[];
}

/** The line and delimiter that give the most known headings, at least two; the first line where they are the half. */
function findHeading(lines: readonly string[], mapping: ColumnMapping): FoundHeading | null {
  let best: FoundHeading | null = null;
  let bestKnown = 1;
  for (const [index, written] of lines.slice(0, HEAD_LINES).entries()) {
    const row = written.replace(COMMENT, '');
    if (row.length > LONGEST_HEADING) continue;
    for (const delimiter of DELIMITERS) {
      if (!row.includes(delimiter)) continue;
      const texts = cellsOf(row, delimiter);
      const known = texts.filter((text) => headingOf(text, undefined, mapping) !== null).length;
      if (known <= bestKnown) continue;
      best = { delimiter, line: index + 1, texts };
      bestKnown = known;
    }
    if (best !== null && 2 * bestKnown >= best.texts.length) break;
  }
  return best;
}

/** A heading in unknown words: the first line that is as many cells wide as the numbers below it. */
function guessHeading(lines: readonly string[], head: Uint8Array, encoding: string): FoundHeading | null {
  if (!encoding.startsWith('utf-16') && !looksLikeText(head.subarray(0, 2048))) return null;
  const first = lines.findIndex((line) => line.trim() !== '' && !COMMENT.test(line));
  const rows = lines.slice(first + 1, first + 6).filter((line) => line.trim() !== '' && !COMMENT.test(line));
  if (first < 0 || rows.length < 2) return null;
  for (const delimiter of DELIMITERS) {
    const texts = cellsOf(lines[first]!, delimiter);
    if (texts.length < 3) continue;
    const alike = rows.every((row) => {
      const cells = cellsOf(row, delimiter);
      return (
        cells.length === texts.length && 2 * cells.filter((cell) => /^\s*[-+]?\d/u.test(cell)).length > cells.length
      );
    });
    if (alike) return { delimiter, line: first + 1, texts };
  }
  return null;
}

function cellsOf(line: string, delimiter: string): string[] {
  return rowsOf(line, delimiter)[0] ?? [];
}

function rowsOf(text: string, delimiter: string): string[][] {
  return Papa.parse<string[]>(text, { delimiter, newline: '\n' }).data.map((row) => row.map((cell) => cell.trim()));
}

/** A heading by the user's mapping, else by its own words; a unit may stand in the line below. */
function headingOf(text: string, unitBelow: string | undefined, mapping: ColumnMapping): Heading | null {
  const plain = text.trim().toLowerCase();
  const ours = Object.entries(mapping).find(([, theirs]) => theirs.trim().toLowerCase() === plain)?.[0];
  const own = ours === undefined ? readHeading(text) : readHeading(ours);
  if (own === null) return null;
  const unitOfText =
    ours === undefined || own.unit !== null ? null : (/[[(]([^\])]*)[\])]\s*$/u.exec(text)?.[1] ?? null);
  const unit = unitOfText ?? (own.unit === null && own.wrongUnit === '' ? unitBelow : undefined);
  if (unit === undefined || unit.trim() === '' || /^[-[\](){}\s]*$/u.test(unit)) return { ...own, text };
  const withUnit = readHeading(`${ours ?? text} [${unit.replace(/[[\](){}]/gu, '')}]`);
  return { ...(withUnit ?? own), text };
}

/** No number in it, and most of what stands there are units. */
function isUnitsRow(cells: readonly string[]): boolean {
  const filled = cells.filter((cell) => cell !== '');
  if (filled.length === 0 || filled.some((cell) => /^[-+]?[\d.,]+$/u.test(cell) && cell !== '1')) return false;
  const units = filled.filter(
    (cell) => cell === '-' || parseUnit(cell) !== null || /^(?:utc|iso|text|yyyy)/iu.test(cell),
  );
  return 2 * units.length > filled.length;
}

function usesDecimalComma(sample: readonly (readonly string[])[]): boolean {
  let commas = 0;
  let stops = 0;
  for (const row of sample) {
    for (const cell of row) {
      if (/^[-+]?\d*,\d+(?:e[-+]?\d+)?$/iu.test(cell)) commas++;
      else if (/^[-+]?\d*\.\d+(?:e[-+]?\d+)?$/iu.test(cell)) stops++;
    }
  }
  return commas > stops;
}

function statedIn(lines: readonly string[]): Table['stated'] {
  const stated: Partial<Record<Heading['meaning'], string>> = {};
  for (const line of lines) {
    const match = /^[\s#%!/"]*([^:=,;\t]{1,40}?)\s*[:=]\s*([^,;\t"]{1,80})/u.exec(line);
    const meaning = match === null ? undefined : readHeading(match[1]!)?.meaning;
    if (meaning !== undefined) stated[meaning] ??= match![2]!.trim();
  }
  return stated;
}
