// What this reader likes, remembered between visits: units, clock, field, theme, heights, scales, the disc to reckon with.

import { FIELD_NAMES, type FieldName, type ThemeName, THEMES } from '../../plot/index.ts';
import type { DisplayUnits } from '../../site/index.ts';
import type { Clock } from '../words/time.ts';

const SPEED_UNITS: readonly DisplayUnits['speed'][] = ['m/s', 'kt', 'km/h', 'mph'];
const HEIGHT_UNITS: readonly DisplayUnits['height'][] = ['m', 'ft'];
const CLOCKS: readonly Clock[] = ['site', 'utc'];
const STORAGE_KEY = 'duskveer/preferences';

interface Stored {
  speed: DisplayUnits['speed'];
  height: DisplayUnits['height'];
  clock: Clock;
  field: FieldName;
  theme: ThemeName;
  /** Name of the criteria set; empty follows the site file. */
  criteria: string;
  /** Top of the picture, m above ground; 0 follows the data. */
  ceiling: number;
  /** Range of a field's colour scale where the reader has changed it, SI. */
  ranges: Partial<Record<FieldName, { low: number; high: number }>>;
  /** The disc for files that come without a site file, m. */
  hubHeight: number;
  rotorDiameter: number;
}

const FIRST_VISIT: Stored = {
  speed: 'm/s',
  height: 'm',
  clock: 'site',
  field: 'speed',
  theme: 'dark',
  criteria: '',
  ceiling: 0,
  ranges: {},
  hubHeight: 100,
  rotorDiameter: 120,
};

export class Preferences {
  speed = $state(FIRST_VISIT.speed);
  height = $state(FIRST_VISIT.height);
  clock = $state(FIRST_VISIT.clock);
  field = $state(FIRST_VISIT.field);
  theme = $state(FIRST_VISIT.theme);
  criteria = $state(FIRST_VISIT.criteria);
  ceiling = $state(FIRST_VISIT.ceiling);
  ranges = $state.raw(FIRST_VISIT.ranges);
  hubHeight = $state(FIRST_VISIT.hubHeight);
  rotorDiameter = $state(FIRST_VISIT.rotorDiameter);

  readonly units: DisplayUnits = $derived({ speed: this.speed, height: this.height });

  readonly #storage: Storage | undefined;
  readonly #firstVisit: boolean;

  /** @param storage where to remember; without one (a browser may refuse it) nothing is remembered */
  constructor(storage: Storage | undefined) {
    this.#storage = storage;
    const told = read(storage);
    this.#firstVisit = told === null;
    Object.assign(this, meaningful(told ?? {}));
  }

  /** Takes the units a site file asks for, unless this reader has been here before. */
  suggest(units: DisplayUnits): void {
    if (!this.#firstVisit) return;
    this.speed = units.speed;
    this.height = units.height;
  }

  remember(): void {
    const all = Object.fromEntries(Object.keys(FIRST_VISIT).map((key) => [key, this[key as keyof Stored]]));
    try {
      this.#storage?.setItem(STORAGE_KEY, JSON.stringify(all));
    } catch {
      // A full or forbidden storage costs only the memory of a choice.
    }
  }
}

function read(storage: Storage | undefined): Record<string, unknown> | null {
  try {
    const told: unknown = JSON.parse(storage?.getItem(STORAGE_KEY) ?? 'null');
    return typeof told === 'object' && told !== null ? (told as Record<string, unknown>) : null;
  } catch {
    return null;
  }
}

/** What was stored, each entry only if it still means something. */
function meaningful(told: Record<string, unknown>): Stored {
  const oneOf = <K extends keyof Stored>(key: K, known: readonly Stored[K][]): Stored[K] =>
    known.includes(told[key] as Stored[K]) ? (told[key] as Stored[K]) : FIRST_VISIT[key];
  const between = (key: 'ceiling' | 'hubHeight' | 'rotorDiameter', low: number, high: number): number => {
    const value = told[key];
    return typeof value === 'number' && value >= low && value <= high ? value : FIRST_VISIT[key];
  };
  const ranges = Object.entries(
    (told['ranges'] ?? {}) as Record<string, { low?: unknown; high?: unknown } | null>,
  ).filter(
    ([field, range]) =>
      FIELD_NAMES.includes(field as FieldName) &&
      typeof range?.low === 'number' &&
      typeof range.high === 'number' &&
      range.high > range.low,
  );
  return {
    speed: oneOf('speed', SPEED_UNITS),
    height: oneOf('height', HEIGHT_UNITS),
    clock: oneOf('clock', CLOCKS),
    field: oneOf('field', FIELD_NAMES),
    theme: oneOf('theme', Object.keys(THEMES) as ThemeName[]),
    criteria: typeof told['criteria'] === 'string' ? told['criteria'] : FIRST_VISIT.criteria,
    ceiling: between('ceiling', 0, 30_000),
    ranges: Object.fromEntries(ranges),
    hubHeight: between('hubHeight', 10, 400),
    rotorDiameter: between('rotorDiameter', 5, 400),
  };
}
