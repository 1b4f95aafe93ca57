// The levels of a profile that carry pressure, temperature and humidity, made fit for lifting parcels through them.

import { dewPointOf, KAPPA } from '../air/index.ts';
import { REJECTING_AIR, type Profile } from '../profile/index.ts';
import { airLevelsOf, type AirLevels } from './air-levels.ts';
import { hectopascals, metres } from './figure.ts';

/** A lowest level higher than this above ground, m, is no surface observation (common practice, without source). */
const SURFACE_WITHIN = 50;
/** Levels further apart than this, Pa, are not joined: the standard levels 700 and 500 hPa still are. */
const WIDEST_GAP = 20_000;
/** Where humidity ends above this pressure level, Pa, the air above counts as dry: the virtual correction is < 0.2 K. */
const DRY_ABOVE = 50_000;
/** A dew point more than this above the temperature, K, is no dew point; less is taken as saturation. */
const SUPERSATURATION = 2;
/** Taken where an instrument tells no vapour at all, kg/kg: less than any can tell, and it has a dew point. */
const DRIEST = 1e-6;
/** Fall of potential temperature within the lowest 100 m, K, above which the surface value is doubted. */
const SUPERADIABATIC = 2;

/** Levels by falling pressure, temperature and dew point meant to be linear in ln p between them. */
export interface Sounding {
  readonly count: number;
  /** Pa, falling */
  readonly pressure: Float64Array;
  /** ln of Pa, falling */
  readonly lnPressure: Float64Array;
  /** m above ground */
  readonly heightAgl: Float64Array;
  /** K */
  readonly temperature: Float64Array;
  /** K; NaN from `moistCount` on, where the air counts as dry */
  readonly dewPoint: Float64Array;
  readonly moistCount: number;
  /** How pressure was had where it was not measured, in words; empty where it was. */
  readonly pressureFrom: string;
  /** Why nothing can be lifted from the surface; empty when the lowest level is one. */
  readonly noSurface: string;
  /** Why nothing can be lifted at all; empty when something can. */
  readonly noAir: string;
  /** What was assumed or left out, in words. */
  readonly notes: readonly string[];
}

/**
 * Gathers the levels of a profile for parcel work. Levels without temperature, with a mark that rejects them, or at
 * which pressure does not fall are passed over; missing dew points are joined over at most 200 hPa; where pressure was not
 * measured it is worked out from the heights.
 * @returns an empty sounding with `noAir` told when fewer than two levels are left
 */
export function soundingOf(profile: Profile): Sounding {
  const notes: string[] = [];
  const levels = airLevelsOf(profile);
  const gathered = gather(levels, notes);
  const moistCount = joinDewPoints(gathered, notes);
  let count = gathered.count;
  if (moistCount > 0 && moistCount < count) {
    const moistTop = gathered.pressure[moistCount - 1]!;
    if (moistTop > DRY_ABOVE) count = moistCount;
    notes.push(
      moistTop > DRY_ABOVE
        ? `Humidity ends at ${hectopascals(moistTop)}; nothing is reckoned above it.`
        : `Humidity ends at ${hectopascals(moistTop)}; the air above counts as dry.`,
    );
  }
  const take = (column: Float64Array): Float64Array => column.subarray(0, count);
  const sounding = {
    count,
    pressure: take(gathered.pressure),
    lnPressure: take(gathered.pressure).map(Math.log),
    heightAgl: take(gathered.heightAgl),
    temperature: take(gathered.temperature),
    dewPoint: take(gathered.dewPoint),
    moistCount,
    pressureFrom: levels.pressureFrom,
    noAir: whyNoAir(levels, gathered.count, moistCount),
    notes,
  };
  if (levels.pressureFrom !== '' && sounding.noAir === '') notes.push(levels.pressureFrom);
  noteSuperadiabatic(sounding, notes);
  return { ...sounding, noSurface: whyNoSurface(sounding) };
}

interface Gathered {
  count: number;
  readonly pressure: Float64Array;
  readonly heightAgl: Float64Array;
  readonly temperature: Float64Array;
  readonly dewPoint: Float64Array;
}

