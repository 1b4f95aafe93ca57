// A place in big-endian bytes that moves on as values are taken, and never past the end.

import { DuskveerError } from '../../air/index.ts';

/** Text in bytes: UTF-8 where it is that, else the Western code page that older writers used; NULs at the end go. */
export function decodeText(bytes: Uint8Array): string {
  let end = bytes.length;
  while (end > 0 && bytes[end - 1] === 0) end--;
  const kept = bytes.subarray(0, end);
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(kept);
  } catch {
    return new TextDecoder('windows-1252').decode(kept);
  }
}

export class Cursor {
  readonly #view: DataView;
  readonly #source: string;
  at: number;

  constructor(
    readonly bytes: Uint8Array,
    source: string,
    at = 0,
  ) {
    this.#view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
    this.#source = source;
    this.at = at;
  }

  uint32(): number {
    return this.#view.getUint32(this.#advance(4));
  }

  /** A 64-bit count; beyond 2^53 it is rounded, which is beyond any file anyway. */
  uint64(): number {
    return Number(this.#view.getBigUint64(this.#advance(8)));
  }

  take(length: number): Uint8Array {
    const from = this.#advance(length);
    return this.bytes.subarray(from, from + length);
  }

  /** @throws DuskveerError `ingest/netcdf-damaged` naming this place */
  fail(what: string): never {
    throw new DuskveerError({
      code: 'ingest/netcdf-damaged',
      what,
      mend: 'Fetch the file again; if it stays so, ask its provider for an intact copy.',
      where: { source: this.#source, byte: this.at },
    });
  }

  /** Refuses a count that the bytes left cannot hold, before anything loops over it. */
  checkCount(count: number, leastBytesEach: number, ofWhat: string): number {
    if (count * leastBytesEach > this.bytes.length - this.at) {
      this.fail(`The header announces ${count} ${ofWhat}, more than the rest of the file can hold.`);
    }
    return count;
  }

  #advance(length: number): number {
    if (!(length <= this.bytes.length - this.at)) this.fail('The file ends inside its header.');
    const from = this.at;
    this.at += length;
    return from;
  }
}
