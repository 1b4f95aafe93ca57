import { describe, expect, it } from 'vitest';
import {
  colourScale,
  drawFigureSheet,
  drawHistogram,
  drawMonthMatrix,
  drawRose,
  FIELDS,
  FONT,
  THEMES,
  type HistogramChart,
  type Look,
  type MonthMatrix,
  type Rose,
} from '../../src/plot/index.ts';
import { contrastOf, type Bytes } from '../../src/plot/colour.ts';
import { inkOn } from '../../src/plot/figure.ts';
import { histogramExtent } from '../../src/plot/histogram.ts';
import { roseRings } from '../../src/plot/rose.ts';
import { recordingPen } from './recording-pen.ts';

const look: Look = { theme: THEMES.dark, ratio: 1, font: FONT };
const named = (lines: string[], name: string): string[] => lines.filter((line) => line.split(' ')[0] === name);
const bytesOf = (hex: string): Bytes => [1, 3, 5].map((at) => parseInt(hex.slice(at, at + 2), 16)) as unknown as Bytes;

describe('drawMonthMatrix', () => {
  const hours = (fill: (month: number, hour: number) => number): number[] =>
    Array.from({ length: 288 }, (_, k) => fill(Math.floor(k / 24), k % 24));
  const matrix: MonthMatrix = {
    months: [4, 5],
    // At 01 h half in May; nothing could be judged in June before noon.
    share: hours((month, hour) => (month === 5 && hour < 12 ? NaN : hour === 1 ? 0.5 : 0)),
    judged: hours((month, hour) => (month === 5 && hour < 12 ? 0 : hour === 1 ? 0.25 : 1)),
    sunset: Array.from({ length: 12 }, () => 19.5),
    sunrise: Array.from({ length: 12 }, (_, month) => (month === 4 ? 4.5 : NaN)),
    notes: [{ title: 'jets in 100', texts: Array.from({ length: 12 }, (_, month) => `m${month}`) }],
    legend: {
      scale: colourScale('share', 'dark'),
      range: { low: 0, high: 0.5 },
      unit: 'jets in 100',
      ticks: [],
      words: '',
    },
  };
  // 24 columns of 40 pixels and two rows of 50 beside margins of 38 + 82 and 22 + 66.
  const area = { left: 0, top: 0, width: 960 + 38 + 82, height: 100 + 22 + 66 };
  // The legend below is 200 strips of one pixel's width.
  const cells = (lines: string[]): string[] => named(lines, 'fillRect').filter((line) => !/ 1 9$/.test(line));

  it('stands night in the middle and fills a cell as far as it could be judged', () => {
    const { pen, lines } = recordingPen();
    drawMonthMatrix(pen, area, matrix, look);
    const all = cells(lines);
    expect(all).toHaveLength(48);
    // 12 h is the first column, whole; 01 h the fourteenth, filled by a quarter of its 49 pixels from below.
    expect(all[0]).toBe('fillRect 38 22 39 49');
    expect(all[13]).toBe(`fillRect ${38 + 13 * 40} ${22 + 49 - 12} 39 12`);
    // A dot where nothing could be judged.
    expect(all[24 + 12]).toMatch(/ 1 1$/);
    expect(named(lines, 'fillText')).toContain('fillText m4 1072 47');
    const labels = named(lines, 'fillText').map((line) => line.split(' ')[1]!);
    expect(labels.slice(-10)).toEqual(['12', '15', '18', '21', '00', '03', '06', '09', '12', 'jets']);
  });

  it('marks sunset and sunrise where they are known', () => {
    const { pen, lines } = recordingPen();
    drawMonthMatrix(pen, area, matrix, look);
    const at = (hour: number): number => 38 + (hour - 12) * 40;
    const strokes = named(lines, 'moveTo').map((line) => Number(line.split(' ')[1]));
    // Rim and stroke at both edges of a row: four for each row and sun time.
    expect(strokes.filter((x) => Math.abs(x - at(19.5)) < 2)).toHaveLength(8);
    expect(strokes.filter((x) => Math.abs(x - at(28.5)) < 2)).toHaveLength(4);
  });

  it('leaves the notes out where there is no room', () => {
    const { pen, lines } = recordingPen();
    drawMonthMatrix(pen, { ...area, width: 380 }, matrix, look);
    expect(lines.some((line) => line.includes('m4'))).toBe(false);
    expect(cells(lines)).toHaveLength(48);
  });

  it('draws the same every time', () => {
    const { pen, lines } = recordingPen();
    drawMonthMatrix(pen, area, matrix, look);
    expect(lines.filter((line) => !/ 1 9$|^fillStyle = rgb/.test(line))).toMatchSnapshot();
  });
});

