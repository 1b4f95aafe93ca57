// A field's value at each level of a profile.

import { signedAngle } from '../air/index.ts';
import { airColumn, fluxOf } from '../moisture/index.ts';
import { profileAt, REJECTING, REJECTING_AIR, type ProfileBlock } from '../profile/index.ts';
import type { FieldName } from './fields.ts';

/** Slopes are taken between levels at least this far from the level, m, or this share of its height if that is less. */
const SLOPE_REACH = 20;
const SLOPE_REACH_SHARE = 0.3;
/** Beyond this distance, m, two levels say nothing of the slope between. */
const SLOPE_LIMIT = 250;

/** A field that a block stores as it is. */
export interface PlainColumn {
  readonly values: Float32Array;
  /** Levels with any of these marks show nothing. */
  readonly rejecting: number;
}

/** The block's own column of a field; null where the field has to be worked out or is not there. */
export function plainColumn(block: ProfileBlock, field: FieldName): PlainColumn | null {
  if (field === 'speed' || field === 'direction') return { values: block[field], rejecting: REJECTING };
  if (field !== 'temperature' || block.temperature === null) return null;
  return { values: block.temperature, rejecting: REJECTING_AIR };
}

/**
 * Writes a field's values of the i-th profile of a block into `out`, one per level.
 * NaN at rejected levels and where a needed value is missing.
 * @param out at least as long as the profile has levels
 */
export function fieldValuesInto(block: ProfileBlock, index: number, field: FieldName, out: Float32Array): void {
  const start = block.offsets[index]!;
  const count = block.offsets[index + 1]! - start;
  const plain = plainColumn(block, field);
  if (plain !== null) {
    const { values, rejecting } = plain;
    for (let k = 0; k < count; k++) out[k] = (block.mark[start + k]! & rejecting) === 0 ? values[start + k]! : NaN;
  } else if (field === 'humidity-flux') humidityFluxInto(block, index, start, count, out);
  else if (field === 'shear') slopeInto(block, start, count, out, block.speed, (from, to) => to - from);
  else if (field === 'veer') slopeInto(block, start, count, out, block.direction, (from, to) => signedAngle(to - from));
  else out.fill(NaN, 0, count);
}

/** kg/(m2 s): density times specific humidity times speed, pressure worked out where it is not measured. */
function humidityFluxInto(block: ProfileBlock, index: number, start: number, count: number, out: Float32Array): void {
  out.fill(NaN, 0, count);
  if (block.temperature === null || block.specificHumidity === null) return;
  const air = airColumn(profileAt(block, index));
  let position = 0;
  for (let k = 0; k < count; k++) {
    if ((block.mark[start + k]! & REJECTING) !== 0 || !Number.isFinite(block.heightAgl[start + k]!)) continue;
    out[k] = fluxOf(air.density[position]!, air.specificHumidity[position]!, block.speed[start + k]!);
    position++;
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
