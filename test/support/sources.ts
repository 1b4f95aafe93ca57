// Byte sources for tests: texts, pieces, failures.

import type { ByteSource, Reading } from '../../src/ingest/index.ts';
import { concatBlocks, type ProfileBlock } from '../../src/profile/index.ts';
import type { Problem } from '../../src/air/index.ts';

export const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text);

/** A source that hands its bytes out in pieces of the given length. */
export function pieces(name: string, bytes: Uint8Array, pieceLength: number): ByteSource {
  return {
    name,
    size: bytes.length,
    // eslint-disable-next-line @typescript-eslint/require-await -- nothing to wait for
    async *stream() {
      for (let at = 0; at < bytes.length; at += pieceLength) yield bytes.subarray(at, at + pieceLength);
    },
  };
}

/** Reads to the end: one block and all problems. */
export async function readToEnd(
  readings: AsyncIterable<Reading>,
): Promise<{ block: ProfileBlock; problems: Problem[]; formats: string[] }> {
  const all: Reading[] = [];
  for await (const reading of readings) all.push(reading);
  return {
    block: concatBlocks(all.map((reading) => reading.block)),
    problems: all.flatMap((reading) => reading.problems),
    formats: [...new Set(all.map((reading) => reading.format))],
  };
}
