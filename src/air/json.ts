// The one place where missing numbers cross a JSON edge: NaN inside, null outside.

/** A number for JSON, rounded to so many decimals; missing and infinite become null. */
export function toJsonNumber(value: number, decimals: number): number | null {
  if (!Number.isFinite(value)) return null;
  const rounded = Number(value.toFixed(decimals));
  return rounded === 0 ? 0 : rounded;
}

/** A column for JSON, each value as by `toJsonNumber`. */
export function toJsonNumbers(values: ArrayLike<number>, decimals: number): (number | null)[] {
  return Array.from(values, (value) => toJsonNumber(value, decimals));
}

/** A number out of JSON: null, absent and anything that is no number become NaN. */
export function fromJsonNumber(value: unknown): number {
  return typeof value === 'number' ? value : NaN;
}
