// Numbers in cells: decimal comma, words for missing, and fill values that no one declared.

import type { LevelMeaning } from './headings.ts';

const MISSING_WORDS = /^(?:nan|na|n\/a|#n\/a|null|none|nil|missing|miss|inf|-inf|\+inf|-*|\/*|\*+|x+|\.+|\?+)$/iu;

/** Whether a cell that is no number says that there is none. */
export function saysMissing(cell: string): boolean {
  return MISSING_WORDS.test(cell.trim());
}

/** The number in a cell; NaN where there is none. */
export function numberIn(cell: string, decimalComma: boolean): number {
  const value = decimalComma ? Number(cell.replace(',', '.')) : Number(cell);
  // Number takes an empty text for zero.
  return value === 0 && cell.trim() === '' ? NaN : value;
}

/** Numbers that stand for missing in many files, without their sign. */
const FILLS = new Set([
  99, 99.9, 99.99, 999, 999.9, 999.99, 9999, 9999.9, 9999.99, 99999, 99999.9, 999999, 9999999, 888, 8888, 88888, 7777,
  6999, 32766, 32767, 32768, 65535,
]);
/** What a quantity can be in whatever unit people write it; a fill value lies outside. */
const POSSIBLE: Readonly<Record<LevelMeaning, readonly [number, number]>> = {
  heightAgl: [-500, 150_000],
  heightAmsl: [-500, 150_000],
  speed: [0, 400],
  direction: [-180, 360],
  u: [-300, 300],
  v: [-300, 300],
  verticalSpeed: [-60, 60],
  pressure: [0.01, 110_000],
  temperature: [-95, 350],
  dewPoint: [-98, 350],
  relativeHumidity: [-10, 150],
  specificHumidity: [-1, 60],
  mixingRatio: [-1, 60],
  signal: [-500, 500],
  speedUncertainty: [0, 100],
  speedDeviation: [0, 100],
  gust: [0, 400],
};

/** True for a number that cannot be meant: far beyond any measurement, or all nines where the quantity never goes. */
export function isFill(value: number, meaning: LevelMeaning): boolean {
  const size = Math.abs(value);
  if (size >= 1e9) return true;
  if (!FILLS.has(size)) return false;
  const [least, most] = POSSIBLE[meaning];
  // 9999 hPa and 9999 m: within what the number could be in another unit, and still a fill where pressure is meant.
  return value < least || value > most || (meaning === 'pressure' && size < 10_000 && size > 1200);
}
