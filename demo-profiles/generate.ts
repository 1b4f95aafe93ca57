// Makes all files of the demo. `npm run demo` writes them; a test makes them again and compares every byte.

import { barrier } from './making/barrier.ts';
import { plains } from './making/plains.ts';
import { storm } from './making/storm.ts';
import { valley } from './making/valley.ts';

/** Every file of the demo by its path below demo-profiles. */
export function demoFiles(): Map<string, Uint8Array> {
  const nights = [plains(), barrier(), valley(), storm()];
  const manifest = {
    about: 'The demo. All of it is invented: places, stations, turbines and weather.',
    opens: 'plains',
    nights: nights.map(({ entry }) => entry),
  };
  const encoder = new TextEncoder();
  const files = new Map<string, Uint8Array>([
    ['manifest.json', encoder.encode(`${JSON.stringify(manifest, null, 2)}\n`)],
  ]);
  for (const night of nights) {
    for (const [path, content] of Object.entries(night.files)) {
      files.set(path, typeof content === 'string' ? encoder.encode(content) : content);
    }
  }
  return files;
}
