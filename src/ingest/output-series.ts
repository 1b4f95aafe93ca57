// A farm's actual output as its own systems write it: a table of times and power. Not a profile, so beside the front door.

import Papa from 'papaparse';
import type { Problem } from '../air/index.ts';
import { numberIn, saysMissing } from './csv/cells.ts';
import { monthFirstIn, TimeText } from './csv/time-text.ts';

/** Output by time, ascending, each time once. */
export interface OutputReading {
  /** UTC, ms */
  readonly timeMs: Float64Array;
  /** kW; NaN missing */
  readonly powerKw: Float64Array;
  readonly problems: readonly Problem[];
  /** How what was not stated was taken, in words. */
  readonly notes: readonly string[];
}

const TIME_HEADING = /time|date|datum|zeit|fecha|utc/iu;
const POWER_HEADING =
  /power|output|generation|production|leistung|potencia|puissance|(?:^|[\s_([])[kmg]?w(?:$|[\s_)\]])/iu;
const UNIT = /(?:^|[\s_([])([kmg]?w)(?:$|[\s_)\]])/iu;
const KILOWATTS: Readonly<Record<string, number>> = { w: 1e-3, kw: 1, mw: 1e3, gw: 1e6 };
/** Rows that cannot be read are told one by one up to here. */
const TOLD = 5;

/**
 * Reads a table of times and power with one heading line. The unit stands in the heading (`output_mw`, `Power [kW]`); where
 * it does not, kW is taken and said. Of equal times the last one counts.
 * @param zone IANA name of the zone of times that state none
 */
export function readOutputSeries(name: string, text: string, zone = 'UTC'): OutputReading {
  const parsed = Papa.parse<string[]>(text.replace(/^\uFEFF/u, ''), { skipEmptyLines: 'greedy', comments: '#' });
  const [heading, ...rows] = parsed.data;
  const headings = heading?.map((cell) => cell.trim()) ?? [];
  const timeColumn = headings.findIndex((cell) => TIME_HEADING.test(cell));
  const powerColumn = headings.findIndex((cell, k) => k !== timeColumn && POWER_HEADING.test(cell));
  if (timeColumn < 0 || powerColumn < 0) return nothing(name, headings);

  const unit = UNIT.exec(headings[powerColumn]!)?.[1]?.toLowerCase();
  const scale = KILOWATTS[unit ?? 'kw']!;
  const comma = parsed.meta.delimiter !== ',';
  const times = new TimeText(zone, monthFirstIn(rows.slice(0, 500).map((row) => row[timeColumn] ?? '')));
  const byTime = new Map<number, number>();
  const bad: number[] = [];
  rows.forEach((row, k) => {
    const timeMs = times.read(row[timeColumn] ?? '');
    const cell = row[powerColumn] ?? '';
    const value = saysMissing(cell) ? NaN : numberIn(cell, comma);
    if (Number.isNaN(timeMs) || (Number.isNaN(value) && !saysMissing(cell)) || Math.abs(value) === Infinity)
      bad.push(k + 2);
    else byTime.set(timeMs, value * scale);
  });
  const sorted = [...byTime].sort(([a], [b]) => a - b);
  const notes: string[] = [];
  if (unit === undefined) notes.push(`${headings[powerColumn]} states no unit: taken as kW`);
  if (times.findings.zoneless) notes.push(`times state no zone: taken as ${zone}`);
  return {
    timeMs: Float64Array.from(sorted, ([timeMs]) => timeMs),
    powerKw: Float64Array.from(sorted, ([, power]) => power),
    problems: unreadableRows(name, bad),
    notes,
  };
}

function nothing(name: string, headings: readonly string[]): OutputReading {
  const said =
    headings.length === 0 ? 'The file is empty.' : `The headings ${headings.join(', ')} name no time and power.`;
  const problem: Problem = {
    code: 'ingest/output-headings',
    what: said,
    mend: 'Give a table whose first line names a time column and a power column with its unit: time,output_mw.',
    where: { source: name, line: 1 },
  };
  return { timeMs: new Float64Array(0), powerKw: new Float64Array(0), problems: [problem], notes: [] };
}

function unreadableRows(name: string, bad: readonly number[]): Problem[] {
  const told = bad.slice(0, TOLD).map((line): Problem => ({
    code: 'ingest/output-row',
    what: 'The row holds no time and number.',
    mend: 'Write the time as ISO 8601 and the power as a plain number; leave it empty where it is missing.',
    where: { source: name, line },
  }));
  if (bad.length <= TOLD) return told;
  const more: Problem = {
    code: 'ingest/output-row',
    what: `${bad.length - TOLD} more rows hold no time and number.`,
    mend: 'Mend them in the same way.',
    where: { source: name, line: bad[TOLD]! },
  };
  return [...told, more];
}
