// Makes the program of a descriptor list.

import { inWords, isLocal, kindOf, xOf, yOf } from './descriptors.ts';
import { OperatorState } from './operators.ts';
import { assemble, OP, type Instruction, type Program } from './program.ts';
import { roleOf } from './roles.ts';
import { ELEMENTS, sequenceOf, type ElementEntry } from './tables.ts';
import { damaged, tooLarge, unknownDescriptor, unsupported } from './trouble.ts';

/** A list that unfolds to more is damaged or made to do harm; the longest upper-air template unfolds to some 400. */
const LONGEST_PROGRAM = 50_000;
const DEEPEST_REPETITION = 16;
const DEEPEST_SEQUENCE = 32;
const WIDEST_NUMBER = 53;
const DATA_REPETITION = new Set([11, 12]);
const FACTORS = new Set([0, 1, 2, 11, 12]);

/**
 * @param descriptors the list of section 3
 * @param centre originating centre, for its local sequences
 * @throws DuskveerError `ingest/bufr-unknown-descriptor`, `-damaged`, `-unsupported`, `-too-large`
 */
export function compile(descriptors: ArrayLike<number>, centre: number): Program {
  const compiler = new Compiler(centre);
  compiler.list(descriptors, 0, descriptors.length, 0);
  return assemble(compiler.instructions, compiler.slotCount);
}

class Compiler {
  readonly instructions: Instruction[] = [];
  readonly #state = new OperatorState();
  readonly #centre: number;
  #depth = 0;
  /** The innermost repetition so far, by number, and how many there are. */
  #loop = 0;
  #loops = 0;
  slotCount = 0;

  constructor(centre: number) {
    this.#centre = centre;
  }

  list(descriptors: ArrayLike<number>, start: number, end: number, nesting: number): void {
    if (nesting > DEEPEST_SEQUENCE) throw tooLarge('The descriptors are nested without end.');
    for (let i = start; i < end; i++) {
      const descriptor = descriptors[i]!;
      switch (kindOf(descriptor)) {
        case 0:
          this.#element(descriptor);
          break;
        case 1:
          i = this.#repetition(descriptors, i, end, nesting);
          break;
        case 2:
          this.#operator(descriptor);
          break;
        default: {
          const members = sequenceOf(descriptor, this.#centre);
          if (members === undefined) throw unknownDescriptor(inWords(descriptor), isLocal(descriptor));
          this.list(members, 0, members.length, nesting + 1);
        }
      }
    }
  }

  /** @returns position of the last descriptor used */
  #repetition(descriptors: ArrayLike<number>, at: number, end: number, nesting: number): number {
    const descriptor = descriptors[at]!;
    const delayed = yOf(descriptor) === 0;
    const first = at + (delayed ? 2 : 1);
    const after = first + xOf(descriptor);
    if (xOf(descriptor) === 0 || after > end) {
      throw damaged(`Replication ${inWords(descriptor)} asks for more descriptors than the list has.`);
    }
    if (++this.#depth > DEEPEST_REPETITION) throw tooLarge('Replications are nested without end.');

    const opening = this.#push(OP.repeat, descriptor, { width: yOf(descriptor) });
    if (delayed) {
      const factor = descriptors[at + 1]!;
      const entry = ELEMENTS.get(factor);
      if (xOf(factor) !== 31 || kindOf(factor) !== 0 || !FACTORS.has(yOf(factor)) || entry === undefined) {
        throw damaged(`Delayed replication is followed by ${inWords(factor)}, which is no replication factor.`);
      }
      opening.op = DATA_REPETITION.has(yOf(factor)) ? OP.repeatData : OP.repeatDelayed;
      opening.descriptor = factor;
      opening.width = entry.width;
    }
    const body = this.instructions.length;
    const outer = this.#loop;
    this.#loop = ++this.#loops;
    const before = this.#state.signature();
    this.list(descriptors, first, after, nesting);
    if (this.#state.signature() !== before) {
      throw unsupported('An operator is opened inside a replication and not closed there.');
    }
    if (!this.instructions.slice(body).some((instruction) => readsBits(instruction))) {
      throw damaged(`Replication ${inWords(descriptor)} repeats nothing.`);
    }
    this.#push(OP.again, 0, { jump: body });
    opening.jump = this.instructions.length;
    this.#depth--;
    this.#loop = outer;
    return after - 1;
  }

  #element(descriptor: number): void {
    const state = this.#state;
    const entry = ELEMENTS.get(descriptor);
    const x = xOf(descriptor);
    const localWidth = state.localWidth;
    state.localWidth = 0;
    if (localWidth > 0 && entry?.width !== localWidth) {
      this.#push(OP.opaque, descriptor, { width: localWidth, associated: state.associatedWidth });
      return;
    }
    if (entry === undefined) throw unknownDescriptor(inWords(descriptor), isLocal(descriptor));
    if (state.referenceWidth > 0) {
      const slot = this.slotCount++;
      state.slots.set(descriptor, slot);
      this.#push(OP.reference, descriptor, { width: state.referenceWidth, slot });
      return;
    }
    const isCoordinate = (x >= 1 && x <= 9) || x === 31;
    if (state.absent > 0) {
      state.absent--;
      if (!isCoordinate) {
        this.#push(OP.absent, descriptor, { role: roleOf(descriptor) });
        return;
      }
    }
    this.#value(descriptor, entry);
  }

