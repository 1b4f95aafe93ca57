// Numbers out of big-endian bytes, whole arrays at once.

import type { RawNumbers, StorageType } from './dataset.ts';

const HOST_IS_LITTLE = new Uint8Array(new Uint16Array([1]).buffer)[0] === 1;

/**
 * Decodes so many whole values as the bytes hold. 64-bit integers become doubles.
 * @param bytes length a multiple of the type's size; left as they are
 */
export function decodeNumbers(bytes: Uint8Array, type: StorageType): RawNumbers {
  // Not `slice`: Node's buffers are byte arrays whose slice does not copy.
  return ownNumbers(new Uint8Array(bytes), type);
}

/** The same, turning the bytes in place: for bytes that were copied for the purpose and begin their buffer. */
export function ownNumbers(bytes: Uint8Array, type: StorageType): RawNumbers {
  const { buffer } = bytes;
  switch (type) {
    case 'i1':
      return new Int8Array(buffer, 0, bytes.length);
    case 'u1':
    case 'text':
      return bytes;
    case 'i2':
      return new Int16Array(swapped16(buffer, bytes.length));
    case 'u2':
      return new Uint16Array(swapped16(buffer, bytes.length));
    case 'i4':
      return new Int32Array(swapped32(buffer, bytes.length));
    case 'u4':
      return new Uint32Array(swapped32(buffer, bytes.length));
    case 'f4':
      return new Float32Array(swapped32(buffer, bytes.length));
    case 'f8':
      return new Float64Array(swapped64(buffer, bytes.length));
    case 'i8':
      return Float64Array.from(new BigInt64Array(swapped64(buffer, bytes.length)), Number);
    case 'u8':
      return Float64Array.from(new BigUint64Array(swapped64(buffer, bytes.length)), Number);
  }
}

function swapped16(buffer: ArrayBufferLike, length: number): ArrayBufferLike {
  if (!HOST_IS_LITTLE) return buffer;
  const words = new Uint16Array(buffer, 0, length >> 1);
  for (let k = 0; k < words.length; k++) words[k] = (words[k]! << 8) | (words[k]! >> 8);
  return buffer;
}

function swapped32(buffer: ArrayBufferLike, length: number): ArrayBufferLike {
  if (!HOST_IS_LITTLE) return buffer;
  const words = new Uint32Array(buffer, 0, length >> 2);
  for (let k = 0; k < words.length; k++) words[k] = swap32(words[k]!);
  return buffer;
}

function swapped64(buffer: ArrayBufferLike, length: number): ArrayBufferLike {
  if (!HOST_IS_LITTLE) return buffer;
  const words = new Uint32Array(buffer, 0, (length >> 3) * 2);
  for (let k = 0; k < words.length; k += 2) {
    const high = swap32(words[k]!);
    words[k] = swap32(words[k + 1]!);
    words[k + 1] = high;
  }
  return buffer;
}

function swap32(word: number): number {
  return (word << 24) | ((word & 0xff00) << 8) | ((word >>> 8) & 0xff00) | (word >>> 24);
}
