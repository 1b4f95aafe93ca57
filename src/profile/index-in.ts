// Small tables of distinct things, numbered as they are met.

/** Number of `wanted` in the table, which grows by it when it is new. */
export function indexIn<T>(known: T[], wanted: T, same: (a: T, b: T) => boolean): number {
  // Searched from the end: successive profiles nearly always share station and source.
  for (let index = known.length - 1; index >= 0; index--) if (same(known[index]!, wanted)) return index;
  return known.push(wanted) - 1;
}
