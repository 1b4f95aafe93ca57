// Numbers that may not be had: each carries its reason in words.

/** A number, or NaN with the reason. */
export interface Figure {
  readonly value: number;
  /** Empty when the value is known. */
  readonly why: string;
}

/** A horizontal vector, m/s eastward and northward, or NaN with the reason. */
export interface VectorFigure {
  readonly u: number;
  readonly v: number;
  /** Empty when the vector is known. */
  readonly why: string;
}

export function figure(value: number, whyNot = ''): Figure {
  return { value, why: Number.isNaN(value) ? whyNot : '' };
}

export function vectorFigure(u: number, v: number): VectorFigure {
  return { u, v, why: '' };
}

export function noVector(why: string): VectorFigure {
  return { u: NaN, v: NaN, why };
}

/** Hectopascals in words, `850 hPa`. */
export function hectopascals(pressure: number): string {
  return `${(pressure / 100).toFixed(0)} hPa`;
}

/** Metres in words, `1500 m`. */
export function metres(height: number): string {
  return `${height.toFixed(0)} m`;
}
