// Whole numbers in fixed columns of bytes.

/** Stands for missing in every field of the archive. */
export const MISSING = -9999;
/** A value that the archive's own checks took out. */
export const REMOVED = -8888;

/**
 * The number in columns `from` up to `to` (not included) of a line; MISSING where there is none or something else stands.
 * @param end of the line: columns beyond it are blank
 */
export function numberAt(bytes: Uint8Array, from: number, to: number, end: number): number {
  const stop = to < end ? to : end;
  let at = from;
  while (at < stop && bytes[at] === 32) at++;
  if (at >= stop) return MISSING;
  const negative = bytes[at] === 45;
  if (negative) at++;
  let value = 0;
  let digits = 0;
  for (; at < stop; at++) {
    const digit = bytes[at]! - 48;
    if (!(digit >= 0 && digit <= 9)) break;
    value = value * 10 + digit;
    digits++;
  }
  if (digits === 0) return MISSING;
  while (at < stop && bytes[at] === 32) at++;
  return at < stop ? MISSING : negative ? -value : value;
}

/** The text in columns `from` up to `to`, trimmed. */
export function textAt(bytes: Uint8Array, from: number, to: number): string {
  return String.fromCharCode(...bytes.subarray(from, to)).trim();
}
