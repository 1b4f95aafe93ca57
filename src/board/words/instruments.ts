// Instruments joined at one place, in words: who gives which heights, and what they differ by.

import { toSpeedUnit } from '../../air/index.ts';
import type { FeedDisagreement, JoinedPart } from '../../desk/index.ts';
import type { DisplayUnits } from '../../site/index.ts';
import { heightText, plain, signed } from './numbers.ts';

/** `Ridge mast (mast): 10 to 120 m, 4 levels` */
export function partWords({ feed, bottom, top, levels }: JoinedPart, units: DisplayUnits): string {
  const heights = `${heightText(bottom, units)} to ${heightText(top, units)} ${units.height}`;
  return `${feed.station.name} (${feed.instrument}): ${heights}, ${levels} levels`;
}

/** What two instruments differ by, whether it needs a person, and the same height by height. */
export function disagreementSentences(
  { better, worse, known }: FeedDisagreement,
  units: DisplayUnits,
): { words: string; call: boolean; rows: { height: string; count: string; direction: string; speed: string }[] } {
  const speed = (value: number): string => signed(toSpeedUnit(value, units.speed), 1);
  const direction = `${signed(known.direction, 1)}° in direction`;
  const where = `${heightText(known.bottom, units)} to ${heightText(known.top, units)} ${units.height}, ${known.times} times`;
  const words = [
    `Where both measure (${where}) the ${worse.instrument} differs from the ${better.instrument} by ${direction} and ` +
      `${speed(known.speed)} ${units.speed} on average.`,
  ];
  if (known.steadyDirection) {
    words.push(
      'The difference of direction is steady: it is taken as one of the instruments, turned back and not read as veer.',
    );
  }
  if (known.steadySpeed) words.push('The difference of speed is steady too; speeds stay as measured.');
  if (known.beyondUncertainty) {
    words.push('It is more than their uncertainty allows: have both checked. Neither is averaged into the other.');
  } else if (!known.steadyDirection) words.push('It lies within their uncertainty.');
  return {
    words: words.join(' '),
    call: known.beyondUncertainty,
    rows: known.byHeight.map((at) => ({
      height: heightText(at.height, units),
      count: plain(at.count, 0),
      direction: signed(at.direction, 1),
      speed: speed(at.speed),
    })),
  };
}
