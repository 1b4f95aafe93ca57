// From gathered levels, as written, to profiles in the house's own units, heights above ground, specific humidity.

import { hypsometricHeights, toInside, type ParsedUnit } from '../../air/index.ts';
import { BlockBuilder, type Instrument, type ProfileBlock, type Station } from '../../profile/index.ts';
import { ASSUMED_PRESSURE_NOTE, levelHumidity } from '../level-humidity.ts';
import type { LevelMeaning } from './headings.ts';
import type { Gathered } from './level-store.ts';

/** What stands once a profile. */
export interface ProfileHead {
  readonly station: Station;
  readonly instrument: Instrument;
  readonly timeMs: number;
  readonly periodS: number;
  /** Whether values such as -9999 were taken for missing in it. */
  filled: boolean;
}

const NO_ELEVATION_NOTE =
  'Heights are above sea level and the elevation of the station is not known: the ground was taken to lie at sea level.';
const LOWEST_IS_GROUND_NOTE =
  'Heights are above sea level and the elevation of the station is not known: the lowest level was taken for the ground.';
const BY_WEIGHT_NOTE =
  'The table gives pressures and no heights: heights were computed from the weight of the air, the first level taken for the ground.';
const FILL_NOTE = 'Fill values such as -9999 or 1e30 were taken as missing.';

/**
 * One block of all the profiles.
 * @param units unit of each quantity, stated or assumed
 * @param notes that hold for every profile
 */
export function toProfiles(
  gathered: Gathered,
  heads: readonly ProfileHead[],
  units: ReadonlyMap<LevelMeaning, ParsedUnit>,
  source: string,
  notes: readonly string[],
): ProfileBlock {
  const { offsets } = gathered;
  const column = (meaning: LevelMeaning): Float32Array | null => {
    const written = gathered.columns.get(meaning);
    const unit = units.get(meaning);
    if (written === undefined || unit === undefined) return null;
    const inside = new Float32Array(written.length);
    const scale = unit.quantity === 'geopotential' ? unit.scale / 9.80665 : unit.scale;
    for (let k = 0; k < inside.length; k++) inside[k] = toInside(written[k]!, { ...unit, scale });
    return inside;
  };
  const columns = {
    temperature: column('temperature'),
    pressure: column('pressure'),
    specificHumidity: column('specificHumidity'),
    mixingRatio: column('mixingRatio'),
    dewPoint: column('dewPoint'),
    relativeHumidity: column('relativeHumidity'),
  };
  const heights = new Heights(column('heightAgl'), column('heightAmsl'), columns.pressure, columns.temperature);
  const wind = {
    speed: column('speed'),
    direction: column('direction'),
    u: column('u'),
    v: column('v'),
    verticalSpeed: column('verticalSpeed'),
    signal: column('signal'),
    speedUncertainty: column('speedUncertainty'),
    speedDeviation: column('speedDeviation'),
    gust: column('gust'),
  };
  if (columns.pressure !== null) withoutZeroPressure(columns.pressure);

  const builder = new BlockBuilder();
  heads.forEach((head, index) => {
    const start = offsets[index]!;
    const end = offsets[index + 1]!;
    const cut = <T extends Float32Array | null>(from: T): T => (from?.subarray(start, end) ?? null) as T;
    const { heightAgl, station, note } = heights.of(start, end, head.station);
    const ground = Number.isNaN(station.elevation) ? 0 : station.elevation;
    const humidity = levelHumidity(
      {
        specificHumidity: cut(columns.specificHumidity),
        mixingRatio: cut(columns.mixingRatio),
        dewPoint: cut(columns.dewPoint),
        relativeHumidity: cut(columns.relativeHumidity),
        temperature: cut(columns.temperature),
        pressure: cut(columns.pressure),
      },
      (level) => ground + heightAgl[level]!,
    );
    const own = [
      note,
      humidity.pressureAssumed ? ASSUMED_PRESSURE_NOTE : '',
      humidity.pressureAssumed && Number.isNaN(station.elevation)
        ? 'The ground was taken to lie at sea level for that.'
        : '',
      head.filled ? FILL_NOTE : '',
    ].filter((text) => text !== '');
    builder.add({
      station,
      source,
      instrument: head.instrument,
      timeMs: head.timeMs,
      periodS: head.periodS,
      notes: own.length === 0 ? notes : [...notes, ...own],
      levels: {
        heightAgl,
        speed: cut(wind.speed) ?? undefined,
        direction: cut(wind.direction) ?? undefined,
        u: cut(wind.u) ?? undefined,
        v: cut(wind.v) ?? undefined,
        verticalSpeed: cut(wind.verticalSpeed) ?? undefined,
        signal: cut(wind.signal) ?? undefined,
        speedUncertainty: cut(wind.speedUncertainty) ?? undefined,
        speedDeviation: cut(wind.speedDeviation) ?? undefined,
        gust: cut(wind.gust) ?? undefined,
        temperature: cut(columns.temperature) ?? undefined,
        pressure: cut(columns.pressure) ?? undefined,
        specificHumidity: humidity.specificHumidity ?? undefined,
      },
    });
  });
  return builder.finish();
}

