import { describe, expect, it } from 'vitest';
import { triangleLayers, triangleThroughTime } from '../../src/moisture/index.ts';
import {
  BlockBuilder,
  profileAt,
  type Instrument,
  type LevelInput,
  type Profile,
  type Station,
} from '../../src/profile/index.ts';

const NOW = Date.UTC(2031, 6, 15, 5, 0);
const PER_DEGREE = 6_371_000 * (Math.PI / 180);
const PLACES = [
  ['A', 0, 0],
  ['B', 0, 0.5],
  ['C', 0.5, 0],
] as const;
const HEIGHTS = Array.from({ length: 33 }, (_, k) => 100 * k);

const profile = (
  station: Station,
  levels: LevelInput,
  timeMs = NOW,
  instrument: Instrument = 'wind-profiler',
): Profile => {
  const builder = new BlockBuilder();
  builder.add({ station, source: 'test', instrument, timeMs, levels });
  return profileAt(builder.finish(), 0);
};
/** Wind that converges at a rate in 1/s the same at all heights. */
const converging = (rate: number, shape: (station: Station) => Partial<LevelInput> = () => ({}), elevation = 200) =>
  PLACES.map(([id, latitude, longitude]) => {
    const station = { id, name: id, latitude, longitude, elevation };
    return profile(station, {
      heightAgl: HEIGHTS,
      u: HEIGHTS.map(() => 8 - (rate / 2) * PER_DEGREE * longitude),
      v: HEIGHTS.map(() => 3 - (rate / 2) * PER_DEGREE * latitude),
      specificHumidity: HEIGHTS.map(() => 0.012),
      ...shape(station),
    });
  });

