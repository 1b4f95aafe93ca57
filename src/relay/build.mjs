// Builds what runs out of what is written: the page into dist/board, the command line into dist/relay. Plain JavaScript,
// because it must run before anything is built; Vite is loaded only when there is something to do.

import { createHash, randomUUID } from 'node:crypto';
import { mkdir, readdir, readFile, rename, rm, stat, utimes, writeFile } from 'node:fs/promises';
import { readdirSync, statSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';

export const root = fileURLToPath(new URL('../../', import.meta.url));

/** What can be built: its configuration, the file that comes last into place, and what it does not depend on. */
const PARTS = {
  relay: { config: 'src/relay/vite.config.ts', last: 'main.js', apart: ['src/board', 'src/plot'], inputs: ['static'] },
  board: {
    config: 'vite.config.ts',
    last: 'index.html',
    apart: ['src/relay'],
    inputs: ['static', 'vite.config.ts', 'svelte.config.js'],
  },
};

/** Parts of older builds stay this long, so that a page or process already running can still load its lazy pieces. */
const KEEP_MS = 24 * 3600 * 1000;

/**
 * Builds a part unless its build was made of exactly the sources that lie there now. Several processes may do this at
 * once: each builds in a folder of its own and moves file after file into place, the entry last.
 * @param {'relay' | 'board'} name
 * @param {{ force?: boolean }} options
 * @returns {Promise<boolean>} whether anything had to be built
 */
export async function ensureBuilt(name, { force = false } = {}) {
  const part = PARTS[name];
  const out = join(root, 'dist', name);
  const stampFile = join(out, '.sources');
  const stamp = sourcesStamp(part);
  if (!force && (await readFile(stampFile, 'utf8').catch(() => '')) === stamp) return false;

  process.stderr.write(`Building ${name === 'board' ? 'the page' : 'the command line'} ...\n`);
  const fresh = join(root, 'dist', `.${name}-${randomUUID()}`);
  try {
    await bundle(part.config, fresh);
    await moveIntoPlace(fresh, out, part.last);
    await writeFile(`${stampFile}.${process.pid}`, stamp);
    await rename(`${stampFile}.${process.pid}`, stampFile);
  } finally {
    await rm(fresh, { recursive: true, force: true });
  }
  return true;
}

async function bundle(configFile, outDir) {
  const { build } = await import('vite').catch((cause) => {
    throw new Error('The tools for building are not installed. Run: npm ci', { cause });
  });
  await build({ configFile: join(root, configFile), logLevel: 'silent', build: { outDir, emptyOutDir: true } });
}

/** Names, sizes and times of all sources in one digest: sees a file that came, went or changed. */
function sourcesStamp(part) {
  const digest = createHash('sha256');
  const visit = (path) => {
    if (part.apart.includes(path)) return;
    const entry = statSync(join(root, path), { throwIfNoEntry: false });
    if (entry === undefined) return;
    if (entry.isDirectory()) for (const name of readdirSync(join(root, path)).sort()) visit(`${path}/${name}`);
    else digest.update(`${path} ${entry.size} ${entry.mtimeMs}\n`);
  };
  for (const path of ['src', 'package.json', 'package-lock.json', ...part.inputs]) visit(path);
  return digest.digest('hex');
}

async function filesUnder(folder) {
  const entries = await readdir(folder, { recursive: true, withFileTypes: true }).catch(() => []);
  return entries.filter((entry) => entry.isFile()).map((entry) => relative(folder, join(entry.parentPath, entry.name)));
}

async function moveIntoPlace(fresh, out, last) {
  const files = await filesUnder(fresh);
  if (!files.includes(last)) throw new Error(`The build made no ${last}.`);
  const now = new Date();
  for (const file of [...files.filter((name) => name !== last), last]) {
    await mkdir(dirname(join(out, file)), { recursive: true });
    await utimes(join(fresh, file), now, now);
    await rename(join(fresh, file), join(out, file));
  }
  for (const file of await filesUnder(out)) {
    if (files.includes(file)) continue;
    const age = now.getTime() - (await stat(join(out, file)).catch(() => ({ mtimeMs: Infinity }))).mtimeMs;
    if (age > KEEP_MS) await rm(join(out, file), { force: true });
  }
}