/** No air has no pressure: such cells say that there is none. */
function withoutZeroPressure(pressure: Float32Array): void {
  for (let k = 0; k < pressure.length; k++) if (!(pressure[k]! > 0)) pressure[k] = NaN;
}

interface ProfileHeights {
  readonly heightAgl: Float32Array;
  /** With the elevation that the heights themselves tell, where nothing else does. */
  readonly station: Station;
  readonly note: string;
}

/** Heights above ground of a profile's levels, from what the table gives. */
class Heights {
  readonly #agl: Float32Array | null;
  readonly #amsl: Float32Array | null;
  readonly #pressure: Float32Array | null;
  readonly #temperature: Float32Array | null;

  constructor(
    agl: Float32Array | null,
    amsl: Float32Array | null,
    pressure: Float32Array | null,
    temperature: Float32Array | null,
  ) {
    this.#agl = agl;
    this.#amsl = amsl;
    this.#pressure = pressure;
    this.#temperature = temperature;
  }

  of(start: number, end: number, station: Station): ProfileHeights {
    const agl = this.#agl?.subarray(start, end);
    const amsl = this.#amsl?.subarray(start, end);
    if (agl !== undefined) {
      if (amsl === undefined || !Number.isNaN(station.elevation)) return { heightAgl: agl, station, note: '' };
      return { heightAgl: agl, station: { ...station, elevation: elevationBetween(agl, amsl) }, note: '' };
    }
    if (amsl !== undefined) return this.#above(amsl, station);
    const none = new Float32Array(end - start).fill(NaN);
    const pressure = this.#pressure?.subarray(start, end) ?? none;
    const temperature = this.#temperature?.subarray(start, end) ?? none;
    const heights = hypsometricHeights(pressure, temperature, none, 0);
    return { heightAgl: Float32Array.from(heights), station, note: BY_WEIGHT_NOTE };
  }

  #above(amsl: Float32Array, station: Station): ProfileHeights {
    if (!Number.isNaN(station.elevation)) {
      return { heightAgl: amsl.map((height) => height - station.elevation), station, note: '' };
    }
    // A sounding begins at the ground; a lidar's or profiler's lowest gate does not.
    if (this.#pressure === null) return { heightAgl: amsl, station, note: NO_ELEVATION_NOTE };
    const lowest = amsl.reduce((least, height) => (height < least ? height : least), Infinity);
    const heightAgl = amsl.map((height) => height - lowest);
    return { heightAgl, station: { ...station, elevation: finite(lowest) }, note: LOWEST_IS_GROUND_NOTE };
  }
}

/** What both heights of the levels say of the ground; the altitude itself where it does not change with height. */
function elevationBetween(agl: Float32Array, amsl: Float32Array): number {
  const known = [...agl.keys()].filter((k) => !Number.isNaN(agl[k]!) && !Number.isNaN(amsl[k]!));
  if (known.length === 0) return NaN;
  const first = amsl[known[0]!]!;
  if (known.length > 1 && known.every((k) => amsl[k] === first)) return first;
  const differences = known.map((k) => amsl[k]! - agl[k]!).sort((a, b) => a - b);
  return differences[differences.length >> 1]!;
}

function finite(value: number): number {
  return Number.isFinite(value) ? value : NaN;
}
