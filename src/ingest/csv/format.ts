// Tables of text (CSV, TSV and their kin; RFC 4180 relaxed), a row a level or a column a height.

import { DuskveerError, type Problem } from '../../air/index.ts';
import { concatBlocks } from '../../profile/index.ts';
import { PLAIN_SITE } from '../../site/index.ts';
import type { FileFormat, Reading, ReadOptions } from '../format.ts';
import { headOf } from '../head.ts';
import { stationOfFileName } from '../site-station.ts';
import type { ByteSource } from '../source.ts';
import { Collector } from './collect.ts';
import { planOf } from './plan.ts';
import { RowTime } from './row-time.ts';
import { rowsOf } from './rows.ts';
import { findTable, type Table } from './table.ts';
import { monthFirstIn } from './time-text.ts';

export const csvTable: FileFormat = {
  name: 'csv',
  title: 'tables of text (CSV, TSV; long or wide)',
  recognise: (head) => findTable(head, PLAIN_SITE.columns) !== null,
  read: readTable,
};

async function* readTable(
  source: ByteSource,
  options: ReadOptions,
): AsyncGenerator<Pick<Reading, 'block' | 'problems'>> {
  const { site } = options;
  const table = findTable(await headOf(source), site.columns);
  if (table === null) throw noTable(source);
  const problems: Problem[] = [];
  const plan = planOf(table, source.name, problems);
  const time = new RowTime(plan.once, site.fileTimeZone, monthFirst(table, plan.once.date ?? plan.once.time));
  const collector = new Collector(table, plan, time, options, source.name, stationOfFileName(source.name));
  let any = false;
  try {
    for await (const rows of rowsOf(source, table, options.signal, problems)) {
      const block = collector.take(rows);
      if (block === null) continue;
      any = true;
      yield { block, problems: problems.splice(0) };
    }
  } catch (error) {
    if (!(error instanceof DuskveerError)) throw error;
    problems.push(error.problem);
  }
  const block = collector.finish();
  problems.push(...collector.problems());
  if (!any && block === null && problems.length === 0) problems.push(noRows(source, table));
  yield { block: block ?? concatBlocks([]), problems };
}

function monthFirst(table: Table, cell: number | undefined): boolean {
  return cell !== undefined && monthFirstIn(table.sample.map((row) => row[cell] ?? ''));
}

function noTable(source: ByteSource): DuskveerError {
  return new DuskveerError({
    code: 'ingest/csv-no-heading',
    what: 'No line with the names of the columns was found.',
    mend: 'Put a line above the numbers that names them, such as time,height,speed,direction.',
    where: { source: source.name, line: 1 },
  });
}

function noRows(source: ByteSource, table: Table): Problem {
  return {
    code: 'ingest/csv-no-rows',
    what: 'The table has a heading and no rows.',
    mend: 'Check that the export of the data ran to its end.',
    where: { source: source.name, line: table.lastHeadLine },
  };
}
