// Vapour carried through a layer. At limits between levels humidity, wind (and density) are each linear in the coordinate;
// then the trapezoid of the products.

import { directionOf, GRAVITY, speedOf } from '../air/index.ts';
import { cutLayer, integrate } from './layer.ts';

/** Vertically integrated vapour transport, kg/(m s); NaN where it could not be had. */
export interface Transport {
  readonly east: number;
  readonly north: number;
  /** Length of the vector. */
  readonly size: number;
  /** degrees, where the vapour comes from */
  readonly direction: number;
}

/** The transport of nothing known. */
export const NO_TRANSPORT: Transport = { east: NaN, north: NaN, size: NaN, direction: NaN };

/**
 * Vapour transport in the pressure form: (1/g) integral of q V dp (Zhu & Newell 1998, Mon. Wea. Rev. 126).
 * @param levels Pa, kg/kg, m/s; levels with a missing value are passed over
 * @param limits Pa; cut to the data, absent ones are the ends of the data
 */
export function transportByPressure(
  levels: {
    readonly pressure: ArrayLike<number>;
    readonly specificHumidity: ArrayLike<number>;
    readonly u: ArrayLike<number>;
    readonly v: ArrayLike<number>;
  },
  limits: { readonly bottom?: number | undefined; readonly top?: number | undefined } = {},
): Transport {
  const cut = cutLayer(levels.pressure, [levels.specificHumidity, levels.u, levels.v], limits.top, limits.bottom);
  if (cut === undefined) return NO_TRANSPORT;
  const [humidity, u, v] = cut.columns as Columns3;
  return transport(
    integrate(cut, (k) => humidity[k]! * u[k]!) / GRAVITY,
    integrate(cut, (k) => humidity[k]! * v[k]!) / GRAVITY,
  );
}

/**
 * Vapour transport in the height form: integral of rho q V dz.
 * @param levels m, kg/m3, kg/kg, m/s; levels with a missing value are passed over
 * @param limits m above ground; cut to the data, absent ones are the ends of the data
 */
export function transportByHeight(
  levels: {
    readonly heightAgl: ArrayLike<number>;
    readonly density: ArrayLike<number>;
    readonly specificHumidity: ArrayLike<number>;
    readonly u: ArrayLike<number>;
    readonly v: ArrayLike<number>;
  },
  limits: { readonly bottom?: number | undefined; readonly top?: number | undefined } = {},
): Transport & { readonly reaches: number } {
  const columns = [levels.density, levels.specificHumidity, levels.u, levels.v];
  const cut = cutLayer(levels.heightAgl, columns, limits.bottom, limits.top);
  if (cut === undefined) return { ...NO_TRANSPORT, reaches: NaN };
  const [density, humidity, u, v] = cut.columns as Columns4;
  return {
    ...transport(
      integrate(cut, (k) => density[k]! * humidity[k]! * u[k]!),
      integrate(cut, (k) => density[k]! * humidity[k]! * v[k]!),
    ),
    reaches: cut.along.at(-1)!,
  };
}

/**
 * Precipitable water of a layer, kg/m2: (1/g) integral of q dp (AMS Glossary).
 * @returns NaN where nothing of the layer was measured
 */
export function precipitableWater(
  levels: { readonly pressure: ArrayLike<number>; readonly specificHumidity: ArrayLike<number> },
  limits: { readonly bottom?: number | undefined; readonly top?: number | undefined } = {},
): number {
  const cut = cutLayer(levels.pressure, [levels.specificHumidity], limits.top, limits.bottom);
  return cut === undefined ? NaN : integrate(cut, (k) => cut.columns[0]![k]!) / GRAVITY;
}

/** Horizontal vapour flux density rho q V (Peixoto & Oort 1992), kg/(m2 s), one component. NaN in, NaN out. */
export function fluxOf(density: number, specificHumidity: number, component: number): number {
  return density * specificHumidity * component;
}

type Columns3 = readonly [Float64Array, Float64Array, Float64Array];
type Columns4 = readonly [Float64Array, Float64Array, Float64Array, Float64Array];

function transport(east: number, north: number): Transport {
  return { east, north, size: speedOf(east, north), direction: directionOf(east, north) };
}