describe('inkOn', () => {
  it('keeps figures readable on every colour of the scale, in every theme', () => {
    for (const theme of ['dark', 'light', 'red'] as const) {
      const { rgba } = colourScale('share', theme);
      for (let k = 0; k < 256; k++) {
        const colour: Bytes = [rgba[4 * k]!, rgba[4 * k + 1]!, rgba[4 * k + 2]!];
        const contrast = contrastOf(colour, bytesOf(inkOn(colour, THEMES[theme])));
        // One hue has only so much lightness to give.
        expect(contrast).toBeGreaterThan(theme === 'red' ? 2 : 3.5);
      }
    }
  });
});

describe('drawHistogram', () => {
  const series = { name: 'jets', start: 0, step: 50, counts: [0, 0, 1, 3, 0, 0, 0], total: 4 };
  const chart: HistogramChart = { series: [series], upright: false, label: 'height, m', factor: 1 };
  const area = { left: 0, top: 0, width: 260, height: 252 };

  it('shows the classes that hold anything, and one on either side', () => {
    expect(histogramExtent([series])).toEqual({ low: 50, high: 250 });
    expect(histogramExtent([{ ...series, counts: [5, 0, 0, 0, 0, 0, 2] }])).toEqual({ low: 0, high: 350 });
    expect(histogramExtent([{ ...series, counts: [0, 0], total: 0 }])).toEqual({ low: 0, high: 50 });
  });

  it('draws shares of all, across and upright', () => {
    const { pen, lines } = recordingPen();
    drawHistogram(pen, area, chart, look);
    // 200 pixels for 200 m from 46 on, 200 for 81 in 100: the bars are 25 and 75 in 100 high.
    const tall = (share: number): number => Number(((200 * share) / 81).toFixed(1));
    expect(named(lines, 'fillRect')).toEqual([
      `fillRect 96 ${(208 - tall(25)).toFixed(1)} 49 ${tall(25)}`,
      `fillRect 146 ${(208 - tall(75)).toFixed(1)} 49 ${tall(75)}`,
    ]);
    const upright = recordingPen();
    drawHistogram(upright.pen, area, { ...chart, upright: true }, look);
    expect(named(upright.lines, 'fillRect')).toEqual([
      `fillRect 46 108 ${tall(25)} 49`,
      `fillRect 46 58 ${tall(75)} 49`,
    ]);
  });

  it('lays a second series over the first as an outline, and tells a mark', () => {
    const { pen, lines } = recordingPen();
    const both = [series, { ...series, name: 'others', counts: [0, 2, 0, 2, 0, 0, 0] }];
    drawHistogram(pen, area, { ...chart, series: both, mark: { at: 300, label: 'sunset' } }, look);
    expect(named(lines, 'fillRect')).toHaveLength(2);
    expect(named(lines, 'clip')).toHaveLength(1);
    expect(named(lines, 'fillText').some((line) => line.startsWith('fillText sunset'))).toBe(true);
    expect(lines).toMatchSnapshot();
  });

  it('draws axes of nothing', () => {
    const { pen, lines } = recordingPen();
    drawHistogram(pen, area, { ...chart, series: [{ ...series, counts: [0, 0], total: 0 }] }, look);
    expect(named(lines, 'fillRect')).toEqual([]);
    expect(lines.join()).not.toContain('null');
  });
});

