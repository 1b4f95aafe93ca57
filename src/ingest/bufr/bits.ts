// Reads numbers of any width out of the bits of a data section, first bit first.

import { truncated } from './trouble.ts';

export class BitReader {
  readonly #bytes: Uint8Array;
  readonly #end: number;
  /** Next bit, counted from the start of the message. */
  position: number;

  /**
   * @param bytes a message that goes on for at least four bytes after the end, as section 5 sees to
   * @param start first byte, @param end byte after the last
   */
  constructor(bytes: Uint8Array, start: number, end: number) {
    this.#bytes = bytes;
    this.position = start * 8;
    this.#end = end * 8;
  }

  get left(): number {
    return this.#end - this.position;
  }

  /**
   * The next `width` bits, 0 to 53, as an unsigned number.
   * @throws DuskveerError `ingest/bufr-truncated`
   */
  read(width: number): number {
    const position = this.position;
    const next = position + width;
    if (next > this.#end) throw truncated(position >> 3);
    this.position = next;
    const bytes = this.#bytes;
    const at = position >> 3;
    const shift = position & 7;
    if (shift + width <= 32) {
      if (width === 0) return 0;
      const window = (bytes[at]! << 24) | (bytes[at + 1]! << 16) | (bytes[at + 2]! << 8) | bytes[at + 3]!;
      return (window << shift) >>> (32 - width);
    }
    const upper = width - 24;
    this.position = position;
    const high = this.read(upper);
    return high * 0x1000000 + this.read(24);
  }

  /** @throws DuskveerError `ingest/bufr-truncated` */
  skip(width: number): void {
    if (this.position + width > this.#end) throw truncated(this.position >> 3);
    this.position += width;
  }

  /** Characters of International Alphabet No. 5 without padding; empty when missing (every bit set). */
  text(width: number): string {
    let text = '';
    let missing = true;
    for (let left = width; left >= 8; left -= 8) {
      const code = this.read(8);
      if (code !== 255) missing = false;
      text += code >= 32 && code < 127 ? String.fromCharCode(code) : ' ';
    }
    this.skip(width % 8);
    return missing ? '' : text.trim();
  }
}
