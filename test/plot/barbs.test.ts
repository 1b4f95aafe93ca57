import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { drawBarb, feathersOf, FONT, THEMES, type BarbStyle, type Look } from '../../src/plot/index.ts';
import { recordingPen } from './recording-pen.ts';

const look: Look = { theme: THEMES.dark, ratio: 1, font: FONT };
const drawn = (speed: number, direction: number, style: BarbStyle = { hemisphere: 'north' }): string[] => {
  const { pen, lines } = recordingPen();
  drawBarb(pen, 0, 0, speed, direction, look, { length: 100, ...style });
  return lines;
};
/** Ends of all lines drawn, rounded. */
const points = (lines: string[]): [number, number][] =>
  lines
    .filter((line) => line.startsWith('moveTo') || line.startsWith('lineTo'))
    .map((line) => line.split(' ').slice(1).map(Number) as [number, number]);

describe('feathersOf', () => {
  it('counts as the WMO convention does (WMO-No. 485, Appendix II-4): half 2.5, whole 5, pennant 25 m/s', () => {
    const rows: [number, number, number, number][] = [
      [1, 0, 0, 0],
      [2.5, 0, 0, 1],
      [5, 0, 1, 0],
      [7.4, 0, 1, 1],
      [12.5, 0, 2, 1],
      [22.5, 0, 4, 1],
      [25, 1, 0, 0],
      [62.5, 2, 2, 1],
    ];
    for (const [speed, pennants, whole, half] of rows) {
      expect(feathersOf(speed), String(speed)).toEqual({ pennants, whole, half, calm: false });
    }
    expect(feathersOf(0.3).calm).toBe(true);
  });

  it('counts in fives of knots for readers of knots', () => {
    // 65 kt = 33.4 m/s: a pennant, a feather and a half.
    expect(feathersOf(65 * (1852 / 3600), 'kt')).toMatchObject({ pennants: 1, whole: 1, half: 1 });
    expect(feathersOf(65 * (1852 / 3600), 'm/s')).toMatchObject({ pennants: 1, whole: 1, half: 1 });
    expect(feathersOf(100 * (1852 / 3600), 'kt')).toMatchObject({ pennants: 2, whole: 0, half: 0 });
    expect(feathersOf(100 * (1852 / 3600), 'm/s')).toMatchObject({ pennants: 2, whole: 0, half: 1 });
  });

  it('never differs from the speed by more than half a step (property)', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.5, max: 120, noNaN: true }), (speed) => {
        const { pennants, whole, half } = feathersOf(speed);
        expect(Math.abs(25 * pennants + 5 * whole + 2.5 * half - speed)).toBeLessThanOrEqual(1.25 + 1e-9);
        expect(whole).toBeLessThan(5);
        expect(half).toBeLessThan(2);
      }),
    );
  });
});

describe('drawBarb', () => {
  it('points the shaft to where the wind comes from', () => {
    expect(points(drawn(1, 0))[1]).toEqual([0, -100]);
    expect(points(drawn(1, 90))[1]).toEqual([100, 0]);
    expect(points(drawn(1, 180))[1]).toEqual([0, 100]);
  });

  it('puts feathers on the side of low pressure: east of a north wind in the north, west of it in the south', () => {
    const northern = points(drawn(12, 0, { hemisphere: 'north' })).slice(2);
    const southern = points(drawn(12, 0, { hemisphere: 'south' })).slice(2);
    expect(Math.max(...northern.map(([x]) => x))).toBeGreaterThan(30);
    expect(Math.min(...northern.map(([x]) => x))).toBe(0);
    expect(southern).toEqual(northern.map(([x, y]) => [-x + 0, y]));
  });

  it('draws a ring for a calm, and nothing for a wind without direction or speed', () => {
    expect(drawn(0, NaN).some((line) => line.startsWith('arc'))).toBe(true);
    expect(drawn(10, NaN)).toEqual([]);
    expect(drawn(NaN, 90)).toEqual([]);
  });

  it('sets a lone half feather in from the end', () => {
    const [, end, foot] = points(drawn(2.5, 0));
    expect(end).toEqual([0, -100]);
    expect(foot![1]).toBeGreaterThan(-90);
  });

  it('draws the same every time', () => {
    expect(drawn(33.5, 225, { hemisphere: 'south', rimmed: true })).toMatchSnapshot();
  });
});
