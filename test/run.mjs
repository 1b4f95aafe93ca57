// `npm test`: the tests of every room in Node, then the page in a real browser. Arguments go to both, so that
// `npm test -- jet` runs what has jet in its path.

import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { findChromium } from './browser/chromium.mjs';

const root = join(import.meta.dirname, '..');
const given = process.argv.slice(2);

function vitest(configuration, environment = {}) {
  const cli = join(root, 'node_modules/vitest/vitest.mjs');
  const some = given.length > 0 ? ['--passWithNoTests'] : [];
  const args = [cli, 'run', '--config', configuration, ...some, ...given];
  const { status, signal } = spawnSync(process.execPath, args, {
    cwd: root,
    stdio: 'inherit',
    env: { ...process.env, ...environment },
  });
  if (signal !== null) process.stderr.write(`The tests of ${configuration} were ended from outside (${signal}).\n`);
  return status;
}

let failed = vitest('vitest.config.ts') !== 0;
try {
  failed = vitest('test/browser/vitest.config.ts', { CHROME_PATH: await findChromium() }) !== 0 || failed;
} catch (error) {
  process.stderr.write(`The page was not tested. ${error.message}\n`);
  failed = true;
}
process.exitCode = failed ? 1 : 0;