describe('drawRose', () => {
  const counts = new Array<number>(16).fill(0);
  // South by two classes: 3 of 8 weak, 1 strong; north 4 weak.
  const rose: Rose = {
    counts: counts.flatMap((_, sector) => (sector === 0 ? [4, 0] : sector === 8 ? [3, 1] : [0, 0])),
    classes: [
      { words: 'below 12 m/s', value: 10 },
      { words: '12 m/s and more', value: 14 },
    ],
    scale: colourScale('speed', 'dark'),
    range: FIELDS.speed.range,
  };
  const area = { left: 0, top: 0, width: 240, height: 280 };

  it('points a petal to where the wind comes from, as long as its share', () => {
    const { pen, lines } = recordingPen();
    drawRose(pen, area, rose, look);
    // Rings at 20, 40, 60 in 100; radius 100 about (120, 120).
    const arcs = named(lines, 'arc').map((line) => line.split(' ').slice(1).map(Number));
    expect(arcs.slice(0, 3).map(([x, y, radius]) => [x, y, radius])).toEqual([
      [120, 120, 33.3],
      [120, 120, 66.7],
      [120, 120, 100],
    ]);
    const petals = arcs.slice(3);
    expect(petals).toHaveLength(6);
    const middle = ([, , , from, to]: number[]): number => (from! + to!) / 2;
    // Upward on the canvas is minus a quarter turn: north; downward is south.
    expect(middle(petals[0]!)).toBeCloseTo(-Math.PI / 2, 1);
    expect(petals[0]![2]).toBeCloseTo((50 / 60) * 100, 1);
    expect(middle(petals[2]!)).toBeCloseTo(Math.PI / 2, 1);
    expect(petals[2]![2]).toBeCloseTo((37.5 / 60) * 100, 1);
    expect(petals[4]![2]).toBeCloseTo((50 / 60) * 100, 1);
  });

  it('sets rings at round shares', () => {
    expect(roseRings(50)).toEqual([20, 40, 60]);
    expect(roseRings(7.5)).toEqual([2, 4, 6, 8]);
    expect(roseRings(100)).toEqual([25, 50, 75, 100]);
    expect(roseRings(0)).toEqual([0.5]);
  });

  it('draws the same every time, with the key beside it where there is room', () => {
    const { pen, lines } = recordingPen();
    drawRose(pen, { ...area, width: 500 }, rose, look);
    expect(lines).toMatchSnapshot();
  });

  it('draws rings of nothing', () => {
    const { pen, lines } = recordingPen();
    drawRose(pen, area, { ...rose, counts: rose.counts.map(() => 0) }, look);
    expect(named(lines, 'arc')).toHaveLength(1);
    expect(lines.join()).not.toContain('null');
  });
});

describe('drawFigureSheet', () => {
  const words = (lines: string[]): string[] =>
    named(lines, 'fillText').map((line) => line.slice('fillText '.length).replace(/ [\d.]+ [\d.]+$/, ''));

  it('writes title, source and caution about the figure', () => {
    const { pen, lines } = recordingPen();
    let given = { left: 0, top: 0, width: 0, height: 0 };
    drawFigureSheet(
      pen,
      { width: 800, height: 500 },
      { title: 'How often', source: 'Plain (lidar)', foot: 'An aid.', draw: (_, area) => (given = area) },
      look,
    );
    expect(words(lines)).toEqual(['How often', 'Plain (lidar)', 'An aid.']);
    // Margins of 24; a head of 36 and a line of 18 above, a line of 18 and 12 of air below.
    expect(given).toEqual({ left: 24, top: 78, width: 752, height: 500 - 24 - 18 - 12 - 78 });
  });

  it('breaks a long caution so that none of it is lost', () => {
    const { pen, lines } = recordingPen();
    const foot = 'one two three four five six seven eight nine ten';
    drawFigureSheet(
      pen,
      { width: 48 + 130, height: 500 },
      { title: 'T', source: 'S', foot, draw: () => undefined },
      look,
    );
    // A letter is six pixels wide: 21 fit.
    expect(words(lines).slice(2)).toEqual(['one two three four', 'five six seven eight', 'nine ten']);
  });
});
