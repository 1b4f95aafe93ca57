// A field's value at each level of a profile.

import { GAS_CONSTANT_DRY, signedAngle, virtualTemperature } from '../air/index.ts';
import { REJECTING, type ProfileBlock } from '../profile/index.ts';
import type { FieldName } from './fields.ts';

/** Slopes are taken between levels at least this far from the level, m, or this share of its height if that is less. */
const SLOPE_REACH = 20;
const SLOPE_REACH_SHARE = 0.3;
/** Beyond this distance, m, two levels say nothing of the slope between. */
const SLOPE_LIMIT = 250;

/**
 * Writes a field's values of the i-th profile of a block into `out`, one per level.
 * NaN at rejected levels and where a needed value is missing.
 * @param out at least as long as the profile has levels
 */
export function fieldValuesInto(block: ProfileBlock, index: number, field: FieldName, out: Float32Array): void {
  const start = block.offsets[index]!;
  const count = block.offsets[index + 1]! - start;
  switch (field) {
    case 'speed': {
      copyInto(block.speed, start, count, out, block.mark);
      return;
    }
    case 'direction': {
      copyInto(block.direction, start, count, out, block.mark);
      return;
    }
    case 'temperature': {
      copyInto(block.temperature, start, count, out, block.mark);
      return;
    }
    case 'humidity-flux': {
      humidityFluxInto(block, start, count, out);
      return;
    }
    case 'shear': {
      slopeInto(block, start, count, out, block.speed, (from, to) => to - from);
      return;
    }
    case 'veer': {
      slopeInto(block, start, count, out, block.direction, (from, to) => signedAngle(to - from));
      return;
    }
  }
}

function copyInto(
  column: Float32Array | null,
  start: number,
  count: number,
  out: Float32Array,
  mark: Uint32Array,
): void {
  if (column === null) {
    out.fill(NaN, 0, count);
    return;
  }
  for (let k = 0; k < count; k++) out[k] = (mark[start + k]! & REJECTING) === 0 ? column[start + k]! : NaN;
}

/** kg/(m2 s): density times specific humidity times speed, density by the gas law with virtual temperature. */
function humidityFluxInto(block: ProfileBlock, start: number, count: number, out: Float32Array): void {
  const { pressure, temperature, specificHumidity, speed, mark } = block;
  out.fill(NaN, 0, count);
  if (pressure === null || temperature === null || specificHumidity === null) return;
  for (let k = 0; k < count; k++) {
    const at = start + k;
    if ((mark[at]! & REJECTING) !== 0) continue;
    const humidity = specificHumidity[at]!;
    const density = pressure[at]! / (GAS_CONSTANT_DRY * virtualTemperature(temperature[at]!, humidity));
    out[k] = density * humidity * speed[at]!;
  }
}

/** Slope per metre between the nearest usable level far enough below and above; one-sided at the ends. */
function slopeInto(
  { heightAgl, mark }: ProfileBlock,
  start: number,
  count: number,
  out: Float32Array,
  column: Float32Array,
  difference: (from: number, to: number) => number,
): void {
  const usable = (k: number): boolean => (mark[start + k]! & REJECTING) === 0 && !Number.isNaN(column[start + k]!);
  for (let k = 0; k < count; k++) {
    out[k] = NaN;
    if (!usable(k)) continue;
    const height = heightAgl[start + k]!;
    const reach = Math.min(SLOPE_REACH, SLOPE_REACH_SHARE * height);
    let below = k - 1;
    while (below >= 0 && (!usable(below) || height - heightAgl[start + below]! < reach)) below--;
    let above = k + 1;
    while (above < count && (!usable(above) || heightAgl[start + above]! - height < reach)) above++;
    if (below < 0 || height - heightAgl[start + below]! > SLOPE_LIMIT) below = k;
    if (!(above < count && heightAgl[start + above]! - height <= SLOPE_LIMIT)) above = k;
    if (below === above) continue;
    const rise = heightAgl[start + above]! - heightAgl[start + below]!;
    out[k] = difference(column[start + below]!, column[start + above]!) / rise;
  }
}
