// What the night does to the farm, in a sentence: power now, what the jet's shape adds or takes, where the nose is, and the
// newest ramp with its reason.

import type { NightState } from '../../desk/index.ts';
import type { DisplayUnits } from '../../site/index.ts';
import { noseSpell } from './nose-spell.ts';
import { heightText, plain } from './numbers.ts';
import { rampEvents } from './ramp-events.ts';
import type { Piece } from './story.ts';
import { durationWords, type TimeWords } from './time.ts';

const MW = 1000;
/** A ramp that ended longer ago than this is no news, ms. */
const NEWS_MS = 3 * 3_600_000;

export function farmStory(night: NightState, units: DisplayUnits, times: TimeWords): Piece[] {
  const last = night.timeMs.length - 1;
  if (last < 0) return [{ text: `No profile in this night up to ${times.clock(night.atMs)}.` }];
  return [...powerPieces(night, last, times), ...nosePieces(night, last, units, times), ...rampPieces(night, times)];
}

function powerPieces(night: NightState, last: number, times: TimeWords): Piece[] {
  const { farm, timeMs, discs } = night;
  const { output } = farm;
  const at = times.clock(timeMs[last]!);
  const now = output.equivalentKw[last] ?? NaN;
  if (output.why !== '') return [{ text: `Power cannot be given: ${output.why}. ` }];
  if (!Number.isFinite(now)) {
    const why = discs.map(({ winds }) => winds[last]!.why).find((each) => each !== '') ?? '';
    return [{ text: `At ${at} no power can be reckoned: ${why === '' ? 'the discs are not covered' : why}. ` }];
  }
  return [
    { text: `At ${at} the wind over the discs is good for ` },
    { text: `${plain(now / MW, 1)} MW`, weight: 'strong' },
    { text: ` of ${plain((output.ratedKw * output.factor) / MW, 0)}; ` },
    ...differencePieces(output.differenceKw[last] ?? NaN, night.findings[last]!.jets.length > 0),
  ];
}

/** Less than this, kW, is nothing to speak of for a farm. */
const NOTHING = 50;

function differencePieces(difference: number, jet: boolean): Piece[] {
  const what = jet ? 'the jet' : 'the shape of the profile';
  if (Math.abs(difference) < NOTHING) {
    return [{ text: `${what} neither adds nor takes against hub-height reckoning. ` }];
  }
  return [
    { text: `${what} ${difference < 0 ? 'takes' : 'adds'} ` },
    { text: `${plain(Math.abs(difference) / MW, 1)} MW`, weight: 'strong' },
    { text: ' against hub-height reckoning. ' },
  ];
}

function nosePieces(night: NightState, last: number, units: DisplayUnits, times: TimeWords): Piece[] {
  const { discs, findings, timeMs } = night;
  const jet = findings[last]!.jets[0];
  const spells = discs.flatMap(({ turbine, winds }) => {
    const spell = noseSpell(
      timeMs,
      winds.map((wind) => wind.noseInRotor),
    );
    return spell === null ? [] : [{ ...spell, name: turbine.name }];
  });
  const lasting = spells.filter((spell) => spell.lasts);
  const height = jet === undefined ? '' : `${heightText(jet.noseHeight, units)} ${units.height}`;
  if (lasting.length > 0) {
    const text = `entered ${entries(lasting, times)}`;
    const rest = jet === undefined ? 'the newest profile shows none' : `stands at ${height}`;
    return [{ text: 'The nose ' }, { text, weight: 'call' }, { text: ` and ${rest}. ` }];
  }
  const before = spells.sort((a, b) => b.lastMs - a.lastMs)[0];
  const words =
    before === undefined
      ? ''
      : ` It was in the disc of ${before.name} from ${times.clock(before.enteredMs)} to ${times.clock(before.lastMs)}.`;
  if (jet === undefined) return [{ text: `There is no nose now.${words} ` }];
  return [{ text: 'The nose at ' }, { text: height, weight: 'strong' }, { text: ` is outside the discs.${words} ` }];
}

/** `the discs at 02:10`, or each disc with its time. */
function entries(spells: readonly { readonly name: string; readonly enteredMs: number }[], times: TimeWords): string {
  const [first] = spells;
  if (spells.length > 1 && spells.every((spell) => spell.enteredMs === first!.enteredMs)) {
    return `the discs at ${times.clock(first!.enteredMs)}`;
  }
  return spells.map(({ name, enteredMs }) => `the disc of ${name} at ${times.clock(enteredMs)}`).join(', ');
}

function rampPieces({ farm, atMs }: NightState, times: TimeWords): Piece[] {
  const event = rampEvents(farm.ramps, times).at(-1);
  if (event === undefined || atMs - event.endMs > NEWS_MS) return [];
  const ago = durationWords(atMs - event.endMs);
  return [{ text: `${event.words}${atMs - event.endMs > 0 ? ` It ended ${ago} ago.` : ''}` }];
}
