// The wind below and above the measured heights of a disc, where the site file allows the power law to continue it.

import { shearExponent } from '../air/index.ts';
import { windColumn, type WindColumn } from '../profile/index.ts';
import { bottomTip, shareBelow, topTip, type Disc } from './disc.ts';

export interface Continued {
  /** The measured levels with the continued ones around them; the given column itself where nothing was continued. */
  readonly column: WindColumn;
  /** Share of the disc's area that rests on continued wind, 0 to 1. */
  readonly share: number;
  /** Why nothing was continued though part of the disc is not covered; empty otherwise. */
  readonly why: string;
}

/** Less of the disc measured than this carries no continuation. Our own choice. */
const LEAST_COVERAGE = 0.5;
/** Continued levels stand this share of the radius apart. */
const STEP = 0.25;

/**
 * Continues the wind to the tips: V = V_end (z/z_end)^alpha, alpha fitted over the levels from tip to tip (IEC 61400-1 power
 * law), the end level's direction held. The uncertainty grows with that of alpha.
 * @param column usable levels, ascending, with their uncertainty
 */
export function continueWind(column: WindColumn, disc: Disc): Continued {
  const nothing = (why: string): Continued => ({ column, share: 0, why });
  if (column.count === 0) return nothing('');
  const [lowest, highest] = [column.heightAgl[0]!, column.heightAgl[column.count - 1]!];
  const measured = shareBelow(disc, highest) - shareBelow(disc, lowest);
  if (measured >= 1) return nothing('');
  if (measured < LEAST_COVERAGE) return nothing('too little of the rotor is measured to continue the wind');
  const inside: number[] = [];
  for (let k = 0; k < column.count; k++) {
    if (column.heightAgl[k]! >= bottomTip(disc) && column.heightAgl[k]! <= topTip(disc)) inside.push(k);
  }
  const heights = inside.map((k) => column.heightAgl[k]!);
  const { exponent } = shearExponent(
    heights,
    inside.map((k) => column.speed[k]!),
  );
  if (Number.isNaN(exponent)) return nothing('fewer than two levels within the rotor to fit a power law to');
  const spread = exponentSpread(
    heights,
    inside.map((k) => column.speedUncertainty[k]! / column.speed[k]!),
  );

  const out = windColumn(column.count + 2 * Math.ceil(2 / STEP) + 2);
  const addContinued = (height: number, end: number): void => {
    const ratio = height / column.heightAgl[end]!;
    const speed = column.speed[end]! * Math.pow(ratio, exponent);
    const relative = Math.hypot(column.speedUncertainty[end]! / column.speed[end]!, spread * Math.log(ratio));
    push(out, {
      height,
      speed,
      direction: column.direction[end]!,
      uncertainty: speed * relative,
      mark: 0,
      level: column.level[end]!,
    });
  };
  for (const height of steps(Math.max(bottomTip(disc), 1), lowest, disc)) addContinued(height, 0);
  for (let k = 0; k < column.count; k++) {
    push(out, {
      height: column.heightAgl[k]!,
      speed: column.speed[k]!,
      direction: column.direction[k]!,
      uncertainty: column.speedUncertainty[k]!,
      mark: column.mark[k]!,
      level: column.level[k]!,
    });
  }
  for (const height of steps(topTip(disc), highest, disc).reverse()) addContinued(height, column.count - 1);
  return { column: out, share: 1 - measured, why: '' };
}

/** Heights from a tip toward the end level, the end level left out; none where the tip lies within the data. */
function steps(tip: number, end: number, disc: Disc): number[] {
  const sense = Math.sign(end - tip);
  const outward = tip < disc.hubHeight ? 1 : -1;
  if (sense !== outward) return [];
  const count = Math.ceil(Math.abs(end - tip) / ((STEP * disc.rotorDiameter) / 2));
  return Array.from({ length: count }, (_, k) => tip + ((end - tip) * k) / count);
}

/** Standard uncertainty of the fitted exponent, from the relative uncertainty of each speed. */
function exponentSpread(heights: readonly number[], relative: readonly number[]): number {
  const logs = heights.map(Math.log);
  const mean = logs.reduce((sum, value) => sum + value, 0) / logs.length;
  const squares = logs.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return Math.sqrt(logs.reduce((sum, value, k) => sum + (((value - mean) * relative[k]!) / squares) ** 2, 0));
}

interface Level {
  readonly height: number;
  readonly speed: number;
  readonly direction: number;
  readonly uncertainty: number;
  readonly mark: number;
  readonly level: number;
}

function push(out: WindColumn, level: Level): void {
  const at = out.count++;
  out.heightAgl[at] = level.height;
  out.speed[at] = level.speed;
  out.direction[at] = level.direction;
  out.speedUncertainty[at] = level.uncertainty;
  out.mark[at] = level.mark;
  out.level[at] = level.level;
}
