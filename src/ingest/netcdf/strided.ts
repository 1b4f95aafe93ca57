// Values of a variable laid out anew for other dimensions: reordered, repeated, reversed.

import { sizeOf } from './dataset.ts';

/** Where a value lies: `at` plus, for each target dimension, its index times its stride. */
export interface Strides {
  readonly at: number;
  /** Stride by target dimension; 0 repeats the value along it. */
  readonly by: readonly number[];
}

/**
 * Strides that lay `dimensions` out over `target`.
 * @returns null when the variable has a dimension longer than 1 that the target lacks
 */
export function stridesFor(
  dimensions: readonly string[],
  shape: readonly number[],
  target: readonly string[],
): Strides | null {
  const by = target.map(() => 0);
  let stride = 1;
  for (let axis = dimensions.length - 1; axis >= 0; axis--) {
    const position = target.indexOf(dimensions[axis]!);
    if (position >= 0) by[position]! += stride;
    else if (shape[axis] !== 1) return null;
    stride *= shape[axis]!;
  }
  return { at: 0, by };
}

/** Fills `out`, flat and as large as `shape`, with the values at those strides. */
export function layOutInto(
  out: Float32Array | Float64Array,
  values: ArrayLike<number>,
  strides: Strides,
  shape: readonly number[],
): void {
  const inner = shape.at(-1) ?? 1;
  const innerStride = strides.by.at(-1) ?? 0;
  const outer = shape.slice(0, -1);
  const index = outer.map(() => 0);
  const runs = inner === 0 ? 0 : sizeOf(outer);
  let from = strides.at;
  let to = 0;
  for (let run = 0; run < runs; run++) {
    for (let k = 0, source = from; k < inner; k++, source += innerStride) out[to++] = values[source]!;
    for (let axis = outer.length - 1; axis >= 0; axis--) {
      from += strides.by[axis]!;
      if (++index[axis]! < outer[axis]!) break;
      from -= strides.by[axis]! * outer[axis]!;
      index[axis] = 0;
    }
  }
}
