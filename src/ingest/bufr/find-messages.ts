// Finds the messages in a stream of bytes: bulletin headings and junk between them are passed over, lengths are believed
// only where they agree with each other or with the end mark.

import { throwIfCancelled, type Problem } from '../../air/index.ts';
import type { ByteSource } from '../source.ts';
import { layoutOf, uint24, type Layout } from './sections.ts';

export interface FoundMessage {
  /** From `BUFR` on; at least four bytes follow the data. */
  readonly bytes: Uint8Array;
  readonly layout: Layout;
}

/** A message or what looked like one, in file order. */
export interface Found {
  /** Which message of the file, from one. */
  readonly record: number;
  /** Byte of the file at which it begins. */
  readonly byte: number;
  /** Undefined where it cannot be read; the problem says why. */
  readonly message: FoundMessage | undefined;
  readonly problem: Problem | undefined;
}

const SECTION_0 = 8;
const END_MARK = 4;
/** Some encoders leave padding out of the length of section 4. */
const MOST_PADDING = 4;

/** Position of `BUFR` at or after a byte; -1: none. */
export function findStart(bytes: Uint8Array, from: number): number {
  for (let at = bytes.indexOf(0x42, from); at >= 0; at = bytes.indexOf(0x42, at + 1)) {
    if (bytes[at + 1] === 0x55 && bytes[at + 2] === 0x46 && bytes[at + 3] === 0x52) return at;
  }
  return -1;
}

function endsAt(bytes: Uint8Array, at: number): boolean {
  return at >= 0 && bytes[at] === 0x37 && bytes[at + 1] === 0x37 && bytes[at + 2] === 0x37 && bytes[at + 3] === 0x37;
}

/** The bytes of a source around a moving position. */
class Window {
  readonly #pieces: AsyncIterator<Uint8Array>;
  bytes: Uint8Array = new Uint8Array(0);
  /** Byte of the file at which `bytes` begins. */
  base = 0;
  ended = false;

  constructor(source: ByteSource) {
    this.#pieces = source.stream()[Symbol.asyncIterator]();
  }

  /** Reads on until so many bytes are at hand, or the source ends. */
  async have(length: number): Promise<void> {
    const gathered = [this.bytes];
    let total = this.bytes.length;
    while (total < length && !this.ended) {
      const next = await this.#pieces.next();
      if (next.done === true) this.ended = true;
      else {
        gathered.push(next.value);
        total += next.value.length;
      }
    }
    if (gathered.length === 1) return;
    if (this.bytes.length === 0 && gathered.length === 2) {
      this.bytes = gathered[1]!;
      return;
    }
    const joined = new Uint8Array(total);
    let at = 0;
    for (const piece of gathered) {
      joined.set(piece, at);
      at += piece.length;
    }
    this.bytes = joined;
  }

  async close(): Promise<void> {
    await this.#pieces.return?.();
  }

  dropBefore(at: number): void {
    this.bytes = this.bytes.subarray(at);
    this.base += at;
  }
}

/**
 * All messages of a source, in order. Memory: the longest message that section 0 can announce, 16 MiB, and a piece.
 * @throws Cancelled
 */
export async function* findMessages(source: ByteSource, signal: AbortSignal | undefined): AsyncGenerator<Found> {
  const window = new Window(source);
  try {
    yield* messagesOf(window, signal);
  } finally {
    await window.close();
  }
}

async function* messagesOf(window: Window, signal: AbortSignal | undefined): AsyncGenerator<Found> {
  let record = 0;
  let at = 0;
  for (;;) {
    throwIfCancelled(signal);
    const start = findStart(window.bytes, at);
    if (start < 0) {
      // The last three bytes may be the beginning of `BUFR`.
      window.dropBefore(Math.max(0, window.bytes.length - 3));
      at = 0;
      if (window.ended) return;
      await window.have(window.bytes.length + 1);
      continue;
    }
    if (start > 0) window.dropBefore(start);
    await window.have(SECTION_0);
    at = 4;
    if (window.bytes.length < SECTION_0) return;
    const edition = window.bytes[7]!;
    const length = uint24(window.bytes, 4);
    const isOld = edition < 2 && length < 64;
    if (!isOld && (edition < 2 || edition > 4)) continue;

    const where = { record: ++record, byte: window.base };
    const found = (message: FoundMessage | undefined, problem?: Problem): Found => ({ ...where, message, problem });
    if (isOld) {
      yield found(undefined, {
        code: 'ingest/bufr-edition',
        what: `The message is of edition ${edition} of the code, from before 1993; editions 2 to 4 are read.`,
        mend: 'Have it recoded; the other messages of the file are read.',
        where,
      });
      continue;
    }
    await window.have(length);
    const judged = judge(window.bytes, length);
    at = judged.next;
    yield found(judged.message, judged.problem === undefined ? undefined : { ...judged.problem, where });
  }
}

interface Judged {
  readonly message?: FoundMessage;
  readonly problem?: Omit<Problem, 'where'>;
  /** Where to look for the next message. */
  readonly next: number;
}

/** What stands at the start of the bytes, given the length that section 0 states. */
function judge(bytes: Uint8Array, length: number): Judged {
  const layout = layoutOf(bytes);
  if (layout !== undefined) {
    const end = layout.section5 + END_MARK;
    const message = { bytes, layout };
    const marked = endsAt(bytes, layout.section5);
    if (marked && end === length) return { message, next: end };
    if (marked) {
      return {
        message,
        next: end,
        problem: {
          code: 'ingest/bufr-length',
          what: `The message states a length of ${length} bytes but its sections are ${end} bytes long; the sections are believed.`,
          mend: 'Nothing need be done if its profile looks right; if it happens often, tell the sender.',
          mild: true,
        },
      };
    }
    const padding = length - end;
    if (padding > 0 && padding <= MOST_PADDING && endsAt(bytes, length - END_MARK)) return { message, next: length };
    if (padding === 0 && bytes.length >= length) {
      return {
        message,
        next: length,
        problem: {
          code: 'ingest/bufr-end-mark',
          what: 'The message lacks its end mark 7777; its lengths agree, so it is read.',
          mend: 'Nothing need be done if its profile looks right; if it happens often, tell the sender.',
          mild: true,
        },
      };
    }
  }
  if (bytes.length < length && !(layout !== undefined && layout.section5 + END_MARK < bytes.length)) {
    return {
      next: 4,
      problem: {
        code: 'ingest/bufr-truncated',
        what: `The message should be ${length} bytes long, but only ${bytes.length} bytes follow.`,
        mend: 'Fetch the file again; the transfer was most likely cut short.',
      },
    };
  }
  return {
    // Where the end mark stands as section 0 says, no other message hides inside.
    next: length >= SECTION_0 + END_MARK && endsAt(bytes, length - END_MARK) ? length : 4,
    problem: {
      code: 'ingest/bufr-damaged',
      what: 'The lengths of the message and of its sections contradict each other.',
      mend: 'Ask the sender for the message again; the other messages of the file are read.',
    },
  };
}