  #value(descriptor: number, entry: ElementEntry): void {
    const state = this.#state;
    const x = xOf(descriptor);
    const { width, scale, reference } = state.applied(descriptor, entry);
    if (width <= 0 || (entry.kind !== 'text' && width > WIDEST_NUMBER) || Math.abs(scale) > 300) {
      throw damaged(`Operators make element ${inWords(descriptor)} ${width} bits wide.`);
    }
    this.#push(opOf(descriptor, entry), descriptor, {
      width,
      scale,
      reference,
      // One bit and class 31 know no missing value.
      missing: width > 1 && x !== 31 ? 2 ** width - 1 : -1,
      slot: state.slots.get(descriptor) ?? -1,
      associated: x === 31 ? 0 : state.associatedWidth,
      role: roleOf(descriptor),
    });
  }

  #operator(descriptor: number): void {
    const state = this.#state;
    const x = xOf(descriptor);
    const y = yOf(descriptor);
    switch (x) {
      case 1:
        state.addedWidth = y === 0 ? 0 : y - 128;
        break;
      case 2:
        state.addedScale = y === 0 ? 0 : y - 128;
        break;
      case 3:
        if (y === 0) state.slots.clear();
        state.referenceWidth = y === 255 ? 0 : y;
        if (y > WIDEST_NUMBER && y !== 255) throw damaged(`New reference values of ${y} bits.`);
        break;
      case 4:
        if (y === 0) state.associated.pop();
        else state.associated.push(y);
        if (state.associatedWidth > WIDEST_NUMBER) throw unsupported('Associated fields of more than 53 bits.');
        break;
      case 5:
        if (y > 0) this.#push(OP.remark, descriptor, { width: y * 8 });
        break;
      case 6:
        state.localWidth = y;
        break;
      case 7:
        state.decimals = y;
        break;
      case 8:
        state.characters = y;
        break;
      case 21:
        state.absent = y;
        break;
      case 22:
      case 23:
      case 24:
      case 25:
      case 32:
        this.#push(y === 255 ? OP.marker : OP.relate, descriptor, { width: x });
        break;
      case 35:
        this.#push(OP.forget, descriptor, {});
        break;
      // Definition and re-use of a bit-map (2 36, 2 37): the last one defined is kept in any case. Events, conditioning
      // events and categorical forecast values (2 41 to 2 43) change nothing in the data.
      case 36:
      case 37:
      case 41:
      case 42:
      case 43:
        break;
      default:
        throw unsupported(`The message uses operator ${inWords(descriptor)}, which is not known.`);
    }
  }

  #push(op: number, descriptor: number, rest: Partial<Instruction>): Instruction {
    if (this.instructions.length >= LONGEST_PROGRAM) throw tooLarge('The descriptors unfold without end.');
    const instruction: Instruction = {
      op,
      descriptor,
      width: 0,
      scale: 0,
      reference: 0,
      slot: -1,
      missing: -1,
      associated: 0,
      jump: 0,
      role: 0,
      loop: this.#loop,
      ...rest,
    };
    this.instructions.push(instruction);
    return instruction;
  }
}

function opOf(descriptor: number, entry: ElementEntry): number {
  if (entry.kind === 'text') return OP.text;
  const x = xOf(descriptor);
  if (x === 33) return OP.quality;
  if (x === 31 && yOf(descriptor) === 21) return OP.meaning;
  if (x === 31 && yOf(descriptor) === 31) return OP.present;
  return OP.number;
}

/** What takes no bit, however often it runs. */
const WITHOUT_BITS: ReadonlySet<number> = new Set([OP.absent, OP.repeat, OP.again, OP.relate, OP.forget]);

/** Whether an instruction takes at least one bit each time it runs. */
function readsBits({ op }: Instruction): boolean {
  return !WITHOUT_BITS.has(op);
}
