// Which table C operators are in force at a point of the descriptor list, and what they make of an element
// (WMO-No. 306, FM 94, Table C, with its notes).

import { xOf } from './descriptors.ts';
import type { ElementEntry } from './tables.ts';

export class OperatorState {
  /** 2 01: bits added to widths. */
  addedWidth = 0;
  /** 2 02: added to scales. */
  addedScale = 0;
  /** 2 07: decimals added to scale, reference and width. */
  decimals = 0;
  /** 2 08: characters of every text; 0: as tabulated. */
  characters = 0;
  /** 2 03: bits of the new reference values being defined; 0: none are. */
  referenceWidth = 0;
  /** 2 04: bits of the associated fields, the outermost first. */
  readonly associated: number[] = [];
  /** 2 06: bits of the next descriptor if it is unknown; 0: not announced. */
  localWidth = 0;
  /** 2 21: so many of the next elements carry no data. */
  absent = 0;
  /** 2 03: number of the new reference value by descriptor. */
  readonly slots = new Map<number, number>();

  get associatedWidth(): number {
    return this.associated.reduce((sum, width) => sum + width, 0);
  }

  /** All that a repeated part must leave as it found it, for its second round to read like its first. */
  signature(): string {
    return [
      this.addedWidth,
      this.addedScale,
      this.decimals,
      this.characters,
      this.referenceWidth,
      this.localWidth,
      this.absent,
      ...this.associated,
    ].join();
  }

  /** Width, scale and reference of an element as the operators have it. Class 31 stays as tabulated (note 10). */
  applied(descriptor: number, entry: ElementEntry): { width: number; scale: number; reference: number } {
    const { kind, width, scale, reference } = entry;
    if (xOf(descriptor) === 31) return { width, scale, reference };
    if (kind === 'text') return { width: this.characters > 0 ? this.characters * 8 : width, scale, reference };
    if (kind !== 'number') return { width, scale, reference };
    return {
      width: width + this.addedWidth + Math.floor((10 * this.decimals + 2) / 3),
      scale: scale + this.addedScale + this.decimals,
      reference: reference * 10 ** this.decimals,
    };
  }
}
