import { describe, expect, it } from 'vitest';
import { compassWords, directionText, inHundred, plain, signed, speedText } from '../../src/board/words/numbers.ts';
import { durationWords, timeWords } from '../../src/board/words/time.ts';

describe('numbers in words', () => {
  it('writes a true minus, a sign where asked, a dash for nothing', () => {
    expect(plain(-1.25, 1)).toBe('−1.3');
    expect(plain(-0.01, 1)).toBe('0.0');
    expect(signed(2, 0)).toBe('+2');
    expect(signed(-2, 0)).toBe('−2');
    expect(signed(0.01, 1)).toBe('0.0');
    expect(plain(NaN, 1)).toBe('–');
    expect(signed(NaN, 1)).toBe('–');
  });

  it('tells speeds in the reader’s unit', () => {
    expect(speedText(10, { speed: 'm/s', height: 'm' })).toBe('10.0');
    // 10 m/s are 36000/1852 knots.
    expect(speedText(10, { speed: 'kt', height: 'm' })).toBe('19');
    expect(speedText(10, { speed: 'km/h', height: 'm' })).toBe('36');
  });

  it('writes directions with three figures and in words', () => {
    expect(directionText(5)).toBe('005°');
    expect(directionText(359.7)).toBe('000°');
    expect(directionText(NaN)).toBe('–');
    expect(compassWords(350)).toBe('north');
    expect(compassWords(222)).toBe('south-west');
    expect(compassWords(NaN)).toBe('');
  });

  it('never claims to be wholly sure', () => {
    expect(inHundred(1)).toBe('99 in 100');
    expect(inHundred(0)).toBe('1 in 100');
    expect(inHundred(0.7)).toBe('70 in 100');
  });
});

describe('times in words', () => {
  const timeMs = Date.UTC(2024, 4, 22, 8, 40);

  it('keeps site time and UTC apart whatever the zone of this machine', () => {
    const site = timeWords('site', 'Etc/GMT+6');
    expect([site.clock(timeMs), site.day(timeMs), site.zoneWords]).toEqual(['02:40', 'Wed 22 May', 'site time']);
    expect(site.iso(timeMs)).toBe('2024-05-22T02:40:00-06:00');
    const utc = timeWords('utc', 'Etc/GMT+6');
    expect([utc.clock(timeMs), utc.zoneWords]).toEqual(['08:40', 'UTC']);
    expect(timeWords('site', 'UTC').zoneWords).toBe('UTC');
  });

  it('follows a change of the clock', () => {
    // Central European Time ends on 27 October 2024 at 01:00 UTC: 00:59 UTC is 02:59 in summer time, 01:00 UTC is 02:00.
    const berlin = timeWords('site', 'Europe/Berlin');
    expect(berlin.clock(Date.UTC(2024, 9, 27, 0, 59))).toBe('02:59');
    expect(berlin.clock(Date.UTC(2024, 9, 27, 1, 0))).toBe('02:00');
  });

  it('has a dash for a moment that is not known', () => {
    expect(timeWords('utc', 'UTC').clock(NaN)).toBe('–');
  });

  it('tells durations as people do', () => {
    expect(durationWords(6 * 60_000)).toBe('6 min');
    expect(durationWords(160 * 60_000)).toBe('2 h 40 min');
    expect(durationWords(2 * 3_600_000)).toBe('2 h');
    expect(durationWords(72 * 3_600_000)).toBe('3 days');
    expect(durationWords(NaN)).toBe('unknown');
  });
});
