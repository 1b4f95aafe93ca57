// `npm run demo`: writes the demo's files beside this one.

import { mkdirSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { runnerImport } from 'vite';

const here = import.meta.dirname;
const { module } = await runnerImport(join(here, 'generate.ts'), { configFile: false, logLevel: 'error' });
for (const [path, bytes] of module.demoFiles()) {
  mkdirSync(dirname(join(here, path)), { recursive: true });
  writeFileSync(join(here, path), bytes);
  process.stdout.write(`${path}: ${(bytes.length / 1000).toFixed(1)} kB\n`);
}
