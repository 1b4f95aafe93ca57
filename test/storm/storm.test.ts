import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ingredientsOf, joinWindAndAir, stormOf, type StormNumbers } from '../../src/storm/index.ts';
import { airLevels, EVENING, MIDNIGHT, PLAINS, profileOf } from './soundings.ts';

const HOUR = 3_600_000;
const SOUTH = { ...PLAINS, id: 'south', latitude: -35 };

/** A veering night wind with a jet near 600 m; turn -1 is its mirror image, backing. */
function windAtHeights(heights: ArrayLike<number>, turn = 1) {
  const angle = (z: number): number => (Math.min(z, 6000) * Math.PI) / 2 / 6000;
  const speed = (z: number): number => 5 + 15 * Math.exp(-(((z - 600) / 400) ** 2)) + z / 500;
  const list = Array.from(heights);
  return {
    heightAgl: list,
    u: list.map((z) => speed(z) * Math.sin(angle(z))),
    v: list.map((z) => turn * speed(z) * Math.cos(angle(z))),
  };
}

const fullLevels = (report: typeof EVENING, turn = 1) => {
  const air = airLevels(report);
  return { ...air, ...windAtHeights(air.heightAgl, turn) };
};
const profilerLevels = windAtHeights(Array.from({ length: 60 }, (_, k) => 100 + k * 120));
const JET = {
  noseHeight: 600,
  noseSpeed: 21,
  noseDirection: 190,
  core: { bottom: 350, top: 900, threshold: 15, bottomIsBound: false },
};

/** Every number of the assessment with the reason that goes with it. */
function figures(storm: StormNumbers): [number, string][] {
  const { shear, helicity, motion, clusters, jetInflow, advection } = storm;
  const vectors = [
    motion.mean,
    motion.right,
    motion.left,
    clusters.cloudLayer,
    clusters.upwind,
    clusters.downwind,
    jetInflow,
  ];
  return [
    ...[
      shear.to1km,
      shear.to3km,
      shear.to6km,
      shear.effective,
      helicity.to1km,
      helicity.to3km,
      helicity.effective,
      ...advection,
    ].map(({ value, why }): [number, string] => [value, why]),
    ...vectors.flatMap(({ u, v, why }): [number, string][] => [
      [u, why],
      [v, why],
    ]),
  ];
}

describe('stormOf', () => {
  it('has every number of a whole sounding, and no reason', () => {
    const storm = stormOf(profileOf(fullLevels(MIDNIGHT)), { jet: JET });
    expect(storm.status).toBe('assessed');
    // By night the surface air has no free convection: an answer, not a gap.
    expect(storm.parcels[0]!.cape).toBe(0);
    expect(storm.why).toMatch(/^Surface-based parcel: .* nowhere warmer/);
    for (const [value, why] of figures(storm)) {
      expect(Number.isFinite(value)).toBe(true);
      expect(why).toBe('');
    }
    expect(storm.clusters.jetFrom).toMatch(/nose at 600 m/);
    expect(storm.airFrom).toEqual({ station: 'plains', timeMs: 0, ageS: 0 });
  });

  it('has a reason beside every number that is missing, whatever is missing', () => {
    for (const storm of [
      stormOf(profileOf(airLevels(EVENING))),
      stormOf(profileOf(profilerLevels)),
      stormOf(profileOf(windAtHeights([10, 100, 900]))),
      stormOf(profileOf(fullLevels(EVENING), { ...PLAINS, latitude: NaN })),
      stormOf(profileOf({ heightAgl: [] })),
    ]) {
      expect(storm.status).not.toBe('assessed');
      expect(storm.why).not.toBe('');
      for (const [value, why] of figures(storm)) expect(Number.isNaN(value)).toBe(why !== '');
      for (const parcel of storm.parcels) if (Number.isNaN(parcel.cape)) expect(parcel.why).not.toBe('');
    }
  });

  it('survives any column of numbers, and never leaves a gap without a reason (property)', () => {
    const column = (low: number, high: number) =>
      fc.array(fc.oneof({ weight: 5, arbitrary: fc.double({ min: low, max: high, noNaN: true }) }, fc.constant(NaN)), {
        minLength: 12,
        maxLength: 12,
      });
    fc.assert(
      fc.property(
        column(0, 16_000),
        column(500, 110_000),
        column(150, 350),
        column(0, 0.1),
        column(-80, 80),
        fc.boolean(),
        (heightAgl, pressure, temperature, specificHumidity, u, falling) => {
          const sorted = falling ? pressure.toSorted((a, b) => b - a) : pressure;
          const heights = falling ? heightAgl.toSorted((a, b) => a - b) : heightAgl;
          const v = u.toReversed();
          const storm = stormOf(
            profileOf({ heightAgl: heights, pressure: sorted, temperature, specificHumidity, u, v }),
            { jet: JET },
          );
          for (const [value, why] of figures(storm)) expect(Number.isNaN(value)).toBe(why !== '');
          for (const parcel of storm.parcels) if (Number.isNaN(parcel.cape)) expect(parcel.why).not.toBe('');
        },
      ),
    );
  });

  it('has no advection where the wind is calm, which is an answer', () => {
    const air = airLevels(MIDNIGHT);
    const calm = Array.from(air.heightAgl, () => 0);
    for (const layer of stormOf(profileOf({ ...air, u: calm, v: calm })).advection) {
      expect(layer).toMatchObject({ value: 0, why: '' });
    }
  });

  it('takes the right mover in the north, the left one in the south, and the motion given above both', () => {
    const north = stormOf(profileOf(fullLevels(MIDNIGHT)));
    const south = stormOf(profileOf(fullLevels(MIDNIGHT, -1), SOUTH));
    expect(north.mover).toBe('right');
    expect(south.mover).toBe('left');
    expect(north.helicity.to3km.value).toBeGreaterThan(0);
    expect(south.helicity.to3km.value).toBeLessThan(0);
    const given = stormOf(profileOf(fullLevels(MIDNIGHT)), { motion: { u: 0, v: 0 } });
    expect(given.mover).toBe('given');
    expect(given.helicity.to3km.value).not.toBeCloseTo(north.helicity.to3km.value, 0);
  });

  it('names the strongest wind below 1500 m where no jet is given', () => {
    const storm = stormOf(profileOf(fullLevels(MIDNIGHT)));
    expect(storm.clusters.jetFrom).toMatch(/strongest wind below 1500 m/);
    expect(storm.jetInflow.why).toMatch(/No jet/);
  });

  it('gives the jet layer its inflow: the mean wind less the motion', () => {
    const steady = { heightAgl: [0, 1000, 7000], u: [0, 0, 0], v: [12, 12, 12] };
    const storm = stormOf(profileOf(steady), { jet: JET, motion: { u: 5, v: 2 } });
    expect(storm.jetInflow.u).toBeCloseTo(-5, 9);
    expect(storm.jetInflow.v).toBeCloseTo(10, 9);
  });

  it('uses wind of the profiler with air of the sounding, and says how old', () => {
    const sounding = profileOf(airLevels(MIDNIGHT), PLAINS, 0);
    const profiler = profileOf(profilerLevels, PLAINS, 3 * HOUR);
    const storm = stormOf(profiler, { air: sounding });
    expect(storm.airFrom.ageS).toBe(3 * 3600);
    expect(storm.parcels[3]!.cape).toBeGreaterThan(0);
    expect(storm.shear.to6km.value).toBeGreaterThan(0);
    expect(storm.clusters.cloudLayer.why).toMatch(/7180 m/);
    expect(storm.notes.join()).toMatch(/lowest wind level, 100 m/);
  });
});

