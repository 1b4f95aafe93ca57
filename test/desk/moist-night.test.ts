import { beforeAll, describe, expect, it } from 'vitest';
import type { Desk, MoistureState } from '../../src/desk/index.ts';
import { demoDesk } from '../support/demo-desk.ts';

const ASHWILLOW = 'ashwillow/wind-profiler';
const NOW = Date.parse('2024-06-28T06:30Z');
const clock = (ms: number): string => new Date(ms).toISOString().slice(11, 16);

let desk: Desk;
let state: MoistureState;
beforeAll(async () => {
  desk = await demoDesk('storm');
  state = desk.moisture(NOW, { feed: ASHWILLOW })!;
});

describe('the moist night of the demo', () => {
  it('lends the profiler the humidity of the midnight sounding, and tells its age; Tonight tells the same', () => {
    const now = state.numbers.at(-1)!;
    expect(now).toMatchObject({ status: 'ok', humidityFrom: 'ashwillow-sonde', humidityAgeS: 3600 });
    // One hour in place: the root of 0.05 squared twice.
    expect(now.humidityUncertainty).toBeCloseTo(0.05 * Math.SQRT2, 3);
    expect(desk.night(NOW, { feed: ASHWILLOW })!.moisture).toEqual(now);
    expect(state.lenders.map(({ id }) => id)).not.toContain('ashwillow-tower');
  });

  it('gives one number by both integrals', () => {
    const { transport, transportInHeight } = state.numbers.at(-1)!;
    expect(transportInHeight.size / transport.size).toBeCloseTo(1, 2);
    expect(transportInHeight.direction).toBeCloseTo(transport.direction, 0);
  });

  it('takes the humidity of one station where that is asked for', () => {
    const asked = desk.moisture(NOW, { feed: ASHWILLOW, humidityFrom: 'dry-fork' })!.numbers.at(-1)!;
    expect(asked).toMatchObject({ humidityFrom: 'dry-fork', humidityAgeS: 0 });
    expect(asked.humidityUncertainty).toBeGreaterThan(state.numbers.at(-1)!.humidityUncertainty);
    const nobody = desk.moisture(NOW, { feed: ASHWILLOW, humidityFrom: 'nobody' })!.numbers.at(-1)!;
    expect(nobody).toMatchObject({ status: 'not-assessable', why: 'no humidity' });
  });

  it('grows since sunset and still does, counted from the sounding that all recent numbers share', () => {
    const { sinceMs, then, now, rate } = state.growth;
    expect(clock(sinceMs)).toBe('02:10');
    expect(now).toBeGreaterThan(1.2 * then);
    expect(rate.perHour).toBeGreaterThan(rate.uncertainty);
    expect(rate.perHour).toBeLessThan(60);
  });

  it('tells when the surge over Dry Fork gets here: 137 km away, half done there at 05:33 by the making of the demo', () => {
    const [dryFork] = state.arrivals.upstream;
    expect(dryFork!.station.id).toBe('dry-fork');
    expect(dryFork!.now.distance / 1000).toBeCloseTo(137, 0);
    const { surge, arrival, came } = dryFork!.surge!;
    expect(Math.abs(surge.timeMs - Date.parse('2024-06-28T05:33Z'))).toBeLessThan(10 * 60_000);
    expect(arrival.status).toBe('on-its-way');
    expect(arrival.earliestMs).toBeGreaterThan(NOW);
    // It comes at 07:33 by the making of the demo.
    expect(Math.abs(arrival.arrivesMs - Date.parse('2024-06-28T07:33Z'))).toBeLessThan(30 * 60_000);
    expect(came).toBeNull();
  });

  it('keeps score: by the morning both surges have come, as the tower saw', () => {
    const before = state.arrivals.upstream[0]!.score;
    expect(before).toMatchObject({ why: '', seenBy: 'Ashwillow Plain tower', score: { hits: 1, falseAlarms: 0 } });
    const morning = desk.moisture(Date.parse('2024-06-28T10:00Z'), { feed: ASHWILLOW })!.arrivals.upstream[0]!;
    expect(morning.score.score).toMatchObject({ hits: 2, falseAlarms: 0, misses: 0 });
    expect(morning.score.score.meanAbsoluteErrorS).toBeLessThan(1800);
    expect(morning.surge!.came).not.toBeNull();
  });

  it('finds the three streams converging below a kilometre, clear of the error, and moisture gathering', () => {
    const [triangle] = state.triangles;
    expect(triangle).toMatchObject({ named: true, why: '', apartS: 0 });
    for (const { field, top } of triangle!.layers.filter((layer) => layer.top <= 1000)) {
      expect(field.divergence, `up to ${top} m`).toBeLessThan(-2 * field.divergenceUncertainty);
      expect(field.moistureFluxDivergence).toBeLessThan(-2 * field.moistureFluxDivergenceUncertainty);
    }
    expect(triangle!.layers.at(-1)!.verticalMotion).toBeGreaterThan(0);
    expect(triangle!.through.timeMs).toHaveLength(state.timeMs.length);
  });

  it('says that one night is too little to tell what is usual', () => {
    expect(state.usual).toMatchObject({ status: 'not-assessable', days: 0, least: 20 });
  });

  it('paints lent humidity too, and leaves a feed with its own as it is', () => {
    const lent = desk.moistBlock(ASHWILLOW)!;
    expect(lent.specificHumidity!.some((value) => value > 0)).toBe(true);
    expect(lent.speed).toBe(desk.block(ASHWILLOW)!.speed);
    expect(desk.moistBlock(ASHWILLOW)).toBe(lent);
    expect(desk.moistBlock('dry-fork/wind-profiler')).toBe(desk.block('dry-fork/wind-profiler'));
    expect(desk.moistBlock('nobody')).toBeNull();
  });

  it('says why where nothing measures humidity', async () => {
    const dry = await demoDesk('storm', [
      'ashwillow-evening.csv',
      'ashwillow-midnight.csv',
      'ashwillow-tower.csv',
      'dry-fork.nc',
      'long-slough.nc',
    ]);
    const alone = dry.moisture(NOW, { feed: ASHWILLOW })!;
    expect(alone.numbers.at(-1)).toMatchObject({ status: 'not-assessable', why: 'no humidity' });
    expect(alone.growth.now).toBeNaN();
    expect(alone.arrivals.upstream).toEqual([]);
    expect(alone.arrivals.why).toBe('no profile of the upstream stations dry-fork, long-slough is open');
    expect(alone.triangles[0]!.why).toBe('three stations are needed, and none lately of dry-fork, long-slough');
  });
});
