// Writes src/ingest/bufr/tables/elements.ts and sequences.ts from the official tables of WMO-No. 306, Volume I.2.
//
//   node test/support/make-bufr-tables.mjs FOLDER
//
// FOLDER holds the tables as the WMO publishes them in machine-readable form: BUFRCREX_TableB_en_NN.csv and
// BUFR_TableD_en_NN.csv. Only figures are taken, no titles or notes: of an element its descriptor, kind of unit, scale,
// reference value and width; of a sequence its members. Kept are the sequences of upper-air reports (3 01, 3 03, 3 09, 3 21)
// with all they reach, the elements of these, and whole classes from which upper-air messages are spelled out.

import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import Papa from 'papaparse';

const folder = process.argv[2];
if (folder === undefined) throw new Error('Say where the tables are: node test/support/make-bufr-tables.mjs FOLDER');

const UPPER_AIR_SEQUENCES = ['301', '303', '309', '321'];
const WHOLE_CLASSES = [
  '01',
  '02',
  '04',
  '05',
  '06',
  '07',
  '08',
  '10',
  '11',
  '12',
  '13',
  '20',
  '21',
  '25',
  '31',
  '33',
  '35',
];

const rowsOf = (pattern) =>
  readdirSync(folder)
    .filter((name) => pattern.test(name))
    .sort()
    .flatMap(
      (name) => Papa.parse(readFileSync(join(folder, name), 'utf8'), { header: true, skipEmptyLines: true }).data,
    );

const elements = new Map(rowsOf(/^BUFRCREX_TableB_en_\d+\.csv$/).map((row) => [row.FXY, row]));
const sequences = new Map();
for (const row of rowsOf(/^BUFR_TableD_en_\d+\.csv$/)) {
  if (!sequences.has(row.FXY1)) sequences.set(row.FXY1, []);
  sequences.get(row.FXY1).push(row.FXY2);
}

const kept = new Set([...elements.keys()].filter((fxy) => WHOLE_CLASSES.includes(fxy.slice(1, 3))));
const reach = (fxy) => {
  if (kept.has(fxy)) return;
  kept.add(fxy);
  for (const member of sequences.get(fxy) ?? []) reach(member);
};
for (const fxy of sequences.keys()) if (UPPER_AIR_SEQUENCES.includes(fxy.slice(0, 3))) reach(fxy);

function kindOf(unit) {
  if (unit.startsWith('CCITT')) return 's';
  if (/code table/i.test(unit)) return 'c';
  if (/flag table/i.test(unit)) return 'f';
  return '';
}

/** One line a group (first three digits), its entries separated by spaces. */
function lines(entries) {
  const groups = new Map();
  for (const [fxy, text] of entries.sort(([a], [b]) => (a < b ? -1 : 1))) {
    const group = fxy.slice(0, 3);
    groups.set(group, [...(groups.get(group) ?? []), `${fxy.slice(3)}${text}`]);
  }
  return [...groups].map(([group, list]) => `${group} ${list.join(' ')}`).join('\n');
}

const elementLines = lines(
  [...kept].flatMap((fxy) => {
    const row = elements.get(fxy);
    if (row === undefined) return [];
    const { BUFR_Scale: scale, BUFR_ReferenceValue: reference, BUFR_DataWidth_Bits: width } = row;
    return [[fxy, `${kindOf(row.BUFR_Unit)}:${scale},${reference},${width}`]];
  }),
);
const sequenceLines = lines(
  [...kept].flatMap((fxy) => (sequences.has(fxy) ? [[fxy, `:${sequences.get(fxy).join(',')}`]] : [])),
);

const head = `// Written by test/support/make-bufr-tables.mjs; change that and run it again.
// Figures of WMO-No. 306, Manual on Codes, Volume I.2`;
const out = new URL('../../src/ingest/bufr/tables/', import.meta.url);
writeFileSync(
  new URL('elements.ts', out),
  `${head}, BUFR/CREX Table B: a line a class, an entry an element:
// number, kind of unit (s characters, c code table, f flag table, else a number), scale, reference value, width in bits.

export const ELEMENT_LINES = \`${elementLines}\`;
`,
);
writeFileSync(
  new URL('sequences.ts', out),
  `${head}, BUFR Table D: a line a category, an entry a sequence: number, members.

export const SEQUENCE_LINES = \`${sequenceLines}\`;
`,
);
