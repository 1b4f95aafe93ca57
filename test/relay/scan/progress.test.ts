import { describe, expect, it } from 'vitest';
import { durationInWords, ScanProgress } from '../../../src/relay/scan/progress.ts';

function progressOn(isTTY: boolean): { said: string[]; progress: ScanProgress; pass: (ms: number) => void } {
  const said: string[] = [];
  let nowMs = 0;
  const stream = { isTTY, write: (text: string) => said.push(text) };
  return { said, progress: new ScanProgress(stream, 4, 400, () => nowMs), pass: (ms) => (nowMs += ms) };
}

describe('ScanProgress', () => {
  it('tells a person the time left by the share of bytes', () => {
    const { said, progress, pass } = progressOn(true);
    pass(10_000);
    progress.done('a', 100);
    pass(10_000);
    progress.bytes('b', 100);
    expect(said).toEqual([
      '\r\u001b[K1 of 4 files, 25 %, about 30 s left',
      '\r\u001b[K1 of 4 files, 50 %, about 20 s left',
    ]);
    progress.say('a: trouble');
    expect(said.slice(2)).toEqual(['\r\u001b[K', 'a: trouble\n']);
  });

  it('writes plain lines for a log, seldom', () => {
    const { said, progress, pass } = progressOn(false);
    for (let k = 1; k <= 100; k++) {
      pass(300);
      progress.bytes('a', k);
    }
    expect(said.every((line) => /^0 of 4 files, \d+ %, about \d+ (?:s|min) left\n$/.test(line))).toBe(true);
    expect(said.length).toBeLessThanOrEqual(3);
    progress.clear();
    expect(said.join('')).not.toContain('\u001b');
  });

  it('makes no guess at once, and none without bytes', () => {
    const { said, progress, pass } = progressOn(true);
    pass(500);
    progress.bytes('a', 4);
    expect(said).toEqual(['\r\u001b[K0 of 4 files, 1 %']);
  });
});

describe('durationInWords', () => {
  it.each([
    [400, '0 s'],
    [89_000, '89 s'],
    [91_000, '2 min'],
    [5_300_000, '88 min'],
    [12_000_000, '3 h 20 min'],
  ])('%d ms is %s', (ms, words) => expect(durationInWords(ms)).toBe(words));
});
