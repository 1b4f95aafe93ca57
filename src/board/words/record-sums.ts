// Energy of a record as rows of a table, the whole of it first.

import { UTCDate } from '@date-fns/utc';
import { format } from 'date-fns';
import type { FarmRecord, RecordSum } from '../../desk/index.ts';
import { NONE, plain, signed } from './numbers.ts';
import { durationWords } from './time.ts';

export interface SumRow {
  readonly words: string;
  readonly hours: string;
  readonly hub: string;
  readonly whole: string;
  readonly difference: string;
  readonly actual: string;
}

export function sumRows({ sums, sumsBy }: FarmRecord): SumRow[] {
  const pattern = sumsBy === 'day' ? 'EEE d MMM yyyy' : 'MMM yyyy';
  const rows = sums.map((sum) => rowOf(format(new UTCDate(sum.startMs), pattern), sum));
  return [rowOf('all of it', totalOf(sums)), ...rows];
}

/** What the record says in a sentence. */
export function recordSentence({ sums, timeMs, why }: FarmRecord): string {
  if (timeMs.length === 0) return 'No profile up to this moment.';
  const total = totalOf(sums);
  const span = durationWords(timeMs[timeMs.length - 1]! - timeMs[0]!);
  if (why !== '') return `Over ${span} no power can be given: ${why}.`;
  if (total.hours === 0) return `Over ${span} the discs were never covered well enough to reckon power.`;
  const difference = total.equivalentMwh - total.hubMwh;
  const share = plain((100 * Math.abs(difference)) / total.hubMwh, 1);
  const how = difference < 0 ? 'less' : 'more';
  return (
    `Over ${span}, ${plain(total.hours, 0)} hours of them known, the wind was good for ${plain(total.equivalentMwh, 0)} MWh: ` +
    `${plain(Math.abs(difference), 0)} MWh (${share} %) ${how} than hub-height reckoning says.`
  );
}

function totalOf(sums: readonly RecordSum[]): RecordSum {
  const add = (of: (sum: RecordSum) => number): number =>
    sums.map(of).reduce((total, value) => total + (Number.isNaN(value) ? 0 : value), 0);
  const reported = sums.some((sum) => Number.isFinite(sum.actualMwh));
  return {
    startMs: NaN,
    hours: add((sum) => sum.hours),
    hubMwh: add((sum) => sum.hubMwh),
    equivalentMwh: add((sum) => sum.equivalentMwh),
    actualMwh: reported ? add((sum) => sum.actualMwh) : NaN,
  };
}

function rowOf(words: string, sum: RecordSum): SumRow {
  return {
    words,
    hours: plain(sum.hours, 1),
    hub: plain(sum.hubMwh, 0),
    whole: plain(sum.equivalentMwh, 0),
    difference: signed(sum.equivalentMwh - sum.hubMwh, 0),
    actual: Number.isFinite(sum.actualMwh) ? plain(sum.actualMwh, 0) : NONE,
  };
}
