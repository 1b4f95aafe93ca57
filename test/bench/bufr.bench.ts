// BUFR: messages a second, a day of a profiler network, and the time the worst file can cost.

import { existsSync, readFileSync } from 'node:fs';
import { bytesSource, readProfiles } from '../../src/ingest/index.ts';
import { BitWriter, joined, message } from '../support/bufr-writer.ts';
import { randomFrom } from '../support/random.ts';
import { sharedPath } from '../support/shared.ts';

type Report = (figure: { name: string; value: number; unit: string; note?: string }) => void;

async function read(bytes: Uint8Array): Promise<{ profiles: number; problems: number }> {
  let [profiles, problems] = [0, 0];
  for await (const reading of readProfiles(bytesSource('bench.bufr', bytes))) {
    profiles += reading.block.profileCount;
    problems += reading.problems.length;
  }
  return { profiles, problems };
}

async function seconds(work: () => Promise<unknown>, rounds: number): Promise<number> {
  const times: number[] = [];
  for (let round = 0; round < rounds; round++) {
    const start = performance.now();
    await work();
    times.push((performance.now() - start) / 1000);
  }
  return times.sort((a, b) => a - b)[rounds >> 1]!;
}

/** A profiler's report as 3 01 032, 3 21 021, 2 x 0 25 0xx, period and 3 21 022 have it: 60 gates. */
function profilerReport(station: number, minutes: number): Uint8Array {
  const bits = new BitWriter();
  bits.value(99, 0, 0, 7).value(station, 0, 0, 10).coded(2, 0);
  bits.value(2031, 0, 0, 12).value(10, 0, 0, 4).value(4, 0, 0, 6);
  bits.value(Math.floor(minutes / 60), 0, 0, 5).value(minutes % 60, 0, 0, 6);
  bits.value(47.25, 2, -9000, 15).value(3.5, 2, -18_000, 16).value(120, 0, -400, 15);
  bits.coded(4, 6).coded(4, 0).coded(7, 30).coded(11, 900).coded(11, 210);
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

export default async function bench(report: Report): Promise<void> {
  const path = sharedPath('real/bufr/temp-part1.bufr');
  if (existsSync(path)) {
    const bytes = new Uint8Array(readFileSync(path));
    const many = joined(...Array.from({ length: 10 }, () => bytes));
    await read(many);
    const { profiles } = await read(many);
    report({
      name: 'bufr temp',
      value: Math.round(profiles / (await seconds(() => read(many), 7))),
      unit: 'messages/s',
    });
  }

  const network = joined(
    ...Array.from({ length: 100 * 48 }, (_, k) => profilerReport(1 + Math.floor(k / 48), 30 * (k % 48))),
  );
  report({
    name: 'bufr day of a profiler network',
    value: await seconds(() => read(network), 5),
    unit: 's',
    note: `100 stations x 48 reports of 60 gates, ${(network.length / 2 ** 20).toFixed(1)} MiB; target below 3 s`,
  });

  const header = ['001001', '001002', '301011', '301012', '301022'];
  const worst = message({
    descriptors: [...header, '106000', '031012', '104000', '031012', '007007', '011001', '011002', '011003'],
    data: new Uint8Array(200).fill(0xff),
  });
  report({
    name: 'bufr worst message',
    value: await seconds(() => read(worst), 3),
    unit: 's',
    note: '65535 x 65535 levels out of no bits',
  });

  // Mutated bytes: flips, cuts and doublings of a sound file; nothing but problems may come of it.
  const sound = network.subarray(0, 200_000);
  const random = randomFrom(1);
  let mutated = 0;
  let slowest = 0;
  let problems = 0;
  while (mutated < 10_000_000) {
    const bytes = sound.slice(0, 2000 + Math.floor(random() * 100_000));
    for (let k = 0; k < bytes.length / 200; k++)
      bytes[Math.floor(random() * bytes.length)] = Math.floor(random() * 256);
    const start = performance.now();
    problems += (await read(bytes)).problems;
    slowest = Math.max(slowest, performance.now() - start);
    mutated += bytes.length;
  }
  report({
    name: 'bufr slowest mutated file',
    value: Math.round(slowest),
    unit: 'ms',
    note: `${mutated} bytes, ${problems} problems, no crash`,
  });
}