describe('joinWindAndAir', () => {
  const profiler = profileOf(profilerLevels, PLAINS, 10 * HOUR);
  const soundingAt = (timeMs: number) => profileOf(airLevels(EVENING), PLAINS, timeMs);

  it('takes the newest sounding that is not later than the wind', () => {
    const joined = joinWindAndAir(profiler, [soundingAt(0), soundingAt(6 * HOUR), soundingAt(11 * HOUR), profiler]);
    expect(joined.air!.timeMs).toBe(6 * HOUR);
    expect(joined.airAgeS).toBe(4 * 3600);
  });

  it('uses no air from the future, none too old, and a profile its own', () => {
    expect(joinWindAndAir(profiler, [soundingAt(11 * HOUR)]).why).toMatch(/No sounding/);
    expect(joinWindAndAir(profiler, [soundingAt(0)], { oldestS: 3600 }).why).toMatch(/10.0 h old/);
    const own = soundingAt(5);
    expect(joinWindAndAir(own, []).air).toBe(own);
  });
});

describe('ingredientsOf', () => {
  it('sets each number beside its reference and source, unknown ones with the reason', () => {
    const rows = ingredientsOf(stormOf(profileOf(airLevels(MIDNIGHT))), { jetSpeed: { value: 20, why: '' } });
    expect(new Set(rows.map((row) => row.ingredient))).toEqual(new Set(['moisture', 'instability', 'lift', 'shear']));
    for (const row of rows) {
      expect(row.source).not.toBe('');
      expect(row.meets === null).toBe(Number.isNaN(row.value));
      expect(row.why === '').toBe(!Number.isNaN(row.value));
    }
    expect(rows.find((row) => row.what === 'Speed of the jet')!.meets).toBe(true);
    expect(rows.find((row) => row.what === 'Moisture transport')!.why).toBe('Not given.');
  });

  it('reads helicity by its mover: negative speaks for storms in the south', () => {
    const rows = ingredientsOf(stormOf(profileOf(fullLevels(MIDNIGHT, -1), SOUTH)));
    const helicity = rows.find((row) => row.what === 'Helicity 0-3 km')!;
    expect(helicity).toMatchObject({ reference: -150, sense: 'at-most' });
    expect(helicity.meets).toBe(helicity.value <= -150);
    const swift = stormOf(profileOf(fullLevels(MIDNIGHT, -1), SOUTH), { motion: { u: 0, v: 25 } });
    expect(swift.helicity.to3km.value).toBeLessThan(-150);
    expect(ingredientsOf(swift).find((row) => row.what === 'Helicity 0-3 km')!.meets).toBe(true);
  });
});
