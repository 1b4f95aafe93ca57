// A table of the result as CSV and Parquet beside each other; both appear under their names only when they are whole.

import { closeSync, openSync, renameSync, writeSync } from 'node:fs';
import { join } from 'node:path';
import { csvHeading, csvRows, type Table } from '../../desk/index.ts';
import { ParquetTable } from './parquet.ts';

export class TableFile {
  readonly #csvPath: string;
  readonly #parquetPath: string;
  readonly #csv: number;
  readonly #parquet: ParquetTable;

  /** @param name of the table @param shape a table of the columns to come; its rows are not written */
  constructor(folder: string, name: string, shape: Table) {
    this.#csvPath = join(folder, `${name}.csv`);
    this.#parquetPath = join(folder, `${name}.parquet`);
    this.#csv = openSync(unfinished(this.#csvPath), 'w');
    this.#parquet = new ParquetTable(unfinished(this.#parquetPath), shape);
    writeSync(this.#csv, csvHeading(shape));
  }

  add(table: Table): void {
    if (table.rowCount === 0) return;
    writeSync(this.#csv, csvRows(table));
    this.#parquet.add(table);
  }

  finish(): void {
    this.#parquet.finish();
    closeSync(this.#csv);
    renameSync(unfinished(this.#csvPath), this.#csvPath);
    renameSync(unfinished(this.#parquetPath), this.#parquetPath);
  }
}

/** What a file of the result is called until it is whole. */
export function unfinished(path: string): string {
  return `${path}.unfinished`;
}
