// Single groups of the codes TEMP (FM 35) and PILOT (FM 32), WMO-No. 306, Volume I.1, Part A. Missing is NaN.

import { KNOT, ZERO_CELSIUS } from '../../air/index.ts';

export interface Wind {
  /** m/s */
  readonly speed: number;
  /** degrees; NaN when calm */
  readonly direction: number;
}

export interface Moisture {
  /** K */
  readonly temperature: number;
  /** K */
  readonly dewPoint: number;
}

/** Number of an all-digit text; NaN where a solidus says missing, undefined where it is neither. */
export function figures(text: string): number | undefined {
  if (/^\d+$/u.test(text)) return Number(text);
  return /^[\d/]+$/u.test(text) && text.includes('/') ? NaN : undefined;
}

/**
 * `ddfff`: direction to five degrees, speed in the report's unit; 500 on the speed stands for the odd five degrees.
 * @returns undefined for what is no wind group
 */
export function windGroup(group: string, knots: boolean): Wind | undefined {
  if (group.length !== 5) return undefined;
  const tens = figures(group.slice(0, 2));
  const rest = figures(group.slice(2));
  if (tens === undefined || rest === undefined || tens > 36) return undefined;
  const force = rest >= 500 ? rest - 500 : rest;
  const direction = tens * 10 + (rest >= 500 ? 5 : 0);
  if (direction > 360) return undefined;
  return { speed: force * (knots ? KNOT : 1), direction: force === 0 ? NaN : direction };
}

/**
 * `TTTDD`: temperature in tenths, an odd last digit standing for below zero (code table 3931, to two tenths), and dew-point
 * depression: 00 to 50 in tenths, 56 to 99 whole degrees plus 50 (code table 0777).
 * @returns undefined for what is no such group
 */
export function temperatureGroup(group: string): Moisture | undefined {
  if (group.length !== 5) return undefined;
  const tenths = figures(group.slice(0, 3));
  const coded = figures(group.slice(3));
  if (tenths === undefined || coded === undefined || (coded > 50 && coded < 56)) return undefined;
  const celsius = tenths % 2 === 1 ? -tenths / 10 : tenths / 10;
  const temperature = celsius + ZERO_CELSIUS;
  return { temperature, dewPoint: temperature - (coded > 50 ? coded - 50 : coded / 10) };
}

/** Opens a section that holds no levels: `31313`, `41414`, regional `51515` to `59595`, national `61616` to `69696`. */
export function isSection(group: string): boolean {
  return group === '31313' || group === '41414' || /^([56])(?!\1)([1-9])\1\2\1$/u.test(group);
}
