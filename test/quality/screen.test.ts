import { describe, expect, it } from 'vitest';
import { BlockBuilder, MARK, unplacedStation, type LevelInput } from '../../src/profile/index.ts';
import { screen } from '../../src/quality/index.ts';

const HOUR_MS = 3_600_000;

function blockOf(...profiles: LevelInput[]): ReturnType<BlockBuilder['finish']> {
  const builder = new BlockBuilder();
  profiles.forEach((levels, i) =>
    builder.add({ station: unplacedStation('heron-moss'), source: 'mast.csv', timeMs: i * HOUR_MS, levels }),
  );
  return builder.finish();
}

describe('screen', () => {
  it('leaves a sound profile alone and shares its columns', () => {
    const block = blockOf({ heightAgl: [50, 100, 150], speed: [5, 6, 7], direction: [10, 360, 0] });
    const report = screen(block);
    expect([...report.block.mark]).toEqual([0, 0, 0]);
    expect(report.block.speed).toBe(block.speed);
    expect(report.block.mark).not.toBe(block.mark);
  });

  it('marks what the atmosphere cannot do, keeps the value and the wind beside a bad temperature', () => {
    const block = blockOf({
      heightAgl: [50, 100, 150, 200, 250],
      speed: [-1, 95, 7, 8, NaN],
      direction: [10, 10, 400, 10, NaN],
      temperature: [290, 290, 290, 20, NaN],
      pressure: [1e5, 1e5, 1e5, 1e5, NaN],
    });
    const { block: screened, feeds } = screen(block);
    const { impossible } = MARK;
    expect([...screened.mark]).toEqual([impossible, impossible, impossible, MARK['air-impossible'], 0]);
    expect(screened.speed[1]).toBe(95);
    expect(feeds).toHaveLength(1);
    expect(feeds[0]).toMatchObject({
      source: 'mast.csv',
      stationId: 'heron-moss',
      profiles: 1,
      levels: 5,
      windLevels: 4,
      rejected: 3,
      byMark: { impossible: 3, 'air-impossible': 1 },
    });
    expect(feeds[0]!.words[0]).toContain('3 of 5 levels');
  });

  it('leaves out a screen on request', () => {
    const block = blockOf({ heightAgl: [50], speed: [-1], direction: [10] });
    expect([...screen(block, { without: ['gross-limits'] }).block.mark]).toEqual([0]);
  });

  it('takes an empty block', () => {
    expect(screen(new BlockBuilder().finish())).toMatchObject({ feeds: [] });
  });
});