function gather(from: AirLevels, notes: string[]): Gathered {
  const { levelCount, heightAgl, pressure, temperature, specificHumidity, mark } = from;
  const column = (): Float64Array => new Float64Array(levelCount);
  const out: Gathered = {
    count: 0,
    pressure: column(),
    heightAgl: column(),
    temperature: column(),
    dewPoint: column(),
  };
  if (pressure === null || temperature === null) return out;
  let saturated = 0;
  let impossible = 0;
  let dry = 0;
  let count = 0;
  for (let k = 0; k < levelCount; k++) {
    const below = count > 0 ? out.pressure[count - 1]! : Infinity;
    const falls = pressure[k]! > 0 && pressure[k]! < below;
    if ((mark[k]! & REJECTING_AIR) !== 0 || !falls || !(temperature[k]! > 0) || !(heightAgl[k]! > -Infinity)) continue;
    if (below < Infinity && below - pressure[k]! > WIDEST_GAP + 1) {
      notes.push(
        `Nothing was measured between ${hectopascals(below)} and ${hectopascals(pressure[k]!)}; data are taken to end there.`,
      );
      break;
    }
    const humidity = specificHumidity === null ? NaN : specificHumidity[k]!;
    // High up nobody minds whether there is a trace of vapour or none.
    if (humidity === 0 && pressure[k]! > DRY_ABOVE) dry++;
    let dewPoint = dewPointOf(humidity === 0 ? DRIEST : humidity, pressure[k]!);
    if (dewPoint > temperature[k]! + SUPERSATURATION) {
      impossible++;
      dewPoint = NaN;
    } else if (dewPoint > temperature[k]!) {
      // A rounding of the stored numbers is not worth a word.
      if (dewPoint > temperature[k]! + 0.05) saturated++;
      dewPoint = temperature[k]!;
    }
    out.pressure[count] = pressure[k]!;
    out.heightAgl[count] = heightAgl[k]!;
    out.temperature[count] = temperature[k]!;
    out.dewPoint[count] = dewPoint;
    count++;
  }
  out.count = count;
  if (dry > 0) notes.push(`${levels(dry)} without any vapour: taken as ${1e6 * DRIEST} mg/kg.`);
  if (saturated > 0) notes.push(`${levels(saturated)} had a dew point above the temperature: taken as saturated.`);
  if (impossible > 0) {
    notes.push(`${levels(impossible)} had a dew point more than ${SUPERSATURATION} K above the temperature: left out.`);
  }
  return out;
}

/** Fills missing dew points between known ones, in place. @returns how many levels from the bottom have one */
function joinDewPoints(levels: Gathered, notes: string[]): number {
  const { pressure, dewPoint } = levels;
  let known = -1;
  let widest = 0;
  for (let k = 0; k < levels.count; k++) {
    if (Number.isNaN(dewPoint[k]!)) continue;
    if (known < 0 && k > 0) return dropBelow(levels, k, notes);
    const gap = known < 0 ? 0 : pressure[known]! - pressure[k]!;
    if (gap > WIDEST_GAP + 1) break;
    for (let j = known + 1; j < k; j++) {
      const share = Math.log(pressure[known]! / pressure[j]!) / Math.log(pressure[known]! / pressure[k]!);
      dewPoint[j] = dewPoint[known]! + share * (dewPoint[k]! - dewPoint[known]!);
      widest = Math.max(widest, gap);
    }
    known = k;
  }
  if (widest > 2000) {
    notes.push(`Missing humidity was joined over up to ${hectopascals(widest)}, dew point linear in ln p.`);
  }
  dewPoint.fill(NaN, known + 1);
  return known + 1;
}

/** Levels below the first with humidity cannot be lifted from; they go, and the rest is joined. */
function dropBelow(levels: Gathered, first: number, notes: string[]): number {
  notes.push(`Humidity begins at ${metres(levels.heightAgl[first]!)} above ground; nothing is reckoned below it.`);
  for (const column of [levels.pressure, levels.heightAgl, levels.temperature, levels.dewPoint]) {
    column.copyWithin(0, first, levels.count);
  }
  levels.count -= first;
  return joinDewPoints(levels, notes);
}

