// The four parcels' numbers, each with what it was lifted from and, where a number is missing, why.

import { liftParcel, type Ascent, type ParcelStart } from './ascent.ts';
import { fineEnvironment, type Environment } from './environment.ts';
import { hectopascals } from './figure.ts';
import { atLnPressure, type Sounding } from './sounding.ts';
import { PARCEL_NAMES, type ParcelName, type Start } from './start.ts';

/** Data that end below this pressure, Pa, cannot show that a parcel never becomes buoyant. */
const DEEP_ENOUGH = 50_000;

/** Why a parcel that was followed has no LFC: an answer, not a gap in the data. */
export const NO_LFC = 'The parcel is nowhere warmer than its surroundings: no LFC, no CAPE.';

/** A lifted parcel. Pressures in Pa, heights in m above ground, temperatures in K, energies in J/kg; NaN as `why` says. */
export interface Parcel extends Ascent {
  readonly name: ParcelName;
  /** What was lifted; null when nothing could be. */
  readonly start: ParcelStart | null;
  readonly startHeight: number;
  readonly lclHeight: number;
  readonly lfcHeight: number;
  readonly elHeight: number;
  /** How far the air must be lifted to become free, m: LFC minus start. */
  readonly liftToLfc: number;
  /** Why numbers are missing or only a bound; empty when all are whole. */
  readonly why: string;
}

/** Lifts the four parcels, in the order of their names. */
export function liftParcels(sounding: Sounding, starts: Readonly<Record<ParcelName, Start>>): Parcel[] {
  const environment = fineEnvironment(sounding);
  return PARCEL_NAMES.map((name) => {
    const { start, why } = starts[name];
    return start === null ? notLifted(name, why) : lifted(name, start, sounding, environment);
  });
}

function lifted(name: ParcelName, start: ParcelStart, sounding: Sounding, environment: Environment): Parcel {
  const ascent = liftParcel(environment, start);
  const heightAt = (pressure: number): number => atLnPressure(sounding, sounding.heightAgl, Math.log(pressure));
  const startHeight = heightAt(start.pressure);
  const lfcHeight = heightAt(ascent.lfcPressure);
  const top = sounding.pressure[sounding.count - 1]!;
  const undecided = Number.isNaN(ascent.lfcPressure) && (top > DEEP_ENOUGH || top > ascent.lclPressure);
  return {
    name,
    start,
    ...ascent,
    cape: undecided ? NaN : ascent.cape,
    startHeight,
    lclHeight: heightAt(ascent.lclPressure),
    lfcHeight,
    elHeight: heightAt(ascent.elPressure),
    liftToLfc: lfcHeight - startHeight,
    why: whyOf(ascent, undecided, top),
  };
}

function whyOf(ascent: Ascent, undecided: boolean, top: number): string {
  if (undecided) {
    return `Data end at ${hectopascals(top)}, up to where the parcel does not become buoyant; it may above.`;
  }
  if (Number.isNaN(ascent.cape)) return 'The parcel cannot be followed through these data.';
  if (Number.isNaN(ascent.lfcPressure)) return NO_LFC;
  if (!ascent.positiveAtTop) return '';
  return `The parcel is still buoyant where data end, at ${hectopascals(top)}: CAPE is a lower bound, EL is that top.`;
}

function notLifted(name: ParcelName, why: string): Parcel {
  return {
    name,
    start: null,
    startHeight: NaN,
    lclPressure: NaN,
    lclTemperature: NaN,
    lclHeight: NaN,
    lfcPressure: NaN,
    lfcHeight: NaN,
    elPressure: NaN,
    elHeight: NaN,
    cape: NaN,
    cin: NaN,
    negativeAboveLfc: NaN,
    liftToLfc: NaN,
    positiveAtTop: false,
    why,
  };
}
