// Divergence, vorticity and moisture-flux divergence between stations, layer by layer, and the vertical motion they imply.

import { standardAtmosphere } from '../air/index.ts';
import { completeUncertainty } from '../jet/index.ts';
import { gatherWind, windColumn, type Instrument, type Profile } from '../profile/index.ts';
import { humidAir, type HumidityOptions } from './humid-air.ts';
import { cutLayer, integrate } from './layer.ts';
import { windField, type FieldPoint, type WindField } from './wind-field.ts';

export interface TriangleOptions extends HumidityOptions {
  /** What may lend its humidity to a profile, where that differs between the stations; goes before `humidity`. */
  readonly humidityFor?: ((profile: Profile) => readonly Profile[]) | undefined;
  /**
   * m above ground, ascending: layers between successive edges, with the mean wind of each. Absent: at the levels that the
   * stations share, with the wind measured there, where levels are few; else layers of 250 m up to 3 km.
   */
  readonly edges?: readonly number[] | undefined;
  /** s by which profiles may lie apart; half an hour unless told. */
  readonly toleranceS?: number | undefined;
}

const TOLERANCE_S = 1800;
/** m above ground */
const HIGHEST = 3000;
/** Up to so many levels each stands for itself; more are dense enough to be averaged. Our own choice. */
const FEW = 15;
const USUAL_EDGES: readonly number[] = Array.from({ length: 13 }, (_, k) => 250 * k);

export interface TriangleLayer {
  /** Middle of the layer, or the level that stands for it, and bounds; m above each station's ground. */
  readonly heightAgl: number;
  readonly bottom: number;
  readonly top: number;
  readonly field: WindField;
  /** What each station gave, in the order of the stations; NaN where it has nothing in the layer. */
  readonly points: readonly FieldPoint[];
  /** m/s at the layer's top, upward, by continuity from the ground; NaN once a layer below could not be had. */
  readonly verticalMotion: number;
  readonly verticalMotionUncertainty: number;
}

export interface TriangleTime {
  readonly timeMs: number;
  readonly stations: readonly string[];
  readonly layers: readonly TriangleLayer[];
  /** What limits the numbers, in words. */
  readonly notes: readonly string[];
}

/** Ascent of a balloon, m/s, for how far the wind carries it away (common practice, without source). */
const BALLOON_ASCENT = 5;
/** Grounds that differ by more, m, make layers above ground slope noticeably. Our own choice. */
const UNEVEN = 200;
/** So much of a layer must be measured; its mean is then that of the measured part. Our own choice. */
const LEAST_SHARE = 0.5;
/** A layer is measured when no gap between its levels is wider than this, m, or than twice the layer. Our own choice. */
const WIDEST_GAP = 500;

/**
 * Layers of one time.
 * @param profiles one a station
 */
export function triangleLayers(
  profiles: readonly Profile[],
  options: TriangleOptions = {},
): Pick<TriangleTime, 'layers' | 'notes'> {
  const { edges, toleranceS = TOLERANCE_S, humidityFor, ...shared } = options;
  const times = profiles.map((profile) => profile.timeMs);
  const apartS = (Math.max(...times) - Math.min(...times)) / 1000;
  const grounds = profiles.map((profile) => profile.station.elevation).filter((value) => Number.isFinite(value));
  const ground = grounds.reduce((sum, value) => sum + value, 0) / grounds.length;
  const uneven = Math.max(...grounds) - Math.min(...grounds);
  const notes: string[] = [];
  if (uneven > UNEVEN) notes.push(`the stations' grounds differ by ${Math.round(uneven)} m, layers follow each ground`);
  if (apartS > toleranceS) notes.push(`the profiles lie ${Math.round(apartS / 60)} min apart`);

  const columns = profiles.map((profile) =>
    stationColumn(profile, humidityFor === undefined ? shared : { ...shared, humidity: humidityFor(profile) }),
  );
  let [motion, variance, lastDensity] = [0, 0, NaN];
  const layers = layersFor(columns, edges).map(({ level, bottom, top }): TriangleLayer => {
    const points = columns.map((column) =>
      level === undefined ? layerMean(column, bottom, top) : windAtLevel(column, level),
    );
    const field = apartS > toleranceS ? apart(windField(points), apartS) : windField(points);
    // Continuity of air whose density falls with height: rho w at the top = rho w at the bottom - rho div dz.
    const middle = densityOf(ground, (bottom + top) / 2);
    const upper = densityOf(ground, top);
    const lower = Number.isNaN(lastDensity) ? densityOf(ground, bottom) : lastDensity;
    motion = (motion * lower - field.divergence * middle * (top - bottom)) / upper;
    variance = variance * (lower / upper) ** 2 + ((field.divergenceUncertainty * middle * (top - bottom)) / upper) ** 2;
    lastDensity = upper;
    return {
      heightAgl: level ?? (bottom + top) / 2,
      bottom,
      top,
      field,
      points,
      verticalMotion: motion,
      verticalMotionUncertainty: Math.sqrt(variance),
    };
  });
  return { layers, notes };
}

