// How the house writes values into JSON: every key with its unit, every number with the digits it deserves.

/** UTC to the second, or to the millisecond where there are any: `2024-05-22T01:40:00Z`. */
export function isoTime(timeMs: number): string | null {
  return Number.isFinite(timeMs) ? new Date(timeMs).toISOString().replace('.000Z', 'Z') : null;
}

/** Decimals by quantity: what instruments resolve, and one digit more where arithmetic follows. */
export const DECIMALS = {
  height: 2,
  speed: 3,
  direction: 2,
  pressure: 1,
  temperature: 2,
  degrees: 5,
  share: 4,
  density: 4,
  exponent: 4,
  power: 1,
  water: 3,
  transport: 3,
  flux: 6,
  energy: 2,
  area: 1,
} as const;
