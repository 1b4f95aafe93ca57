// The first bytes of a source: enough to tell what it is.

import type { ByteSource } from './source.ts';

/** As many bytes as any format may look at to recognise itself. */
export const HEAD_BYTES = 64 * 1024;

/** The first bytes, up to 64 KiB; fewer only when the source ends before. */
export async function headOf(source: ByteSource): Promise<Uint8Array> {
  const head = new Uint8Array(HEAD_BYTES);
  let length = 0;
  for await (const piece of source.stream()) {
    const taken = piece.subarray(0, HEAD_BYTES - length);
    head.set(taken, length);
    length += taken.length;
    if (length === HEAD_BYTES) break;
  }
  return head.subarray(0, length);
}

/** True when the bytes at the position are those of the text, a character a byte. */
export function hasBytes(bytes: Uint8Array, position: number, text: string): boolean {
  if (bytes.length < position + text.length) return false;
  for (let k = 0; k < text.length; k++) if (bytes[position + k] !== text.charCodeAt(k)) return false;
  return true;
}

/** True when nothing in the bytes is foreign to plain text: no zero bytes and hardly any control characters. */
export function looksLikeText(head: Uint8Array): boolean {
  let odd = 0;
  for (const byte of head) {
    if (byte === 0) return false;
    // Tab to carriage return, escape, and the separators 28 to 31 with which old bulletins begin and end.
    if (byte < 32 && !(byte >= 9 && byte <= 13) && byte < 27 && byte > 3) odd++;
  }
  return odd <= head.length / 200;
}
