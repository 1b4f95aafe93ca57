// Packed bytes, unpacked as they stream, within stated limits: gzip (RFC 1952, any number of members) and the bare
// deflate data (RFC 1951) inside zip archives. The content is held against its check sum at the end.

import { Gunzip, Inflate } from 'fflate';
import { DuskveerError } from '../air/index.ts';
import { crc32 } from './crc32.ts';
import type { ByteSource, ReadLimits } from './source.ts';

/** Packed bytes handed over at once: deflate grows at most 1032-fold, so that 32 MiB come back at most. */
const FEED = 32 * 1024;
/** Below this size nobody minds how far a file expands. */
const HARMLESS = 64 * 2 ** 20;
/** Check sum and length at the end of a gzip member. */
const TRAILER = 8;

/** True for the first bytes of a gzip member. */
export function isGzip(head: Uint8Array): boolean {
  return head.length >= 3 && head[0] === 0x1f && head[1] === 0x8b && head[2] === 8;
}

/** The unpacked content of a gzip source. */
export function gunzipped(source: ByteSource, limits: ReadLimits): ByteSource {
  return { name: source.name, size: undefined, stream: () => inflate(source, limits, 'gzip') };
}

/**
 * Unpacks a stream.
 * @param packing gzip members, or bare deflate data with this check sum of the content
 * @throws DuskveerError `ingest/damaged-packing` where the packed data break off or make no sense,
 *   `ingest/expands-too-far` past the limits; what was unpacked before has been handed out by then
 */
export async function* inflate(
  source: ByteSource,
  limits: ReadLimits,
  packing: 'gzip' | { readonly checkSum: number },
): AsyncGenerator<Uint8Array> {
  let ready: Uint8Array[] = [];
  let sum = 0;
  let packed = 0;
  let unpacked = 0;
  /** The packed bytes just handed over, with the few before them. */
  let recent = new Uint8Array(0);

  const take = (piece: Uint8Array): void => {
    if (piece.length === 0) return;
    sum = crc32(piece, sum);
    ready.push(piece);
  };
  const checkTrailer = (end: number): void => {
    const at = end - (packed - recent.length) - TRAILER;
    if (at < 0) throw new Error('it ends too early');
    if (new DataView(recent.buffer, recent.byteOffset + at).getUint32(0, true) !== sum)
      throw new Error('wrong check sum');
    sum = 0;
  };
  const inflater = packing === 'gzip' ? new Gunzip(take) : new Inflate(take);
  if (inflater instanceof Gunzip) inflater.onmember = checkTrailer;

  const push = (bytes: Uint8Array, final: boolean): unknown => {
    const kept = recent.subarray(Math.max(0, recent.length - TRAILER));
    recent = new Uint8Array(kept.length + bytes.length);
    recent.set(kept);
    recent.set(bytes, kept.length);
    packed += bytes.length;
    try {
      inflater.push(bytes, final);
      if (final && packing === 'gzip') checkTrailer(packed);
      if (final && packing !== 'gzip' && packing.checkSum !== sum) throw new Error('wrong check sum');
    } catch (error) {
      return error ?? new Error('unknown cause');
    }
    return undefined;
  };

  function* feed(bytes: Uint8Array, final: boolean): Generator<Uint8Array> {
    const failure = push(bytes, final);
    for (const piece of ready) {
      unpacked += piece.length;
      yield piece;
    }
    ready = [];
    if (failure !== undefined) throw damaged(source.name, packed, failure);
    if (unpacked > limits.unpackedBytes || (unpacked > HARMLESS && unpacked > packed * limits.expansion)) {
      throw expandsTooFar(source.name, packed, unpacked);
    }
  }

  for await (const piece of source.stream()) {
    for (let at = 0; at < piece.length; at += FEED) yield* feed(piece.subarray(at, at + FEED), false);
  }
  yield* feed(new Uint8Array(0), true);
}

function damaged(name: string, byte: number, cause: unknown): DuskveerError {
  const reason = cause instanceof Error ? cause.message : String(cause);
  return new DuskveerError(
    {
      code: 'ingest/damaged-packing',
      what: `The packed data are damaged or break off (${reason}).`,
      mend: 'Fetch the file again; what could be unpacked is used.',
      where: { source: name, byte },
    },
    { cause },
  );
}

function expandsTooFar(name: string, packed: number, unpacked: number): DuskveerError {
  return new DuskveerError({
    code: 'ingest/expands-too-far',
    what: `The packed file expands without end: ${Math.round(unpacked / 2 ** 20)} MiB came out of ${Math.ceil(packed / 1024)} KiB.`,
    mend: 'If the file is sound, unpack it first and read the unpacked file, or split it.',
    where: { source: name, byte: packed },
  });
}
