// `npm run build`: everything that runs, anew.

import { ensureBuilt } from './build.mjs';

await ensureBuilt('relay', { force: true });
await ensureBuilt('board', { force: true });
