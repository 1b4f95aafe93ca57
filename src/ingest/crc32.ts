// The check sum by which gzip and zip know their content (RFC 1952, section 8).

const TABLE = new Uint32Array(256);
for (let byte = 0; byte < 256; byte++) {
  let sum = byte;
  for (let bit = 0; bit < 8; bit++) sum = (sum & 1) === 1 ? (sum >>> 1) ^ 0xedb88320 : sum >>> 1;
  TABLE[byte] = sum;
}

/** The check sum of bytes that follow those with the given sum; begin with 0. */
export function crc32(bytes: Uint8Array, before: number): number {
  let sum = ~before;
  for (const byte of bytes) sum = (sum >>> 8) ^ TABLE[(sum ^ byte) & 0xff]!;
  return ~sum >>> 0;
}
