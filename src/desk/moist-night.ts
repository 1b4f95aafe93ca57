// What vapour the night carries over one feed: the numbers of each profile, their growth, when upstream air gets here,
// how the stations' streams converge, and whether all that is usual.

import { rateOf, type Rate } from '../jet/index.ts';
import type { MoistureNumbers } from '../moisture/index.ts';
import type { ArrivalBoard } from './arrivals.ts';
import type { FeedName } from './feed-name.ts';
import type { NightWindow } from './night-window.ts';
import type { TriangleState } from './triangles.ts';
import type { UsualTransport } from './usual-transport.ts';

export interface MoistureQuestion {
  /** Key of the feed. */
  readonly feed: string;
  /** Criteria set by name; the site's unless told. */
  readonly criteria?: string;
  /** Only this station lends its humidity; empty: the least uncertain of all that may. */
  readonly humidityFrom?: string;
}

/** The moist night as far as it is known at a moment. */
export interface MoistureState {
  readonly atMs: number;
  readonly feed: FeedName;
  readonly window: NightWindow;
  /** Valid times of the profiles in the window up to `atMs`, ascending; `numbers` run in parallel. */
  readonly timeMs: readonly number[];
  readonly numbers: readonly MoistureNumbers[];
  readonly growth: Growth;
  readonly arrivals: ArrivalBoard;
  readonly triangles: readonly TriangleState[];
  readonly usual: UsualTransport;
  /** Stations that may lend humidity in this night. */
  readonly lenders: readonly { readonly id: string; readonly name: string }[];
}

/** How the transport below 3 km has grown. NaN where it is not known. */
export interface Growth {
  /** UTC ms and kg/(m s): the first number at or after sunset, or of the night where the sun's times are not known. */
  readonly sinceMs: number;
  readonly then: number;
  readonly now: number;
  /** kg/(m s) an hour over the last hour and a half, within which the humidity's source has not changed. */
  readonly rate: Rate;
}

/** Humidity whose times lie no further apart than this comes from an instrument that runs on, ms. */
const RUNS_ON_MS = 3_600_000;

/** The growth up to the newest profile. */
export function growthOf(timeMs: readonly number[], numbers: readonly MoistureNumbers[], sunsetMs: number): Growth {
  const known = timeMs
    .map((at, k) => ({ timeMs: at, size: numbers[k]!.below3Km.size, ...humidityOf(at, numbers[k]!) }))
    .filter(({ size }) => Number.isFinite(size));
  const last = known.at(-1);
  const first = known.find((point) => !(point.timeMs < sunsetMs));
  // A new sounding, or another station's humidity, makes the number jump: that is no growth of the stream.
  let alike = known.length - 1;
  while (
    alike > 0 &&
    known[alike - 1]!.from === last?.from &&
    known[alike]!.measuredMs - known[alike - 1]!.measuredMs <= RUNS_ON_MS
  )
    alike--;
  return {
    sinceMs: first?.timeMs ?? NaN,
    then: first?.size ?? NaN,
    now: last?.timeMs === timeMs.at(-1) ? (last?.size ?? NaN) : NaN,
    rate: rateOf(known.slice(Math.max(0, alike)), ({ size }) => size),
  };
}

function humidityOf(
  atMs: number,
  { humidityFrom, humidityAgeS }: MoistureNumbers,
): { from: string; measuredMs: number } {
  return { from: humidityFrom, measuredMs: atMs - 1000 * humidityAgeS };
}
