// Says in words what unknown bytes look like, so that whoever dropped the file sees what it is.

import { hasBytes, looksLikeText } from './head.ts';

/** First bytes of kinds of file that people drop by mistake. */
const WELL_KNOWN: readonly (readonly [string, string])[] = [
  ['%PDF', 'a PDF document'],
  ['\x89PNG', 'a PNG picture'],
  ['\xff\xd8\xff', 'a JPEG picture'],
  ['GIF8', 'a GIF picture'],
  ['II*\0', 'a TIFF picture'],
  ['MM\0*', 'a TIFF picture'],
  ['BZh', 'a bzip2 archive'],
  ['\xfd7zXZ', 'an xz archive'],
  ['(\xb5/\xfd', 'a Zstandard archive'],
  ["7z\xbc\xaf'\x1c", 'a 7z archive'],
  ['Rar!', 'a RAR archive'],
  ['GRIB', 'a GRIB file (fields on a grid, not profiles)'],
  ['\xd0\xcf\x11\xe0', 'an old office document'],
  ['SQLite format 3', 'an SQLite database'],
];

/** What the bytes look like, to complete "The file looks like …". */
export function describeBytes(head: Uint8Array): string {
  const known = WELL_KNOWN.find(([magic]) => hasBytes(head, 0, magic));
  if (known !== undefined) return known[1];
  if (looksLikeText(head)) {
    const text = new TextDecoder().decode(head.subarray(0, 400)).trim();
    if (/^<(!doctype|html)/i.test(text)) return 'a web page';
    if (text.startsWith('<')) return 'XML text';
    if (/^[{[]/.test(text)) return 'JSON text';
    const line = text.split(/[\r\n]/, 1)[0]!;
    return `text beginning “${line.length > 48 ? `${line.slice(0, 48)}…` : line}”`;
  }
  const bytes = [...head.subarray(0, 8)].map((byte) => byte.toString(16).padStart(2, '0'));
  return `binary data beginning with the bytes ${bytes.join(' ')}`;
}
