// Where bytes come from, apart from what they mean: readers take a ByteSource and never fetch or open anything.

import { DuskveerError, throwIfCancelled } from '../air/index.ts';

export interface ByteSource {
  readonly name: string;
  /** Bytes in all, where known beforehand. */
  readonly size: number | undefined;
  /** The bytes from the start, in pieces of any length; each call begins anew. */
  stream(): AsyncIterable<Uint8Array>;
}

/** A source over bytes already in memory. */
export function bytesSource(name: string, bytes: Uint8Array): ByteSource {
  return {
    name,
    size: bytes.length,
    // eslint-disable-next-line @typescript-eslint/require-await -- a stream of one piece has nothing to wait for
    async *stream() {
      yield bytes;
    },
  };
}

/** How much the house is willing to hold of one file; beyond it a reader says so and stops. */
export interface ReadLimits {
  /** Bytes of a whole-file format, unpacked. */
  readonly fileBytes: number;
  /** Bytes that one packed file may unpack to. */
  readonly unpackedBytes: number;
  /** How many times its packed size a file may unpack to, counted once more than 64 MiB came out. */
  readonly expansion: number;
  /** Levels in all profiles of a file. */
  readonly levels: number;
  /** UTC, ms: profiles before this or from `latestMs` on are taken for a wrong clock and left out, with a problem. */
  readonly earliestMs: number;
  readonly latestMs: number;
}

export const DEFAULT_LIMITS: ReadLimits = {
  fileBytes: 2 ** 30,
  unpackedBytes: 4 * 2 ** 30,
  expansion: 300,
  levels: 2e8,
  earliestMs: Date.UTC(1900, 0, 1),
  latestMs: Date.UTC(2070, 0, 1),
};

/**
 * All bytes of a source, for formats that need random access.
 * @throws DuskveerError `ingest/too-large` when the source passes the limit
 * @throws Cancelled
 */
export async function readAll(source: ByteSource, limit: number, signal?: AbortSignal): Promise<Uint8Array> {
  const pieces: Uint8Array[] = [];
  let length = 0;
  for await (const piece of source.stream()) {
    throwIfCancelled(signal);
    length += piece.length;
    if (length > limit) {
      throw new DuskveerError({
        code: 'ingest/too-large',
        what: `The file is larger than the ${Math.round(limit / 2 ** 20)} MiB that are held at once.`,
        mend: 'Split it by day or month.',
        where: { source: source.name, byte: limit },
      });
    }
    pieces.push(piece);
  }
  if (pieces.length === 1) return pieces[0]!;
  const all = new Uint8Array(length);
  let at = 0;
  for (const piece of pieces) {
    all.set(piece, at);
    at += piece.length;
  }
  return all;
}
