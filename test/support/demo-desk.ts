// A desk with an invented night of the demo in it.

import { readdirSync, readFileSync } from 'node:fs';
import { Desk } from '../../src/desk/index.ts';
import { readProfiles } from '../../src/ingest/index.ts';
import { readSite } from '../../src/site/index.ts';

const DEMO = new URL('../../demo-profiles/', import.meta.url);

/** @param left names of files that are left out */
export async function demoDesk(night: string, left: readonly string[] = []): Promise<Desk> {
  const folder = new URL(`${night}/`, DEMO);
  const { site } = readSite(readFileSync(new URL('site.json', folder), 'utf8'), 'site.json');
  if (site === null) throw new Error(`The site file of ${night} cannot be read.`);
  const desk = new Desk(site);
  for (const name of readdirSync(folder)) {
    if (name === 'site.json' || left.includes(name)) continue;
    const bytes = new Uint8Array(readFileSync(new URL(name, folder)));
    const source = {
      name,
      size: bytes.length,
      // eslint-disable-next-line @typescript-eslint/require-await -- the shape of a source
      async *stream() {
        yield bytes;
      },
    };
    for await (const { block } of readProfiles(source, { site })) desk.accept(block);
  }
  return desk;
}
