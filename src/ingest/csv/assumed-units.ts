// Which unit a column without one is in, as far as the size of its values tells.

import { parseUnit, type ParsedUnit } from '../../air/index.ts';
import type { LevelMeaning } from './headings.ts';

export interface AssumedUnit {
  readonly unit: ParsedUnit;
  /** For the note, `temperature °C`; empty where nothing but the one unit is ever used. */
  readonly words: string;
}

const NAMES: Partial<Record<LevelMeaning, string>> = {
  heightAgl: 'height above ground',
  heightAmsl: 'height above sea level',
  verticalSpeed: 'vertical speed',
  dewPoint: 'dew point',
  relativeHumidity: 'relative humidity',
  specificHumidity: 'specific humidity',
  mixingRatio: 'mixing ratio',
};

/**
 * The unit of a column by the range of its values: kelvin or degrees Celsius, pascal, hectopascal or kilopascal,
 * fraction or per cent, kilograms or grams a kilogram, metres or kilometres; speeds are m/s.
 * @param values as written, NaN missing, the first of them as many as are at hand
 */
export function assumedUnit(meaning: LevelMeaning, values: ArrayLike<number>): AssumedUnit {
  const unit = unitText(meaning, values);
  const parsed = parseUnit(unit)!;
  const shown = unit === 'degC' ? '°C' : unit === 'fraction' ? 'as a fraction' : unit;
  return { unit: parsed, words: meaning === 'signal' ? '' : `${NAMES[meaning] ?? meaning} ${shown}` };
}

function unitText(meaning: LevelMeaning, values: ArrayLike<number>): string {
  switch (meaning) {
    case 'temperature':
    case 'dewPoint':
      return medianOf(values) > 150 ? 'K' : 'degC';
    case 'pressure': {
      const median = medianOf(values);
      if (median > 2000) return 'Pa';
      return greatest(values) < 120 ? 'kPa' : 'hPa';
    }
    case 'relativeHumidity':
      return greatest(values) > 1.5 ? '%' : 'fraction';
    case 'specificHumidity':
    case 'mixingRatio':
      return greatest(values) > 0.06 ? 'g/kg' : 'kg/kg';
    case 'heightAgl':
    case 'heightAmsl':
      return looksLikeKilometres(values) ? 'km' : 'm';
    case 'direction':
      return 'degrees';
    case 'signal':
      return '1';
    default:
      return 'm/s';
  }
}

/** Ten or more different heights below 30, some of them broken numbers: no mast is so crowded. */
function looksLikeKilometres(values: ArrayLike<number>): boolean {
  const different = new Set<number>();
  let broken = false;
  for (let k = 0; k < values.length; k++) {
    const value = values[k]!;
    if (Number.isNaN(value)) continue;
    if (!(value < 30)) return false;
    if (!Number.isInteger(value)) broken = true;
    if (different.size < 10) different.add(value);
  }
  return broken && different.size >= 10;
}

function known(values: ArrayLike<number>): number[] {
  return Array.from(values).filter((value) => !Number.isNaN(value));
}

function medianOf(values: ArrayLike<number>): number {
  const sorted = known(values).sort((a, b) => a - b);
  return sorted[sorted.length >> 1] ?? NaN;
}

function greatest(values: ArrayLike<number>): number {
  let most = NaN;
  for (let k = 0; k < values.length; k++) if (!(values[k]! <= most) && !Number.isNaN(values[k]!)) most = values[k]!;
  return most;
}
