// Kills a scan in the middle, as a power cut would.

import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const launcher = fileURLToPath(new URL('../../../src/relay/duskveer.mjs', import.meta.url));

/**
 * Starts the real process and kills it once so many files are done.
 * @param out folder of the result, as the arguments name it too
 * @returns how many files were done when it died
 */
export async function killMidway(args: readonly string[], out: string, afterFiles: number): Promise<number> {
  const child = spawn(process.execPath, [launcher, ...args], { stdio: 'ignore' });
  const ended = new Promise((resolve) => child.on('close', resolve));
  const parts = join(out, 'parts');
  const done = (): number =>
    existsSync(parts) ? readdirSync(parts).filter((name) => name.endsWith('.part')).length : 0;
  while (done() < afterFiles && child.exitCode === null) await new Promise((resolve) => setTimeout(resolve, 5));
  child.kill('SIGKILL');
  await ended;
  return done();
}

/**
 * Every file of a result by name, with a digest of its bytes. The parts are left aside: they hold equal values, but how a
 * number is packed in them depends on what the thread had done before.
 */
export function resultBytes(out: string): Record<string, string> {
  const names = readdirSync(out).filter((name) => name !== 'parts');
  return Object.fromEntries(names.sort().map((name) => [name, digestOf(join(out, name))]));
}

function digestOf(path: string): string {
  return createHash('sha256').update(readFileSync(path)).digest('hex');
}
