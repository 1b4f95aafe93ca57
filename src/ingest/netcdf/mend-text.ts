// Text that was UTF-8 but was taken for the Western code page: the HDF5 library does so where a writer left its texts
// flagged as ASCII, and "Jülich" comes out as "JÃ¼lich".

/** Bytes 0x80 to 0x9f in the Western code page (windows-1252); five of them stand for themselves. */
const UPPER = '€\x81‚ƒ„…†‡ˆ‰Š‹Œ\x8dŽ\x8f\x90‘’“”•–—˜™š›œ\x9džŸ';

// Spelled out: not every host's decoder knows that page in full.
const BYTE_OF: ReadonlyMap<string, number> = new Map(Array.from(UPPER, (letter, k) => [letter, 0x80 + k]));

/** The text as its writer meant it; unchanged where it does not read as UTF-8 in disguise. NULs at the end go. */
export function mendText(text: string): string {
  const plain = text.replace(/\0+$/u, '');
  if (/^[\0-\x7f]*$/u.test(plain)) return plain;
  const bytes: number[] = [];
  for (const letter of plain) {
    const byte = BYTE_OF.get(letter) ?? (letter.charCodeAt(0) < 256 ? letter.charCodeAt(0) : undefined);
    if (byte === undefined) return plain;
    bytes.push(byte);
  }
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(Uint8Array.from(bytes));
  } catch {
    return plain;
  }
}
