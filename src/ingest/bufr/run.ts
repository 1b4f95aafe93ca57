// Runs a program over a data section: one report's bits, or all reports of a compressed message side by side.

import type { BitReader } from './bits.ts';
import { SAID, type Elements } from './elements.ts';
import { OP, type Program } from './program.ts';
import { saidByElement } from './quality-codes.ts';
import { Relation } from './relation.ts';
import { damaged, tooLarge } from './trouble.ts';

/** How the two forms of a data section, plain and compressed, hold one value. */
export interface Coding {
  /** Appends a number, preceded by its associated field, if any. @returns its value in the first report */
  number(instruction: number, said: number): number;
  /** Appends a number that must be the same in all reports: factors, indicators, meanings. */
  shared(instruction: number, said: number): number;
  text(instruction: number, said: number): void;
  /** Appends an element without a value, passing over its bits. */
  opaque(instruction: number, said: number): void;
  /** Passes over characters. */
  remark(width: number): void;
  /** A signed new reference value. */
  reference(width: number): number;
  /** Passes over a value like that of the instruction, `widened` by so many bits. */
  marker(instruction: number, widened: number): void;
}

/** What of a run the codings need to know. */
export interface RunState {
  readonly program: Program;
  readonly bits: BitReader;
  readonly elements: Elements;
  /** New reference values by slot. */
  readonly references: Float64Array;
  /** Meaning of associated fields in force, code table 0 31 021. */
  meaning: number;
}

/** Data that stand once can be repeated at no cost in bits: rounds are counted, too. */
const MOST_ROUNDS = 2 ** 21;
const RELATE_DIFFERENCE = 25;
const RELATE_SUBSTITUTED = 23;
const RELATE_QUALITY = 22;

/**
 * Appends all elements of one run through the program.
 * @throws DuskveerError `ingest/bufr-truncated`, `-damaged`, `-too-large`
 */
export function run(state: RunState, coding: Coding): void {
  const { program, bits, elements } = state;
  const { op, width, jump, length, descriptor } = program;
  const relation = new Relation();
  const rounds: number[] = [];
  // Where the data of a repetition that stands once begin; -1 for other repetitions.
  const rewinds: number[] = [];
  let roundsDone = 0;
  let said = 0;
  let pc = 0;
  while (pc < length) {
    switch (op[pc]) {
      case OP.number:
        coding.number(pc++, said);
        break;
      case OP.text:
        coding.text(pc++, said);
        break;
      case OP.opaque:
        coding.opaque(pc++, said);
        break;
      case OP.remark:
        coding.remark(width[pc++]!);
        break;
      case OP.absent: {
        const place = elements.add(pc++, said);
        elements.value.fill(NaN, place, place + elements.reports);
        break;
      }
      case OP.repeat:
        rounds.push(width[pc]!);
        rewinds.push(-1);
        pc++;
        break;
      case OP.repeatDelayed:
      case OP.repeatData: {
        const count = coding.shared(pc, said);
        if (!(count > 0)) pc = jump[pc]!;
        else {
          rounds.push(count);
          rewinds.push(op[pc] === OP.repeatData ? bits.position : -1);
          pc++;
        }
        break;
      }
      case OP.again: {
        if (++roundsDone > MOST_ROUNDS) throw tooLarge('The replications of the message multiply without end.');
        const last = rounds.length - 1;
        if (--rounds[last]! > 0) {
          pc = jump[pc]!;
          if (rewinds[last]! >= 0) bits.position = rewinds[last]!;
        } else {
          rounds.pop();
          rewinds.pop();
          pc++;
        }
        break;
      }
      case OP.reference:
        state.references[program.slot[pc]!] = coding.reference(width[pc]!);
        pc++;
        break;
      case OP.meaning:
        state.meaning = coding.number(pc++, said);
        break;
      case OP.present:
        if (relation.kind === 0) coding.number(pc++, said);
        else relation.indicate(coding.shared(pc++, said));
        break;
      case OP.quality: {
        const element = elements.count;
        coding.number(pc, said);
        if (relation.kind === RELATE_QUALITY) note(elements, relation.next(), element, descriptor[pc]!);
        pc++;
        break;
      }
      case OP.relate:
        relation.begin(width[pc++]!, elements.count);
        said = SAID.aside;
        break;
      case OP.marker: {
        const target = relation.next();
        if (target < 0) throw damaged('More values follow than the bit-map of data present announces.');
        coding.marker(elements.instruction[target]!, width[pc] === RELATE_DIFFERENCE ? 1 : 0);
        if (width[pc] === RELATE_SUBSTITUTED) mark(elements, target, SAID.substituted);
        pc++;
        break;
      }
      default: // OP.forget
        relation.forget();
        said = 0;
        pc++;
    }
  }
}

/** Carries what a quality element says over to the element it relates to, report by report. */
function note(elements: Elements, target: number, from: number, descriptor: number): void {
  if (target < 0) return;
  const { reports, said, value } = elements;
  for (let r = 0; r < reports; r++)
    said[target * reports + r]! |= saidByElement(descriptor, value[from * reports + r]!);
}

function mark(elements: Elements, target: number, bits: number): void {
  const { reports, said } = elements;
  for (let r = 0; r < reports; r++) said[target * reports + r]! |= bits;
}
