// How to know an HDF5 file without loading the library that reads it.

const SIGNATURE = [0x89, 0x48, 0x44, 0x46, 0x0d, 0x0a, 0x1a, 0x0a];
/** Where the signature may stand: at the start, or after a block of the user's own (HDF5 file format, section II.A). */
const PLACES = [0, 512, 1024, 2048, 4096];

/** Whether the bytes hold the HDF5 signature at one of the places where it may stand. */
export function isHdf5(head: Uint8Array): boolean {
  return PLACES.some((start) => SIGNATURE.every((byte, k) => head[start + k] === byte));
}
