// What passes between the scan and its threads.

import type { ScanFile } from './files.ts';
import type { TaskResult } from './journal.ts';

/** To a thread: scan this file and write its part there. */
export interface Task {
  readonly file: ScanFile;
  readonly partPath: string;
}

/** From a thread. */
export type Report =
  | { readonly kind: 'bytes'; readonly bytes: number }
  | { readonly kind: 'done'; readonly result: TaskResult }
  | { readonly kind: 'failed'; readonly words: string };
