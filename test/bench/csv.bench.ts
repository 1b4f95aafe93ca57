// Reading tables: the real night where it is beside the checkout, and a long table made up on the spot.

import { bytesSource, readProfiles } from '../../src/ingest/index.ts';
import { readShared, sharedIsHere } from '../support/shared.ts';
import { bytesOf } from '../support/sources.ts';

type Report = (figure: { name: string; value: number; unit: string; note?: string }) => void;

/** Processor time, so that a busy machine does not count. */
async function secondsToRead(name: string, bytes: Uint8Array): Promise<number> {
  const before = process.cpuUsage();
  let profiles = 0;
  for await (const { block, problems } of readProfiles(bytesSource(name, bytes))) {
    profiles += block.profileCount;
    if (problems.length > 0) throw new Error(problems[0]!.what);
  }
  if (profiles === 0) throw new Error('nothing was read');
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1e6;
}

const median = (values: number[]): number => values.sort((a, b) => a - b)[values.length >> 1]!;

/** A year of 10-minute profiles of eight gates: 420,480 rows. */
function yearTable(): Uint8Array {
  const lines = ['time,height,speed,direction,temperature'];
  const start = Date.UTC(2023, 0, 1);
  for (let k = 0; k < 52_560; k++) {
    const time = new Date(start + k * 600_000).toISOString().slice(0, 19);
    for (let gate = 1; gate <= 8; gate++) {
      lines.push(
        `${time}Z,${gate * 40},${(5 + ((k * gate) % 97) / 10).toFixed(3)},${(k * 7) % 360},${(gate / 8).toFixed(2)}`,
      );
    }
  }
  return bytesOf(lines.join('\n'));
}

export default async function bench(report: Report): Promise<void> {
  if (sharedIsHere) {
    const night = readShared('real/night/combined_radar_data_qc.csv');
    const first = await secondsToRead('night.csv', night);
    report({
      name: 'csv: real night, first read',
      value: 1000 * first,
      unit: 'ms',
      note: '355 kB, 3790 rows, by processor time; goal 100',
    });
    const times: number[] = [];
    for (let k = 0; k < 15; k++) times.push(await secondsToRead('night.csv', night));
    report({
      name: 'csv: real night, warm',
      value: 1000 * median(times),
      unit: 'ms',
      note: 'median of 15 by processor time; goal 100',
    });
  }
  const year = yearTable();
  const seconds = await secondsToRead('year.csv', year);
  report({
    name: 'csv: a year of rows',
    value: year.length / 1e6 / seconds,
    unit: 'MB/s',
    note: '420,480 rows, time order, by processor time',
  });
}
