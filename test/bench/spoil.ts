// Spoils sound files and reads them: the one harness for all readers. Nothing may crash, hang or eat memory.

import { DuskveerError } from '../../src/air/index.ts';
import { DEFAULT_LIMITS, FORMATS, type ByteSource, type FileFormat, type ReadOptions } from '../../src/ingest/index.ts';
import { PLAIN_SITE } from '../../src/site/index.ts';
import { randomFrom } from '../support/random.ts';
import { pieces } from '../support/sources.ts';

export interface Figure {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly note?: string;
}

/** Spoiled bytes each reader is given. */
const SPOILED_BYTES = 10_000_000;
/** A file of some hundred kilobytes that takes longer hangs, ms. */
const HANGS = 5000;
/** What the whole process may hold at its peak, MiB: the readers' programs, one file and what is made of it. */
const MOST_MEMORY = 512;
const PIECE = 16_384;

/** Ways to spoil bytes; each gives new ones. */
const WAYS: readonly ((bytes: Uint8Array, random: () => number) => Uint8Array)[] = [
  // Single bits.
  (bytes, random) => changed(bytes, random, (byte) => byte ^ (1 << Math.floor(random() * 8))),
  // Whole bytes.
  (bytes, random) => changed(bytes, random, () => Math.floor(random() * 256)),
  // Bytes that stand elsewhere in the file: figures for figures, ends of lines in their midst.
  (bytes, random) => changed(bytes, random, () => bytes[Math.floor(random() * bytes.length)]!),
  // All bits set or none, as counts and lengths fear most.
  (bytes, random) => changed(bytes, random, () => (random() < 0.5 ? 255 : 0)),
  // Cut short.
  (bytes, random) => bytes.slice(0, Math.max(1, Math.floor(random() * bytes.length))),
  // A part doubled, a part lost.
  (bytes, random) => {
    const [a, b] = [Math.floor(random() * bytes.length), Math.floor(random() * bytes.length)];
    return joinedParts(bytes.subarray(0, Math.max(a, b)), bytes.subarray(Math.min(a, b)));
  },
  (bytes, random) => {
    const a = Math.floor(random() * bytes.length);
    return joinedParts(bytes.subarray(0, a), bytes.subarray(a + 1 + Math.floor(random() * 400)));
  },
];

/**
 * Reads ten million bytes' worth of spoiled copies of a file.
 * @param name of the format
 * @throws Error when any reading crashed or hung, or the process holds more than it may
 */
export async function spoil(name: string, intact: Uint8Array, report: (figure: Figure) => void): Promise<void> {
  const format = FORMATS.find((candidate) => candidate.name === name)!;
  if ((await outcome(format, intact)) !== 'profiles') throw new Error(`${name}: the sound file gives no profiles`);
  const random = randomFrom(20_240_601);
  const crashes: string[] = [];
  let [files, bytes, readable, slowest] = [0, 0, 0, 0];
  while (bytes < SPOILED_BYTES) {
    let spoiled = WAYS[files % WAYS.length]!(intact, random);
    if (random() < 0.2) spoiled = WAYS[Math.floor(random() * WAYS.length)]!(spoiled, random);
    const began = performance.now();
    const came = await outcome(format, spoiled);
    slowest = Math.max(slowest, performance.now() - began);
    if (came === 'profiles') readable++;
    else if (came !== 'nothing') crashes.push(came);
    files++;
    bytes += Math.max(1, spoiled.length);
  }
  const peak = process.resourceUsage().maxRSS / 1024;
  const hung = slowest > HANGS ? 1 : 0;
  report({
    name: `${name}: crashes and hangs`,
    value: crashes.length + hung,
    unit: `of ${files} files`,
    note: `${(bytes / 1e6).toFixed(1)} million spoiled bytes; ${readable} files still gave profiles`,
  });
  report({ name: `${name}: slowest spoiled file`, value: Math.round(slowest), unit: 'ms', note: `at most ${HANGS}` });
  report({ name: `${name}: peak memory so far`, value: Math.round(peak), unit: 'MiB', note: `at most ${MOST_MEMORY}` });
  if (crashes.length + hung > 0) throw new Error(`${name}: ${crashes[0] ?? 'a file hung'}`);
  if (peak > MOST_MEMORY) throw new Error(`${name}: ${Math.round(peak)} MiB of memory`);
}

/** What came of reading: `profiles`, `nothing` but words, or the message of a crash. */
async function outcome(format: FileFormat, bytes: Uint8Array): Promise<string> {
  const source: ByteSource = pieces('spoiled', bytes, PIECE);
  try {
    format.recognise(bytes.subarray(0, 65_536));
    let profiles = 0;
    for await (const { block } of format.read(source, OPTIONS)) profiles += block.profileCount;
    return profiles > 0 ? 'profiles' : 'nothing';
  } catch (error) {
    if (error instanceof DuskveerError) return 'nothing';
    return error instanceof Error ? (error.stack ?? error.message) : String(error);
  }
}

const OPTIONS: ReadOptions = {
  site: PLAIN_SITE,
  limits: { ...DEFAULT_LIMITS, levels: 1_000_000 },
  signal: undefined,
  onProgress: undefined,
  referenceTimeMs: Date.UTC(2024, 5, 20),
  stationList: [],
};

function changed(bytes: Uint8Array, random: () => number, to: (byte: number) => number): Uint8Array {
  const copy = bytes.slice();
  const changes = 1 + Math.floor(random() ** 3 * (bytes.length / 50));
  for (let k = 0; k < changes; k++) {
    const at = Math.floor(random() * copy.length);
    copy[at] = to(copy[at]!);
  }
  return copy;
}

function joinedParts(a: Uint8Array, b: Uint8Array): Uint8Array {
  const both = new Uint8Array(a.length + b.length);
  both.set(a);
  both.set(b, a.length);
  return both;
}
