// Settles in one place what the chart library takes otherwise than this house gives it: it knows gaps only as null in plain
// arrays (NaN is bridged by a line, and a typed array turns null into 0); it counts x in seconds unless the x scale is no
// time scale, which ours never is: times stay UTC ms and the ticks come from `ticks.ts` on the site's clock.

import type uPlot from 'uplot';
import type { Frame, Look } from './pen.ts';
import type { Theme } from './theme.ts';
import { timeTicks, valueTicks, type Tick } from './ticks.ts';

/** Columns as the library wants them: plain arrays, null where a value is missing. */
export function chartData(x: ArrayLike<number>, ...columns: readonly ArrayLike<number>[]): uPlot.AlignedData {
  const orNull = (column: ArrayLike<number>): (number | null)[] =>
    Array.from(column, (value) => (Number.isFinite(value) ? value : null));
  return [Array.from(x), ...columns.map(orNull)];
}

/** An interval longer than this many usual ones is a gap, over which no line is drawn. */
const GAP = 2.5;

/**
 * The same for series through time, with an empty moment in each gap between the times.
 * @param timeMs ascending
 */
export function seriesData(timeMs: ArrayLike<number>, ...columns: readonly ArrayLike<number>[]): uPlot.AlignedData {
  const intervals = Float64Array.from(
    { length: Math.max(0, timeMs.length - 1) },
    (_, k) => timeMs[k + 1]! - timeMs[k]!,
  );
  const usual = intervals.slice().sort()[intervals.length >> 1] ?? NaN;
  const times: number[] = [];
  const from: number[] = [];
  for (let k = 0; k < timeMs.length; k++) {
    if (k > 0 && intervals[k - 1]! > GAP * usual) {
      times.push((timeMs[k - 1]! + timeMs[k]!) / 2);
      from.push(-1);
    }
    times.push(timeMs[k]!);
    from.push(k);
  }
  return chartData(times, ...columns.map((column) => from.map((k) => column[k] ?? NaN)));
}

/** The frame that a chart's axes span, in device pixels. */
export function frameOf(chart: uPlot, xScale: string, yScale: string): Frame {
  const { left, top, width, height } = chart.bbox;
  const [x, y] = [chart.scales[xScale]!, chart.scales[yScale]!];
  return { left, top, width, height, xLow: x.min ?? 0, xHigh: x.max ?? 1, yLow: y.min ?? 0, yHigh: y.max ?? 1 };
}

/** A theme's colour, thinned: `#rrggbbaa`. */
export function thinned(colour: string, opacity: number): string {
  return (
    colour +
    Math.round(255 * opacity)
      .toString(16)
      .padStart(2, '0')
  );
}

/** What all axes of the house share: hairlines, soft numbers, no tick marks. */
export function plainAxis(look: Look, ticksOf: (low: number, high: number, room: number) => Tick[]): uPlot.Axis {
  const { theme } = look;
  let last: Tick[] = [];
  return {
    font: `13px ${look.font}`,
    labelFont: `13px ${look.font}`,
    stroke: theme.soft,
    grid: { stroke: gridColour(theme), width: 1 },
    ticks: { show: false },
    border: { show: false },
    splits: (chart, axis, low, high) => {
      const across = (chart.axes[axis]!.side ?? 0) % 2 === 0;
      const pixels = (across ? chart.bbox.width : chart.bbox.height) / look.ratio;
      last = ticksOf(low, high, pixels);
      return last.map((tick) => tick.at);
    },
    values: (_, splits) => splits.map((at) => last.find((tick) => tick.at === at)?.label ?? ''),
  };
}

/** Over the picture as well as over the ground a line must just be seen. */
export function gridColour(theme: Theme): string {
  return thinned(theme.ink, 0.1);
}

/** Time across, on a zone's clock. */
export function timeAxis(look: Look, timeZone: string): uPlot.Axis {
  return plainAxis(look, (low, high, room) => timeTicks(low, high, room / 74, timeZone));
}

/** Values in the reader's unit: shown = inside * factor + offset. */
export function valueAxis(look: Look, spacing: number, factor: number, offset = 0): uPlot.Axis {
  return plainAxis(look, (low, high, room) => valueTicks(low, high, room / spacing, factor, offset));
}
