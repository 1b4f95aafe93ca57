// A descriptor list turned once into a flat program: sequences unfolded, operators worked into widths, scales and
// references, so that reading a message is a walk along typed arrays. Most feeds send a handful of lists.

import { ROLE } from './roles.ts';

/** What an instruction does. */
export const OP = {
  /** A number: coded, missing when every bit is set. */
  number: 0,
  text: 1,
  /** Bits to pass over; as an element that is always missing (local, behind 2 06). */
  opaque: 2,
  /** Characters that belong to no element (2 05). */
  remark: 3,
  /** An element without bits (2 21). */
  absent: 4,
  /** Repeat what follows up to `jump` as often as `width` says. */
  repeat: 5,
  /** The same, as often as the element of this instruction says. */
  repeatDelayed: 6,
  /** The same, but the data stand there once and count as often as said (0 31 011, 0 31 012). */
  repeatData: 7,
  /** End of a repeated part that begins at `jump`. */
  again: 8,
  /** A new reference value for `slot` (2 03). */
  reference: 9,
  /** Meaning of the associated field, 0 31 021. */
  meaning: 10,
  /** Data present indicator, 0 31 031. */
  present: 11,
  /** Element of class 33. */
  quality: 12,
  /** Values that relate to earlier elements follow: 2 22, 2 23, 2 24, 2 25, 2 32; the kind is in `width`. */
  relate: 13,
  /** A value in the form of the earlier element it relates to: 2 23 255 and its like. */
  marker: 14,
  /** 2 35: what follows relates to what stands directly before it. */
  forget: 15,
} as const;

export interface Program {
  readonly length: number;
  readonly op: Uint8Array;
  readonly descriptor: Uint16Array;
  /** bits, or the count of a repetition */
  readonly width: Int32Array;
  /** Value = (coded + reference) x multiplier / divisor: one of the two is 1, so that decimals come out exactly. */
  readonly multiplier: Float64Array;
  readonly divisor: Float64Array;
  readonly reference: Float64Array;
  /** Which new reference value replaces `reference`; -1: none. */
  readonly slot: Int16Array;
  /** Coded value that says missing; -1 where none does. */
  readonly missing: Float64Array;
  /** bits of associated field before the value */
  readonly associated: Uint8Array;
  readonly jump: Int32Array;
  readonly role: Uint8Array;
  /** The innermost repetition around the instruction, by number; 0: none. */
  readonly loop: Uint16Array;
  /** 1: stands among measured values and is said of a level; 0: is said of the report. */
  readonly ofLevel: Uint8Array;
  readonly slotCount: number;
  /** Whether wind or temperature occurs at all. */
  readonly holdsProfile: boolean;
  readonly holdsTemperature: boolean;
  readonly holdsProfilerTests: boolean;
}

export interface Instruction {
  op: number;
  descriptor: number;
  width: number;
  scale: number;
  reference: number;
  slot: number;
  missing: number;
  associated: number;
  jump: number;
  role: number;
  loop: number;
}

const MEASURED: ReadonlySet<number> = new Set([ROLE.speed, ROLE.u, ROLE.temperature]);
const COORDINATES: ReadonlySet<number> = new Set([
  ROLE.pressure,
  ROLE.heightAboveStation,
  ROLE.heightAmsl,
  ROLE.coordinateGpm,
  ROLE.coordinateGeopotential,
]);

/** Packs instructions into columns. */
export function assemble(instructions: readonly Instruction[], slotCount: number): Program {
  const measured = instructions.filter((i) => MEASURED.has(i.role));
  const levelLoops = new Set(measured.map((i) => i.loop));
  // Values outside any repetition are levels spelled out only where nothing is repeated; else they are from the ground.
  if (levelLoops.size > 1) levelLoops.delete(0);
  const column = (pick: (instruction: Instruction) => number): number[] => instructions.map(pick);
  return {
    length: instructions.length,
    op: Uint8Array.from(column((i) => i.op)),
    descriptor: Uint16Array.from(column((i) => i.descriptor)),
    width: Int32Array.from(column((i) => i.width)),
    multiplier: Float64Array.from(column((i) => (i.scale < 0 ? 10 ** -i.scale : 1))),
    divisor: Float64Array.from(column((i) => (i.scale > 0 ? 10 ** i.scale : 1))),
    reference: Float64Array.from(column((i) => i.reference)),
    slot: Int16Array.from(column((i) => i.slot)),
    missing: Float64Array.from(column((i) => i.missing)),
    associated: Uint8Array.from(column((i) => i.associated)),
    jump: Int32Array.from(column((i) => i.jump)),
    role: Uint8Array.from(column((i) => i.role)),
    loop: Uint16Array.from(column((i) => i.loop)),
    ofLevel: Uint8Array.from(column((i) => (levelLoops.has(i.loop) ? 1 : 0))),
    slotCount,
    holdsProfile: measured.length > 0 && instructions.some((i) => COORDINATES.has(i.role)),
    holdsProfilerTests: instructions.some((i) => i.role === ROLE.tests),
    holdsTemperature: instructions.some((i) => i.role === ROLE.temperature),
  };
}