function levels(count: number): string {
  return count === 1 ? 'One level' : `${count} levels`;
}

function whyNoAir(profile: AirLevels, count: number, moistCount: number): string {
  if (profile.temperature === null) return 'The profile has no temperature.';
  if (profile.noPressure !== '') return profile.noPressure;
  if (count < 2) return 'Fewer than two levels have both pressure and temperature.';
  if (profile.specificHumidity === null || moistCount === 0) return 'The profile has no humidity.';
  if (moistCount < 2) return 'Humidity was measured at one level only.';
  return '';
}

function whyNoSurface(sounding: Pick<Sounding, 'count' | 'heightAgl'>): string {
  if (sounding.count === 0 || sounding.heightAgl[0]! <= SURFACE_WITHIN) return '';
  return (
    `The lowest level with temperature and humidity lies ${metres(sounding.heightAgl[0]!)} above ground; ` +
    'the surface is missing.'
  );
}

function noteSuperadiabatic(sounding: Omit<Sounding, 'noSurface'>, notes: string[]): void {
  const { pressure, temperature, heightAgl, count } = sounding;
  if (count < 2) return;
  let above = 1;
  while (above + 1 < count && heightAgl[above + 1]! <= heightAgl[0]! + 100) above++;
  const broughtDown = temperature[above]! * Math.pow(pressure[0]! / pressure[above]!, KAPPA);
  const excess = temperature[0]! - broughtDown;
  if (heightAgl[above]! > heightAgl[0]! + 100 || excess <= SUPERADIABATIC) return;
  notes.push(
    `The lowest level is ${excess.toFixed(1)} K warmer than air brought down from ${metres(heightAgl[above]!)}: ` +
      'the surface-based parcel may be too warm, the mixed-layer one is safer.',
  );
}

/** Nothing to lift, and why. */
export function noSounding(why: string): Sounding {
  const none = new Float64Array(0);
  return {
    count: 0,
    pressure: none,
    lnPressure: none,
    heightAgl: none,
    temperature: none,
    dewPoint: none,
    moistCount: 0,
    pressureFrom: '',
    noSurface: why,
    noAir: why,
    notes: [],
  };
}

/** Where a pressure lies among the levels: index of the level below it, from 0 to count - 2. */
function levelBelow(lnPressure: Float64Array, count: number, wanted: number): number {
  let low = 0;
  let high = count - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (lnPressure[middle]! >= wanted) low = middle;
    else high = middle;
  }
  return low;
}

/** Slack for pressures that went through a logarithm and back. */
const ROUNDING = 1e-9;

/** A column at ln p, linear in ln p. @returns NaN outside the levels */
export function atLnPressure(sounding: Sounding, column: Float64Array, wanted: number): number {
  const { lnPressure, count } = sounding;
  if (count < 2 || !(wanted <= lnPressure[0]! + ROUNDING) || !(wanted >= lnPressure[count - 1]! - ROUNDING)) return NaN;
  const k = levelBelow(lnPressure, count, wanted);
  const share = (lnPressure[k]! - wanted) / (lnPressure[k]! - lnPressure[k + 1]!);
  // A level's own value stands even where the next one is missing.
  return share <= 0 ? column[k]! : column[k]! + Math.min(share, 1) * (column[k + 1]! - column[k]!);
}

/** Temperature at a height above ground, K, linear in height. @returns NaN outside the levels */
export function temperatureAtHeight(sounding: Sounding, heightAgl: number): number {
  const { heightAgl: heights, temperature, count } = sounding;
  for (let k = 0; k + 1 < count; k++) {
    if (heights[k]! <= heightAgl && heights[k + 1]! >= heightAgl) {
      const depth = heights[k + 1]! - heights[k]!;
      const share = depth > 0 ? (heightAgl - heights[k]!) / depth : 0;
      return temperature[k]! + share * (temperature[k + 1]! - temperature[k]!);
    }
  }
  return NaN;
}
