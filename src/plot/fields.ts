// What a time-height section can show: each field with its scale, its usual range, and the rule by which many values
// that fall into one pixel become one.

import { toSpeedUnit, ZERO_CELSIUS, type SpeedUnit } from '../air/index.ts';
import type { ScaleName, ValueRange } from './scales.ts';

/** Fields in the order in which a page offers them. */
export const FIELD_NAMES = ['speed', 'direction', 'shear', 'veer', 'humidity-flux', 'temperature'] as const;
export type FieldName = (typeof FIELD_NAMES)[number];

/**
 * `greatest`: the greatest value. `largest-size`: the value furthest from zero, the positive one of equals.
 * `at-strongest-wind`: the value where the wind is strongest, the greater one where winds are equal.
 */
export type PixelRule = 'greatest' | 'largest-size' | 'at-strongest-wind';

export interface Field {
  readonly name: FieldName;
  /** For people: `wind speed`. */
  readonly title: string;
  readonly scale: ScaleName;
  /** SI; the reader may change it. */
  readonly range: ValueRange;
  readonly pixelRule: PixelRule;
}

export const FIELDS: Readonly<Record<FieldName, Field>> = {
  speed: { name: 'speed', title: 'wind speed', scale: 'speed', range: { low: 0, high: 24 }, pixelRule: 'greatest' },
  direction: {
    name: 'direction',
    title: 'wind direction, from',
    scale: 'compass',
    range: { low: 0, high: 360 },
    pixelRule: 'at-strongest-wind',
  },
  shear: {
    name: 'shear',
    title: 'change of speed with height',
    scale: 'signed',
    range: { low: -0.06, high: 0.06 },
    pixelRule: 'largest-size',
  },
  veer: {
    name: 'veer',
    title: 'turn of the wind with height, clockwise positive',
    scale: 'signed',
    range: { low: -0.3, high: 0.3 },
    pixelRule: 'largest-size',
  },
  'humidity-flux': {
    name: 'humidity-flux',
    title: 'flux of water vapour',
    scale: 'moisture',
    range: { low: 0, high: 0.5 },
    pixelRule: 'greatest',
  },
  temperature: {
    name: 'temperature',
    title: 'temperature',
    scale: 'warmth',
    range: { low: ZERO_CELSIUS - 10, high: ZERO_CELSIUS + 30 },
    pixelRule: 'at-strongest-wind',
  },
};

/** How a field's numbers are told to the reader: `shown = inside * factor + offset`. */
export interface ShownUnit {
  readonly unit: string;
  readonly factor: number;
  readonly offset: number;
  /** Decimals that a single value deserves. */
  readonly decimals: number;
}

/** The unit a field is shown in: m/s inside is shown in the reader's speed unit, slopes per 100 m. */
export function shownUnit(field: FieldName, speedUnit: SpeedUnit): ShownUnit {
  switch (field) {
    case 'speed':
      return { unit: speedUnit, factor: toSpeedUnit(1, speedUnit), offset: 0, decimals: 1 };
    case 'direction':
      return { unit: '°', factor: 1, offset: 0, decimals: 0 };
    case 'shear':
      return { unit: `${speedUnit} per 100 m`, factor: 100 * toSpeedUnit(1, speedUnit), offset: 0, decimals: 1 };
    case 'veer':
      return { unit: '° per 100 m', factor: 100, offset: 0, decimals: 0 };
    case 'humidity-flux':
      return { unit: 'g/m²/s', factor: 1000, offset: 0, decimals: 0 };
    case 'temperature':
      return { unit: '°C', factor: 1, offset: -ZERO_CELSIUS, decimals: 1 };
  }
}

/** An inside value in the shown unit; NaN stays NaN. */
export function toShown(value: number, unit: ShownUnit): number {
  return value * unit.factor + unit.offset;
}

/** A shown value brought back inside. */
export function fromShown(value: number, unit: ShownUnit): number {
  return (value - unit.offset) / unit.factor;
}
