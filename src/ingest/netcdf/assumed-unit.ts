// The unit of numbers that come without one, by their range.

import type { Role } from './roles.ts';

export interface AssumedUnit {
  readonly scale: number;
  readonly offset: number;
  /** How to name it in a note. */
  readonly words: string;
}

const SI = (words: string): AssumedUnit => ({ scale: 1, offset: 0, words });

/** @param values as stored in the file, NaN missing */
export function assumedUnit(role: Role, values: Float32Array): AssumedUnit {
  let lowest = Infinity;
  let highest = -Infinity;
  for (const value of values) {
    if (value < lowest) lowest = value;
    if (value > highest) highest = value;
  }
  switch (role) {
    case 'temperature':
    case 'dewPoint':
      return lowest > 150 ? SI('kelvin') : { scale: 1, offset: 273.15, words: 'degrees Celsius' };
    case 'pressure':
      if (highest > 2000) return SI('pascal');
      return highest > 150
        ? { scale: 100, offset: 0, words: 'hectopascal' }
        : { scale: 1000, offset: 0, words: 'kilopascal' };
    case 'relativeHumidity':
      return highest > 2 ? { scale: 0.01, offset: 0, words: 'per cent' } : SI('a fraction');
    case 'specificHumidity':
    case 'mixingRatio':
      return highest > 0.1 ? { scale: 0.001, offset: 0, words: 'g/kg' } : SI('kg/kg');
    case 'direction':
      return SI('degrees');
    case 'height':
      return SI('metres');
    case 'signal':
      return SI('as it stands');
    case 'speed':
    case 'u':
    case 'v':
    case 'verticalSpeed':
    case 'speedUncertainty':
      return SI('m/s');
  }
}
