// The archive's tables out of files of the browser, line by line, so that ten years need no more room than a few lines.

import { archiveTableKind, ArchiveTableReader, type ArchiveView } from '../../desk/index.ts';
import type { OpenFile } from './protocol.ts';

/** Characters of text handed on together, about. */
const PIECE = 2 ** 20;

export async function readArchiveTables(files: readonly OpenFile[]): Promise<ArchiveView[]> {
  const reader = new ArchiveTableReader();
  const kinds = await Promise.all(files.map(async (file) => archiveTableKind(await headingOf(file.blob))));
  for (const kind of ['nights', 'profiles'] as const) {
    for (const file of files.filter((_, k) => kinds[k] === kind)) await readTable(file.blob, reader);
  }
  return reader.views();
}

/** The first line of a file, as far as it is worth looking. */
export async function headingOf(blob: Blob): Promise<string> {
  const LONGEST_HEADING = 2 ** 16;
  return (await blob.slice(0, LONGEST_HEADING).text()).split('\n', 1)[0]!;
}

async function readTable(blob: Blob, reader: ArchiveTableReader): Promise<void> {
  const pieces = blob.stream().getReader();
  const decoder = new TextDecoder();
  let text = '';
  let begun = false;
  const hand = (end: number): void => {
    const whole = text.slice(0, end);
    text = text.slice(end);
    const first = begun ? 0 : whole.indexOf('\n') + 1;
    if (!begun) reader.begin(whole.slice(0, first));
    begun = true;
    reader.take(whole.slice(first));
  };
  for (;;) {
    const { done, value } = await pieces.read();
    text += done ? decoder.decode() : decoder.decode(value, { stream: true });
    if (!done && text.length < PIECE) continue;
    const end = done ? text.length : text.lastIndexOf('\n') + 1;
    if (end > 0) hand(end);
    if (done) return;
  }
}
