// `npm run bench`: compiles every bench and runs each in a process of its own, so that none warms or spoils another's
// code; one JSON line a figure. `npm run bench -- jet` runs those with jet in their name.

import { spawnSync } from 'node:child_process';
import { readdirSync } from 'node:fs';
import { mkdir, rm } from 'node:fs/promises';
import { basename, join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';

const here = import.meta.dirname;
const root = join(here, '../..');
const out = join(root, 'dist/bench', String(process.pid));

/** In the child process: runs one compiled bench. */
async function runBuilt(file) {
  const { default: bench } = await import(pathToFileURL(file).href);
  const name = basename(file, '.bench.js');
  await bench((figure) => process.stdout.write(`${JSON.stringify({ bench: name, ...figure })}\n`));
}

async function runAll(filters) {
  const names = readdirSync(here)
    .filter((name) => name.endsWith('.bench.ts'))
    .map((name) => basename(name, '.ts'))
    .filter((name) => filters.length === 0 || filters.some((filter) => name.includes(filter)));
  if (names.length === 0) {
    process.stderr.write(`No bench in test/bench matches ${filters.join(' ') || 'anything'}.\n`);
    return 1;
  }
  const { build } = await import('vite');
  await mkdir(out, { recursive: true });
  try {
    await build({
      root,
      configFile: false,
      logLevel: 'error',
      publicDir: false,
      build: {
        ssr: true,
        target: 'node20',
        outDir: out,
        emptyOutDir: true,
        rolldownOptions: {
          input: Object.fromEntries(names.map((name) => [name, join(here, `${name}.ts`)])),
          output: { entryFileNames: '[name].js', chunkFileNames: '[name]-[hash].js' },
        },
      },
    });
    let failures = 0;
    for (const name of names) {
      const args = ['--expose-gc', fileURLToPath(import.meta.url), '--built', join(out, `${name}.js`)];
      const { status } = spawnSync(process.execPath, args, { cwd: root, stdio: ['ignore', 'inherit', 'inherit'] });
      if (status !== 0) {
        process.stderr.write(`${name} failed.\n`);
        failures++;
      }
    }
    return failures === 0 ? 0 : 1;
  } finally {
    await rm(out, { recursive: true, force: true });
  }
}

const args = process.argv.slice(2);
if (args[0] === '--built') await runBuilt(args[1]);
else process.exitCode = await runAll(args);
