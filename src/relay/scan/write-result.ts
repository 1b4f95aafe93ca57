// The result of a scan: the tables of profiles, jets and nights out of all parts, of problems, and what the columns mean.

import { renameSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import {
  emptyRows,
  jetTable,
  NightGatherer,
  nightTable,
  profileTable,
  textColumn,
  yesNoColumn,
  type FilledColumn,
  type FeedName,
  type NightRow,
  type Table,
} from '../../desk/index.ts';
import { unplacedStation } from '../../profile/index.ts';
import { joinParts } from './join-parts.ts';
import type { JournalEntry } from './journal.ts';
import type { Part } from './part.ts';
import type { ScanQuestion } from './question.ts';
import { TableFile, unfinished } from './table-file.ts';

/** A problem with the file it is of. */
export interface FileProblem {
  readonly file: string;
  readonly place: string;
  readonly code: string;
  readonly what: string;
  readonly mend: string;
  readonly unread: boolean;
}

export interface Totals {
  profiles: number;
  assessable: number;
  withJet: number;
  jets: number;
  nights: number;
}

const NIGHTS_TOGETHER = 1000;

/**
 * Writes all tables into the folder.
 * @param load the part of that name
 */
export async function writeResult(
  folder: string,
  question: ScanQuestion,
  entries: readonly JournalEntry[],
  load: (part: string) => Promise<Part>,
  problems: readonly FileProblem[],
): Promise<Totals> {
  const { discs } = question;
  const nobody: FeedName = { key: '', station: unplacedStation(''), instrument: 'unknown' };
  const none = emptyRows(nobody, discs.length);
  const shapes = {
    profiles: profileTable(none, discs),
    jets: jetTable(none, discs),
    nights: nightTable([], discs),
    problems: problemsAsTable(problems),
  };
  const files = {
    profiles: new TableFile(folder, 'profiles', shapes.profiles),
    jets: new TableFile(folder, 'jets', shapes.jets),
    nights: new TableFile(folder, 'nights', shapes.nights),
    problems: new TableFile(folder, 'problems', shapes.problems),
  };
  const totals: Totals = { profiles: 0, assessable: 0, withJet: 0, jets: 0, nights: 0 };

  let nights: NightRow[] = [];
  const flushNights = (): void => {
    files.nights.add(nightTable(nights, discs));
    totals.nights += nights.length;
    nights = [];
  };
  for (const { feed, portions } of joinParts(entries, load)) {
    const gatherer = new NightGatherer(feed);
    for await (const rows of portions()) {
      files.profiles.add(profileTable(rows, discs));
      files.jets.add(jetTable(rows, discs));
      nights.push(...gatherer.add(rows));
      if (nights.length >= NIGHTS_TOGETHER) flushNights();
      const { status } = rows.profiles;
      totals.profiles += status.length;
      totals.jets += rows.jets.category.length;
      for (let row = 0; row < status.length; row++) {
        if (status[row]! > 0) totals.assessable++;
        if (status[row]! > 1) totals.withJet++;
      }
    }
    nights.push(...gatherer.finish());
  }
  flushNights();
  files.problems.add(shapes.problems);
  for (const file of Object.values(files)) file.finish();
  writeColumns(folder, question, shapes);
  return totals;
}

function problemsAsTable(problems: readonly FileProblem[]): Table {
  const text = (name: 'file' | 'place' | 'code' | 'what' | 'mend', meaning: string): FilledColumn =>
    textColumn(
      name,
      meaning,
      problems.map((problem) => problem[name]),
    );
  return {
    rowCount: problems.length,
    columns: [
      text('file', 'file or folder'),
      text('place', 'where in it'),
      text('code', 'kind of problem, for programs'),
      text('what', 'what is wrong'),
      text('mend', 'how to mend it'),
      yesNoColumn(
        'unread',
        'whether something was lost that could have been used',
        problems.map(({ unread }) => Number(unread)),
      ),
    ],
  };
}

/** `columns.json`: what was asked, and unit, meaning and source of every column. */
function writeColumns(folder: string, { site, criteria, discs }: ScanQuestion, shapes: Record<string, Table>): void {
  const about = {
    about:
      'Tables of low-level jets in wind profiles, each as CSV and Parquet with the same columns. Times are UTC. ' +
      'A night runs from mean solar noon to the next. Frequencies should be taken per assessable profile.',
    caution:
      'An aid to judgement. Official warnings come from the national service; lifting, climbing and switching follow site ' +
      'rules, the maker’s limits and licensed practice. Not for air navigation.',
    site: site.name,
    criteria,
    turbines: discs.map(({ name, hubHeight, rotorDiameter }) => ({
      name,
      hub_height_m: hubHeight,
      rotor_diameter_m: rotorDiameter,
    })),
    tables: Object.fromEntries(
      Object.entries(shapes).map(([name, { columns }]) => [
        name,
        columns.map(({ name, kind, unit, meaning, source }) => ({
          name,
          kind,
          ...(unit === '' ? {} : { unit }),
          meaning,
          ...(source === '' ? {} : { source }),
        })),
      ]),
    ),
  };
  const path = join(folder, 'columns.json');
  writeFileSync(unfinished(path), `${JSON.stringify(about, null, 2)}\n`);
  renameSync(unfinished(path), path);
}
