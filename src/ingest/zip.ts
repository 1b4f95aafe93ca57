// Zip archives (ISO/IEC 21320-1): the directory at the end names the files, each unpacked as it streams.

import { DuskveerError, type Problem } from '../air/index.ts';
import { inflate } from './gzip.ts';
import { hasBytes } from './head.ts';
import { bytesSource, readAll, type ByteSource, type ReadLimits } from './source.ts';

const DIRECTORY_END = 'PK\x05\x06';
const DIRECTORY_ENTRY = 'PK\x01\x02';
const LOCAL_HEADER = 'PK\x03\x04';
/** More files than this in one archive are no archive of profiles. */
const MOST_FILES = 20_000;

/** True for the first bytes of a zip archive that holds something. */
export function isZip(head: Uint8Array): boolean {
  return hasBytes(head, 0, LOCAL_HEADER);
}

interface Entry {
  readonly name: string;
  readonly method: number;
  readonly encrypted: boolean;
  readonly packedSize: number;
  readonly checkSum: number;
  readonly start: number;
}

/**
 * The files in an archive, named `archive.zip/file`; one that cannot be unpacked comes as a problem.
 * @throws DuskveerError `ingest/damaged-packing`, `ingest/workbook`, `ingest/too-large`
 */
export async function* unzipped(
  archive: ByteSource,
  limits: ReadLimits,
  signal: AbortSignal | undefined,
): AsyncGenerator<ByteSource | Problem> {
  const bytes = await readAll(archive, limits.fileBytes, signal);
  const entries = directoryOf(bytes, archive.name);
  if (entries.some((entry) => entry.name === '[Content_Types].xml')) {
    throw new DuskveerError({
      code: 'ingest/workbook',
      what: 'The file is an office document, not a table of text.',
      mend: 'Save the sheet as CSV and read that.',
      where: { source: archive.name },
    });
  }
  for (const entry of entries) {
    const name = `${archive.name}/${entry.name}`;
    if (entry.encrypted || (entry.method !== 0 && entry.method !== 8)) {
      yield {
        code: 'ingest/packing-not-read',
        what: entry.encrypted
          ? 'This file of the archive is encrypted.'
          : 'This file of the archive is packed unusually.',
        mend: 'Unpack the archive first and read the files in it.',
        where: { source: name },
      };
      continue;
    }
    const content = contentOf(bytes, entry);
    if (content === null) throw broken(archive.name, entry.start);
    const packed = bytesSource(name, content);
    yield entry.method === 0 ? packed : { name, size: undefined, stream: () => inflate(packed, limits, entry) };
  }
}

function directoryOf(bytes: Uint8Array, name: string): Entry[] {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  let end = bytes.length - 22;
  const first = Math.max(0, end - 0xffff);
  while (end >= first && !hasBytes(bytes, end, DIRECTORY_END)) end--;
  if (end < first) throw broken(name, bytes.length);
  const count = Math.min(view.getUint16(end + 10, true), MOST_FILES);
  let at = view.getUint32(end + 16, true);
  const entries: Entry[] = [];
  for (let k = 0; k < count; k++) {
    if (at + 46 > bytes.length || !hasBytes(bytes, at, DIRECTORY_ENTRY)) throw broken(name, at);
    const nameLength = view.getUint16(at + 28, true);
    const entryName = new TextDecoder().decode(bytes.subarray(at + 46, at + 46 + nameLength));
    // Folders, and the shadow files that one desktop system adds to every archive, hold nothing to read.
    if (!entryName.endsWith('/') && !entryName.startsWith('__MACOSX/')) {
      entries.push({
        name: entryName,
        method: view.getUint16(at + 10, true),
        encrypted: (view.getUint16(at + 8, true) & 1) !== 0,
        checkSum: view.getUint32(at + 16, true),
        packedSize: view.getUint32(at + 20, true),
        start: view.getUint32(at + 42, true),
      });
    }
    at += 46 + nameLength + view.getUint16(at + 30, true) + view.getUint16(at + 32, true);
  }
  return entries;
}

/** The packed bytes of an entry; null when they lie outside the archive (files past 4 GiB do, too). */
function contentOf(bytes: Uint8Array, entry: Entry): Uint8Array | null {
  if (entry.start + 30 > bytes.length || !hasBytes(bytes, entry.start, LOCAL_HEADER)) return null;
  const view = new DataView(bytes.buffer, bytes.byteOffset + entry.start, 30);
  const start = entry.start + 30 + view.getUint16(26, true) + view.getUint16(28, true);
  if (start + entry.packedSize > bytes.length) return null;
  return bytes.subarray(start, start + entry.packedSize);
}

function broken(name: string, byte: number): DuskveerError {
  return new DuskveerError({
    code: 'ingest/damaged-packing',
    what: 'The zip archive is damaged or its end is missing.',
    mend: 'Fetch the archive again, or unpack it and read the files in it.',
    where: { source: name, byte },
  });
}
