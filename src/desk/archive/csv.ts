// A table as CSV (RFC 4180): commas, a heading, times in ISO 8601, missing values as empty cells.

import type { FilledColumn, Table } from './table.ts';

/** The heading line, with its line end. */
export function csvHeading({ columns }: Table): string {
  return `${columns.map(({ name }) => cell(name)).join(',')}\n`;
}

/** The rows, each with its line end. */
export function csvRows({ columns, rowCount }: Table): string {
  const writers = columns.map(cellWriter);
  let text = '';
  for (let row = 0; row < rowCount; row++) {
    for (let k = 0; k < writers.length; k++) text += (k === 0 ? '' : ',') + writers[k]!(row);
    text += '\n';
  }
  return text;
}

function cellWriter({ kind, values, decimals }: FilledColumn): (row: number) => string {
  if (kind === 'text') return (row) => cell(values[row] as string);
  const numbers = values as ArrayLike<number>;
  const written = (write: (value: number) => string) => (row: number) => {
    const value = numbers[row]!;
    return Number.isNaN(value) ? '' : write(value);
  };
  if (kind === 'time') return written((value) => new Date(value).toISOString().replace('.000Z', 'Z'));
  if (kind === 'yes-no') return written((value) => (value === 1 ? 'yes' : 'no'));
  const scale = 10 ** decimals;
  // Adding nought turns minus nought into nought.
  return written((value) => String(Math.round(value * scale) / scale + 0));
}

function cell(text: string): string {
  return /[",\r\n]/u.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
