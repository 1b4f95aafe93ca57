// From numbers as stored to numbers as meant: fill values, valid range, scale and offset (CF-1.11, section 8.1 and
// appendix A; netCDF User's Guide, appendix A), units. Missing is NaN from here on.

import type { ParsedUnit } from '../../air/index.ts';
import { numbersOf, textOf, type RawNumbers, type StorageType, type Variable } from './dataset.ts';

/** How a variable's numbers are coded; ranges and fills are in stored numbers. */
export interface Coding {
  readonly fills: readonly number[];
  readonly lowest: number;
  readonly highest: number;
  readonly scale: number;
  readonly offset: number;
}

/** What the netCDF library writes where nothing was written, by type; single bytes have no such value. */
const DEFAULT_FILLS: Readonly<Partial<Record<StorageType, number>>> = {
  i2: -32_767,
  u2: 65_535,
  i4: -2_147_483_647,
  u4: 4_294_967_295,
  i8: -9_223_372_036_854_776_000,
  u8: 18_446_744_073_709_552_000,
  f4: 9.969209968386869e36,
  f8: 9.969209968386869e36,
};

/** Numbers that writers use for "missing" without saying so; none of them is a wind, temperature, height or position. */
const UNDECLARED = new Set([-9999, -9999.9, -99_999, -999, -999.9, -999.99, -8888].flatMap((x) => [x, Math.fround(x)]));
/** Beyond this every number is a fill: 1e20, 1e30 and the like are in use. */
const HUGE_NUMBER = 1e19;
/** Below this a number may be one of the undeclared. */
const LEAST_PLAIN = -900;

/** Reads how the variable's numbers are coded from its attributes. */
export function codingOf(variable: Variable): Coding {
  const { attributes, type } = variable;
  const declared = [...numbersOf(attributes, '_FillValue'), ...numbersOf(attributes, 'missing_value')];
  const byDefault = DEFAULT_FILLS[type];
  const fills = attributes.has('_FillValue') || byDefault === undefined ? declared : [...declared, byDefault];
  const asStored = type === 'f4' ? fills.flatMap((fill) => [fill, Math.fround(fill)]) : fills;
  const scale = numbersOf(attributes, 'scale_factor')[0] ?? 1;
  const offset = numbersOf(attributes, 'add_offset')[0] ?? 0;
  const range = numbersOf(attributes, 'valid_range');
  const limits = [
    numbersOf(attributes, 'valid_min')[0] ?? range[0] ?? -Infinity,
    numbersOf(attributes, 'valid_max')[0] ?? range[1] ?? Infinity,
  ];
  // The range belongs to the stored numbers; fractions beside stored integers can only mean the unpacked ones.
  const unpacked = (scale !== 1 || offset !== 0) && limits.some((x) => Number.isFinite(x) && !Number.isInteger(x));
  const [low = -Infinity, high = Infinity] = unpacked
    ? limits.map((x) => (x - offset) / scale).sort((a, b) => a - b)
    : limits;
  const margin = isFloat(type) && Number.isFinite(high - low) ? RANGE_MARGIN * (high - low) : 0;
  return { fills: [...new Set(asStored)], lowest: low - margin, highest: high + margin, scale, offset };
}

/**
 * Part of a range that a float may lie beyond it: ranges are round figures of a catalogue, and a sonde at -90.1 degrees
 * whose file says "-90 to 50" has measured it. Integers get none, for beyond their range lie the fills.
 */
const RANGE_MARGIN = 0.01;

function isFloat(type: StorageType): boolean {
  return type === 'f4' || type === 'f8';
}

/** Integers that a writer meant without sign though the format had none (`_Unsigned`, netCDF User's Guide). */
export function asMeant(raw: RawNumbers, variable: Variable): RawNumbers {
  if (textOf(variable.attributes, '_Unsigned').toLowerCase() !== 'true') return raw;
  if (raw instanceof Int8Array) return new Uint8Array(raw.buffer, raw.byteOffset, raw.length);
  if (raw instanceof Int16Array) return new Uint16Array(raw.buffer, raw.byteOffset, raw.length);
  if (raw instanceof Int32Array) return new Uint32Array(raw.buffer, raw.byteOffset, raw.length);
  return raw;
}

/**
 * Decodes numbers into the unit used inside.
 * @param out as long as `raw`; may share its memory
 * @param undeclared gathers fill-like numbers that the file does not declare and that were taken as missing; null where
 * such numbers can be true, as in times
 */
export function decodeInto(
  out: Float32Array | Float64Array,
  raw: RawNumbers,
  coding: Coding,
  unit: Pick<ParsedUnit, 'scale' | 'offset'>,
  undeclared: Set<number> | null,
): void {
  const low = Math.max(coding.lowest, LEAST_PLAIN);
  const high = Math.min(coding.highest, HUGE_NUMBER);
  const isPlain =
    coding.scale === 1 && coding.offset === 0 && !coding.fills.some((fill) => fill >= low && fill <= high);
  if (isPlain && raw instanceof Float32Array && out instanceof Float32Array) {
    // Nearly all values of nearly all files come this way, so it is kept free of everything that they do not need.
    for (let k = 0; k < raw.length; k++) {
      const stored = raw[k]!;
      out[k] =
        stored >= low && stored <= high ? stored * unit.scale + unit.offset : meant(stored, coding, unit, undeclared);
    }
    return;
  }
  for (let k = 0; k < raw.length; k++) out[k] = meant(raw[k]!, coding, unit, undeclared);
}

/** One value, NaN when missing. */
function meant(
  stored: number,
  { fills, lowest, highest, scale, offset }: Coding,
  unit: Pick<ParsedUnit, 'scale' | 'offset'>,
  undeclared: Set<number> | null,
): number {
  // NaN fails the range, as does what lies outside it.
  if (!(stored >= lowest && stored <= highest) || fills.includes(stored)) return NaN;
  const value = stored * scale + offset;
  if (value > HUGE_NUMBER || value < LEAST_PLAIN) {
    if (Math.abs(value) > HUGE_NUMBER || (undeclared !== null && UNDECLARED.has(value))) {
      undeclared?.add(value);
      return NaN;
    }
  }
  return value * unit.scale + unit.offset;
}
