import { readFileSync } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { Desk, type InflowState } from '../../src/desk/index.ts';
import { readProfiles } from '../../src/ingest/index.ts';
import { readSite } from '../../src/site/index.ts';
import { pieces } from '../support/sources.ts';

const FOLDER = new URL('../../demo-profiles/storm/', import.meta.url);
const at = (clock: string): number => Date.parse(`2024-06-28T${clock}Z`);

let desk: Desk;

/** The demo's storm night with some of its files. */
async function deskOf(names: readonly string[]): Promise<Desk> {
  const site = readSite(readFileSync(new URL('site.json', FOLDER), 'utf8'), 'site.json').site!;
  const made = new Desk(site);
  for (const name of names) {
    const source = pieces(name, readFileSync(new URL(name, FOLDER)), 2 ** 16);
    for await (const reading of readProfiles(source, { site })) made.accept(reading.block);
  }
  return made;
}

const told = (atMs: number, feed = 'ashwillow/wind-profiler', from = desk): InflowState => {
  const state = from.inflow(atMs, { feed });
  expect(state).toHaveProperty('storm');
  return state as InflowState;
};

beforeAll(async () => {
  desk = await deskOf(['ashwillow.nc', 'dry-fork.nc', 'ashwillow-evening.csv', 'ashwillow-midnight.csv']);
});

describe('Desk.inflow', () => {
  it('joins the profiler’s wind with the midnight sounding, each with its age', () => {
    const state = told(at('06:35'));
    expect(state.windAgeS).toBe(300);
    expect(state.air).toMatchObject({ station: 'ashwillow-sonde', ageS: 65 * 60, distance: 0 });
    expect(state.storm.windAloft).toMatchObject({ station: 'ashwillow-sonde', ageS: 3600, above: state.windTop });
    expect(state.storm.inflow.kind).toBe('elevated');
    expect(state.storm.inflow.stableLayer!.strength).toBeGreaterThan(0);
    expect(Number.isFinite(state.storm.clusters.downwind.u)).toBe(true);
    expect(state.others.transport!.value).toBeGreaterThan(100);
    expect(state.jet!.noseSpeed).toBeGreaterThan(10);
  });

  it('looks at nothing later than the moment', () => {
    const state = told(at('04:00'));
    expect(state.windMs).toBe(at('04:00'));
    expect(state.air!.timeMs).toBe(Date.parse('2024-06-27T23:30Z'));
    expect(state.air!.ageS).toBe(4.5 * 3600);
  });

  it('gives columns and ways up on one height axis', () => {
    const { columns, traces, hodograph } = told(at('06:30'));
    for (const heights of [columns.heightAgl, hodograph.heightAgl, ...traces.map((trace) => trace.heightAgl)]) {
      for (let k = 1; k < heights.length; k++) expect(heights[k]!).toBeGreaterThan(heights[k - 1]!);
    }
    expect(traces.map(({ name }) => name)).toEqual(['surface-based', 'mixed-layer', 'most-unstable', 'jet-fed']);
    expect(columns.heightAgl.length).toBe(columns.dewPoint.length);
  });

  it('continues the radiometer of a neighbour with the sounding above it', () => {
    const { air, storm } = told(at('06:30'), 'dry-fork/wind-profiler');
    expect(air!.distance).toBe(0);
    expect(storm.airAloft).toMatchObject({ station: 'ashwillow-sonde', ageS: 3600 });
    // The radiometer’s lowest gate is at 100 m: nothing is lifted from the surface.
    expect(storm.parcels.map(({ cape }) => Number.isFinite(cape))).toEqual([false, false, true, true]);
  });

  it('is not assessable past the stated ages, and says which', async () => {
    expect(desk.inflow(at('17:00'), { feed: 'ashwillow/wind-profiler' })).toMatchObject({
      why: 'The last wind of Ashwillow Plain profiler is 4.0 h old; more than 3.0 h is not used.',
    });
    const old = desk.inflow(at('06:30'), { feed: 'ashwillow/wind-profiler', oldestAirS: 1800 }) as InflowState;
    expect(old.air).toBeNull();
    expect(old.airWhy).toMatch(/1.0 h old; more than 0.5 h is not used/);
    expect(old.storm.parcels.every(({ why }) => why === old.airWhy)).toBe(true);
    expect(Number.isFinite(old.storm.shear.to3km.value)).toBe(true);
    const alone = told(at('06:30'), 'ashwillow/wind-profiler', await deskOf(['ashwillow.nc']));
    expect(alone.airWhy).toMatch(/No sounding/);
    expect(desk.inflow(at('06:30'), { feed: 'nowhere/lidar' })).toBeNull();
  });

  it('takes a sounding for its own wind and air', () => {
    const state = told(at('06:30'), 'ashwillow-sonde/radiosonde');
    expect(state.windAgeS).toBe(3600);
    expect(state.storm.windAloft).toBeNull();
    expect(state.storm.status).toBe('assessed');
  });
});
