// Round values for axes and legends: in the reader's unit, and on the site's clock.

import { TZDateMini, tzOffset } from '@date-fns/tz';
import { format } from 'date-fns';

export interface Tick {
  /** In the unit used inside. */
  readonly at: number;
  readonly label: string;
}

/**
 * Round values between two ends.
 * @param factor shown = inside * factor + offset
 * @param most how many ticks there is room for
 */
export function valueTicks(low: number, high: number, most: number, factor = 1, offset = 0): Tick[] {
  const [from, to] = [low * factor + offset, high * factor + offset];
  if (!(to > from) || !(most >= 1)) return [];
  const step = roundStep((to - from) / most);
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const ticks: Tick[] = [];
  const allow = 1e-9 * (to - from);
  for (let k = Math.ceil((from - allow) / step); k * step <= to + allow; k++) {
    ticks.push({ at: (k * step - offset) / factor, label: signed(k * step, decimals) });
  }
  return ticks;
}

/** The least of 1, 2, 2.5, 5 times a power of ten that is not below a value; 2.5 only above one. */
function roundStep(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value) + 1e-9);
  const steps = power >= 10 ? [1, 2, 2.5, 5, 10] : [1, 2, 5, 10];
  return power * (steps.find((step) => step * power >= value * (1 - 1e-9)) ?? 10);
}

/** With a true minus sign, and zero without any. */
function signed(value: number, decimals: number): string {
  const text = Math.abs(value).toFixed(decimals);
  return value < 0 && Number(text) !== 0 ? `−${text}` : text;
}

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;
const CLOCK_STEPS = [1, 2, 5, 10, 15, 30, 60, 120, 180, 360, 720].map((minutes) => minutes * MINUTE);
const DAY_STEPS = [1, 2, 3, 7, 14];
const MONTH_STEPS = [1, 2, 3, 6, 12, 24, 60, 120];

/**
 * Round times of a zone's clock between two moments, daylight saving included; midnight is told as a date.
 * @param timeZone IANA name
 * @param most how many ticks there is room for
 */
export function timeTicks(startMs: number, endMs: number, most: number, timeZone: string): Tick[] {
  const span = endMs - startMs;
  if (!(span > 0) || !(most >= 1)) return [];
  const clockStep = CLOCK_STEPS.find((step) => span / step <= most);
  if (clockStep !== undefined) return clockTicks(startMs, endMs, clockStep, timeZone);
  const days = DAY_STEPS.find((step) => span / (step * DAY) <= most);
  return days === undefined ? monthTicks(startMs, endMs, most, timeZone) : dayTicks(startMs, endMs, days, timeZone);
}

/** A moment told on a zone's clock, in a date-fns pattern: `HH:mm`, `d MMM`. */
export function timeText(timeMs: number, timeZone: string, pattern: string): string {
  return format(new TZDateMini(timeMs, timeZone), pattern);
}

/** The zone's clock as if it were UTC, ms. */
function clockOf(timeMs: number, timeZone: string): number {
  return timeMs + tzOffset(timeZone, new Date(timeMs)) * MINUTE;
}

/** The moment at which the zone's clock shows this. A time that the clock jumps over becomes the moment of the jump. */
function momentOf(clockMs: number, timeZone: string): number {
  const guess = clockMs - tzOffset(timeZone, new Date(clockMs)) * MINUTE;
  return clockMs - tzOffset(timeZone, new Date(guess)) * MINUTE;
}

function clockTicks(startMs: number, endMs: number, step: number, timeZone: string): Tick[] {
  const ticks: Tick[] = [];
  const first = Math.floor(clockOf(startMs, timeZone) / step) - Math.ceil(HOUR / step);
  const last = Math.ceil(clockOf(endMs, timeZone) / step) + Math.ceil(HOUR / step);
  for (let k = first; k <= last; k++) {
    const at = momentOf(k * step, timeZone);
    if (at < startMs || at > endMs || clockOf(at, timeZone) !== k * step) continue;
    if (ticks.length > 0 && at <= ticks[ticks.length - 1]!.at) continue;
    ticks.push({ at, label: timeText(at, timeZone, (k * step) % DAY === 0 ? 'd MMM' : 'HH:mm') });
  }
  return ticks;
}

function dayTicks(startMs: number, endMs: number, days: number, timeZone: string): Tick[] {
  const ticks: Tick[] = [];
  const lastDay = Math.ceil(clockOf(endMs, timeZone) / DAY);
  for (let day = Math.floor(clockOf(startMs, timeZone) / DAY); day <= lastDay; day++) {
    if (day % days !== 0) continue;
    const at = momentOf(day * DAY, timeZone);
    if (at >= startMs && at <= endMs) ticks.push({ at, label: timeText(at, timeZone, 'd MMM') });
  }
  return ticks;
}

function monthTicks(startMs: number, endMs: number, most: number, timeZone: string): Tick[] {
  const first = new Date(clockOf(startMs, timeZone));
  const firstMonth = 12 * first.getUTCFullYear() + first.getUTCMonth();
  const months = Math.round((endMs - startMs) / (30.44 * DAY));
  const step = MONTH_STEPS.find((count) => months / count <= most) ?? 12 * 100;
  const ticks: Tick[] = [];
  for (let month = firstMonth - (firstMonth % step); ; month += step) {
    const at = momentOf(Date.UTC(Math.floor(month / 12), month % 12, 1), timeZone);
    if (at > endMs) return ticks;
    if (at >= startMs)
      ticks.push({ at, label: timeText(at, timeZone, month % 12 === 0 || step >= 12 ? 'yyyy' : 'MMM') });
  }
}
