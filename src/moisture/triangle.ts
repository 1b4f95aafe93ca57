// Divergence, vorticity and moisture-flux divergence between stations, layer by layer, and the vertical motion they imply.

import { standardAtmosphere } from '../air/index.ts';
import { completeUncertainty } from '../jet/index.ts';
import { gatherWind, windColumn, type Instrument, type Profile } from '../profile/index.ts';
import { humidAir, type HumidityOptions } from './humid-air.ts';
import { cutLayer, integrate } from './layer.ts';
import { windField, type FieldPoint, type WindField } from './wind-field.ts';

export interface TriangleOptions extends HumidityOptions {
  /** m above ground: layers between successive edges, ascending. */
  readonly edges: readonly number[];
  /** s by which profiles may lie apart. */
  readonly toleranceS: number;
}

/** Layers of a quarter kilometre to 3 km; profiles of the same quarter of an hour. */
export const TRIANGLE_DEFAULTS: TriangleOptions = {
  edges: Array.from({ length: 13 }, (_, k) => 250 * k),
  toleranceS: 900,
};

export interface TriangleLayer {
  /** Middle and bounds, m above each station's ground. */
  readonly heightAgl: number;
  readonly bottom: number;
  readonly top: number;
  readonly field: WindField;
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
  options: Partial<TriangleOptions> = {},
): Pick<TriangleTime, 'layers' | 'notes'> {
  const { edges, toleranceS, ...humidity } = { ...TRIANGLE_DEFAULTS, ...options };
  const times = profiles.map((profile) => profile.timeMs);
  const apartS = (Math.max(...times) - Math.min(...times)) / 1000;
  const grounds = profiles.map((profile) => profile.station.elevation).filter((value) => Number.isFinite(value));
  const ground = grounds.reduce((sum, value) => sum + value, 0) / grounds.length;
  const uneven = Math.max(...grounds) - Math.min(...grounds);
  const notes: string[] = [];
  if (uneven > UNEVEN) notes.push(`the stations' grounds differ by ${Math.round(uneven)} m, layers follow each ground`);
  if (apartS > toleranceS) notes.push(`the profiles lie ${Math.round(apartS / 60)} min apart`);

  const columns = profiles.map((profile) => stationColumn(profile, humidity));
  let [motion, variance, lastDensity] = [0, 0, NaN];
  const layers = edges.slice(1).map((top, k): TriangleLayer => {
    const bottom = edges[k]!;
    const points = columns.map((column) => layerMean(column, bottom, top));
    const field = apartS > toleranceS ? apart(windField(points), apartS) : windField(points);
    // Continuity of air whose density falls with height: rho w at the top = rho w at the bottom - rho div dz.
    const middle = densityOf(ground, (bottom + top) / 2);
    const upper = densityOf(ground, top);
    const lower = Number.isNaN(lastDensity) ? densityOf(ground, bottom) : lastDensity;
    motion = (motion * lower - field.divergence * middle * (top - bottom)) / upper;
    variance = variance * (lower / upper) ** 2 + ((field.divergenceUncertainty * middle * (top - bottom)) / upper) ** 2;
    lastDensity = upper;
    return {
      heightAgl: (bottom + top) / 2,
      bottom,
      top,
      field,
      verticalMotion: motion,
      verticalMotionUncertainty: Math.sqrt(variance),
    };
  });
  return { layers, notes };
}

/**
 * Layers through time. The station with the fewest profiles gives the times; of each other station the profile nearest in
 * time is taken.
 * @param series profiles of each station, ascending in time
 */
export function triangleThroughTime(
  series: readonly (readonly Profile[])[],
  options: Partial<TriangleOptions> = {},
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

function layerMean(column: StationColumn, bottom: number, top: number): FieldPoint {
  const { station, instrument } = column.profile;
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
  return {
    latitude: station.latitude,
    longitude: station.longitude,
    u,
    v,
    specificHumidity,
    windUncertainty: layerUncertainty(column, bottom, top),
    humidityUncertainty: column.humidityUncertainty * specificHumidity,
    positionUncertainty: drift(instrument, Math.hypot(u, v), (bottom + top) / 2),
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
