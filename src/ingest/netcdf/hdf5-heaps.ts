// A look at the heaps of an HDF5 file in which its variable-length texts lie. The library walks them object by object and
// trusts their sizes: one that says "no bytes" keeps it in the same place for ever, where nobody can stop it.

/** Bytes before the first object: signature, version, three reserved bytes, then the size of the whole heap. */
const HEAD = 8;
const SIGNATURE = [0x47, 0x43, 0x4f, 0x4c];

/**
 * Walks every global heap (HDF5 file format, section III.E) as the library would.
 * @returns the byte of the first object that would not let the walk go on, null when all do
 */
export function brokenHeap(bytes: Uint8Array): number | null {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const lengthBytes = sizeOfLengths(bytes);
  if (lengthBytes !== 4 && lengthBytes !== 8) return null;
  const lengthAt = (at: number): number =>
    lengthBytes === 8 ? Number(view.getBigUint64(at, true)) : view.getUint32(at, true);
  const objectHead = padded(8 + lengthBytes);
  for (let start = bytes.indexOf(SIGNATURE[0]!); start >= 0; start = bytes.indexOf(SIGNATURE[0]!, start + 1)) {
    if (!SIGNATURE.every((byte, k) => bytes[start + k] === byte) || bytes[start + 4] !== 1) continue;
    if (start + HEAD + lengthBytes > bytes.length) continue;
    const end = start + lengthAt(start + HEAD);
    // Letters that only look like a heap's signature; and what reaches past the file the library refuses by itself.
    if (!(end <= bytes.length)) continue;
    for (let at = start + padded(HEAD + lengthBytes); at + objectHead <= end;) {
      const index = view.getUint16(at, true);
      const size = lengthAt(at + 8);
      // Free space counts its own head, objects do not.
      const step = index === 0 ? size : objectHead + padded(size);
      if (!(step >= objectHead && at + step <= end)) return at;
      at += step;
    }
  }
  return null;
}

function padded(size: number): number {
  return Math.ceil(size / 8) * 8;
}

/** Bytes that the file writes lengths in, from its superblock; 0 where that cannot be found. */
function sizeOfLengths(bytes: Uint8Array): number {
  const start = [0, 512, 1024, 2048, 4096].find((place) => bytes[place] === 0x89 && bytes[place + 1] === 0x48);
  if (start === undefined) return 0;
  const version = bytes[start + 8]!;
  return (version < 2 ? bytes[start + 14] : bytes[start + 10]) ?? 0;
}
