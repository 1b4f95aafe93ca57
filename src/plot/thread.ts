// The jet's track through a section: a thread with a halo, in a band that is as wide as its spread; dashed where it lies
// in the outlook.

import { tracePoints, xPixel, yPixel, type Frame, type Look, type Pen } from './pen.ts';

/** Parallel columns, ascending in time; NaN heights are where there is no nose. */
export interface Thread {
  readonly timeMs: ArrayLike<number>;
  /** Nose, m above ground. */
  readonly height: ArrayLike<number>;
  /** Bounds of the spread, m above ground; NaN or absent where none is known. */
  readonly low?: ArrayLike<number>;
  readonly high?: ArrayLike<number>;
  readonly kind: 'observed' | 'outlook';
  /** Points further apart than this, ms, are not joined. */
  readonly joinMs: number;
}

export interface ThreadStyle {
  /** Width of the line, CSS pixels; 2 unless told. */
  readonly width?: number;
}

export function drawThread(pen: Pen, frame: Frame, thread: Thread, look: Look, style: ThreadStyle = {}): void {
  const { width = 2 } = style;
  const { theme, ratio } = look;
  pen.lineJoin = 'round';
  pen.lineCap = 'round';
  for (const run of runsOf(thread)) {
    drawBand(pen, frame, thread, run, look);
    const x = (k: number): number => xPixel(frame, thread.timeMs[run.first + k]!);
    const y = (k: number): number => yPixel(frame, thread.height[run.first + k]!);
    const count = run.end - run.first;
    if (count === 1) {
      drawDot(pen, x(0), y(0), width, look);
      continue;
    }
    const trace = (): void => {
      pen.beginPath();
      tracePoints(pen, count, x, y);
      pen.stroke();
    };
    pen.globalAlpha = 0.75;
    pen.strokeStyle = theme.ground;
    pen.lineWidth = (width + 2.5) * ratio;
    trace();
    pen.globalAlpha = 1;
    pen.strokeStyle = theme.ink;
    pen.lineWidth = width * ratio;
    if (thread.kind === 'outlook') pen.setLineDash([7 * ratio, 5 * ratio]);
    trace();
    pen.setLineDash([]);
  }
}

/** Points that are joined: from `first` up to, not including, `end`. */
interface Run {
  readonly first: number;
  readonly end: number;
}

function runsOf({ timeMs, height, joinMs }: Thread): Run[] {
  const runs: Run[] = [];
  let first = -1;
  for (let k = 0; k <= timeMs.length; k++) {
    const known = k < timeMs.length && !Number.isNaN(height[k]!);
    const broken = first >= 0 && (!known || timeMs[k]! - timeMs[k - 1]! > joinMs);
    if (broken) runs.push({ first, end: k });
    if (broken) first = -1;
    if (known && first < 0) first = k;
  }
  return runs;
}

function drawBand(pen: Pen, frame: Frame, thread: Thread, { first, end }: Run, { theme }: Look): void {
  const { timeMs, low, high, height } = thread;
  if (low === undefined || high === undefined || end - first < 2) return;
  // Where no bound is known the band closes on the thread.
  const bound = (side: ArrayLike<number>, k: number): number => (Number.isNaN(side[k]!) ? height[k]! : side[k]!);
  pen.globalAlpha = thread.kind === 'outlook' ? 0.2 : 0.16;
  pen.fillStyle = theme.ink;
  pen.beginPath();
  for (let k = first; k < end; k++) pen.lineTo(xPixel(frame, timeMs[k]!), yPixel(frame, bound(low, k)));
  for (let k = end - 1; k >= first; k--) pen.lineTo(xPixel(frame, timeMs[k]!), yPixel(frame, bound(high, k)));
  pen.closePath();
  pen.fill();
  pen.globalAlpha = 1;
}

function drawDot(pen: Pen, x: number, y: number, width: number, { theme, ratio }: Look): void {
  pen.fillStyle = theme.ground;
  pen.beginPath();
  pen.arc(x, y, (width + 1) * ratio, 0, 2 * Math.PI);
  pen.fill();
  pen.fillStyle = theme.ink;
  pen.beginPath();
  pen.arc(x, y, width * ratio, 0, 2 * Math.PI);
  pen.fill();
}
