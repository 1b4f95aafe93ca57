#!/usr/bin/env node
// The door of the command line: builds itself when its sources have changed, then hands over to the built program.

import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { stripVTControlCharacters } from 'node:util';
import { ensureBuilt, root } from './build.mjs';

try {
  await ensureBuilt('relay');
  if (process.argv[2] === 'serve') await ensureBuilt('board');
} catch (error) {
  process.stderr.write(`Duskveer could not be built. ${stripVTControlCharacters(error.message)}\n`);
  process.exit(1);
}
await import(pathToFileURL(join(root, 'dist/relay/main.js')).href);
