// A farm's actual output beside the reckoned one, in words.

import type { NightState } from '../../desk/index.ts';
import { plain } from './numbers.ts';
import type { TimeWords } from './time.ts';

const MW = 1000;
/** Shares of less reckoned output than this, kW, say nothing. */
const LEAST_SUM = 1;

/** What was reported last and how it lies to what was reckoned, then the same over the night. */
export function actualWords({ farm, timeMs }: NightState, times: TimeWords): string[] {
  const { actual, output } = farm;
  if (actual === null) return [];
  const both = [...timeMs.keys()].filter((k) => Number.isFinite(actual.powerKw[k]! + output.equivalentKw[k]!));
  const last = both.at(-1);
  if (last === undefined) return ['No time of this night has both reported and reckoned output.'];
  const now = actual.powerKw[last]!;
  const sum = (of: Float64Array): number => both.reduce((total, k) => total + of[k]!, 0);
  const [reported, reckoned] = [sum(actual.powerKw), sum(output.equivalentKw)];
  const words = [
    `At ${times.clock(timeMs[last]!)} the farm reported ${plain(now / MW, 1)} MW, ${moreOrLess(now - output.equivalentKw[last]!, 'MW')} than reckoned from the whole profile.`,
  ];
  if (reckoned > LEAST_SUM) {
    const share = (100 * (reported - reckoned)) / reckoned;
    words.push(`Over the ${both.length} profiles of this night that have both it reported ${moreOrLess(share, '%')}.`);
  }
  return words;
}

function moreOrLess(value: number, unit: 'MW' | '%'): string {
  const size = plain(Math.abs(unit === 'MW' ? value / MW : value), 1);
  return `${size} ${unit} ${value < 0 ? 'less' : 'more'}`;
}

/** The fitted factor with what it rests on, or why there is none. */
export function fitWords({ farm }: NightState): string {
  const fit = farm.actual?.fit;
  if (fit === undefined) return '';
  if (fit.why !== '') return `No factor can be fitted: ${fit.why}.`;
  return (
    `The farm yields ${plain(fit.factor, 3)} ± ${plain(fit.uncertainty, 3)} of what its curves make of the wind, ` +
    `fitted by least squares over ${fit.used} intervals; what is left scatters by ${plain(fit.residualKw / MW, 1)} MW.`
  );
}

/** The line for the site file. */
export function factorLine(factor: number): string {
  return `"farm_factor": ${factor.toFixed(3)}`;
}
