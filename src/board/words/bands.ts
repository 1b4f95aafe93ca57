// Time in bands as rows of a table.

import type { BandTimes } from '../../rotor/index.ts';
import { plain } from './numbers.ts';
import { durationWords } from './time.ts';

export interface BandRow {
  readonly words: string;
  readonly time: string;
  /** Of the time that is known, 0 to 1; 0 for what is not known. */
  readonly share: number;
  readonly percent: string;
}

/** A row a band, and one for the time in which nothing was known. */
export function bandRows({ edges, seconds, unknownS }: BandTimes, decimals: number): BandRow[] {
  const known = seconds.reduce((sum, each) => sum + each, 0);
  const row = (words: string, each: number, share: number): BandRow => ({
    words,
    time: durationWords(1000 * each),
    share,
    percent: plain(100 * share, 0),
  });
  const rows = Array.from(seconds, (each, k) => row(bandWords(edges, k, decimals), each, known > 0 ? each / known : 0));
  return [...rows, row('not known', unknownS, 0)];
}

function bandWords(edges: readonly number[], k: number, decimals: number): string {
  const [from, to] = [edges[k - 1], edges[k]];
  if (from === undefined) return `below ${plain(to ?? NaN, decimals)}`;
  return to === undefined ? `${plain(from, decimals)} and above` : `${plain(from, decimals)} to ${plain(to, decimals)}`;
}
