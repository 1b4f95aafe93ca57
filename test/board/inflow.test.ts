import { readFileSync } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { DeskService } from '../../src/board/worker/desk-service.ts';
import { airAtHeight } from '../../src/board/state/air-at-height.ts';
import { heightWordsAt, inflowAnswers, inflowStory, leadingParcel } from '../../src/board/words/inflow.ts';
import { levelCsv, numbersCsv, windCsv, windRows } from '../../src/board/words/inflow-tables.ts';
import type { InflowState } from '../../src/desk/index.ts';
import { ingredientsOf } from '../../src/storm/index.ts';

const FOLDER = new URL('../../demo-profiles/storm/', import.meta.url);
const blob = (name: string): { name: string; blob: Blob } => ({
  name,
  blob: new Blob([new Uint8Array(readFileSync(new URL(name, FOLDER)))]),
});
const MS = { speed: 'm/s', height: 'm' } as const;
const KNOTS = { speed: 'kt', height: 'ft' } as const;
const text = (state: InflowState, units: typeof MS | typeof KNOTS = MS): string =>
  inflowStory(state, units)
    .map((piece) => piece.text)
    .join('');

let service: DeskService;
let told: InflowState;
let windOnly: InflowState;
beforeAll(async () => {
  const site = { text: readFileSync(new URL('site.json', FOLDER), 'utf8'), name: 'site.json' };
  const disc = { hubHeight: 100, rotorDiameter: 120 };
  const stateOf = async (names: readonly string[]): Promise<InflowState> => {
    service = new DeskService();
    service.open({ file: site, disc });
    await service.read(1, names.map(blob), () => undefined);
    return service.inflow(Date.parse('2024-06-28T06:35Z'), 'ashwillow/wind-profiler', '') as InflowState;
  };
  windOnly = await stateOf(['ashwillow.nc']);
  told = await stateOf(['ashwillow.nc', 'ashwillow-midnight.csv']);
});

describe('the inflow in words', () => {
  it('tells parcel, lift, clusters and ages, in the reader’s units', () => {
    expect(text(told)).toMatch(/storms could feed on air from \d+ to \d+ m.* has \d+ J\/kg .* at [\d.]+ m\/s/);
    expect(text(told)).toMatch(/Wind 5 min old, above \d+ m 1 h 5 min; temperature and humidity 1 h 5 min\.$/);
    expect(text(told, KNOTS)).toMatch(/ ft.* at \d+ kt/);
  });

  it('tells once why there is no air, and still what the wind gives', () => {
    const said = text(windOnly);
    expect(said.match(/No sounding with temperature and humidity is at hand/g)).toHaveLength(1);
    const rows = windRows(windOnly.storm, MS);
    expect(rows.find(({ what }) => what === 'Shear 0–3 km')!.value).toMatch(/^[\d.]+ m\/s$/);
    expect(rows.find(({ what }) => what === 'Shear 0–6 km')!.value).toMatch(/6000 m are needed/);
    for (const answer of inflowAnswers(windOnly, windOnly.storm, 'jet-fed', MS)) {
      expect(answer.figures.length > 0 || answer.lines.some((line) => line.text !== '')).toBe(true);
    }
  });

  it('gives every answer an age and a method', () => {
    const answers = inflowAnswers(told, told.storm, leadingParcel(told.storm), MS);
    expect(answers.map(({ age }) => age)).toEqual([
      'air 1 h 5 min old',
      'air 1 h 5 min old',
      'wind 5 min old, aloft 1 h 5 min',
      'wind 5 min old, aloft 1 h 5 min',
    ]);
    const all = JSON.stringify(answers);
    for (const method of ['Doswell & Rasmussen 1994', 'Thompson et al. 2007', 'Davies-Jones', 'Corfidi 2003']) {
      expect(all).toContain(method);
    }
  });

  it('reads the sounding’s own numbers at a level’s height', () => {
    const trace = told.traces.find(({ name }) => name === 'jet-fed');
    const level = 20;
    const height = told.columns.heightAgl[level]!;
    const at = airAtHeight(told, trace, height);
    expect(at.temperature).toBeCloseTo(told.columns.temperature[level]!, 9);
    expect(at.pressure).toBeCloseTo(told.columns.pressure[level]!, 3);
    expect(heightWordsAt(at, MS)).toMatch(
      /hPa, temperature .* °C, dew point .* \(\d+ %\).*wind [\d.]+ m\/s from \d{3}°/,
    );
    expect(heightWordsAt(airAtHeight(windOnly, undefined, 1000), MS)).toMatch(/^1000 m, wind /);
  });
});

describe('the inflow as files', () => {
  it('has a line a level, with where each wind came from', () => {
    const wind = windCsv(told).trim().split('\n');
    expect(wind).toHaveLength(1 + told.hodograph.count);
    expect(wind[1]).toMatch(/^ashwillow,2024-06-28T06:30:00.000Z,/);
    expect(wind.at(-1)).toMatch(/^ashwillow-sonde,2024-06-28T05:30:00.000Z,/);
    expect(levelCsv(told, 'jet-fed').trim().split('\n')).toHaveLength(1 + told.columns.heightAgl.length);
  });

  it('has every number with its reason or source, nothing that is no number', () => {
    const csv = numbersCsv(windOnly, windOnly.storm, ingredientsOf(windOnly.storm, windOnly.others));
    expect(csv).not.toMatch(/NaN|undefined|null/);
    expect(csv).toContain('No sounding with temperature and humidity is at hand');
    expect(csv).toContain('common practice, without source');
  });
});
