// Ramps: changes of output by at least a share of capacity within a time, as events with a beginning and an end.

import type { RampDefinition } from '../site/index.ts';
import { swingingDoor } from './swinging-door.ts';

/** Output by time; NaN where not known. */
export interface OutputSeries {
  /** UTC, ms, ascending */
  readonly timeMs: ArrayLike<number>;
  readonly powerKw: ArrayLike<number>;
}

export interface Ramp {
  /** Name of the definition it meets. */
  readonly definition: string;
  readonly sense: 'up' | 'down';
  readonly startMs: number;
  readonly endMs: number;
  /** kW from start to end, negative when down. */
  readonly changeKw: number;
  /** The same as a share of capacity. */
  readonly changeShare: number;
  /** kW/h, mean over the event. */
  readonly ratePerHourKw: number;
}

/** The door's width as a share of the definition's change. Our own choice: a tenth keeps corners true to the sample. */
const DOOR = 0.1;
/** A piece slower than this share of the definition's rate is level ground, not part of a ramp. Our own choice. */
const LEVEL = 1 / 3;
/** Samples further apart than this many usual intervals are a gap; no ramp crosses one. */
const GAP = 3.5;

/**
 * Finds the ramps of every definition. A ramp is there if and only if two samples no further apart than the definition's
 * time differ by at least its share of capacity; its beginning and end are then the corners of the swinging-door pieces
 * that rise (or fall) with it. Overlapping ramps of one sense are one event.
 * @param capacityKw what the shares are of
 * @returns by definition in the order given, each ascending in time
 */
export function findRamps(series: OutputSeries, capacityKw: number, definitions: readonly RampDefinition[]): Ramp[] {
  if (!(capacityKw > 0)) return [];
  const stretches = withoutGaps(series);
  return definitions.flatMap((definition) =>
    stretches.flatMap((stretch) =>
      (['up', 'down'] as const)
        .flatMap((sense) => rampsOf(stretch, capacityKw, definition, sense))
        .sort((a, b) => a.startMs - b.startMs),
    ),
  );
}

interface Stretch {
  readonly timeMs: readonly number[];
  readonly powerKw: readonly number[];
}

function withoutGaps(series: OutputSeries): Stretch[] {
  const known: number[] = [];
  for (let k = 0; k < series.timeMs.length; k++) if (Number.isFinite(series.powerKw[k]!)) known.push(k);
  const intervals = known.slice(1).map((k, position) => series.timeMs[k]! - series.timeMs[known[position]!]!);
  const usual = [...intervals].sort((a, b) => a - b)[intervals.length >> 1] ?? 0;
  const stretches: { timeMs: number[]; powerKw: number[] }[] = [];
  known.forEach((k, position) => {
    if (position === 0 || intervals[position - 1]! > GAP * usual) stretches.push({ timeMs: [], powerKw: [] });
    const stretch = stretches.at(-1)!;
    stretch.timeMs.push(series.timeMs[k]!);
    stretch.powerKw.push(series.powerKw[k]!);
  });
  return stretches;
}

interface Span {
  from: number;
  to: number;
}

function rampsOf(stretch: Stretch, capacityKw: number, definition: RampDefinition, sense: 'up' | 'down'): Ramp[] {
  const { timeMs } = stretch;
  const sign = sense === 'up' ? 1 : -1;
  const power = sense === 'up' ? stretch.powerKw : stretch.powerKw.map((value) => -value);
  const change = definition.share * capacityKw;
  const windows = qualifyingSpans(timeMs, power, change, definition.withinS * 1000);
  if (windows.length === 0) return [];
  const runs = risingRuns(timeMs, power, change, definition.withinS * 1000);
  const events = merge(windows.map((span) => snap(span, runs, power, change)));
  return events.map(({ from, to }) => {
    const changeKw = sign * (power[to]! - power[from]!);
    return {
      definition: definition.name,
      sense,
      startMs: timeMs[from]!,
      endMs: timeMs[to]!,
      changeKw,
      changeShare: changeKw / capacityKw,
      ratePerHourKw: changeKw / ((timeMs[to]! - timeMs[from]!) / 3_600_000),
    };
  });
}

/** For each sample the latest earlier one from which the output rose enough in time; overlapping spans joined. */
function qualifyingSpans(
  timeMs: readonly number[],
  power: readonly number[],
  change: number,
  withinMs: number,
): Span[] {
  const spans: Span[] = [];
  for (let to = 1; to < power.length; to++) {
    for (let from = to - 1; from >= 0 && timeMs[to]! - timeMs[from]! <= withinMs; from--) {
      if (!isEnough(power, from, to, change)) continue;
      spans.push({ from, to });
      break;
    }
  }
  return merge(spans);
}

/** A change that meets its limit by the last bit of a rounded share meets it. */
function isEnough(power: readonly number[], from: number, to: number, change: number): boolean {
  return power[to]! - power[from]! >= change * (1 - 1e-9);
}

/** Runs of swinging-door pieces that rise at a rate worth the name. */
function risingRuns(timeMs: readonly number[], power: readonly number[], change: number, withinMs: number): Span[] {
  const corners = swingingDoor(timeMs, power, DOOR * change);
  const leastRate = (LEVEL * change) / withinMs;
  const runs: Span[] = [];
  for (let k = 1; k < corners.length; k++) {
    const [from, to] = [corners[k - 1]!, corners[k]!];
    if ((power[to]! - power[from]!) / (timeMs[to]! - timeMs[from]!) < leastRate) continue;
    const last = runs.at(-1);
    if (last?.to === from) last.to = to;
    else runs.push({ from, to });
  }
  return runs;
}

/**
 * Brings a qualifying span to the corners of the rising runs within it: level ground at its ends falls away and a rise that
 * went on longer is taken whole. Corners may miss the extremes by the door's width; where that would leave too small a
 * change the span's own extremes stand.
 */
function snap(span: Span, runs: readonly Span[], power: readonly number[], change: number): Span {
  const within = runs.filter((run) => run.to > span.from && run.from < span.to);
  if (within.length === 0) return span;
  let from = within[0]!.from;
  let to = within.at(-1)!.to;
  if (isEnough(power, from, to, change)) return { from, to };
  const [first, last] = [Math.min(from, span.from), Math.max(to, span.to)];
  for (let k = from; k >= first; k--) if (power[k]! < power[from]!) from = k;
  for (let k = to; k <= last; k++) if (power[k]! > power[to]!) to = k;
  return isEnough(power, from, to, change) ? { from, to } : span;
}

/** Joins spans that overlap or touch. */
function merge(spans: readonly Span[]): Span[] {
  const merged: Span[] = [];
  for (const span of [...spans].sort((a, b) => a.from - b.from)) {
    const last = merged.at(-1);
    if (last !== undefined && span.from <= last.to) last.to = Math.max(last.to, span.to);
    else merged.push({ ...span });
  }
  return merged;
}
