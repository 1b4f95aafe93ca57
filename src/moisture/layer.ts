// Integrals over a layer of measured levels: cut to what was measured, each factor linear between levels, then the trapezoid
// of the products.

/** Columns over one ascending coordinate, no value missing. */
export interface Cut {
  readonly along: readonly number[];
  readonly columns: readonly (readonly number[])[];
}

/**
 * Keeps the levels at which every column is known, orders them by the coordinate and cuts them to the limits; at a limit
 * between levels each column is linear.
 * @param along coordinate, in any order
 * @param low lower limit of the coordinate; a limit outside the levels is that of the levels
 * @returns undefined where nothing of the layer is left
 */
export function cutLayer(
  along: ArrayLike<number>,
  columns: readonly ArrayLike<number>[],
  low = -Infinity,
  high = Infinity,
): Cut | undefined {
  const order: number[] = [];
  for (let k = 0; k < along.length; k++) {
    if (Number.isFinite(along[k]!) && columns.every((column) => Number.isFinite(column[k]!))) order.push(k);
  }
  order.sort((a, b) => along[a]! - along[b]!);
  if (order.length < 2) return undefined;
  const from = Math.max(low, along[order[0]!]!);
  const to = Math.min(high, along[order.at(-1)!]!);
  if (!(to > from)) return undefined;

  const keptAlong: number[] = [];
  const kept = columns.map((): number[] => []);
  const add = (at: number, below: number, above: number): void => {
    const span = along[above]! - along[below]!;
    const weight = span > 0 ? (at - along[below]!) / span : 0;
    keptAlong.push(at);
    columns.forEach((column, c) => kept[c]!.push(column[below]! * (1 - weight) + column[above]! * weight));
  };
  for (let position = 0; position < order.length; position++) {
    const level = order[position]!;
    const next = order[position + 1];
    if (along[level]! >= from && along[level]! <= to) add(along[level]!, level, level);
    if (next === undefined) break;
    if (along[level]! < from && along[next]! > from) add(from, level, next);
    if (along[level]! < to && along[next]! > to) add(to, level, next);
  }
  return { along: keptAlong, columns: kept };
}

/** Trapezoid of a product of columns of the cut over its coordinate. */
export function integrate(cut: Cut, product: (level: number) => number): number {
  let sum = 0;
  let previous = product(0);
  for (let k = 1; k < cut.along.length; k++) {
    const value = product(k);
    sum += ((previous + value) / 2) * (cut.along[k]! - cut.along[k - 1]!);
    previous = value;
  }
  return sum;
}
