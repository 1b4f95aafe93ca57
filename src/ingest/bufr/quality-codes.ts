// What codes of quality say of a value, in the house's two words: doubted, rejected.

import { packed } from './descriptors.ts';
import { SAID } from './elements.ts';

/**
 * Per cent confidence (0 33 007) below this is doubt. Centres that send it use 70 for a value without remark and 10 to 35 for
 * values that failed a check.
 */
const DOUBTED_CONFIDENCE = 50;

const TWO_BITS = packed('033002');
const THREE_BITS = packed('033003');
const CONFIDENCE = packed('033007');
const OF_FOLLOWING = packed('033020');

/** What an element of class 33 says of the value it relates to. */
export function saidByElement(descriptor: number, value: number): number {
  if (descriptor === CONFIDENCE) return value < DOUBTED_CONFIDENCE ? SAID.doubted : 0;
  if (descriptor === TWO_BITS) return value === 1 ? SAID.doubted : 0;
  if (descriptor === THREE_BITS) return value === 3 ? SAID.rejected : value === 1 || value === 2 ? SAID.doubted : 0;
  if (descriptor === OF_FOLLOWING) return value === 3 ? SAID.rejected : value === 1 || value === 2 ? SAID.doubted : 0;
  return 0;
}

/** What an associated field says, by its meaning (code table 0 31 021). Meanings not listed say nothing. */
export function saidByField(meaning: number, value: number): number {
  switch (meaning) {
    case 1: // one bit: suspect or bad
    case 8: // suspected
      return value === 1 ? SAID.doubted : 0;
    case 2: // slightly suspect, highly suspect, bad
      return value === 3 ? SAID.rejected : value > 0 ? SAID.doubted : 0;
    case 5: // checked: suspect; out of the instrument's range; both that and aggregated
      return value === 3 || value === 4 ? SAID.rejected : value === 1 ? SAID.doubted : 0;
    case 6: // probably bad, bad
      return value === 4 ? SAID.rejected : value === 3 ? SAID.doubted : 0;
    case 7: // per cent confidence
      return value < DOUBTED_CONFIDENCE ? SAID.doubted : 0;
    case 21: // substituted
      return value === 1 ? SAID.rejected : 0;
    default:
      return 0;
  }
}
