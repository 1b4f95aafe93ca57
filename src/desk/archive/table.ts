// The shape of the archive's tables, whatever file they are written to: columns with unit, meaning and source.

/** What a column holds; `time` is UTC in ms, `yes-no` 1 or 0. NaN is missing in all but `text`, where '' is. */
export type ColumnKind = 'text' | 'time' | 'whole' | 'number' | 'yes-no';

export interface TableColumn {
  readonly name: string;
  readonly kind: ColumnKind;
  /** As in the name; empty for plain numbers and words. */
  readonly unit: string;
  /** Decimals worth writing, for `number`. */
  readonly decimals: number;
  readonly meaning: string;
  /** Publication or standard behind the number; empty where it is a plain count or measurement. */
  readonly source: string;
}

/** Columns with their values, all of equal length. */
export interface Table {
  readonly columns: readonly FilledColumn[];
  readonly rowCount: number;
}

export interface FilledColumn extends TableColumn {
  readonly values: readonly string[] | ArrayLike<number>;
}

/** Writes down a column in one line. */
export function textColumn(name: string, meaning: string, values: readonly string[]): FilledColumn {
  return { name, kind: 'text', unit: '', decimals: 0, meaning, source: '', values };
}

export function timeColumn(name: string, meaning: string, values: ArrayLike<number>): FilledColumn {
  return { name, kind: 'time', unit: 'UTC', decimals: 0, meaning, source: '', values };
}

export function wholeColumn(name: string, meaning: string, values: ArrayLike<number>, source = ''): FilledColumn {
  return { name, kind: 'whole', unit: '', decimals: 0, meaning, source, values };
}

export function yesNoColumn(name: string, meaning: string, values: ArrayLike<number>): FilledColumn {
  return { name, kind: 'yes-no', unit: '', decimals: 0, meaning, source: '', values };
}

/** @param unit and decimals as `m 1` */
export function numberColumn(
  name: string,
  unitAndDecimals: string,
  meaning: string,
  values: ArrayLike<number>,
  source = '',
): FilledColumn {
  const [unit, decimals] = [unitAndDecimals.slice(0, -2).trim(), Number(unitAndDecimals.slice(-1))];
  return { name, kind: 'number', unit, decimals, meaning, source, values };
}
