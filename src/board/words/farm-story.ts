// What the night does to the farm, in a sentence: power now, what the jet's shape adds or takes, where the nose is.

import type { NightState } from '../../desk/index.ts';
import type { DisplayUnits } from '../../site/index.ts';
import { heightText, plain } from './numbers.ts';
import type { Piece } from './story.ts';
import type { TimeWords } from './time.ts';

const MW = 1000;

export function farmStory(night: NightState, units: DisplayUnits, times: TimeWords): Piece[] {
  const last = night.timeMs.length - 1;
  if (last < 0) return [{ text: `No profile in this night up to ${times.clock(night.atMs)}.` }];
  return [...powerPieces(night, last, times), ...nosePieces(night, last, units, times)];
}

function powerPieces({ farm, timeMs }: NightState, last: number, times: TimeWords): Piece[] {
  const { output } = farm;
  const at = times.clock(timeMs[last]!);
  const now = output.equivalentKw[last] ?? NaN;
  const difference = output.differenceKw[last] ?? NaN;
  if (output.why !== '') return [{ text: `Power cannot be given: ${output.why}. ` }];
  if (!Number.isFinite(now)) return [{ text: `At ${at} the disc is not covered well enough to reckon power. ` }];
  const rated = plain((output.ratedKw * output.factor) / MW, 0);
  return [
    { text: `At ${at} the wind over the discs is good for ` },
    { text: `${plain(now / MW, 1)} MW`, weight: 'strong' },
    { text: ` of ${rated}; ` },
    ...differencePieces(difference),
  ];
}

/** Less than this, kW, is nothing to speak of for a farm. */
const NOTHING = 50;

function differencePieces(difference: number): Piece[] {
  if (Math.abs(difference) < NOTHING) {
    return [{ text: 'the shape of the profile neither adds nor takes against hub-height reckoning. ' }];
  }
  return [
    { text: `the shape of the profile ${difference < 0 ? 'takes' : 'adds'} ` },
    { text: `${plain(Math.abs(difference) / MW, 1)} MW`, weight: 'strong' },
    { text: ' against hub-height reckoning. ' },
  ];
}

function nosePieces(
  { discs, findings, timeMs }: NightState,
  last: number,
  units: DisplayUnits,
  times: TimeWords,
): Piece[] {
  const jet = findings[last]!.jets[0];
  const winds = discs[0]?.winds ?? [];
  const entered = winds.findLastIndex((wind, k) => wind.noseInRotor === true && winds[k - 1]?.noseInRotor !== true);
  const before = entered < 0 ? '' : ` It last entered a disc at ${times.clock(timeMs[entered]!)}.`;
  if (jet === undefined) return [{ text: `There is no nose now.${before}` }];
  const inside = discs.some(({ winds: each }) => each[last]?.noseInRotor === true);
  const height = `${heightText(jet.noseHeight, units)} ${units.height}`;
  return [
    { text: 'The nose at ' },
    { text: height, weight: 'strong' },
    inside
      ? { text: ` is in the disc${entered < 0 ? '' : ` since ${times.clock(timeMs[entered]!)}`}.`, weight: 'call' }
      : { text: ` is outside the discs.${before}` },
  ];
}
