// The folder of outside data beside the checkout. A user's clone has none: tests that need it skip and say so.

import { existsSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

// Benches run compiled, from a folder of their own: there the checkout is the working directory.
const besideCheckout = [fileURLToPath(new URL('../../../shared/', import.meta.url)), `${process.cwd()}/../shared/`];
const root = besideCheckout.find((path) => existsSync(path)) ?? besideCheckout[0]!;

/** Whether the outside data are at hand. */
export const sharedIsHere = existsSync(root);

/** Path of a file in the outside data. */
export const sharedPath = (path: string): string => root + path;

/** Reason to print where a suite skips. */
export const SKIP_REASON = 'skipped: ../shared (outside check data) is not beside this checkout';

if (!sharedIsHere) console.warn(SKIP_REASON);

export function readShared(path: string): Uint8Array {
  return readFileSync(sharedPath(path));
}

export function readSharedJson(path: string): unknown {
  return JSON.parse(readFileSync(sharedPath(path), 'utf8'));
}
