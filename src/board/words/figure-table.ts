// A figure's numbers as a table: shown beside the picture and saved as CSV.

export interface FigureTable {
  readonly columns: readonly string[];
  /** The first cell of a row is its name. */
  readonly rows: readonly (readonly string[])[];
}

/** The table as CSV (RFC 4180), with plain minus signs and without the thin spaces of the page. */
export function figureCsv({ columns, rows }: FigureTable): string {
  const cell = (text: string): string => {
    const plain = text.replaceAll('\u2009', '').replaceAll('−', '-').replace(/^–$/u, '');
    return /[",\n]/u.test(plain) ? `"${plain.replaceAll('"', '""')}"` : plain;
  };
  return [columns, ...rows].map((row) => `${row.map(cell).join(',')}\n`).join('');
}
