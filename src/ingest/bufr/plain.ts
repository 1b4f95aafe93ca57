// Values of an uncompressed report: one after the other.

import { OP } from './program.ts';
import { saidByField } from './quality-codes.ts';
import type { Coding, RunState } from './run.ts';

export function plainCoding(state: RunState): Coding {
  const { program, bits, elements, references } = state;
  const { width, missing, multiplier, divisor, reference, slot, associated, op } = program;

  /** Bits of the associated field turned into what they say. */
  const field = (instruction: number): number => {
    const fieldWidth = associated[instruction]!;
    return fieldWidth === 0 ? 0 : saidByField(state.meaning, bits.read(fieldWidth));
  };

  const number = (instruction: number, said: number): number => {
    const saidHere = associated[instruction] === 0 ? said : said | field(instruction);
    const coded = bits.read(width[instruction]!);
    const place = elements.add(instruction, saidHere);
    if (coded === missing[instruction]) return (elements.value[place] = NaN);
    const from = slot[instruction]!;
    const zero = from < 0 ? reference[instruction]! : references[from]!;
    return (elements.value[place] = ((coded + zero) * multiplier[instruction]!) / divisor[instruction]!);
  };

  return {
    number,
    shared: number,
    text(instruction, said) {
      const saidHere = said | field(instruction);
      const place = elements.add(instruction, saidHere);
      elements.value[place] = NaN;
      // Texts that no profile needs are passed over.
      if (program.role[instruction] === 0) bits.skip(width[instruction]!);
      else {
        const text = bits.text(width[instruction]!);
        if (text !== '') elements.value[place] = elements.texts.push(text) - 1;
      }
    },
    opaque(instruction, said) {
      bits.skip(associated[instruction]! + width[instruction]!);
      elements.value[elements.add(instruction, said)] = NaN;
    },
    remark: (remarkWidth) => bits.skip(remarkWidth),
    reference: (referenceWidth) => signed(bits.read(referenceWidth), referenceWidth),
    marker(instruction, widened) {
      bits.skip(op[instruction] === OP.absent ? 0 : width[instruction]! + widened);
    },
  };
}

/** A number whose first bit is its sign (Table C, 2 03). */
export function signed(coded: number, width: number): number {
  const half = 2 ** (width - 1);
  return coded >= half ? half - coded : coded;
}
