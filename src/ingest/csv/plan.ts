// How the columns of a table make profiles: a row a level (long) or a column a height (wide).

import { DuskveerError, type ParsedUnit, type Problem } from '../../air/index.ts';
import { LEVEL_MEANINGS, type Heading, type LevelMeaning, type Meaning, type ProfileMeaning } from './headings.ts';
import type { Table } from './table.ts';

/** A cell that gives one quantity of a level. */
export interface LevelCell {
  readonly meaning: LevelMeaning;
  /** Position in the row. */
  readonly cell: number;
}

export interface Plan {
  readonly layout: 'long' | 'wide';
  /** Quantities in use, and the unit of each where headings name it. */
  readonly quantities: ReadonlyMap<LevelMeaning, ParsedUnit | null>;
  /** Long: one entry, of no height. Wide: an entry a height, m. */
  readonly levels: readonly { readonly height: number; readonly cells: readonly LevelCell[] }[];
  /** Position in the row of what stands once a profile. */
  readonly once: Readonly<Partial<Record<ProfileMeaning, number>>>;
  /** What the heading says of the zone of times. */
  readonly zone: Heading['zone'];
  readonly notes: readonly string[];
}

const TIME_MEANINGS: readonly Meaning[] = ['time', 'epoch', 'date', 'year'];
const isLevel = (meaning: Meaning): meaning is LevelMeaning => (LEVEL_MEANINGS as readonly string[]).includes(meaning);

/**
 * Makes the plan.
 * @param problems takes the note of columns whose unit is not known
 * @throws DuskveerError `ingest/csv-no-time`, `ingest/csv-no-height` with the headings that the table has
 */
export function planOf(table: Table, source: string, problems: Problem[]): Plan {
  const usable: { heading: Heading; cell: number }[] = [];
  const unused: string[] = [];
  table.columns.forEach(({ text, heading }, cell) => {
    if (heading === null) {
      if (text !== '') unused.push(text);
    } else if (heading.wrongUnit !== '') {
      problems.push(unknownUnit(heading, source, table.lastHeadLine));
    } else usable.push({ heading, cell });
  });

  const once: Partial<Record<ProfileMeaning, number>> = {};
  let zone: Heading['zone'] = '';
  for (const { heading, cell } of usable) {
    if (isLevel(heading.meaning)) continue;
    if (TIME_MEANINGS.includes(heading.meaning)) zone ||= heading.zone;
    if (once[heading.meaning] === undefined) once[heading.meaning] = cell;
    else unused.push(heading.text);
  }
  if (once.time === undefined && once.epoch === undefined && once.date === undefined && once.year === undefined) {
    throw missing('time', 'csv-no-time', table, source);
  }

  const levelHeadings = usable.filter(({ heading }) => isLevel(heading.meaning));
  const hasHeight = levelHeadings.some(
    ({ heading }) => heading.meaning === 'heightAgl' || heading.meaning === 'heightAmsl' || isSounding(heading),
  );
  const wide = !hasHeight && levelHeadings.some(({ heading }) => !Number.isNaN(heading.height));
  if (!hasHeight && !wide) throw missing('height', 'csv-no-height', table, source);

  const quantities = new Map<LevelMeaning, ParsedUnit | null>();
  const byHeight = new Map<number, LevelCell[]>();
  for (const { heading, cell } of levelHeadings) {
    const meaning = heading.meaning as LevelMeaning;
    const height = wide ? heading.height : NaN;
    const cells = byHeight.get(height) ?? [];
    // In a long table a column for one height alone, in a wide one a column for none, has no level to go to.
    const homeless = wide ? Number.isNaN(heading.height) : !Number.isNaN(heading.height);
    if (homeless || cells.some((known) => known.meaning === meaning)) {
      unused.push(heading.text);
      continue;
    }
    cells.push({ meaning, cell });
    byHeight.set(height, cells);
    if (quantities.get(meaning) === undefined || heading.unit !== null) quantities.set(meaning, heading.unit);
  }
  const levels = [...byHeight].map(([height, cells]) => ({ height, cells })).sort((a, b) => a.height - b.height);
  if (wide && countsNotHeights(levels)) problems.push(gateNumbers(source, table.lastHeadLine));
  if (![...quantities.keys()].some((meaning) => meaning === 'speed' || meaning === 'u')) {
    problems.push(noWind(table, source));
  }
  const notes = unused.length === 0 ? [] : [`Columns not used: ${shortList(unused)}.`];
  return { layout: wide ? 'wide' : 'long', quantities, levels, once, zone, notes };
}

/** A pressure column without a height of its own can stand for the height. */
function isSounding(heading: Heading): boolean {
  return heading.meaning === 'pressure' && Number.isNaN(heading.height);
}

/** Heights 1, 2, 3 … or 0, 1, 2 … are the numbers of gates. */
function countsNotHeights(levels: Plan['levels']): boolean {
  return (
    levels.length >= 3 && levels.every(({ height }, k) => height === k + levels[0]!.height) && levels[0]!.height <= 1
  );
}

function shortList(texts: readonly string[]): string {
  return texts.length <= 12 ? texts.join(', ') : `${texts.slice(0, 12).join(', ')} and ${texts.length - 12} more`;
}

function missing(what: 'time' | 'height', code: string, table: Table, source: string): DuskveerError {
  const headings = table.columns.map(({ text }) => text).filter((text) => text !== '');
  return new DuskveerError({
    code: `ingest/${code}`,
    what: `No column for the ${what} was recognised among the headings: ${shortList(headings)}.`,
    mend: `Name the column “${what}”, or tell in the site file under "columns" which heading is the ${what}.`,
    where: { source, line: Math.max(1, table.lastHeadLine) },
  });
}

function noWind(table: Table, source: string): Problem {
  return {
    code: 'ingest/csv-no-wind',
    what: `No column for wind speed was recognised among the headings: ${shortList(table.columns.map(({ text }) => text))}.`,
    mend: 'Name the column “speed”, or tell in the site file under "columns" which heading is the speed.',
    where: { source, line: Math.max(1, table.lastHeadLine) },
  };
}

function unknownUnit(heading: Heading, source: string, line: number): Problem {
  return {
    code: 'ingest/csv-unknown-unit',
    what: `The unit “${heading.wrongUnit}” of the column “${heading.text}” is not known or is no unit of that quantity; the column was left out.`,
    mend: 'Write the unit as in m/s, kt, m, ft, hPa, degC, K, %, g/kg or degrees.',
    where: { source, line: Math.max(1, line), key: heading.text },
  };
}

function gateNumbers(source: string, line: number): Problem {
  return {
    code: 'ingest/csv-gate-numbers',
    what: 'The headings seem to number the gates 1, 2, 3 …; the numbers were taken for heights in metres.',
    mend: 'Write the height of each column in its heading, as in ws_80m.',
    where: { source, line: Math.max(1, line) },
  };
}
