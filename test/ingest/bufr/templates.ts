// Small made-up reports, as their descriptors and the bits that follow from Table B.

import { BitWriter } from '../../support/bufr-writer.ts';

export interface Level {
  height: number | null;
  direction: number | null;
  speed: number | null;
}

/** Station number, date, time, position, station height. */
export const HEADER = [
  '001001',
  '001002',
  '004001',
  '004002',
  '004003',
  '004004',
  '004005',
  '005001',
  '006001',
  '007001',
];

export function header(bits: BitWriter, minute = 10, station = 321): BitWriter {
  bits.value(99, 0, 0, 7).value(station, 0, 0, 10);
  bits.value(2031, 0, 0, 12).value(10, 0, 0, 4).value(4, 0, 0, 6).value(20, 0, 0, 5).value(minute, 0, 0, 6);
  return bits.value(47.25, 5, -9_000_000, 25).value(3.5, 5, -18_000_000, 26).value(120, 0, -400, 15);
}

/** A wind profile: height above sea level, direction, speed. */
export const WIND = ['103000', '031001', '007007', '011001', '011002'];
export const LEVELS: readonly Level[] = [
  { height: 220, direction: 200, speed: 6.5 },
  { height: 320, direction: 205, speed: 11.2 },
  { height: 420, direction: null, speed: null },
  { height: 520, direction: 360, speed: 0.1 },
];

export function wind(bits: BitWriter, levels: readonly Level[] = LEVELS): BitWriter {
  bits.coded(8, levels.length);
  for (const level of levels) level1(bits, level);
  return bits;
}

export function level1(bits: BitWriter, { height, direction, speed }: Level): BitWriter {
  return bits.value(height, 0, -1000, 17).value(direction, 0, 0, 9).value(speed, 1, 0, 12);
}

export const report = (minute = 10, station = 321): BitWriter => wind(header(new BitWriter(), minute, station));
