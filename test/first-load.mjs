// The size budget: fails when the script that a first visit must load passes the limit. Readers and WebAssembly are
// loaded when first needed and do not count. Reads the manifest of the built page.

import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';

const LIMIT_BYTES = 150_000;
const board = join(import.meta.dirname, '../dist/board');
const manifest = JSON.parse(readFileSync(join(board, '.vite/manifest.json'), 'utf8'));

/** The entry's script and everything it imports statically. */
function scriptsOf(key, seen = new Set()) {
  const chunk = manifest[key];
  if (chunk === undefined || seen.has(chunk.file)) return seen;
  seen.add(chunk.file);
  for (const imported of chunk.imports ?? []) scriptsOf(imported, seen);
  return seen;
}

let failed = false;
for (const [key, chunk] of Object.entries(manifest)) {
  if (!chunk.isEntry) continue;
  const scripts = [...scriptsOf(key)].filter((file) => file.endsWith('.js'));
  const bytes = scripts.reduce((sum, file) => sum + gzipSync(readFileSync(join(board, file))).length, 0);
  const over = bytes > LIMIT_BYTES;
  failed ||= over;
  const words = `${key}: first load ${(bytes / 1000).toFixed(1)} kB of script, gzipped, limit ${LIMIT_BYTES / 1000} kB`;
  (over ? process.stderr : process.stdout).write(`${words}${over ? ': too much' : ''}\n`);
}
process.exitCode = failed ? 1 : 0;
