// Writes tables of any length as a Parquet file, group after group, so that only one group is held.

import type { DecodedArray } from 'hyparquet';
import { fileWriter, ParquetWriter, schemaFromColumnData } from 'hyparquet-writer';
import type { FilledColumn, Table } from '../../desk/index.ts';

/** Rows gathered before a group is written: enough to pack well, few enough to hold. */
const GROUP_ROWS = 50_000;

type ParquetType = 'STRING' | 'TIMESTAMP' | 'INT32' | 'FLOAT' | 'DOUBLE' | 'BOOLEAN';

export class ParquetTable {
  readonly #columns: readonly { name: string; type: ParquetType; data: unknown[] }[];
  readonly #writer: ParquetWriter;
  #rows = 0;

  /** @param shape a table of the columns to come, with or without rows, which are not written */
  constructor(path: string, shape: Table) {
    this.#columns = shape.columns.map((column) => ({ name: column.name, type: typeOf(column), data: [] }));
    const schema = schemaFromColumnData({
      columnData: this.#columns.map(({ name, type }) => ({ name, type, data: [], nullable: true })),
    });
    this.#writer = new ParquetWriter({ writer: fileWriter(path), schema, createdBy: 'Duskveer' });
  }

  add(table: Table): void {
    table.columns.forEach((column, k) => appendTo(this.#columns[k]!.data, column, table.rowCount));
    this.#rows += table.rowCount;
    if (this.#rows >= GROUP_ROWS) this.#writeGroup();
  }

  finish(): void {
    if (this.#rows > 0) this.#writeGroup();
    void this.#writer.finish();
  }

  #writeGroup(): void {
    const columnData = this.#columns.map(({ name, type, data }) => ({ name, type, data: data as DecodedArray }));
    void this.#writer.write({ columnData, rowGroupSize: this.#rows });
    for (const { data } of this.#columns) data.length = 0;
    this.#rows = 0;
  }
}

function typeOf({ kind, values }: FilledColumn): ParquetType {
  switch (kind) {
    case 'text':
      return 'STRING';
    case 'time':
      return 'TIMESTAMP';
    case 'whole':
      return 'INT32';
    case 'yes-no':
      return 'BOOLEAN';
    case 'number':
      return values instanceof Float32Array ? 'FLOAT' : 'DOUBLE';
  }
}

function appendTo(data: unknown[], { kind, values }: FilledColumn, count: number): void {
  for (let row = 0; row < count; row++) {
    const value = values[row]!;
    if (kind === 'text') data.push(value);
    else if (Number.isNaN(value)) data.push(null);
    else if (kind === 'yes-no') data.push(value === 1);
    else if (kind === 'time') data.push(BigInt(value));
    else data.push(value);
  }
}
