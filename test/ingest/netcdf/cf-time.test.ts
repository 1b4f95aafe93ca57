import { describe, expect, it } from 'vitest';
import { parseTimeUnit, timeMsOf } from '../../../src/ingest/netcdf/cf-time.ts';

const at = (value: number, units: string, calendar = ''): string => {
  const unit = parseTimeUnit(units, calendar);
  return unit === null ? 'none' : new Date(timeMsOf(value, unit)).toISOString();
};

describe('parseTimeUnit', () => {
  it.each([
    [1.5, 'hours since 2024-04-13 00:00:00 +00:00', '2024-04-13T01:30:00.000Z'],
    [19920, 'seconds since 2019-01-01 00:00:00 0:00', '2019-01-01T05:32:00.000Z'],
    [1, 'days since 1970-1-1', '1970-01-02T00:00:00.000Z'],
    [0, 'seconds since 1970-1-1 0:00:00 0:00', '1970-01-01T00:00:00.000Z'],
    [90, 'min since 2020-02-29T23:00Z', '2020-03-01T00:30:00.000Z'],
    [0, 'hours since 2020-01-01 06:00 -6:00', '2020-01-01T12:00:00.000Z'],
    [0, 'hours since 2020-01-01 06:00:00+0530', '2020-01-01T00:30:00.000Z'],
    [0, 'Seconds Since 2020-01-01 06:00:00.25 UTC', '2020-01-01T06:00:00.250Z'],
    [250, 'milliseconds since 2020-01-01', '2020-01-01T00:00:00.250Z'],
  ])('%d %s', (value, units, want) => expect(at(value, units)).toBe(want));

  it('counts days of the Julian calendar before 1582 unless the calendar is proleptic', () => {
    // 1 January of the year 1 is 3 January 1 of the proleptic Gregorian calendar; day 719164 of the mixed one is
    // 1 January 1970 + 2 days earlier (CF-1.11, section 4.4.1; day numbers by any almanac).
    expect(at(719_164, 'days since 1-1-1', 'standard')).toBe('1970-01-01T00:00:00.000Z');
    expect(at(719_162, 'days since 0001-01-01', 'proleptic_gregorian')).toBe('1970-01-01T00:00:00.000Z');
  });

  it.each([
    ['hours', ''],
    ['months since 2020-01-01', ''],
    ['hours since 2020-01-01', '360_day'],
    ['hours since 2020-01-01', 'noleap'],
    ['m', ''],
    ['hours since yesterday', ''],
  ])('refuses "%s" in calendar "%s"', (units, calendar) => expect(parseTimeUnit(units, calendar)).toBeNull());
});
