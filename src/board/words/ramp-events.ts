// Ramps as events of the night: one that meets several definitions is told once.

import type { FarmRamp } from '../../desk/index.ts';
import { causeInWords, rampInWords } from '../../rotor/index.ts';
import type { TimeWords } from './time.ts';

export interface RampEvent {
  readonly startMs: number;
  readonly endMs: number;
  readonly changeKw: number;
  /** `↑ 91 MW` */
  readonly mark: string;
  readonly words: string;
  /** What else speaks to it; empty where nothing does. */
  readonly also: string;
  readonly definitions: readonly string[];
}

/** Ascending in time. Of overlapping ramps of one sense the largest speaks. */
export function rampEvents(ramps: readonly FarmRamp[], times: TimeWords): RampEvent[] {
  const groups: FarmRamp[][] = [];
  for (const each of [...ramps].sort((a, b) => a.ramp.startMs - b.ramp.startMs)) {
    const group = groups.find((members) =>
      members.some(
        ({ ramp }) =>
          ramp.sense === each.ramp.sense && each.ramp.startMs < ramp.endMs && each.ramp.endMs > ramp.startMs,
      ),
    );
    if (group === undefined) groups.push([each]);
    else group.push(each);
  }
  return groups.map((group) => {
    const { ramp, causes } = group.reduce((largest, each) =>
      Math.abs(each.ramp.changeKw) > Math.abs(largest.ramp.changeKw) ? each : largest,
    );
    const clock = (timeMs: number): string => times.clock(timeMs);
    return {
      startMs: ramp.startMs,
      endMs: ramp.endMs,
      changeKw: ramp.changeKw,
      mark: `${ramp.sense === 'up' ? '↑' : '↓'} ${Math.abs(ramp.changeKw / 1000).toFixed(0)} MW`,
      words: rampInWords(ramp, causes, clock),
      also: causes
        .slice(1)
        .map((cause) => causeInWords(cause, clock))
        .join('; '),
      definitions: [...new Set(group.map((each) => each.ramp.definition))],
    };
  });
}
