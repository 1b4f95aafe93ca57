// How values are spread: the share of all in classes of equal width. The first series is filled, another one drawn as an
// outline, so that two stand over each other and both are seen.

import { frameWithin, type Area } from './figure.ts';
import { strokeLine, within, writeText, xPixel, yPixel, type Frame, type Look, type Pen } from './pen.ts';
import { valueTicks } from './ticks.ts';

export interface HistogramSeries {
  readonly name: string;
  /** Class k reaches from `start + k * step` to `start + (k + 1) * step`. */
  readonly start: number;
  readonly step: number;
  readonly counts: readonly number[];
  /** All values, those beyond the classes too. */
  readonly total: number;
}

export interface HistogramChart {
  readonly series: readonly HistogramSeries[];
  /** Whether the values stand on the upright axis, as heights do. */
  readonly upright: boolean;
  /** What the value axis tells, with its unit. */
  readonly label: string;
  /** shown = inside * factor */
  readonly factor: number;
  /** A value to be told by a line of its own. */
  readonly mark?: { readonly at: number; readonly label: string };
}

/** The classes that hold anything, with one of room on either side. */
export function histogramExtent(series: readonly HistogramSeries[]): { readonly low: number; readonly high: number } {
  let [low, high] = [Infinity, -Infinity];
  for (const { start, step, counts } of series) {
    counts.forEach((count, k) => {
      if (count === 0) return;
      low = Math.min(low, start + k * step);
      high = Math.max(high, start + (k + 1) * step);
    });
  }
  const [first] = series;
  if (first === undefined || low > high)
    return { low: first?.start ?? 0, high: (first?.start ?? 0) + (first?.step ?? 1) };
  const end = first.start + first.counts.length * first.step;
  return { low: Math.max(first.start, low - first.step), high: Math.min(end, high + first.step) };
}

const shareOf = ({ counts, total }: HistogramSeries, k: number): number =>
  total === 0 ? 0 : (100 * counts[k]!) / total;

export function drawHistogram(pen: Pen, area: Area, chart: HistogramChart, look: Look): void {
  const { theme, ratio } = look;
  const { series, upright, mark } = chart;
  const { low, high } = histogramExtent(mark === undefined ? series : [...series, markAsSeries(mark.at, series)]);
  const most = Math.max(1, ...series.flatMap((one) => one.counts.map((_, k) => shareOf(one, k)))) * 1.08;
  const frame = frameWithin(
    area,
    { left: 46, right: 14, top: mark === undefined ? 8 : 24, bottom: 44 },
    upright ? { xLow: 0, xHigh: most, yLow: low, yHigh: high } : { xLow: low, xHigh: high, yLow: 0, yHigh: most },
    look,
  );
  drawAxes(pen, frame, chart, look);
  series.forEach((one, k) =>
    k === 0 ? drawBars(pen, frame, one, upright, look) : drawOutline(pen, frame, one, upright, look),
  );
  if (mark === undefined) return;
  pen.strokeStyle = theme.ink;
  pen.lineWidth = ratio;
  pen.setLineDash([2 * ratio, 3 * ratio]);
  const [x, y] = [xPixel(frame, mark.at), yPixel(frame, mark.at)];
  if (upright) strokeLine(pen, frame.left, y, frame.left + frame.width, y);
  else strokeLine(pen, x, frame.top, x, frame.top + frame.height);
  pen.setLineDash([]);
  if (upright) writeText(pen, look, mark.label, frame.left + frame.width, y - 4 * ratio, { size: 12, align: 'right' });
  else writeText(pen, look, mark.label, x, frame.top - 8 * ratio, { size: 12, align: 'center' });
}

/** A mark takes part in the extent as if a value stood there. */
function markAsSeries(at: number, [like]: readonly HistogramSeries[]): HistogramSeries {
  return { name: '', start: at, step: like?.step ?? 1, counts: [1], total: 1 };
}

function drawAxes(pen: Pen, frame: Frame, { upright, label, factor }: HistogramChart, look: Look): void {
  const { theme, ratio } = look;
  const across = frame.width / ratio / 56;
  const up = frame.height / ratio / 42;
  const xs = upright ? valueTicks(0, frame.xHigh, across) : valueTicks(frame.xLow, frame.xHigh, across, factor);
  const ys = upright ? valueTicks(frame.yLow, frame.yHigh, up, factor) : valueTicks(0, frame.yHigh, up);
  pen.lineWidth = ratio;
  pen.strokeStyle = theme.rule;
  for (const { at, label: text } of xs) {
    const x = xPixel(frame, at);
    if (upright) strokeLine(pen, x, frame.top, x, frame.top + frame.height);
    writeText(pen, look, text, x, frame.top + frame.height + 17 * ratio, { size: 12, align: 'center' });
  }
  for (const { at, label: text } of ys) {
    const y = yPixel(frame, at);
    if (!upright) strokeLine(pen, frame.left, y, frame.left + frame.width, y);
    writeText(pen, look, text, frame.left - 8 * ratio, y, { size: 12, align: 'right', baseline: 'middle' });
  }
  const below = frame.top + frame.height + 36 * ratio;
  writeText(pen, look, upright ? 'in 100' : label, frame.left + frame.width, below, { size: 12, align: 'right' });
  writeText(pen, look, upright ? label : 'in 100', frame.left - 38 * ratio, below, { size: 12 });
}

const FILL = 0.6;

function drawBars(pen: Pen, frame: Frame, series: HistogramSeries, upright: boolean, { theme, ratio }: Look): void {
  pen.fillStyle = theme.soft;
  // Thinned, so that an outline over it is seen in every theme.
  pen.globalAlpha = FILL;
  series.counts.forEach((count, k) => {
    if (count === 0) return;
    const from = series.start + k * series.step;
    const share = shareOf(series, k);
    if (upright) {
      const [top, bottom] = [Math.round(yPixel(frame, from + series.step)), Math.round(yPixel(frame, from))];
      pen.fillRect(frame.left, top, xPixel(frame, share) - frame.left, Math.max(1, bottom - top - ratio));
    } else {
      const [left, right] = [Math.round(xPixel(frame, from)), Math.round(xPixel(frame, from + series.step))];
      const top = yPixel(frame, share);
      pen.fillRect(left, top, Math.max(1, right - left - ratio), frame.top + frame.height - top);
    }
  });
  pen.globalAlpha = 1;
}

function drawOutline(pen: Pen, frame: Frame, series: HistogramSeries, upright: boolean, { theme, ratio }: Look): void {
  within(pen, frame, () => {
    pen.strokeStyle = theme.ink;
    pen.lineWidth = 2 * ratio;
    pen.lineJoin = 'miter';
    pen.beginPath();
    const to = (value: number, share: number, begin = false): void => {
      const x = xPixel(frame, upright ? share : value);
      const y = yPixel(frame, upright ? value : share);
      if (begin) pen.moveTo(x, y);
      else pen.lineTo(x, y);
    };
    to(series.start, 0, true);
    for (let k = 0; k < series.counts.length; k++) {
      to(series.start + k * series.step, shareOf(series, k));
      to(series.start + (k + 1) * series.step, shareOf(series, k));
    }
    to(series.start + series.counts.length * series.step, 0);
    pen.stroke();
  });
}
