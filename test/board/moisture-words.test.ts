import { beforeAll, describe, expect, it } from 'vitest';
import { moistureCsv, trianglesCsv } from '../../src/board/words/moisture-csv.ts';
import { moistureAnswers, moistureStory, type MoistContext } from '../../src/board/words/moisture.ts';
import { timeWords } from '../../src/board/words/time.ts';
import type { Desk } from '../../src/desk/index.ts';
import { demoDesk } from '../support/demo-desk.ts';

const feed = 'ashwillow/wind-profiler';
let desk: Desk;
beforeAll(async () => {
  desk = await demoDesk('storm');
});

function contextAt(iso: string): MoistContext {
  const names = new Map(desk.feeds().map(({ station }) => [station.id, station.name]));
  return {
    state: desk.moisture(Date.parse(iso), { feed })!,
    stepMs: 600_000,
    units: { speed: 'm/s', height: 'm' },
    times: timeWords('site', 'Etc/GMT+6'),
    nameOf: (id) => names.get(id) ?? id,
  };
}
const story = (iso: string): string =>
  moistureStory(contextAt(iso))
    .map(({ text }) => text)
    .join('');

describe('the moist night in words', () => {
  it('says transport, growth, whose humidity and how old, arrival and convergence', () => {
    expect(story('2024-06-28T06:30Z')).toMatch(
      /^The wind carries \d{3} kg\/m\/s of vapour below 3 km toward the north, up from \d{3} at 20:10 and growing by \d\d an hour \(humidity of Ashwillow Plain soundings, 1 h old, same place, ± 7 %\)\. Moister air that passed Dry Fork profiler at 23:\d\d gets here at 01:\d\d, in \d\d min \(between 0\d:\d\d and 01:\d\d\)\. Between the stations moisture gathers below 1 km, \d\.\d g\/kg an hour\.$/,
    );
  });

  it('says afterwards when it came, and before any profile that there is none', () => {
    expect(story('2024-06-28T09:30Z')).toMatch(/was to come at 01:\d\d and came at 01:\d\d/);
    expect(story('2024-06-27T23:35Z')).not.toContain('NaN');
    expect(story('2024-06-27T21:00Z')).toBe('No profile of Ashwillow Plain profiler in this night up to 15:00.');
    expect(story('2024-06-28T15:00Z')).toContain('The last profile is 2 h old.');
  });

  it('gives every answer its age and what it rests on, never a bare NaN', () => {
    for (const iso of ['2024-06-27T22:00Z', '2024-06-28T06:30Z', '2024-06-28T13:00Z']) {
      for (const answer of moistureAnswers(contextAt(iso))) {
        expect(JSON.stringify(answer), `${iso} ${answer.title}`).not.toMatch(/NaN|undefined|Infinity/);
        expect(answer.lines.length).toBeGreaterThan(0);
        expect(answer.figures.length > 0 || answer.none !== '').toBe(true);
      }
    }
  });

  it('writes a line a profile, and a line a layer, with as many cells as headings', () => {
    const { state } = contextAt('2024-06-28T06:30Z');
    const lines = moistureCsv(state).trimEnd().split('\n');
    expect(lines).toHaveLength(1 + state.timeMs.length);
    for (const line of [...lines, ...trianglesCsv(state.triangles).trimEnd().split('\n')].slice(1)) {
      expect(line).not.toMatch(/NaN|undefined/);
    }
    const cells = (line: string): number => line.split(',').length;
    expect(new Set(lines.map(cells)).size).toBe(1);
    expect(new Set(trianglesCsv(state.triangles).trimEnd().split('\n').map(cells)).size).toBe(1);
  });
});
