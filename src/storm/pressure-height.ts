// At what height a pressure lies, by the levels that report both; temperature is not asked for.

import { REJECTING } from '../profile/index.ts';
import type { AirLevels } from './air-levels.ts';
import { figure, hectopascals, type Figure } from './figure.ts';

/** Height above the levels' own ground, m, of each pressure (Pa); linear in ln p between levels. */
export function heightsOfPressures(levels: AirLevels, wanted: readonly number[]): Figure[] {
  const { pressure, heightAgl, mark, levelCount } = levels;
  const heights: number[] = [];
  const logarithms: number[] = [];
  for (let k = 0; k < levelCount && pressure !== null; k++) {
    const falls = pressure[k]! > 0 && !(Math.log(pressure[k]!) >= logarithms.at(-1)!);
    if ((mark[k]! & REJECTING) !== 0 || !falls || !(heightAgl[k]! > -Infinity)) continue;
    heights.push(heightAgl[k]!);
    logarithms.push(Math.log(pressure[k]!));
  }
  return wanted.map((one) => heightOf(one, heights, logarithms));
}

function heightOf(wanted: number, heights: readonly number[], logarithms: readonly number[]): Figure {
  const logarithm = Math.log(wanted);
  const above = logarithms.findIndex((value) => value <= logarithm);
  if (heights.length < 2)
    return figure(NaN, `No pressure is known, so neither is the height of ${hectopascals(wanted)}.`);
  if (above < 0) {
    const top = hectopascals(Math.exp(logarithms.at(-1)!));
    return figure(NaN, `Pressure data end at ${top}; ${hectopascals(wanted)} is needed.`);
  }
  if (logarithms[above] === logarithm) return figure(heights[above]!);
  if (above === 0) {
    const bottom = hectopascals(Math.exp(logarithms[0]!));
    return figure(NaN, `${hectopascals(wanted)} lies below the lowest level, at ${bottom}.`);
  }
  const share = (logarithms[above - 1]! - logarithm) / (logarithms[above - 1]! - logarithms[above]!);
  return figure(heights[above - 1]! + share * (heights[above]! - heights[above - 1]!));
}
