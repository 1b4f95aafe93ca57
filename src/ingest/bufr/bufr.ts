// The format at the front door: light, so that whoever never opens one does not load tables and decoder.

import type { FileFormat } from '../format.ts';
import { hasBytes } from '../head.ts';

export const bufr: FileFormat = {
  name: 'bufr',
  title: 'WMO BUFR (FM 94), editions 2 to 4',
  recognise(head) {
    for (let at = head.indexOf(0x42); at >= 0; at = head.indexOf(0x42, at + 1)) {
      // The edition number, never a letter, tells a message from text that speaks of one.
      if (hasBytes(head, at, 'BUFR') && at + 7 < head.length && head[at + 7]! <= 4) return true;
    }
    return false;
  },
  async *read(source, options) {
    const { readBufr } = await import('./read-bufr.ts');
    yield* readBufr(source, options);
  },
};
