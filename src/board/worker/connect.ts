// The page's end of the line.

import { wrap, type Remote } from 'comlink';
import type { BoardWorker } from './protocol.ts';

/** Starts the worker. */
export function connectWorker(): Remote<BoardWorker> {
  return wrap<BoardWorker>(new Worker(new URL('./worker.ts', import.meta.url), { type: 'module' }));
}
