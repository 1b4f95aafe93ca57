// How the wind through three or more stations spreads, turns and gathers moisture: Bellamy (1949, Bull. Amer. Meteor. Soc. 30)
// for three, the linear least-squares fit for more.

import { EARTH_RADIUS, signedAngle } from '../air/index.ts';
import { convexHull, hullArea, leastWidth, longestSide, type Point } from './hull.ts';

export interface FieldPoint {
  /** degrees */
  readonly latitude: number;
  readonly longitude: number;
  /** m/s, eastward and northward; NaN missing */
  readonly u: number;
  readonly v: number;
  /** kg/kg; NaN missing */
  readonly specificHumidity: number;
  /** Standard uncertainty of u and of v, m/s; absent or NaN: not known. */
  readonly windUncertainty?: number;
  /** The same of the humidity, kg/kg. */
  readonly humidityUncertainty?: number;
  /** The same of the place along each axis, m (drift of a balloon, width of a beam). */
  readonly positionUncertainty?: number;
}

/** NaN where not computable. Divergences per second; moisture-flux divergence of q V with q in kg/kg. */
export interface WindField {
  readonly status: 'ok' | 'not-assessable';
  readonly why: string;
  /** m2 within the outermost stations */
  readonly area: number;
  readonly divergence: number;
  readonly vorticity: number;
  readonly moistureFluxDivergence: number;
  /** Standard uncertainties that wind, humidity and place bring; NaN where those are not known. */
  readonly divergenceUncertainty: number;
  readonly vorticityUncertainty: number;
  readonly moistureFluxDivergenceUncertainty: number;
  /** Root mean square of what the linear field leaves unexplained, m/s; 0 for three stations. */
  readonly residual: number;
}

const DEGREE = Math.PI / 180;
/** Stations this close to one line, as a share of the longest distance, carry no field (checks of the triangle). */
const LEAST_WIDTH = 0.01;

/**
 * Divergence, vorticity and moisture-flux divergence of the linear wind field through stations on a local plane:
 * x = a cos(mean latitude) dlon, y = a dlat, no map-curvature term.
 * A station without wind is left out where three others remain.
 */
export function windField(points: readonly FieldPoint[]): WindField {
  const placed = points.filter((point) => Number.isFinite(point.latitude) && Number.isFinite(point.longitude));
  const windy = placed.filter((point) => Number.isFinite(point.u) && Number.isFinite(point.v));
  const used = windy.length >= 3 ? windy : placed;
  const plane = onPlane(used);
  const hull = convexHull(plane);
  const area = hullArea(hull);
  const refuse = (why: string): WindField => ({ ...NOTHING, area, why });
  if (placed.length < 3) return refuse(`only ${placed.length} stations with a position, three are needed`);
  if (windy.length < 3) return refuse(`only ${windy.length} stations with wind, three are needed`);
  const width = leastWidth(hull);
  if (!(width > 0 && width >= LEAST_WIDTH * longestSide(hull))) return refuse('the stations lie on one line');

  const slopes = slopeWeights(plane);
  const along = (axis: Float64Array, value: (point: FieldPoint) => number): number =>
    used.reduce((sum, point, k) => sum + axis[k]! * value(point), 0);
  const ux = along(slopes.x, (point) => point.u);
  const uy = along(slopes.y, (point) => point.u);
  const vx = along(slopes.x, (point) => point.v);
  const vy = along(slopes.y, (point) => point.v);
  const quadrature = (term: (point: FieldPoint, x: number, y: number) => number): number =>
    Math.sqrt(used.reduce((sum, point, k) => sum + term(point, slopes.x[k]!, slopes.y[k]!), 0));
  // A station displaced by d sees another wind by the field's own gradient times d.
  const uSpread = (point: FieldPoint): number => spreadOf(point, ux, uy);
  const vSpread = (point: FieldPoint): number => spreadOf(point, vx, vy);
  return {
    status: 'ok',
    why: '',
    area,
    divergence: ux + vy,
    vorticity: vx - uy,
    moistureFluxDivergence:
      along(slopes.x, (point) => point.specificHumidity * point.u) +
      along(slopes.y, (point) => point.specificHumidity * point.v),
    divergenceUncertainty: quadrature((point, x, y) => x * x * uSpread(point) + y * y * vSpread(point)),
    vorticityUncertainty: quadrature((point, x, y) => x * x * vSpread(point) + y * y * uSpread(point)),
    moistureFluxDivergenceUncertainty: quadrature(
      (point, x, y) =>
        point.specificHumidity ** 2 * (x * x * uSpread(point) + y * y * vSpread(point)) +
        (x * point.u + y * point.v) ** 2 * (point.humidityUncertainty ?? NaN) ** 2,
    ),
    residual: residual(used, plane, { ux, uy, vx, vy }),
  };
}

