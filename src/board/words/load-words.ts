// The loads watch in the reader's words and units.

import { fromHeightUnit } from '../../air/index.ts';
import type { LoadState } from '../../rotor/index.ts';
import type { DisplayUnits, Site } from '../../site/index.ts';
import { heightText, plain, signed, speedText } from './numbers.ts';

/** What is watched, and its value now. */
export function loadWords(load: LoadState, site: Site, units: DisplayUnits): { what: string; now: string } {
  const known = Number.isFinite(load.value);
  switch (load.name) {
    case 'shear-over-design':
      return { what: `Shear exponent over ${load.limit}`, now: plain(load.value, 2) };
    case 'veer-strong':
      return { what: `Veer over ${veerText(load.limit, units)} either way`, now: veerText(load.value, units) };
    case 'speed-falls-above-nose':
      return { what: 'Speed falls with height above the nose', now: `upper half ${plain(load.value, 2)}` };
    case 'nose-in-rotor':
      return { what: 'Nose in the disc', now: load.words };
    default: {
      const limit = site.limits.find(({ name }) => load.name === `limit/${name}`);
      if (limit === undefined) return { what: load.name, now: load.words };
      const where = `${heightText(limit.height, units)} ${units.height}`;
      return {
        what: `${limit.name}: over ${speedText(limit.speed, units)} ${units.speed} at ${where}`,
        now: known ? `${speedText(load.value, units)} ${units.speed}` : load.words,
      };
    }
  }
}

function veerText(perHundred: number, units: DisplayUnits): string {
  if (units.height === 'm') return `${signed(perHundred, 1).replace('+', '')}° per 100 m`;
  return `${plain(10 * fromHeightUnit(perHundred, 'ft'), 1)}° per 1000 ft`;
}
