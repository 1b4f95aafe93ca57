// The ways in which one message can fail. Thrown while it is read; the reader adds message number and file and goes on
// with the next message.

import { DuskveerError } from '../../air/index.ts';

const FETCH_AGAIN = 'Ask the sender for the message again; the other messages of the file are read.';
const SAY_SO = 'Send the file to whoever maintains the reader; the other messages of the file are read.';

const trouble = (code: string, what: string, mend: string, byte?: number): DuskveerError =>
  new DuskveerError({ code: `ingest/bufr-${code}`, what, mend, where: byte === undefined ? {} : { byte } });

/** Sections that contradict their own lengths, or counts that nothing can be meant by. @param byte from the message's start */
export const damaged = (what: string, byte?: number): DuskveerError => trouble('damaged', what, FETCH_AGAIN, byte);

/** @param byte from the message's start */
export const truncated = (byte: number): DuskveerError =>
  trouble('truncated', 'The data end before everything that the descriptors announce.', FETCH_AGAIN, byte);

export const unknownDescriptor = (descriptor: string, local: boolean): DuskveerError =>
  trouble(
    'unknown-descriptor',
    `The message uses descriptor ${descriptor}, which ${local ? "only its sender's own tables explain" : 'the tables at hand do not hold'}.`,
    local ? 'Ask the sender for messages in one of the templates of the WMO.' : SAY_SO,
  );

export const unsupported = (what: string): DuskveerError => trouble('unsupported', what, SAY_SO);

export const tooLarge = (what: string): DuskveerError =>
  trouble('too-large', what, 'The counts inside the message are most likely damaged: ask the sender for it again.');
