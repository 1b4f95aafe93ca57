// Is tonight's transport strong for the month and the hour? Its rank among what was measured on other days.

/** Transport at many times, from the open record or from an archive's table. */
export interface TransportHistory {
  /** UTC ms, any order. */
  readonly timeMs: ArrayLike<number>;
  /** kg/(m s) below 3 km, in parallel; NaN where not known. */
  readonly below3Km: ArrayLike<number>;
  /** Where it comes from, in words: `the record that is open`. */
  readonly source: string;
}

export interface UsualTransport {
  readonly status: 'ok' | 'not-assessable';
  /** In words; empty when ok. */
  readonly why: string;
  /** Of a hundred days so many carried less; NaN where not assessable. */
  readonly percentile: number;
  /** Days it rests on: one value each, that nearest to the hour. */
  readonly days: number;
  /** Days below which nothing is said. */
  readonly least: number;
  readonly source: string;
  /** kg/(m s): the middle of those days; NaN where not assessable. */
  readonly median: number;
}

/** Fewer days make no distribution to speak of. Our own choice. */
const LEAST_DAYS = 20;
const HOUR_MS = 3_600_000;
const DAY_MS = 24 * HOUR_MS;
/** As far from the hour of day a value still speaks for it. */
const NEAR_MS = 1.5 * HOUR_MS;

/** Whether a moment of another day falls in the month and about the hour of this one, by UTC. */
export function isAlike(timeMs: number, atMs: number): boolean {
  if (new Date(timeMs).getUTCMonth() !== new Date(atMs).getUTCMonth()) return false;
  return Math.abs(fromHour(timeMs, atMs)) <= NEAR_MS && Math.abs(timeMs - atMs) > DAY_MS / 2;
}

/** ms by which a moment lies after the same hour of its own day, -12 h to 12 h. */
function fromHour(timeMs: number, atMs: number): number {
  const apart = timeMs - atMs;
  return apart - DAY_MS * Math.round(apart / DAY_MS);
}

/** The rank of a transport among those of other days; of several histories the one with the most days speaks. */
export function usualTransport(atMs: number, below3Km: number, histories: readonly TransportHistory[]): UsualTransport {
  const ranked = histories.map((history) => ({ history, sizes: sizesByDay(atMs, history) }));
  const best = ranked.reduce<(typeof ranked)[number] | undefined>(
    (most, each) => (most === undefined || each.sizes.length > most.sizes.length ? each : most),
    undefined,
  );
  const days = best?.sizes.length ?? 0;
  const source = best?.history.source ?? '';
  const refuse = (why: string): UsualTransport => ({
    status: 'not-assessable',
    why,
    percentile: NaN,
    days,
    least: LEAST_DAYS,
    source,
    median: NaN,
  });
  if (best === undefined || days < LEAST_DAYS)
    return refuse(`too few days of this month and hour: ${days} of ${LEAST_DAYS}`);
  if (!Number.isFinite(below3Km)) return refuse('the transport now is not known');
  const sizes = best.sizes.sort((a, b) => a - b);
  const less = sizes.filter((size) => size < below3Km).length;
  const equal = sizes.filter((size) => size === below3Km).length;
  const middle = sizes.length / 2;
  return {
    status: 'ok',
    why: '',
    percentile: (100 * (less + equal / 2)) / days,
    days,
    least: LEAST_DAYS,
    source,
    median: (sizes[Math.floor(middle - 0.5)]! + sizes[Math.ceil(middle - 0.5)]!) / 2,
  };
}

/** One value a day: that nearest to the hour. */
function sizesByDay(atMs: number, { timeMs, below3Km }: TransportHistory): number[] {
  const days = new Map<number, { away: number; size: number }>();
  for (let k = 0; k < timeMs.length; k++) {
    if (!Number.isFinite(below3Km[k]!) || !isAlike(timeMs[k]!, atMs)) continue;
    const away = Math.abs(fromHour(timeMs[k]!, atMs));
    const day = Math.round((timeMs[k]! - atMs) / DAY_MS);
    const known = days.get(day);
    if (known === undefined || away < known.away) days.set(day, { away, size: below3Km[k]! });
  }
  return [...days.values()].map(({ size }) => size);
}
