// The rule by which of many values one is shown; for one pair, and for whole rows of cells at a time. A cell without a
// value is NaN or -Infinity and loses to any other.

import type { PixelRule } from './fields.ts';

/**
 * Whether the first of two values is the one to show. It decides for every pair, so that order never matters.
 * @param wind speed beside each value, for `at-strongest-wind`; neither may be NaN
 */
export function wins(rule: PixelRule, value: number, wind: number, held: number, heldWind: number): boolean {
  if (rule === 'greatest') return value > held;
  if (rule === 'at-strongest-wind') return wind > heldWind || (wind === heldWind && value > held);
  const size = Math.abs(value);
  const heldSize = Math.abs(held);
  return size > heldSize || (size === heldSize && value > held);
}

/** Values, one a row, and the wind beside each where the rule asks for it. */
export interface RowWinners {
  /** -Infinity where there is none. */
  readonly values: Float32Array;
  /** -Infinity where there is no value; null for rules that do not ask for it. */
  readonly strength: Float32Array | null;
}

/** Lets `out.values.length` cells, from `base` on, compete with those in `out`. */
export function takeWinners(rule: PixelRule, out: RowWinners, from: RowWinners, base: number): void {
  if (rule === 'greatest') takeGreatest(out.values, from.values, base);
  else if (rule === 'largest-size') takeLargest(out.values, from.values, base);
  else takeStrongest(out.values, out.strength!, from.values, from.strength!, base);
}

// Comparisons are so worded that a missing value, which is NaN or -Infinity, fails them.

function takeGreatest(out: Float32Array, values: Float32Array, base: number): void {
  for (let row = 0; row < out.length; row++) {
    const value = values[base + row]!;
    if (value > out[row]!) out[row] = value;
  }
}

function takeLargest(out: Float32Array, values: Float32Array, base: number): void {
  for (let row = 0; row < out.length; row++) {
    const value = values[base + row]!;
    if (!(value > -Infinity)) continue;
    const held = out[row]!;
    const size = Math.abs(value);
    const heldSize = Math.abs(held);
    if (held === -Infinity || size > heldSize || (size === heldSize && value > held)) out[row] = value;
  }
}

function takeStrongest(
  out: Float32Array,
  outStrength: Float32Array,
  values: Float32Array,
  strength: Float32Array,
  base: number,
): void {
  for (let row = 0; row < out.length; row++) {
    const wind = strength[base + row]!;
    const held = outStrength[row]!;
    if (wind > held || (wind === held && values[base + row]! > out[row]!)) {
      out[row] = values[base + row]!;
      outStrength[row] = wind;
    }
  }
}
