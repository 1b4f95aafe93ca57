import { describe, expect, it } from 'vitest';
import { isAlike, usualTransport } from '../../src/desk/usual-transport.ts';

const NOW = Date.UTC(2031, 6, 15, 5);
const DAY = 86_400_000;
/** One value a day at about this hour, 1 kg/(m s) more each day before. */
const history = (days: number): { timeMs: number[]; below3Km: number[]; source: string } => {
  const timeMs = Array.from({ length: days }, (_, k) => NOW - 365 * DAY - (k - 10) * DAY + 600_000);
  return { timeMs, below3Km: timeMs.map((_, k) => 100 + k), source: 'a table' };
};

describe('usualTransport', () => {
  it('ranks a transport among those of the month and hour', () => {
    const usual = usualTransport(NOW, 120.5, [history(25)]);
    // Values 100 to 124: of 25 days 21 carried less.
    expect(usual).toMatchObject({ status: 'ok', days: 25, percentile: 84, median: 112, source: 'a table' });
    expect(usualTransport(NOW, 120, [history(25)]).percentile).toBe(82);
  });

  it('takes one value a day, that nearest to the hour', () => {
    const { timeMs, below3Km } = history(22);
    const doubled = {
      timeMs: [...timeMs, ...timeMs.map((ms) => ms + 3_600_000)],
      below3Km: [...below3Km, ...below3Km.map(() => 999)],
      source: '',
    };
    expect(usualTransport(NOW, 500, [doubled])).toMatchObject({ days: 22, percentile: 100 });
  });

  it('says when there are too few days, and lets the fuller history speak', () => {
    expect(usualTransport(NOW, 120, [history(19)])).toMatchObject({
      status: 'not-assessable',
      why: 'too few days of this month and hour: 19 of 20',
      days: 19,
    });
    expect(usualTransport(NOW, 120, [history(3), history(24)]).days).toBe(24);
    expect(usualTransport(NOW, 120, [])).toMatchObject({ status: 'not-assessable', days: 0 });
    expect(usualTransport(NOW, NaN, [history(24)]).why).toBe('the transport now is not known');
  });

  it('knows month and hour by UTC, and not the same night', () => {
    expect(isAlike(NOW - 365 * DAY, NOW)).toBe(true);
    expect(isAlike(NOW - 3_600_000, NOW)).toBe(false);
    expect(isAlike(NOW - 3 * DAY + 7_200_000, NOW)).toBe(false);
    expect(isAlike(NOW - 30 * DAY, NOW)).toBe(false);
  });
});