interface Layer {
  /** Shared level that stands for the layer; absent where its mean does. */
  readonly level?: number;
  readonly bottom: number;
  readonly top: number;
}

/** The levels that all stations share, where those are few and at least half of what the richest has; else usual layers. */
function layersFor(columns: readonly StationColumn[], edges: readonly number[] | undefined): Layer[] {
  const between = (given: readonly number[]): Layer[] => given.slice(1).map((top, k) => ({ bottom: given[k]!, top }));
  if (edges !== undefined) return between(edges);
  const levels = columns.map(({ uncertainty }) => uncertainty.heightAgl.filter((height) => height <= HIGHEST));
  const shared = [...(levels[0] ?? [])].filter((height) => levels.every((heights) => heights.includes(height)));
  const richest = Math.max(...levels.map((heights) => heights.length));
  if (shared.length === 0 || shared.length > FEW || 2 * shared.length < richest) return between(USUAL_EDGES);
  return shared.map((level, k) => {
    const bottom = k === 0 ? 0 : (shared[k - 1]! + level) / 2;
    const top = k === shared.length - 1 ? 2 * level - bottom : (level + shared[k + 1]!) / 2;
    return { level, bottom, top };
  });
}

/**
 * Layers through time. The station with the fewest profiles gives the times; of each other station the profile nearest in
 * time is taken.
 * @param series profiles of each station, ascending in time
 */
export function triangleThroughTime(
  series: readonly (readonly Profile[])[],
  options: TriangleOptions = {},
): TriangleTime[] {
  const measuring = series.filter((profiles) => profiles.length > 0);
  if (measuring.length === 0) return [];
  const fewest = measuring.reduce((least, profiles) => (profiles.length < least.length ? profiles : least));
  return fewest.map(({ timeMs }) => {
    const profiles = measuring.map((station) => nearestInTime(station, timeMs));
    return { timeMs, stations: profiles.map((profile) => profile.station.id), ...triangleLayers(profiles, options) };
  });
}

function nearestInTime(profiles: readonly Profile[], timeMs: number): Profile {
  return profiles.reduce((best, profile) =>
    Math.abs(profile.timeMs - timeMs) < Math.abs(best.timeMs - timeMs) ? profile : best,
  );
}

function apart(field: WindField, apartS: number): WindField {
  const nothing = windField([]);
  return { ...nothing, area: field.area, why: `the stations' profiles lie ${Math.round(apartS / 60)} min apart` };
}

interface StationColumn {
  readonly profile: Profile;
  readonly heightAgl: Float64Array;
  readonly u: Float64Array;
  readonly v: Float64Array;
  readonly specificHumidity: Float64Array;
  /** As a share of the humidity. */
  readonly humidityUncertainty: number;
  readonly uncertainty: { readonly heightAgl: Float64Array; readonly speed: Float64Array };
}

