// Values of a compressed message: for each element the least coded value of all reports, the bits of the increments, and an
// increment a report (WMO-No. 306, FM 94, regulation 94.6.3).

import { signed } from './plain.ts';
import { OP } from './program.ts';
import { saidByField } from './quality-codes.ts';
import type { Coding, RunState } from './run.ts';
import { damaged } from './trouble.ts';

const COUNT_WIDTH = 6;

export function compressedCoding(state: RunState): Coding {
  const { program, bits, elements, references } = state;
  const { width, missing, multiplier, divisor, reference, slot, associated, op } = program;
  const { reports } = elements;
  const said = new Uint8Array(reports);

  /** Associated fields come before the value, compressed like one. */
  const fields = (instruction: number): boolean => {
    const fieldWidth = associated[instruction]!;
    if (fieldWidth === 0) return false;
    const least = bits.read(fieldWidth);
    const increment = bits.read(COUNT_WIDTH);
    for (let r = 0; r < reports; r++) said[r] = saidByField(state.meaning, least + bits.read(increment));
    return true;
  };

  const number = (instruction: number, saidOfAll: number): number => {
    const hasFields = fields(instruction);
    const coded = bits.read(width[instruction]!);
    const increment = bits.read(COUNT_WIDTH);
    const place = elements.add(instruction, saidOfAll);
    const { value } = elements;
    const from = slot[instruction]!;
    const zero = from < 0 ? reference[instruction]! : references[from]!;
    const scaled = (units: number): number => ((units + zero) * multiplier[instruction]!) / divisor[instruction]!;
    if (increment === 0) {
      value.fill(coded === missing[instruction] ? NaN : scaled(coded), place, place + reports);
    } else {
      if (increment > width[instruction]!) throw damaged('A compressed value has increments wider than itself.');
      const none = 2 ** increment - 1;
      for (let r = 0; r < reports; r++) {
        const added = bits.read(increment);
        value[place + r] = added === none ? NaN : scaled(coded + added);
      }
    }
    if (hasFields) for (let r = 0; r < reports; r++) elements.said[place + r]! |= said[r]!;
    return value[place]!;
  };

  /** Passes over a number or text of this width with its increments. */
  const skip = (valueWidth: number, bitsOfUnit: number): void => {
    bits.skip(valueWidth);
    const units = bits.read(COUNT_WIDTH);
    bits.skip(units * bitsOfUnit * reports);
  };

  return {
    number,
    shared(instruction, saidOfAll) {
      const first = number(instruction, saidOfAll);
      const place = (elements.count - 1) * reports;
      for (let r = 1; r < reports; r++) {
        if (elements.value[place + r] !== first) {
          throw damaged('A count or indicator differs between the reports of a compressed message.');
        }
      }
      return first;
    },
    text(instruction, saidOfAll) {
      fields(instruction);
      const place = elements.add(instruction, saidOfAll);
      // Texts that no profile needs are passed over.
      if (program.role[instruction] === 0) {
        skip(width[instruction]!, 8);
        elements.value.fill(NaN, place, place + reports);
        return;
      }
      const common = bits.text(width[instruction]!);
      const characters = bits.read(COUNT_WIDTH);
      for (let r = 0; r < reports; r++) {
        const text = characters === 0 ? common : bits.text(characters * 8);
        elements.value[place + r] = text === '' ? NaN : elements.texts.push(text) - 1;
      }
    },
    opaque(instruction, saidOfAll) {
      if (associated[instruction]! > 0) skip(associated[instruction]!, 1);
      skip(width[instruction]!, 1);
      const place = elements.add(instruction, saidOfAll);
      elements.value.fill(NaN, place, place + reports);
    },
    remark: (remarkWidth) => skip(remarkWidth, 8),
    reference(referenceWidth) {
      const coded = bits.read(referenceWidth);
      if (bits.read(COUNT_WIDTH) !== 0) throw damaged('A new reference value differs between compressed reports.');
      return signed(coded, referenceWidth);
    },
    marker(instruction, widened) {
      if (op[instruction] === OP.absent) return;
      skip(width[instruction]! + widened, op[instruction] === OP.text ? 8 : 1);
    },
  };
}
