// Before all browser tests: builds the page if need be and serves it with the program a user starts, on a free port.

import { spawn, type ChildProcess } from 'node:child_process';
import { createInterface } from 'node:readline';
import type { TestProject } from 'vitest/node';

declare module 'vitest' {
  export interface ProvidedContext {
    /** Address of the served page, ending in a slash. */
    pageAddress: string;
    /** Path of the browser to drive. */
    browserPath: string;
  }
}

export default async function servePage(project: TestProject): Promise<() => Promise<void>> {
  // @ts-expect-error -- plain JavaScript, shared with the runner, which must work before anything is compiled
  const { findChromium } = (await import('./chromium.mjs')) as { findChromium: () => Promise<string> };
  project.provide('browserPath', await findChromium());
  const server = spawn(process.execPath, ['src/relay/duskveer.mjs', 'serve', '--port', '0'], {
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  project.provide('pageAddress', await addressOf(server));
  return () => stopped(server);
}

async function addressOf(server: ChildProcess): Promise<string> {
  for await (const line of createInterface({ input: server.stdout! })) {
    const address = /http:\S+/.exec(line)?.[0];
    if (address !== undefined) return address;
  }
  throw new Error('The page could not be served; the lines above say why.');
}

function stopped(server: ChildProcess): Promise<void> {
  return new Promise((resolve) => {
    server.once('exit', () => resolve());
    server.kill('SIGTERM');
  });
}
