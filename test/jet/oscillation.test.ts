import { describe, expect, it } from 'vitest';
import { coriolisParameter, directionOf, inertialPeriodS, speedOf } from '../../src/air/index.ts';
import { fitOscillation, greatestSpeed, oscillatingWind } from '../../src/jet/index.ts';
import { checkBlock, expectAgrees, type CheckValue } from '../support/check-table.ts';
import { sharedIsHere } from '../support/shared.ts';

const HOUR_S = 3600;
const missing = (list: CheckValue | undefined): number[] => (list as (number | null)[]).map((value) => value ?? NaN);

describe.skipIf(!sharedIsHere)('check table outlook', () => {
  it('agrees on the oscillation', () => {
    const block = checkBlock('outlook', 'oscillation');
    for (const { id, in: given, out } of block.cases) {
      const value = (key: string): number => given[key] as number;
      const oscillation = {
        equilibriumU: value('u_eq_m_per_s'),
        equilibriumV: value('v_eq_m_per_s'),
        departureU: value('u0_m_per_s') - value('u_eq_m_per_s'),
        departureV: value('v0_m_per_s') - value('v_eq_m_per_s'),
        turning: coriolisParameter(value('latitude_deg')),
      };
      const winds = missing(given.time_h).map((hours) => oscillatingWind(oscillation, hours * HOUR_S));
      const greatest = greatestSpeed(oscillation);
      const got: Record<string, unknown> = {
        u_m_per_s: winds.map(({ u }) => u),
        v_m_per_s: winds.map(({ v }) => v),
        speed_m_per_s: winds.map(({ u, v }) => speedOf(u, v)),
        direction_deg: winds.map(({ u, v }) => directionOf(u, v)),
        amplitude_m_per_s: Math.hypot(oscillation.departureU, oscillation.departureV),
        time_of_first_maximum_h: greatest.afterS / HOUR_S,
        maximum_speed_m_per_s: greatest.speed,
      };
      for (const [key, want] of Object.entries(out)) expectAgrees(block, key, got[key], want, `${id} ${key}`);
    }
  });

  it('agrees on the fit', () => {
    const block = checkBlock('outlook', 'oscillation_fit');
    for (const { id, in: given, out } of block.cases) {
      const fit = fitOscillation(
        missing(given.time_h).map((hours) => hours * HOUR_S),
        missing(given.u_m_per_s),
        missing(given.v_m_per_s),
        coriolisParameter(given.latitude_deg as number),
      );
      const got: Record<string, unknown> = {
        u_eq_m_per_s: fit.equilibriumU,
        v_eq_m_per_s: fit.equilibriumV,
        a_u_m_per_s: fit.departureU,
        a_v_m_per_s: fit.departureV,
        rms_vector_residual_m_per_s: fit.rms,
        used: fit.used,
      };
      for (const [key, want] of Object.entries(out)) expectAgrees(block, key, got[key], want, `${id} ${key}`);
    }
  });
});

describe('oscillation', () => {
  it('returns after the inertial period: 23.93 h at 30, 16.92 h at 45, 13.82 h at 60 degrees', () => {
    // Half a sidereal day (11.9672 h) over the sine of the latitude.
    for (const [latitude, hours] of [
      [30, 23.934],
      [45, 16.924],
      [60, 13.819],
    ] as const) {
      const periodS = inertialPeriodS(latitude);
      expect(periodS / HOUR_S).toBeCloseTo(hours, 2);
      const start = {
        equilibriumU: 9,
        equilibriumV: 1,
        departureU: -4,
        departureV: 3,
        turning: coriolisParameter(latitude),
      };
      const later = oscillatingWind(start, periodS);
      expect(later.u).toBeCloseTo(5, 9);
      expect(later.v).toBeCloseTo(4, 9);
    }
  });
});
