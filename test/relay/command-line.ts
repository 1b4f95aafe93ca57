// Runs the command line as a user does: the real process, its exit code and what it wrote.

import { spawn } from 'node:child_process';
import { fileURLToPath } from 'node:url';

const launcher = fileURLToPath(new URL('../../src/relay/duskveer.mjs', import.meta.url));

/** Path of a file of the demo. */
export const demo = (path: string): string => fileURLToPath(new URL(`../../demo-profiles/${path}`, import.meta.url));

export interface Ran {
  readonly code: number | null;
  readonly out: string;
  readonly err: string;
  /** Each line of stdout as JSON. */
  lines(): Record<string, unknown>[];
}

/** @param input bytes for stdin */
export function duskveer(args: readonly string[], input?: Uint8Array | string): Promise<Ran> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [launcher, ...args], { stdio: 'pipe' });
    let out = '';
    let err = '';
    child.stdout.setEncoding('utf8').on('data', (text: string) => (out += text));
    child.stderr.setEncoding('utf8').on('data', (text: string) => (err += text));
    child.on('error', reject);
    // A command that reads no stdin may end before all of it is written.
    child.stdin.on('error', () => undefined);
    child.stdin.end(input);
    child.on('close', (code) => {
      const lines = (): Record<string, unknown>[] =>
        out
          .split('\n')
          .filter((line) => line !== '')
          .map((line) => JSON.parse(line) as Record<string, unknown>);
      // The first run after a change of the sources builds, and says so.
      resolve({ code, out, err: err.replace(/^Building .*\n/, ''), lines });
    });
  });
}
