// Tables B and D, unfolded once from their packed lines.

import { packed } from './descriptors.ts';
import { ELEMENT_LINES } from './tables/elements.ts';
import { SEQUENCE_LINES } from './tables/sequences.ts';

export type UnitKind = 'number' | 'code' | 'flag' | 'text';

export interface ElementEntry {
  readonly kind: UnitKind;
  /** The value is (coded + reference) / 10^scale. */
  readonly scale: number;
  readonly reference: number;
  /** bits */
  readonly width: number;
}

const KIND_LETTERS: Readonly<Record<string, UnitKind>> = { '': 'number', c: 'code', f: 'flag', s: 'text' };

function* entries(lines: string): Generator<[descriptor: number, letters: string, rest: string]> {
  for (const line of lines.split('\n')) {
    const group = line.slice(0, 3);
    for (const entry of line.slice(4).split(' ')) {
      const colon = entry.indexOf(':');
      yield [packed(group + entry.slice(0, 3)), entry.slice(3, colon), entry.slice(colon + 1)];
    }
  }
}

/** Table B by descriptor. */
export const ELEMENTS: ReadonlyMap<number, ElementEntry> = new Map(
  [...entries(ELEMENT_LINES)].map(([descriptor, letters, figures]) => {
    const [scale, reference, width] = figures.split(',').map(Number) as [number, number, number];
    return [descriptor, { kind: KIND_LETTERS[letters]!, scale, reference, width }];
  }),
);

const members = (list: string): readonly number[] => list.split(',').map(packed);

/** Table D by descriptor. */
export const SEQUENCES: ReadonlyMap<number, readonly number[]> = new Map(
  [...entries(SEQUENCE_LINES)].map(([descriptor, , list]) => [descriptor, members(list)]),
);

/** Sequences of a centre's own that upper-air messages in the wild use, by originating centre (common code table C-11). */
const LOCAL_SEQUENCES: Readonly<Record<number, ReadonlyMap<number, readonly number[]>>> = {
  98: new Map([
    [packed('301196'), members('301003,002011,002012,301011,301012,301023,007001')],
    [packed('309196'), members('301196,302004,101000,031001,303014')],
  ]),
};

/** Members of a sequence; undefined when neither the WMO's tables nor the centre's hold it. */
export function sequenceOf(descriptor: number, centre: number): readonly number[] | undefined {
  return SEQUENCES.get(descriptor) ?? LOCAL_SEQUENCES[centre]?.get(descriptor);
}
