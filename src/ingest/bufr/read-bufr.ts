// All messages of a file: decoded, turned into profiles, and said of each that failed why.

import { DuskveerError, type Problem } from '../../air/index.ts';
import { BlockBuilder, type ProfileBlock } from '../../profile/index.ts';
import type { ReadOptions } from '../format.ts';
import type { ByteSource } from '../source.ts';
import { BitReader } from './bits.ts';
import { compile } from './compile.ts';
import { compressedCoding } from './compressed.ts';
import { Elements } from './elements.ts';
import { findMessages, type Found, type FoundMessage } from './find-messages.ts';
import { joinModes } from './join-modes.ts';
import { plainCoding } from './plain.ts';
import type { Program } from './program.ts';
import { run, type RunState } from './run.ts';
import { CATEGORY_WORDS, readHeader, type MessageHeader } from './sections.ts';
import { ProfileMaker } from './to-profiles.ts';
import { damaged, unsupported } from './trouble.ts';

/** Vertical soundings other than by satellite, Table A. */
const VERTICAL_SOUNDINGS = 2;
/** A reading is handed out when it holds so many. */
const LEVELS_A_READING = 200_000;
const PROBLEMS_A_READING = 500;
/** A feed has a handful of descriptor lists; a file that makes up more is not worth remembering. */
const MOST_PROGRAMS = 200;

interface Part {
  readonly block: ProfileBlock;
  readonly problems: readonly Problem[];
}

/** Reads a file in parts of some thousand profiles. @throws Cancelled */
export async function* readBufr(source: ByteSource, options: ReadOptions): AsyncGenerator<Part> {
  const reader = new MessageReader(source.name, options);
  for await (const found of findMessages(source, options.signal)) {
    reader.read(found);
    if (reader.isFull) yield reader.take();
  }
  reader.tellPassedOver();
  yield reader.take();
}

class MessageReader {
  readonly #source: string;
  readonly #options: ReadOptions;
  readonly #programs = new Map<string, Program | DuskveerError>();
  readonly #elements = new Elements();
  readonly #maker = new ProfileMaker();
  /** Messages of other kinds by their name: how many, and the first. */
  readonly #passedOver = new Map<string, { count: number; where: Problem['where'] }>();
  #builder = new BlockBuilder();
  #problems: Problem[] = [];

  constructor(source: string, options: ReadOptions) {
    this.#source = source;
    this.#options = options;
  }

  get isFull(): boolean {
    return this.#builder.levelCount >= LEVELS_A_READING || this.#problems.length >= PROBLEMS_A_READING;
  }

  take(): Part {
    const part = { block: joinModes(this.#builder.finish()), problems: this.#problems };
    this.#builder = new BlockBuilder();
    this.#problems = [];
    return part;
  }

  read({ record, byte, message, problem }: Found): void {
    if (problem !== undefined) this.#problems.push(problem);
    if (message === undefined) return;
    try {
      this.#message(message, { record, byte });
    } catch (error) {
      if (!(error instanceof DuskveerError)) throw error;
      const inMessage = error.problem.where.byte ?? 0;
      this.#problems.push({ ...error.problem, where: { record, byte: byte + inMessage } });
    }
  }

  /** A mild problem for each kind of message that was passed over, with its count. */
  tellPassedOver(): void {
    for (const [kind, { count, where }] of this.#passedOver) {
      this.#problems.push({
        code: 'ingest/bufr-other-kind',
        what: `${count === 1 ? '1 message was' : `${count} messages were`} passed over: ${kind}.`,
        mend: 'Nothing need be done: only wind and temperature profiles are read.',
        where,
        mild: true,
      });
    }
    this.#passedOver.clear();
  }

  #message(message: FoundMessage, where: Problem['where']): void {
    const { bytes, layout } = message;
    const header = readHeader(bytes, layout);
    if (header.category !== VERTICAL_SOUNDINGS) {
      this.#passOver(CATEGORY_WORDS[header.category] ?? `data of category ${header.category}`, where);
      return;
    }
    if (header.masterTable !== 0) throw unsupported(`The message rests on master table ${header.masterTable}.`);
    const program = this.#programOf(header);
    if (!program.holdsProfile) {
      this.#passOver('soundings without a profile of wind or temperature', where);
      return;
    }
    if (header.reports === 0) throw damaged('The message says that it holds no report.');
    const context = {
      source: this.#source,
      known: this.#options,
      headerTimeMs: header.timeMs,
      revision: header.revision,
    };
    const elements = this.#elements;
    const state: RunState = {
      program,
      bits: new BitReader(bytes, header.dataStart, header.dataEnd),
      elements,
      references: new Float64Array(program.slotCount),
      meaning: NaN,
    };
    if (header.compressed) {
      elements.clear(header.reports);
      run(state, compressedCoding(state));
      for (let r = 0; r < header.reports; r++) this.#maker.add(program, elements, r, context, this.#builder);
    } else {
      const coding = plainCoding(state);
      for (let r = 0; r < header.reports; r++) {
        elements.clear(1);
        run(state, coding);
        this.#maker.add(program, elements, 0, context, this.#builder);
      }
    }
  }

  #passOver(kind: string, where: Problem['where']): void {
    const known = this.#passedOver.get(kind);
    if (known === undefined) this.#passedOver.set(kind, { count: 1, where });
    else known.count++;
  }

  #programOf(header: MessageHeader): Program {
    const key = `${header.centre}:${String.fromCharCode(...header.descriptors)}`;
    let program = this.#programs.get(key);
    if (program === undefined) {
      if (this.#programs.size >= MOST_PROGRAMS) this.#programs.clear();
      try {
        program = compile(header.descriptors, header.centre);
      } catch (error) {
        if (!(error instanceof DuskveerError)) throw error;
        program = error;
      }
      this.#programs.set(key, program);
    }
    if (program instanceof DuskveerError) throw program;
    return program;
  }
}
