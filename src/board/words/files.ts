// Names for what a reader saves, and the saving.

import { UTCDate } from '@date-fns/utc';
import { format } from 'date-fns';

function name(site: string, atMs: number, ending: string): string {
  const plain = site
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]+/gu, '-')
    .replace(/^-|-$/g, '');
  return `duskveer-${plain}-${format(new UTCDate(atMs), "yyyyMMdd'T'HHmm'Z'")}.${ending}`;
}

export const csvName = (site: string, atMs: number): string => name(site, atMs, 'csv');
export const pngName = (site: string, atMs: number): string => name(site, atMs, 'png');

/** Hands a file to the browser's downloads. */
export function saveBlob(blob: Blob, fileName: string): void {
  const address = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = address;
  link.download = fileName;
  link.click();
  // The browser has taken its own hold of the bytes once the click has been dealt with.
  setTimeout(() => URL.revokeObjectURL(address), 10_000);
}
