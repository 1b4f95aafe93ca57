import { describe, expect, it, vi } from 'vitest';
import type uPlot from 'uplot';
import {
  chartData,
  FONT,
  frameOf,
  profileOptions,
  sectionOptions,
  seriesData,
  THEMES,
  type Look,
} from '../../src/plot/index.ts';

const look: Look = { theme: THEMES.dark, ratio: 2, font: FONT };
const HOUR = 3_600_000;
const extent = { startMs: 0, endMs: 10 * HOUR, bottom: 0, top: 1000 };
const common = {
  width: 800,
  height: 500,
  look,
  heightUnit: 'ft',
  drawUnder: () => undefined,
  drawOver: () => undefined,
} as const;

/** As much of a chart as the options look at. */
const chartOf = (options: uPlot.Options, extra: object = {}): uPlot =>
  ({
    axes: options.axes!.map((axis, k) => ({ ...axis, side: k === 0 ? 2 : 3 })),
    bbox: { left: 100, top: 16, width: 1200, height: 800 },
    scales: options.scales,
    ...extra,
  }) as unknown as uPlot;

describe('seriesData', () => {
  it('breaks the line where the usual interval is long exceeded', () => {
    expect(seriesData([0, 10, 20, 60, 70], [1, 2, NaN, 4, 5])).toEqual([
      [0, 10, 20, 40, 60, 70],
      [1, 2, null, null, 4, 5],
    ]);
    expect(seriesData([], [])).toEqual([[], []]);
  });
});

describe('chartData', () => {
  it('hands over plain arrays with null for what is missing', () => {
    expect(chartData(Float64Array.of(1, 2, 3), Float32Array.of(5, NaN, Infinity))).toEqual([
      [1, 2, 3],
      [5, null, null],
    ]);
  });
});

describe('frameOf', () => {
  it('takes pixels from the chart and values from its scales', () => {
    const chart = chartOf(sectionOptions({ ...common, extent, timeZone: 'UTC', discCount: 1 }));
    expect(frameOf(chart, 'x', 'height')).toEqual({
      left: 100,
      top: 16,
      width: 1200,
      height: 800,
      xLow: 0,
      xHigh: 10 * HOUR,
      yLow: 0,
      yHigh: 1000,
    });
  });
});

describe('section and profile options', () => {
  const section = sectionOptions({ ...common, extent, timeZone: 'UTC', discCount: 2 });
  const profile = profileOptions({ ...common, bottom: 0, top: 1000, fastest: 24, speedUnit: 'kt' });

  it('leave the same room above and below, so that the height axis is shared to the pixel', () => {
    expect(section.padding![0]).toBe(profile.padding![0]);
    expect(section.axes![0]!.size).toBe(profile.axes![0]!.size);
    expect(section.height).toBe(profile.height);
    expect(section.scales!.height).toEqual(profile.scales!.height);
  });

  it('put ticks at round values of the reader’s unit', () => {
    const axis = section.axes![1]! as {
      splits: (...args: unknown[]) => number[];
      values: (...args: unknown[]) => string[];
    };
    const chart = chartOf(section);
    const splits = axis.splits(chart, 1, 0, 1000);
    expect(axis.values(chart, splits)).toEqual(['0', '500', '1000', '1500', '2000', '2500', '3000']);
    expect(splits[2]).toBeCloseTo(304.8, 9);
  });

  it('keep times in milliseconds on the zone’s clock', () => {
    expect(section.scales!.x!.time).toBe(false);
    const axis = section.axes![0]! as {
      splits: (...args: unknown[]) => number[];
      values: (...args: unknown[]) => string[];
    };
    const chart = chartOf(section);
    const splits = axis.splits(chart, 0, 0, 10 * HOUR);
    expect(splits.slice(0, 2)).toEqual([0, 2 * HOUR]);
    expect(axis.values(chart, splits).slice(0, 2)).toEqual(['1 Jan', '02:00']);
  });

  it('tell where the cursor is and what was drawn to zoom into', () => {
    const onCursor = vi.fn();
    const onZoom = vi.fn();
    const options = sectionOptions({ ...common, extent, timeZone: 'UTC', discCount: 0, onCursor, onZoom });
    const setSelect = vi.fn();
    const chart = chartOf(options, {
      cursor: { left: 60, top: 40 },
      select: { left: 60, top: 100, width: 120, height: 50 },
      posToVal: (pixel: number, scale: string) => (scale === 'x' ? pixel * 60_000 : 1000 - pixel),
      setSelect,
    });
    options.hooks!.setCursor!.forEach((hook) => hook?.(chart));
    expect(onCursor).toHaveBeenCalledWith({ x: HOUR, height: 960 });
    options.hooks!.setSelect!.forEach((hook) => hook?.(chart));
    expect(onZoom).toHaveBeenCalledWith({ startMs: HOUR, endMs: 3 * HOUR, bottom: 850, top: 900 });
    expect(setSelect).toHaveBeenCalledWith({ left: 0, top: 0, width: 0, height: 0 }, false);
    const gone = chartOf(options, { cursor: { left: -10, top: -10 } });
    options.hooks!.setCursor!.forEach((hook) => hook?.(gone));
    expect(onCursor).toHaveBeenLastCalledWith(null);
  });
});