describe('triangleLayers', () => {
  it('finds the convergence of every layer and the air it lifts', () => {
    const { layers, notes } = triangleLayers(converging(2e-5));
    expect(notes).toEqual([]);
    expect(layers).toHaveLength(12);
    for (const { field } of layers) {
      expect(field.status).toBe('ok');
      expect(field.divergence).toBeCloseTo(-2e-5, 9);
      expect(field.moistureFluxDivergence).toBeCloseTo(-2e-5 * 0.012, 10);
      expect(field.divergenceUncertainty).toBeGreaterThan(0);
      expect(field.moistureFluxDivergenceUncertainty).toBeGreaterThan(0);
    }
    // w = -div z for incompressible air; thinner air aloft must rise faster, by less than rho(0)/rho(3 km) = 1.35.
    const top = layers.at(-1)!;
    expect(top.verticalMotion).toBeGreaterThan(2e-5 * 3000);
    expect(top.verticalMotion).toBeLessThan(1.35 * 2e-5 * 3000);
    expect(top.verticalMotionUncertainty).toBeGreaterThan(layers[0]!.verticalMotionUncertainty);
  });

  it('lifts by mass balance: rho w at the top is the mass that converged', () => {
    const edges = Array.from({ length: 301 }, (_, k) => 10 * k);
    const top = triangleLayers(
      converging(1e-5, () => ({}), 0),
      { edges },
    ).layers.at(-1)!;
    // US Standard Atmosphere 1976: pressure 1013.25 and 701.09 hPa, density at 3 km 0.90926 kg/m3; g at mid-height.
    const mass = (101_325 - 70_109) / 9.802;
    expect(top.verticalMotion).toBeCloseTo((1e-5 * mass) / 0.90926, 4);
  });

  it('gives divergence where humidity is missing, and no moisture-flux divergence', () => {
    const dry = converging(2e-5, () => ({ specificHumidity: undefined }));
    const [layer] = triangleLayers(dry).layers;
    expect(layer!.field.divergence).toBeCloseTo(-2e-5, 9);
    expect(layer!.field.moistureFluxDivergence).toBeNaN();
  });

  it('says where a station does not reach, and lifts nothing above that', () => {
    const short = converging(2e-5, ({ id }) => (id === 'B' ? { u: HEIGHTS.map((z) => (z > 1000 ? NaN : 8)) } : {}));
    const { layers } = triangleLayers(short);
    expect(layers[3]!.field.status).toBe('ok');
    expect(layers[6]!.field.why).toBe('only 2 stations with wind, three are needed');
    expect(layers[6]!.verticalMotion).toBeNaN();
  });

  it('takes the measured part of the lowest layer, bridges no wide gap', () => {
    const gates =
      (from: number, to: number) =>
      ({ id }: Station) =>
        id === 'A'
          ? {
              u: HEIGHTS.map((z) => (z < from || z > to ? 8 : NaN)),
              v: HEIGHTS.map((z) => (z < from || z > to ? 3 : NaN)),
            }
          : {};
    expect(triangleLayers(converging(1e-5, gates(0, 60))).layers[0]!.field.status).toBe('ok');
    expect(triangleLayers(converging(1e-5, gates(0, 160))).layers[0]!.field.status).toBe('not-assessable');
    expect(triangleLayers(converging(1e-5, gates(900, 1600))).layers[4]!.field.status).toBe('not-assessable');
  });

  it('notes uneven ground and counts a balloon as adrift', () => {
    const hilly = converging(1e-4, () => ({}));
    hilly[1] = profile(
      { ...hilly[1]!.station, elevation: 600 },
      { heightAgl: HEIGHTS, u: HEIGHTS.map(() => 5), v: HEIGHTS.map(() => 3) },
    );
    expect(triangleLayers(hilly).notes[0]).toContain('grounds differ by 400 m');
    const flown = converging(1e-4).map((one) =>
      profile(
        one.station,
        {
          heightAgl: one.heightAgl,
          speed: one.speed,
          direction: one.direction,
          speedUncertainty: HEIGHTS.map(() => 0.5),
        },
        NOW,
        'radiosonde',
      ),
    );
    const fixed = flown.map((one) =>
      profile(one.station, {
        heightAgl: one.heightAgl,
        speed: one.speed,
        direction: one.direction,
        speedUncertainty: HEIGHTS.map(() => 0.5),
      }),
    );
    const last = (profiles: Profile[]): number => triangleLayers(profiles).layers.at(-1)!.field.divergenceUncertainty;
    expect(last(flown)).toBeGreaterThan(last(fixed));
  });

  it('stands at the levels that the stations share, a single one too, with the wind measured there', () => {
    const levels = [100, 400, 1000];
    const shared = converging(1e-5, ({ longitude, latitude }) => ({
      heightAgl: levels,
      u: levels.map((z) => 8 - (z / 100) * 0.5e-5 * PER_DEGREE * longitude),
      v: levels.map((z) => 3 - (z / 100) * 0.5e-5 * PER_DEGREE * latitude),
      specificHumidity: levels.map(() => 0.01),
    }));
    const { layers } = triangleLayers(shared);
    expect(layers.map(({ heightAgl, bottom, top }) => [heightAgl, bottom, top])).toEqual([
      [100, 0, 250],
      [400, 250, 700],
      [1000, 700, 1300],
    ]);
    [-1e-5, -4e-5, -10e-5].forEach((rate, k) => {
      expect(layers[k]!.field.divergence).toBeCloseTo(rate, 9);
    });
    const single = converging(1e-5, () => ({ heightAgl: [500], u: [8], v: [3], specificHumidity: [0.01] }));
    expect(triangleLayers(single).layers).toMatchObject([{ heightAgl: 500, field: { status: 'ok' } }]);
  });

  it('takes layers of 250 m where the stations share too few levels', () => {
    const own = converging(1e-5, ({ id }) => {
      const shift = id.charCodeAt(0) - 64;
      return { heightAgl: HEIGHTS.map((z) => z + shift) };
    });
    expect(triangleLayers(own).layers.map((layer) => layer.heightAgl)).toEqual(
      Array.from({ length: 12 }, (_, k) => 125 + 250 * k),
    );
  });

  it('refuses stations on one line', () => {
    const line = PLACES.map(([id], k) => ({ id, name: id, latitude: 45 + k / 10, longitude: 10, elevation: 0 })).map(
      (station) => profile(station, { heightAgl: HEIGHTS, u: HEIGHTS.map(() => 5), v: HEIGHTS.map(() => 3) }),
    );
    expect(triangleLayers(line).layers[0]!.field.why).toBe('the stations lie on one line');
  });
});

describe('triangleThroughTime', () => {
  const series = (offsetsS: readonly number[], count = 3): Profile[][] =>
    converging(1e-5).map((one, k) =>
      Array.from({ length: k === 0 ? count : 2 * count }, (_, n) =>
        profile(
          one.station,
          { heightAgl: one.heightAgl, speed: one.speed, direction: one.direction },
          NOW + n * (k === 0 ? 1_200_000 : 600_000) + offsetsS[k]! * 1000,
        ),
      ),
    );

  it('goes by the station with the fewest times and takes the others nearest to it', () => {
    const times = triangleThroughTime(series([0, 60, -120]));
    expect(times.map((at) => at.timeMs)).toEqual([NOW, NOW + 1_200_000, NOW + 2_400_000]);
    expect(times[0]!.stations).toEqual(['A', 'B', 'C']);
    expect(times[2]!.layers[0]!.field.divergence).toBeCloseTo(-1e-5, 9);
  });

  it('refuses stations whose clocks are apart', () => {
    const [first] = triangleThroughTime(series([0, 40_000, 0]));
    expect(first!.layers[0]!.field).toMatchObject({ status: 'not-assessable' });
    expect(first!.layers[0]!.field.why).toContain('min apart');
    expect(first!.layers[0]!.field.area).toBeGreaterThan(0);
  });

  it('has nothing of nothing', () => {
    expect(triangleThroughTime([])).toEqual([]);
    expect(triangleThroughTime([[], [], []])).toEqual([]);
  });
});
