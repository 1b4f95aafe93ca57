// What lies above the top of an instrument that does not reach high enough: wind and air of the last sounding, told apart
// by height and age, so that storms' motion and energy can be reckoned though a profiler ends at 3 km.

import type { Profile } from '../profile/index.ts';
import { metres } from './figure.ts';
import { hodographOf, type Hodograph } from './hodograph.ts';
import { soundingOf, type Sounding } from './sounding.ts';

/** Wind aloft older than this, s, says too little of the wind now (our own choice: half the time between soundings). */
const OLDEST_WIND_S = 6 * 3600;
/** A sounding is of use aloft when it goes on so far above the instrument's top, m. */
const LEAST_MORE = 500;
/** Pressure, Pa, up to which the air must be known for energies to be told; as for parcels. */
const DEEP_ENOUGH = 50_000;

/** Where the part above an instrument's top was taken from. */
export interface AloftSource {
  readonly station: string;
  readonly name: string;
  readonly timeMs: number;
  /** How much older than the wind below, s. */
  readonly ageS: number;
  /** m above ground: from here on. */
  readonly above: number;
}

export interface Aloft<T> {
  readonly column: T;
  /** null where nothing was added */
  readonly from: AloftSource | null;
  /** Why what was at hand was not used; empty otherwise. */
  readonly why: string;
}

/** The wind, continued by that of a sounding above its top where the sounding is young enough. */
export function continueWind(wind: Profile, hodograph: Hodograph, sounding: Profile | undefined): Aloft<Hodograph> {
  const alone = { column: hodograph, from: null, why: '' };
  if (sounding === undefined || sounding === wind || hodograph.count === 0) return alone;
  const upper = hodographOf(sounding);
  const raise = raiseOf(sounding, wind);
  const top = hodograph.heightAgl[hodograph.count - 1]!;
  let first = 0;
  while (first < upper.count && upper.heightAgl[first]! + raise <= top) first++;
  if (!(upper.heightAgl[upper.count - 1]! + raise >= top + LEAST_MORE)) return alone;
  const ageS = (wind.timeMs - sounding.timeMs) / 1000;
  if (ageS > OLDEST_WIND_S) {
    const hours = (ageS / 3600).toFixed(1);
    return {
      ...alone,
      why: `The wind above ${metres(top)} was last measured ${hours} h before; more than ${OLDEST_WIND_S / 3600} h is not used.`,
    };
  }
  const join = (low: Float64Array, high: Float64Array, plus = 0): Float64Array =>
    Float64Array.from([...low, ...high.subarray(first, upper.count).map((value) => value + plus)]);
  return {
    column: {
      count: hodograph.count + upper.count - first,
      heightAgl: join(hodograph.heightAgl.subarray(0, hodograph.count), upper.heightAgl, raise),
      u: join(hodograph.u.subarray(0, hodograph.count), upper.u),
      v: join(hodograph.v.subarray(0, hodograph.count), upper.v),
    },
    from: sourceOf(sounding, ageS, top),
    why: '',
  };
}

/** The air, continued by that of a sounding above its top where it ends too low for energies to be told. */
export function continueAir(air: Profile, sounding: Sounding, other: Profile | undefined): Aloft<Sounding> {
  const alone = { column: sounding, from: null, why: '' };
  const top = sounding.count - 1;
  if (other === undefined || other === air || sounding.noAir !== '' || sounding.pressure[top]! <= DEEP_ENOUGH)
    return alone;
  const upper = soundingOf(other);
  const raise = raiseOf(other, air);
  const topHeight = sounding.heightAgl[top]!;
  let first = 0;
  while (
    first < upper.count &&
    !(upper.heightAgl[first]! + raise > topHeight && upper.pressure[first]! < sounding.pressure[top]!)
  )
    first++;
  if (first === upper.count || !(upper.pressure[upper.count - 1]! < DEEP_ENOUGH)) return alone;
  // Its own humidity must reach its own top, or there would be a gap of dry air at the join.
  const kept = Math.min(sounding.count, sounding.moistCount);
  const join = (low: Float64Array, high: Float64Array, plus = 0): Float64Array =>
    Float64Array.from([...low.subarray(0, kept), ...high.subarray(first).map((value) => value + plus)]);
  return {
    column: {
      ...sounding,
      count: kept + upper.count - first,
      pressure: join(sounding.pressure, upper.pressure),
      lnPressure: join(sounding.lnPressure, upper.lnPressure),
      heightAgl: join(sounding.heightAgl, upper.heightAgl, raise),
      temperature: join(sounding.temperature, upper.temperature),
      dewPoint: join(sounding.dewPoint, upper.dewPoint),
      moistCount: kept + Math.max(0, upper.moistCount - first),
    },
    from: sourceOf(other, (air.timeMs - other.timeMs) / 1000, topHeight),
    why: '',
  };
}

/** The newest of the candidates, not later than the wind and not the wind itself, that goes on to where motion is reckoned. */
export function deepSounding(wind: Profile, candidates: Iterable<Profile>, oldestS: number): Profile | undefined {
  return [...candidates]
    .filter((one) => one !== wind && one.timeMs <= wind.timeMs && wind.timeMs - one.timeMs <= 1000 * oldestS)
    .sort((a, b) => b.timeMs - a.timeMs)
    .find((one) => lowestPressure(one) < DEEP_ENOUGH);
}

function lowestPressure(profile: Profile): number {
  const { pressure, count } = soundingOf(profile);
  return count > 0 ? pressure[count - 1]! : Infinity;
}

/** How much higher above one station's ground a height above the other's lies, m; none where an elevation is not known. */
function raiseOf(other: Profile, here: Profile): number {
  const raise = other.station.elevation - here.station.elevation;
  return Number.isNaN(raise) ? 0 : raise;
}

function sourceOf({ station, timeMs }: Profile, ageS: number, above: number): AloftSource {
  return { station: station.id, name: station.name, timeMs, ageS, above };
}
