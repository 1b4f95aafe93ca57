// Times of the invented nights.

const MINUTE_MS = 60_000;

/** UTC ms of an ISO time with its zone. */
export function at(iso: string): number {
  const ms = Date.parse(iso);
  if (Number.isNaN(ms)) throw new Error(`No time: ${iso}`);
  return ms;
}

/** Times every so many minutes, both ends included. */
export function everyMinutes(minutes: number, startMs: number, endMs: number): number[] {
  const times: number[] = [];
  for (let ms = startMs; ms <= endMs; ms += minutes * MINUTE_MS) times.push(ms);
  return times;
}

/** ISO time in UTC to the second, `2024-05-22T01:40:00Z`. */
export function isoSeconds(timeMs: number): string {
  return new Date(timeMs).toISOString().replace('.000', '');
}

/** Rises smoothly from 0 to 1 between two times. */
export function ramp(timeMs: number, startMs: number, endMs: number): number {
  const share = Math.min(1, Math.max(0, (timeMs - startMs) / (endMs - startMs)));
  return share * share * (3 - 2 * share);
}

/** A spell, both ends included. */
export interface Spell {
  readonly startMs: number;
  readonly endMs: number;
}

export function spell(startIso: string, endIso: string): Spell {
  return { startMs: at(startIso), endMs: at(endIso) };
}

export function within(timeMs: number, spells: readonly Spell[]): boolean {
  return spells.some(({ startMs, endMs }) => timeMs >= startMs && timeMs <= endMs);
}
