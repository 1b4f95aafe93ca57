import { describe, expect, it } from 'vitest';
import { BlockBuilder, pickProfiles, profileAt, unplacedStation, type ProfileBlock } from '../../src/profile/index.ts';

function blockOf(id: string, times: number[], withTemperature: boolean): ProfileBlock {
  const builder = new BlockBuilder();
  for (const timeMs of times) {
    builder.add({
      station: unplacedStation(id),
      source: `${id}.csv`,
      instrument: 'lidar',
      timeMs,
      periodS: 600,
      notes: timeMs === 2 ? ['second'] : [],
      levels: {
        heightAgl: [10, 20],
        speed: [timeMs, timeMs + 0.5],
        direction: [180, 190],
        ...(withTemperature ? { temperature: [280 + timeMs, 281] } : {}),
      },
    });
  }
  return builder.finish();
}

describe('pickProfiles', () => {
  it('puts profiles of several blocks into the order asked for, with stations, sources and notes', () => {
    const a = blockOf('a', [1, 2], true);
    const b = blockOf('b', [3], false);
    const both = pickProfiles([
      { block: b, index: 0 },
      { block: a, index: 1 },
    ]);
    expect(both.stations.map((station) => station.id)).toEqual(['b', 'a']);
    const first = profileAt(both, 0);
    const second = profileAt(both, 1);
    expect([first.source, second.source]).toEqual(['b.csv', 'a.csv']);
    expect(second.notes).toEqual(['second']);
    expect([...second.speed]).toEqual([2, 2.5]);
    expect([...first.temperature!]).toEqual([NaN, NaN]);
    expect([...second.temperature!]).toEqual([282, 281]);
    expect(both.pressure).toBeNull();
  });

  it('is the identity on all profiles in order', () => {
    const a = blockOf('a', [1, 2, 3], true);
    expect(pickProfiles([0, 1, 2].map((index) => ({ block: a, index })))).toEqual(a);
  });

  it('of nothing is an empty block', () => {
    expect(pickProfiles([]).profileCount).toBe(0);
  });
});
