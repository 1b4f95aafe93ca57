import { describe, expect, it } from 'vitest';
import { monthFirstIn, TimeText } from '../../../src/ingest/csv/time-text.ts';

const read = (text: string, zone = 'UTC', monthFirst = false): string => {
  const ms = new TimeText(zone, monthFirst).read(text);
  return Number.isNaN(ms) ? 'none' : new Date(ms).toISOString();
};

describe('TimeText', () => {
  it.each([
    ['2013-11-08 12:00:00', '2013-11-08T12:00:00.000Z'],
    ['2013-11-08T12:00:00Z', '2013-11-08T12:00:00.000Z'],
    ['2013-11-08T12:00+02:00', '2013-11-08T10:00:00.000Z'],
    ['2013-11-08T12:00:00.25-0530', '2013-11-08T17:30:00.250Z'],
    ['2013-11-08T12:00:00+01', '2013-11-08T11:00:00.000Z'],
    ['2013-11-08 12:00 UTC', '2013-11-08T12:00:00.000Z'],
    ['2013/11/8 6:05', '2013-11-08T06:05:00.000Z'],
    ['2013-11-08', '2013-11-08T00:00:00.000Z'],
    ['2013-11-08T24:00:00Z', '2013-11-09T00:00:00.000Z'],
    ['08.11.2013 12:00', '2013-11-08T12:00:00.000Z'],
    ['8/11/2013 12:00', '2013-11-08T12:00:00.000Z'],
    ['11/8/2013 1:05 pm', '2013-08-11T13:05:00.000Z'],
    ['20131108120000', '2013-11-08T12:00:00.000Z'],
    ['201311081200', '2013-11-08T12:00:00.000Z'],
    ['20131108T1200Z', '2013-11-08T12:00:00.000Z'],
    ['20131108', '2013-11-08T00:00:00.000Z'],
    ['1383912000', '2013-11-08T12:00:00.000Z'],
    ['1383912000.5', '2013-11-08T12:00:00.500Z'],
    ['1383912000000', '2013-11-08T12:00:00.000Z'],
    ['1.383912e+09', '2013-11-08T12:00:00.000Z'],
    ['2013-02-30 12:00', 'none'],
    ['2013-11-08 25:00', 'none'],
    ['2013-13-08', 'none'],
    ['noon', 'none'],
    ['', 'none'],
    ['12', 'none'],
  ])('%s', (text, expected) => {
    expect(read(text)).toBe(expected);
  });

  it('takes the month first where the table does', () => {
    expect(read('11/8/2013 1:05 PM', 'UTC', true)).toBe('2013-11-08T13:05:00.000Z');
    expect(monthFirstIn(['1/2/2013', '1/13/2013'])).toBe(true);
    expect(monthFirstIn(['1/2/2013', '13/1/2013'])).toBe(false);
  });

  it('takes times without a zone in the zone of the site, summer and winter, and only those', () => {
    expect(read('2024-07-01 12:00', 'Europe/Berlin')).toBe('2024-07-01T10:00:00.000Z');
    expect(read('2024-01-01 12:00', 'Europe/Berlin')).toBe('2024-01-01T11:00:00.000Z');
    expect(read('2024-07-01T12:00Z', 'Europe/Berlin')).toBe('2024-07-01T12:00:00.000Z');
    // The hour after the clocks went forward on 31 March 2024 at 01:00 UTC.
    expect(read('2024-03-31 03:30', 'Europe/Berlin')).toBe('2024-03-31T01:30:00.000Z');
    expect(read('2024-03-31 01:30', 'Europe/Berlin')).toBe('2024-03-31T00:30:00.000Z');
  });

  it('remembers what it took for granted', () => {
    const times = new TimeText('UTC', false);
    times.read('2024-07-01T12:00Z');
    expect(times.findings).toEqual({ zoneless: false, epoch: false, ambiguousDays: false });
    times.read('1/2/2024 12:00');
    times.read('1383912000');
    expect(times.findings).toEqual({ zoneless: true, epoch: true, ambiguousDays: true });
  });
});
