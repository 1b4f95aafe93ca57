// Whether a file is a farm's output rather than profiles, told by its first bytes.

import { FORMATS } from './formats.ts';
import { readOutputSeries } from './output-series.ts';

/** Whether no format of profiles knows these bytes and a table of times and power begins with them. */
export function isOutputTable(head: Uint8Array): boolean {
  if (FORMATS.some((format) => format.recognise(head))) return false;
  const text = new TextDecoder().decode(head);
  // Bytes that are no text are no table.
  if (text.includes('\0')) return false;
  return readOutputSeries('', text).timeMs.length > 0;
}
