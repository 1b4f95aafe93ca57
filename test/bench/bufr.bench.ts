// BUFR: messages a second, a day of a profiler network, and the time the worst file can cost.

import { existsSync, readFileSync } from 'node:fs';
import { bytesSource, readProfiles } from '../../src/ingest/index.ts';
import { joined, message } from '../support/bufr-writer.ts';
import { profilerReport } from '../support/profiler-report.ts';
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
  const { profiles, problems } = await read(network);
  if (profiles !== 100 * 48 || problems > 0) throw new Error(`of the network's day ${profiles} profiles were read`);
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
}
