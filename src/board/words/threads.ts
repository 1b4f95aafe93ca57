// The night's jets as threads through the section, and the turbines as discs beside it.

import type { NightState } from '../../desk/index.ts';
import type { TrackPoint } from '../../jet/index.ts';
import type { Disc, Thread } from '../../plot/index.ts';
import type { Site } from '../../site/index.ts';

/** Points further apart than this many intervals are not joined. */
const JOIN_INTERVALS = 3.5;

/** A thread for each track, those that last still first; it is broken where a track has a gap, since nobody saw what lay between. */
export function threadsOf(night: NightState, stepMs: number): Thread[] {
  const lastingFirst = [...night.tracks].sort((a, b) => Number(a.endedMs !== null) - Number(b.endedMs !== null));
  return lastingFirst.map(({ points }) => {
    const withGaps = points.flatMap((point) => (point.afterGap ? [null, point] : [point]));
    const column = (value: (point: TrackPoint) => number): number[] =>
      withGaps.map((point) => (point === null ? NaN : value(point)));
    return {
      timeMs: withGaps.map((point, k) => point?.timeMs ?? withGaps[k - 1]?.timeMs ?? NaN),
      height: column((point) => point.noseHeight),
      low: column((point) => point.noseHeight - point.heightSpread),
      high: column((point) => point.noseHeight + point.heightSpread),
      kind: 'observed',
      joinMs: JOIN_INTERVALS * stepMs,
    };
  });
}

export function discsOf(site: Site): Disc[] {
  return site.turbines.map(({ name, hubHeight, rotorDiameter }) => ({ name, hubHeight, rotorDiameter }));
}
