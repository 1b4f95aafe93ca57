// What the archive's tables share: names of turbine types in column names, recurring meanings, columns of every row.

import type { Disc } from '../../rotor/index.ts';
import { nightDate } from './night-number.ts';
import type { FeedRows } from './rows.ts';
import { textColumn, type FilledColumn } from './table.ts';

/** A disc with the name of its turbine type. */
export interface NamedDisc extends Disc {
  readonly name: string;
  /** m above sea level: ground under the turbines; NaN where they stand at the station's height. */
  readonly groundElevation: number;
}

/** The disc as the station's heights above ground have it. */
export function discAtStation(disc: NamedDisc, elevation: number): Disc {
  const lift = disc.groundElevation - elevation;
  return { hubHeight: disc.hubHeight + (Number.isNaN(lift) ? 0 : lift), rotorDiameter: disc.rotorDiameter };
}

export const IEC = 'IEC 61400-12-1:2017';
export const EVENING = 'date of the evening the night begins with, by the mean sun at the station';
export const CATEGORY = 'highest category met, by the criteria named in this file; empty where they know none';
export const BOUND = 'whether the fall-off is a lower bound: data end below the ceiling while the speed still falls';
export const CONFIDENCE =
  'probability that the criteria hold, given the uncertainty of the levels; empty for criteria that the levels decide';

/**
 * The beginnings of the column names of turbine types: lower case, letters and digits, each once.
 * @example discPrefixes([{ name: 'North row', … }]) // ['north_row']
 */
export function discPrefixes(discs: readonly NamedDisc[]): string[] {
  const used = new Set<string>();
  return discs.map(({ name }) => {
    const plain = name
      .normalize('NFKD')
      .toLowerCase()
      .replace(/[^a-z0-9]+/gu, '_')
      .replace(/^_+|_+$/gu, '');
    const stem = /^[a-z]/u.test(plain) ? plain : `turbine_${plain}`.replace(/_$/u, '');
    let prefix = stem;
    for (let k = 2; used.has(prefix); k++) prefix = `${stem}_${k}`;
    used.add(prefix);
    return prefix;
  });
}

export function feedColumns({ feed }: FeedRows, count: number): FilledColumn[] {
  return [
    textColumn('station', 'identifier of the station', new Array<string>(count).fill(feed.station.id)),
    textColumn('instrument', 'kind of instrument', new Array<string>(count).fill(feed.instrument)),
  ];
}

/** Night dates by row; the same text for a night's many rows. */
export function datesOf(number: Int32Array): string[] {
  const dates: string[] = [];
  for (let row = 0; row < number.length; row++) {
    dates.push(row > 0 && number[row] === number[row - 1] ? dates[row - 1]! : nightDate(number[row]!));
  }
  return dates;
}

export function knownCategories(categories: ArrayLike<number>): Float32Array {
  return Float32Array.from(categories, (category) => (category >= 0 ? category : NaN));
}