const NOTHING: WindField = {
  status: 'not-assessable',
  why: '',
  area: NaN,
  divergence: NaN,
  vorticity: NaN,
  moistureFluxDivergence: NaN,
  divergenceUncertainty: NaN,
  vorticityUncertainty: NaN,
  moistureFluxDivergenceUncertainty: NaN,
  residual: NaN,
};

function onPlane(points: readonly FieldPoint[]): Point[] {
  const first = points[0];
  if (first === undefined) return [];
  const meanLatitude = points.reduce((sum, point) => sum + point.latitude, 0) / points.length;
  const perDegree = EARTH_RADIUS * DEGREE;
  return points.map((point) => ({
    x: perDegree * Math.cos(meanLatitude * DEGREE) * signedAngle(point.longitude - first.longitude),
    y: perDegree * (point.latitude - first.latitude),
  }));
}

/** Weights on the stations' values that give the slopes of the least-squares plane along x and y. */
function slopeWeights(plane: readonly Point[]): { x: Float64Array; y: Float64Array } {
  const centre = mean(plane);
  let [xx, xy, yy] = [0, 0, 0];
  const departures = plane.map((point) => ({ x: point.x - centre.x, y: point.y - centre.y }));
  for (const { x, y } of departures) {
    xx += x * x;
    xy += x * y;
    yy += y * y;
  }
  const determinant = xx * yy - xy * xy;
  return {
    x: Float64Array.from(departures, ({ x, y }) => (yy * x - xy * y) / determinant),
    y: Float64Array.from(departures, ({ x, y }) => (xx * y - xy * x) / determinant),
  };
}

function mean(plane: readonly Point[]): Point {
  return {
    x: plane.reduce((sum, point) => sum + point.x, 0) / plane.length,
    y: plane.reduce((sum, point) => sum + point.y, 0) / plane.length,
  };
}

function spreadOf(point: FieldPoint, gradientX: number, gradientY: number): number {
  const place = (point.positionUncertainty ?? 0) ** 2 * (gradientX ** 2 + gradientY ** 2);
  return (point.windUncertainty ?? NaN) ** 2 + place;
}

function residual(
  points: readonly FieldPoint[],
  plane: readonly Point[],
  slope: { readonly ux: number; readonly uy: number; readonly vx: number; readonly vy: number },
): number {
  if (points.length === 3) return 0;
  const centre = mean(plane);
  const meanU = points.reduce((sum, point) => sum + point.u, 0) / points.length;
  const meanV = points.reduce((sum, point) => sum + point.v, 0) / points.length;
  const squares = points.reduce((sum, point, k) => {
    const [x, y] = [plane[k]!.x - centre.x, plane[k]!.y - centre.y];
    return (
      sum + (point.u - meanU - slope.ux * x - slope.uy * y) ** 2 + (point.v - meanV - slope.vx * x - slope.vy * y) ** 2
    );
  }, 0);
  return Math.sqrt(squares / points.length);
}
