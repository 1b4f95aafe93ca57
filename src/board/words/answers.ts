// The answers under the picture, put in the reader's words and units: each with its age and what it rests on.

import type { NightState } from '../../desk/index.ts';
import type { DiscWind } from '../../rotor/index.ts';
import type { DisplayUnits, TurbineType } from '../../site/index.ts';
import { fromHeightUnit, toSpeedUnit } from '../../air/index.ts';
import { compassWords, directionText, heightText, inHundred, plain, signed, speedText } from './numbers.ts';
import { durationWords } from './time.ts';

export interface Answer {
  readonly title: string;
  /** `6 min old`, or what else the figures' time is. */
  readonly age: string;
  readonly figures: readonly { readonly value: string; readonly unit: string }[];
  /** Said in place of figures where there are none: the reason. */
  readonly none: string;
  readonly lines: readonly { readonly text: string; readonly call?: boolean }[];
  /** Too old to act on: struck through. */
  readonly stale: boolean;
}

/** Power-law exponent that the normal wind profile of IEC 61400-1 assumes on land. */
const DESIGN_SHEAR = 0.2;
/** Profiles older than this many intervals are stale. */
export const STALE_INTERVALS = 3;
const HOUR_MS = 3_600_000;

export function answers(night: NightState, stepMs: number, units: DisplayUnits): Answer[] {
  return [jetAnswer, discAnswer, changeAnswer, moistureAnswer].map((answer) =>
    answer(new Context(night, stepMs, units)),
  );
}

class Context {
  readonly night: NightState;
  readonly units: DisplayUnits;
  readonly last: number;
  readonly age: string;
  readonly stale: boolean;

  constructor(night: NightState, stepMs: number, units: DisplayUnits) {
    this.night = night;
    this.units = units;
    this.last = night.timeMs.length - 1;
    const ageMs = night.atMs - (night.timeMs[this.last] ?? NaN);
    this.age = Number.isFinite(ageMs) ? `${durationWords(ageMs)} old` : 'no data';
    this.stale = !(ageMs <= STALE_INTERVALS * stepMs);
  }

  speed(value: number): { value: string; unit: string } {
    return { value: speedText(value, this.units), unit: this.units.speed };
  }

  nothing(title: string, none: string): Answer {
    return { title, age: this.age, figures: [], none, lines: [], stale: this.stale };
  }
}

function jetAnswer(context: Context): Answer {
  const { night, units, last } = context;
  const title = 'Jet nose';
  const finding = night.findings[last];
  if (finding === undefined) return context.nothing(title, 'No profile in this night yet.');
  const jet = finding.jets[0];
  const method = { text: `${night.criteria.name}: ${night.criteria.title}` };
  if (jet === undefined) {
    const none = finding.status === 'no-jet' ? 'No jet' : 'Not assessable';
    return { ...context.nothing(title, none), lines: [{ text: finding.why }, method] };
  }
  const category = jet.category === null ? '' : `, category ${jet.category} of 3`;
  const falloff = `falls off by ${jet.falloffIsBound ? 'at least ' : ''}${speedText(jet.falloff, units)} ${units.speed} above`;
  return {
    title,
    age: context.age,
    figures: [{ value: heightText(jet.noseHeight, units), unit: units.height }, context.speed(jet.noseSpeed)],
    none: '',
    lines: [
      { text: `from ${directionText(jet.noseDirection)}${category}, ${inHundred(jet.confidence)} sure` },
      { text: `${falloff}; by ${night.criteria.name}` },
    ],
    stale: context.stale,
  };
}

function discAnswer(context: Context): Answer {
  const { night, units, last } = context;
  const series = night.discs[0];
  const wind = series?.winds[last];
  if (series === undefined || wind === undefined)
    return context.nothing('Wind on the disc', 'No profile in this night yet.');
  const title = `Wind on the disc, ${discSpan(series.turbine, units)}`;
  if (wind.status !== 'ok') return { ...context.nothing(title, 'Not assessable'), lines: [{ text: wind.why }] };
  const speed = equivalent(wind);
  const steep = wind.shearExponent > DESIGN_SHEAR;
  return {
    title,
    age: context.age,
    figures: [
      context.speed(speed),
      { value: signed(toSpeedUnit(speed - wind.hubSpeed, units.speed), 1), unit: 'over hub' },
    ],
    none: '',
    lines: [
      {
        text: `shear ${plain(wind.shearExponent, 2)}${steep ? `, over the ${DESIGN_SHEAR} that design assumes` : ''}`,
        call: steep,
      },
      { text: `${veerWords(wind, units)}; ${noseWords(wind)}; rotor-equivalent, IEC 61400-12-1` },
    ],
    stale: context.stale,
  };
}

