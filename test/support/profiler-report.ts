// A wind profiler's report in BUFR, written element by element apart from the reader.

import { BitWriter, message } from './bufr-writer.ts';

/** A profiler's report as 3 01 032, 3 21 021, 2 x 0 25 0xx, period and 3 21 022 have it: 60 gates. */
export function profilerReport(station: number, minutes: number): Uint8Array {
  const bits = new BitWriter();
  bits.value(99, 0, 0, 7).value(station, 0, 0, 10).coded(2, 0);
  bits.value(2031, 0, 0, 12).value(10, 0, 0, 4).value(4, 0, 0, 6);
  bits.value(Math.floor(minutes / 60), 0, 0, 5).value(minutes % 60, 0, 0, 6);
  bits.value(47.25, 2, -9000, 15).value(3.5, 2, -18_000, 16).value(120, 0, -400, 15);
  bits.coded(4, 6).coded(4, 0).coded(8, 30).coded(11, 900).coded(11, 210);
  bits.coded(2, 1).coded(8, 64).value(2, 0, 0, 5).value(30, 0, -2048, 12).coded(8, 60);
  for (let gate = 0; gate < 60; gate++) {
    bits
      .value(200 + 60 * gate, 0, -1000, 17)
      .coded(6, 21)
      .coded(1, 0)
      .value((200 + 3 * gate) % 360, 0, 0, 9);
    bits
      .value(6 + gate / 10, 1, 0, 12)
      .coded(6, 21)
      .coded(1, 0)
      .value(0.1, 2, -4096, 13)
      .value(-gate / 3, 0, -32, 8);
  }
  const descriptors = ['301032', '002003', '002101', '201130', '002106', '201000', '201132', '202130', '002121'];
  descriptors.push('202000', '201000', '201133', '202129', '025001', '202000', '201000');
  descriptors.push('025020', '025021', '008021', '004025', '101000', '031001', '321022');
  return message({ descriptors, data: bits, edition: 3 });
}
