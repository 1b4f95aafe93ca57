// Whether the moist air came when it was told to: arrivals told against surges that then came.

import type { Arrival } from './arrival.ts';

/** A rise of humidity at a station. */
export interface Surge {
  /** UTC ms at which half of the rise was done, linear between samples. */
  readonly timeMs: number;
  /** kg/kg */
  readonly rise: number;
}

export interface SurgeRule {
  /** kg/kg that the humidity must rise … */
  readonly rise: number;
  /** … within so many seconds. */
  readonly withinS: number;
}

/** A gram a kilogram within three hours. Our own choice. */
export const SURGE_RULE: SurgeRule = { rise: 0.001, withinS: 3 * 3600 };

/**
 * Rises of humidity in a series: from each low to the high that follows within the time, one surge for rises that overlap.
 * @param timeMs ascending
 * @param specificHumidity kg/kg; NaN is passed over
 */
export function findSurges(
  timeMs: ArrayLike<number>,
  specificHumidity: ArrayLike<number>,
  rule: SurgeRule = SURGE_RULE,
): Surge[] {
  const known = Array.from({ length: timeMs.length }, (_, k) => k).filter((k) => Number.isFinite(specificHumidity[k]!));
  const value = (position: number): number => specificHumidity[known[position]!]!;
  const time = (position: number): number => timeMs[known[position]!]!;
  const surges: Surge[] = [];
  let low = 0;
  for (let k = 1; k < known.length; k++) {
    while (time(k) - time(low) > rule.withinS * 1000) low++;
    for (let earlier = low; earlier < k; earlier++) if (value(earlier) <= value(low)) low = earlier;
    if (value(k) - value(low) < rule.rise) continue;
    let high = k;
    while (high + 1 < known.length && value(high + 1) >= value(high)) high++;
    const half = (value(low) + value(high)) / 2;
    let above = low + 1;
    while (value(above) < half) above++;
    const weight = (half - value(above - 1)) / (value(above) - value(above - 1));
    surges.push({ timeMs: time(above - 1) + weight * (time(above) - time(above - 1)), rise: value(high) - value(low) });
    low = high;
    k = high;
  }
  return surges;
}

export interface ArrivalScore {
  /** Told and came, told and did not come, came untold. */
  readonly hits: number;
  readonly falseAlarms: number;
  readonly misses: number;
  /** s, came minus told, of the hits; NaN without any. */
  readonly meanErrorS: number;
  readonly meanAbsoluteErrorS: number;
  /** Share of the hits that came within the bounds told. */
  readonly withinBounds: number;
}

/** A told arrival and the surge that came; null where none did. */
export interface ArrivalMatch {
  readonly told: Arrival;
  readonly came: Surge | null;
}

/**
 * Matches each told arrival that is on its way with the nearest surge not yet matched within the tolerance, the closest
 * pairs first; in the order told.
 * @param toleranceS s
 */
export function matchArrivals(told: readonly Arrival[], came: readonly Surge[], toleranceS: number): ArrivalMatch[] {
  const due = told.filter((arrival) => arrival.status === 'on-its-way');
  const pairs = due
    .flatMap((arrival) => came.map((surge) => ({ arrival, surge, apart: Math.abs(surge.timeMs - arrival.arrivesMs) })))
    .filter(({ apart }) => apart <= 1000 * toleranceS)
    .sort((a, b) => a.apart - b.apart);
  const matched = new Map<Arrival, Surge>();
  const taken = new Set<Surge>();
  for (const { arrival, surge } of pairs) {
    if (matched.has(arrival) || taken.has(surge)) continue;
    matched.set(arrival, surge);
    taken.add(surge);
  }
  return due.map((arrival) => ({ told: arrival, came: matched.get(arrival) ?? null }));
}

/**
 * Scores arrivals against surges as `matchArrivals` pairs them.
 * @param told arrivals of which only those on their way count
 * @param toleranceS s
 */
export function scoreArrivals(told: readonly Arrival[], came: readonly Surge[], toleranceS: number): ArrivalScore {
  const matches = matchArrivals(told, came, toleranceS);
  const hits = matches.flatMap(({ told: arrival, came: surge }) => (surge === null ? [] : [{ arrival, surge }]));
  const mean = (of: (hit: (typeof hits)[number]) => number): number =>
    hits.reduce((sum, hit) => sum + of(hit), 0) / hits.length;
  const errorS = ({ arrival, surge }: (typeof hits)[number]): number => (surge.timeMs - arrival.arrivesMs) / 1000;
  return {
    hits: hits.length,
    falseAlarms: matches.length - hits.length,
    misses: came.length - hits.length,
    meanErrorS: mean(errorS),
    meanAbsoluteErrorS: mean((hit) => Math.abs(errorS(hit))),
    withinBounds: mean(({ arrival, surge }) =>
      surge.timeMs >= arrival.earliestMs && surge.timeMs <= arrival.latestMs ? 1 : 0,
    ),
  };
}