function changeAnswer(context: Context): Answer {
  const { night, last } = context;
  const title = 'Hub wind, last hour';
  const winds = night.discs[0]?.winds ?? [];
  const now = winds[last];
  if (now === undefined) return context.nothing(title, 'No profile in this night yet.');
  if (!Number.isFinite(now.hubSpeed))
    return { ...context.nothing(title, 'Not assessable'), lines: [{ text: now.why }] };
  const wanted = night.timeMs[last]! - HOUR_MS;
  const then = winds.findLast((wind, k) => night.timeMs[k]! <= wanted && Number.isFinite(wind.hubSpeed));
  const figures = [context.speed(now.hubSpeed)];
  if (then === undefined) {
    return { ...context.nothing(title, ''), figures, lines: [{ text: 'no measurement an hour ago to compare with' }] };
  }
  const change = now.hubSpeed - then.hubSpeed;
  return {
    title,
    age: context.age,
    figures: [...figures, { value: signed(toSpeedUnit(change, context.units.speed), 1), unit: 'in 1 h' }],
    none: '',
    lines: [
      { text: `from ${directionText(now.hubDirection)}, ${compassWords(now.hubDirection)}` },
      {
        text: `hub height ${heightText(night.discs[0]!.turbine.hubHeight, context.units)} ${context.units.height}, measured`,
      },
    ],
    stale: context.stale,
  };
}

function moistureAnswer(context: Context): Answer {
  const numbers = context.night.moisture;
  const title = 'Moisture below 3 km';
  if (numbers === null) return context.nothing(title, 'No profile in this night yet.');
  const { below3Km, precipitableWater, humidityAgeS, humidityFrom, notes } = numbers;
  if (!Number.isFinite(below3Km.size))
    return { ...context.nothing(title, 'Not assessable'), lines: [{ text: numbers.why }] };
  const heading = compassWords((below3Km.direction + 180) % 360);
  return {
    title,
    age: humidityAgeS > 0 ? `humidity ${durationWords(1000 * humidityAgeS)} old` : context.age,
    figures: [{ value: plain(below3Km.size, 0), unit: 'kg/m/s' }],
    none: '',
    lines: [
      { text: `toward the ${heading}; ${plain(precipitableWater, 1)} kg/m² of water above` },
      { text: [`humidity from ${humidityFrom}`, ...notes].join('; ') },
    ],
    stale: context.stale,
  };
}

/** The rotor-equivalent speed with veer where directions are known, else without. */
export function equivalent(wind: DiscWind): number {
  return Number.isNaN(wind.equivalentSpeedVeer) ? wind.equivalentSpeed : wind.equivalentSpeedVeer;
}

function discSpan({ hubHeight, rotorDiameter }: TurbineType, units: DisplayUnits): string {
  const low = heightText(hubHeight - rotorDiameter / 2, units);
  const high = heightText(hubHeight + rotorDiameter / 2, units);
  return `${low}–${high} ${units.height}`;
}

function noseWords(wind: DiscWind): string {
  if (wind.noseInRotor === null) return 'no nose';
  return wind.noseInRotor ? 'nose in the disc' : 'nose outside the disc';
}

/** The turn over the whole disc where both tips are measured, else its rate over the part that is. */
function veerWords({ veer, veerPer100M, coverage }: DiscWind, units: DisplayUnits): string {
  if (Number.isFinite(veer)) return `veer ${signed(veer, 0)}° over the disc`;
  if (!Number.isFinite(veerPer100M)) return 'veer not known, no directions';
  const rate =
    units.height === 'm'
      ? `${signed(veerPer100M, 0)}° per 100 m`
      : `${signed(10 * fromHeightUnit(veerPer100M, 'ft'), 0)}° per 1000 ft`;
  return `veer ${rate} over the ${plain(100 * coverage, 0)} % measured`;
}