function stationColumn(profile: Profile, humidity: HumidityOptions): StationColumn {
  const { air, use } = humidAir(profile, humidity);
  const { heightAgl, u, v, specificHumidity } = air;
  const wind = gatherWind(profile, windColumn(profile.levelCount));
  completeUncertainty(wind, profile.instrument, NaN);
  return {
    profile,
    heightAgl,
    u,
    v,
    specificHumidity,
    humidityUncertainty: use.uncertainty,
    uncertainty: {
      heightAgl: wind.heightAgl.slice(0, wind.count),
      speed: wind.speedUncertainty.slice(0, wind.count),
    },
  };
}

function windAtLevel(column: StationColumn, level: number): FieldPoint {
  const at = column.heightAgl.indexOf(level);
  return pointOf(column, level, {
    u: column.u[at] ?? NaN,
    v: column.v[at] ?? NaN,
    specificHumidity: column.specificHumidity[at] ?? NaN,
    windUncertainty: layerUncertainty(column, level, level),
  });
}

function layerMean(column: StationColumn, bottom: number, top: number): FieldPoint {
  const mean = (values: readonly ArrayLike<number>[]): number[] => {
    const cut = cutLayer(column.heightAgl, values, bottom, top);
    const widest = Math.max(WIDEST_GAP, 2 * (top - bottom));
    const depth = cut === undefined ? 0 : cut.along.at(-1)! - cut.along[0]!;
    if (cut === undefined || depth < LEAST_SHARE * (top - bottom) || gapAround(column, values, bottom, top) > widest) {
      return values.map(() => NaN);
    }
    return cut.columns.map((kept) => integrate(cut, (k) => kept[k]!) / depth);
  };
  const [u, v] = mean([column.u, column.v]) as [number, number];
  const [specificHumidity] = mean([column.specificHumidity]) as [number];
  const windUncertainty = layerUncertainty(column, bottom, top);
  return pointOf(column, (bottom + top) / 2, { u, v, specificHumidity, windUncertainty });
}

function pointOf(
  { profile, humidityUncertainty }: StationColumn,
  height: number,
  wind: Required<Pick<FieldPoint, 'u' | 'v' | 'specificHumidity' | 'windUncertainty'>>,
): FieldPoint {
  return {
    ...wind,
    latitude: profile.station.latitude,
    longitude: profile.station.longitude,
    humidityUncertainty: humidityUncertainty * wind.specificHumidity,
    positionUncertainty: drift(profile.instrument, Math.hypot(wind.u, wind.v), height),
  };
}

/** Widest step between levels with values that overlaps the layer, m. */
function gapAround(column: StationColumn, values: readonly ArrayLike<number>[], bottom: number, top: number): number {
  let widest = 0;
  let previous = NaN;
  column.heightAgl.forEach((height, k) => {
    if (values.some((value) => Number.isNaN(value[k]!))) return;
    if (height > bottom && previous < top) widest = Math.max(widest, height - previous);
    previous = height;
  });
  return widest;
}

/** Of the mean of independent levels; where none lies in the layer, that of the nearest one. */
function layerUncertainty(column: StationColumn, bottom: number, top: number): number {
  const { heightAgl, speed } = column.uncertainty;
  let [count, squares, nearest, distance] = [0, 0, NaN, Infinity];
  heightAgl.forEach((height, k) => {
    const away = Math.abs(height - (bottom + top) / 2);
    if (away < distance) [nearest, distance] = [speed[k]!, away];
    if (height < bottom || height > top) return;
    count++;
    squares += speed[k]! ** 2;
  });
  return count === 0 ? nearest : Math.sqrt(squares) / count;
}

/** How far from its station the wind was measured, m: a balloon has drifted, the others stay. */
function drift(instrument: Instrument, speed: number, height: number): number {
  const flies = instrument === 'radiosonde' || instrument === 'pilot-balloon' || instrument === 'dropsonde';
  return flies && Number.isFinite(speed) ? (speed * height) / BALLOON_ASCENT : 0;
}

function densityOf(ground: number, heightAgl: number): number {
  return standardAtmosphere((Number.isNaN(ground) ? 0 : ground) + heightAgl).density;
}
