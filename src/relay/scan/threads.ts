// Hands files to threads, one at a time each, until all are done or the scan is stopped.

import { join } from 'node:path';
import { Worker } from 'node:worker_threads';
import type { ScanFile } from './files.ts';
import type { TaskResult } from './journal.ts';
import type { Report, Task } from './protocol.ts';
import type { ScanQuestion } from './question.ts';

export interface ThreadEvents {
  /** Bytes of the file taken so far. */
  onBytes(file: ScanFile, bytes: number): void;
  onDone(file: ScanFile, result: TaskResult): Promise<void>;
  /** The file could not be worked on, for a reason of the machine's or a fault of ours. */
  onFailed(file: ScanFile, words: string): void;
}

/** A thread's heap may grow to this, MB, before its file is given up: the others go on. */
const HEAP_MB = 4096;
/** Room for what is short-lived, MB: small, or the large arrays it holds on to wait long to be freed. */
const YOUNG_MB = 8;

/**
 * Works through the files.
 * @param partPath where the part of a file goes
 * @returns when all are done, or soon after the signal is raised; the threads have ended then
 */
export async function runThreads(
  count: number,
  files: readonly ScanFile[],
  question: ScanQuestion,
  partPath: (file: ScanFile) => string,
  events: ThreadEvents,
  signal: AbortSignal,
): Promise<void> {
  const waiting = [...files];
  const threads = Array.from({ length: Math.min(count, files.length) }, () => runThread());
  await Promise.all(threads);

  async function runThread(): Promise<void> {
    let worker: Worker | null = null;
    try {
      for (let file = waiting.shift(); file !== undefined && !signal.aborted; file = waiting.shift()) {
        worker ??= new Worker(join(import.meta.dirname, 'scan-worker.js'), {
          workerData: question,
          resourceLimits: { maxOldGenerationSizeMb: HEAP_MB, maxYoungGenerationSizeMb: YOUNG_MB },
        });
        if (!(await workOn(worker, file))) worker = null;
      }
    } finally {
      await worker?.terminate();
    }
  }

  /** @returns whether the thread can take another file */
  async function workOn(worker: Worker, file: ScanFile): Promise<boolean> {
    const outcome = await new Promise<TaskResult | string | null>((resolve) => {
      const finish = (result: TaskResult | string | null): void => {
        signal.removeEventListener('abort', onStop);
        worker.off('message', onReport).off('error', onError).off('exit', onExit);
        resolve(result);
      };
      const onStop = (): void => finish(null);
      const onReport = (report: Report): void => {
        if (report.kind === 'bytes') events.onBytes(file, report.bytes);
        else finish(report.kind === 'done' ? report.result : report.words);
      };
      const onError = (error: Error): void => finish(error.message);
      const onExit = (): void => finish('its thread ended without a word');
      signal.addEventListener('abort', onStop, { once: true });
      worker.on('message', onReport).on('error', onError).on('exit', onExit);
      worker.postMessage({ file, partPath: partPath(file) } satisfies Task);
    });
    if (outcome === null) return true;
    if (typeof outcome !== 'string') {
      await events.onDone(file, outcome);
      return true;
    }
    events.onFailed(file, outcome);
    await worker.terminate();
    return false;
  }
}
