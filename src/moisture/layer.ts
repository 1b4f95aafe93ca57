// Integrals over a layer of measured levels: cut to what was measured, each factor linear between levels, then the trapezoid
// of the products.

/** Columns over one ascending coordinate, no value missing. */
export interface Cut {
  readonly along: Float64Array;
  readonly columns: readonly Float64Array[];
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
  const order = knownInOrder(along, columns);
  const last = order.length - 1;
  if (last < 1) return undefined;
  const from = Math.max(low, along[order[0]!]!);
  const to = Math.min(high, along[order[last]!]!);
  if (!(to > from)) return undefined;

  let first = 0;
  while (along[order[first]!]! < from) first++;
  let end = last;
  while (along[order[end]!]! > to) end--;
  const before = along[order[first]!]! > from;
  const after = along[order[end]!]! < to;
  const cut = (values: ArrayLike<number>): Float64Array => {
    const kept = new Float64Array(end - first + 1 + Number(before) + Number(after));
    let count = 0;
    if (before) kept[count++] = linear(along, values, order[first - 1]!, order[first]!, from);
    for (let k = first; k <= end; k++) kept[count++] = values[order[k]!]!;
    if (after) kept[count] = linear(along, values, order[end]!, order[end + 1]!, to);
    return kept;
  };
  return { along: cut(along), columns: columns.map(cut) };
}

function knownInOrder(along: ArrayLike<number>, columns: readonly ArrayLike<number>[]): Uint32Array {
  const order = new Uint32Array(along.length);
  let count = 0;
  let [ascending, descending] = [true, true];
  for (let k = 0; k < along.length; k++) {
    // A sum is finite only if every part of it is.
    let sum = along[k]!;
    for (const column of columns) sum += column[k]!;
    if (sum - sum !== 0) continue;
    if (count > 0) {
      const step = along[k]! - along[order[count - 1]!]!;
      if (step < 0) ascending = false;
      if (step > 0) descending = false;
    }
    order[count++] = k;
  }
  const known = order.subarray(0, count);
  if (ascending) return known;
  return descending ? known.reverse() : known.sort((a, b) => along[a]! - along[b]!);
}

function linear(along: ArrayLike<number>, values: ArrayLike<number>, below: number, above: number, at: number): number {
  const weight = (at - along[below]!) / (along[above]! - along[below]!);
  return values[below]! * (1 - weight) + values[above]! * weight;
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
