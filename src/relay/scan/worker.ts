// A thread of the scan: takes files one by one, writes their parts. Built as an entry of its own, `scan-worker.js`.

import { parentPort, workerData } from 'node:worker_threads';
import { writePart } from './part.ts';
import type { TaskResult } from './journal.ts';
import type { Report, Task } from './protocol.ts';
import type { ScanQuestion } from './question.ts';
import { scanFile } from './scan-file.ts';

const port = parentPort!;
const question = workerData as ScanQuestion;
const say = (report: Report): void => port.postMessage(report);

async function work({ file, partPath }: Task): Promise<TaskResult> {
  const part = await scanFile(file, question, (bytes) => say({ kind: 'bytes', bytes }));
  return {
    bytes: await writePart(partPath, part),
    unread: part.problems.some(({ unread }) => unread),
    problems: part.problems.length,
    retry: part.problems.some(({ code }) => code === 'ingest/bytes-stopped'),
    feeds: part.feeds.map(({ feed, profiles: { timeMs } }) => ({
      key: feed.key,
      // JSON turns missing coordinates into null.
      station: feed.station,
      instrument: feed.instrument,
      rows: timeMs.length,
      first_ms: timeMs[0]!,
      last_ms: timeMs[timeMs.length - 1]!,
    })),
  };
}

port.on('message', (task: Task) => {
  work(task).then(
    (result) => say({ kind: 'done', result }),
    (error: unknown) => say({ kind: 'failed', words: error instanceof Error ? error.message : String(error) }),
  );
});
