// How strong a beam's echo is, on one scale, and how strong it must be to carry wind.

import { textOf, type RawNumbers, type Variable } from '../netcdf/dataset.ts';
import { asMeant, codingOf, decodeInto } from '../netcdf/values.ts';

/** Signal-to-noise ratio, linear, below which a lidar's velocity is noise: 0.015, which is -18.2 dB. */
const LEAST_RATIO = 0.015;
// Päschke, Leinweber & Lehmann (2015, Atmos. Meas. Tech. 8) tell of -18.2 dB as the usual limit; cited from memory.
/** Carrier-to-noise ratio is counted over a narrower band: -22 dB, common practice, without source. */
const LEAST_CARRIER_RATIO = 10 ** -2.2;

export interface SignalScale {
  /** Least value that carries wind, linear. */
  readonly least: number;
  /** Stored number to linear ratio. */
  readonly toRatio: (stored: number) => number;
  /** What was assumed; empty where the file says it. */
  readonly note: string;
}

/** Reads from unit and words how the signal is counted: as a ratio, in decibels, or as a ratio plus one. */
export function signalScale(signal: Variable, sample: ArrayLike<number>): SignalScale {
  const units = textOf(signal.attributes, 'units').toLowerCase();
  const words = `${textOf(signal.attributes, 'long_name')} ${textOf(signal.attributes, 'comment')}`.toLowerCase();
  const isCarrier = /cnr|carrier/u.test(`${signal.name.toLowerCase()} ${words}`);
  const least = isCarrier ? LEAST_CARRIER_RATIO : LEAST_RATIO;
  const inDecibels = (note: string): SignalScale => ({ least, toRatio: (stored) => 10 ** (stored / 10), note });
  if (units === 'db') return inDecibels('');
  if (/\+\s*1|plus (?:1|one)/u.test(words)) return { least, toRatio: (stored) => stored - 1, note: '' };
  const middle = medianOf(sample);
  if (middle < 0) return inDecibels(`${signal.name} has negative values: taken as decibels`);
  if (middle > 0.8 && middle < 1.2) {
    return {
      least,
      toRatio: (stored) => stored - 1,
      note: `${signal.name} lies about 1: taken as signal-to-noise ratio plus 1`,
    };
  }
  return { least, toRatio: (stored) => stored, note: '' };
}

/** The values of some rows, decoded, units aside; NaN missing. */
export function decodedRows(variable: Variable, from: number, to: number, scale = 1): Float64Array {
  const raw: RawNumbers = asMeant(variable.numbers(from, to), variable);
  const out = new Float64Array(raw.length);
  decodeInto(out, raw, codingOf(variable), { scale, offset: 0 }, new Set());
  return out;
}

function medianOf(values: ArrayLike<number>): number {
  const known = Array.from(values).filter((value) => !Number.isNaN(value));
  return known.sort((a, b) => a - b)[known.length >> 1] ?? NaN;
}
