// What one input file came to, as a file of its own: written whole or not at all, and told apart from one that is damaged.

import { readFile, rename, writeFile } from 'node:fs/promises';
import { deserialize, serialize } from 'node:v8';
import { crc32 } from 'node:zlib';
import type { FeedRows } from '../../desk/index.ts';

/** A problem of a file, as the table of problems tells it. */
export interface ScanProblem {
  /** Where in the file, in words. */
  readonly place: string;
  readonly code: string;
  readonly what: string;
  readonly mend: string;
  /** Whether something was lost that could have been used. */
  readonly unread: boolean;
}

export interface Part {
  readonly feeds: readonly FeedRows[];
  readonly problems: readonly ScanProblem[];
}

const CHECK_BYTES = 4;

/** Writes the part; when this returns, it is there in full. @returns its length in bytes */
export async function writePart(path: string, part: Part): Promise<number> {
  const body = serialize(part);
  const check = Buffer.alloc(CHECK_BYTES);
  check.writeUInt32LE(crc32(body));
  const unfinished = `${path}.${process.pid}.unfinished`;
  await writeFile(unfinished, Buffer.concat([check, body]), { flush: true });
  await rename(unfinished, path);
  return CHECK_BYTES + body.length;
}

/** The part of that file; null when there is none or it is damaged. */
export async function readPart(path: string): Promise<Part | null> {
  const bytes = await readFile(path).catch(() => null);
  if (bytes === null || bytes.length < CHECK_BYTES) return null;
  const body = bytes.subarray(CHECK_BYTES);
  return bytes.readUInt32LE() === crc32(body) ? (deserialize(body) as Part) : null;
}
