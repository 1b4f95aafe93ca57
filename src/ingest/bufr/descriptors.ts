// Descriptors as in section 3: two bits F, six bits X, eight bits Y in one number (WMO-No. 306, FM 94, regulation 94.5.3).

/** A descriptor out of its six-digit form, `packed('008042')`. */
export function packed(digits: string): number {
  return (Number(digits[0]) << 14) | (Number(digits.slice(1, 3)) << 8) | Number(digits.slice(3, 6));
}

export const kindOf = (descriptor: number): number => descriptor >> 14;
export const xOf = (descriptor: number): number => (descriptor >> 8) & 63;
export const yOf = (descriptor: number): number => descriptor & 255;

/** For people, `0 08 042`. */
export function inWords(descriptor: number): string {
  const x = String(xOf(descriptor)).padStart(2, '0');
  return `${kindOf(descriptor)} ${x} ${String(yOf(descriptor)).padStart(3, '0')}`;
}

/** Classes and categories 48 and up, entries 192 and up, are for each centre's own use. */
export function isLocal(descriptor: number): boolean {
  return xOf(descriptor) >= 48 || yOf(descriptor) >= 192;
}
