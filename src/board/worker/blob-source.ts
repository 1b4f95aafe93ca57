// A file of the browser as a source of bytes for the readers.

import type { ByteSource } from '../../ingest/index.ts';
import type { OpenFile } from './protocol.ts';

export function blobSource({ name, blob }: OpenFile): ByteSource {
  return {
    name,
    size: blob.size,
    async *stream() {
      const reader = blob.stream().getReader();
      try {
        for (;;) {
          const { done, value } = await reader.read();
          if (done) return;
          yield value;
        }
      } finally {
        // A reader that has seen enough lets go of the file.
        await reader.cancel().catch(() => undefined);
      }
    },
  };
}
