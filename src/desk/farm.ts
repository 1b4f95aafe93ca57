// What a night did to the farm: power by hub height and by the whole profile, ramps with their causes, loads.

import type { JetTrack } from '../jet/index.ts';
import type { Profile } from '../profile/index.ts';
import {
  causesOfRamp,
  farmOutput,
  findRamps,
  meanOutputAt,
  ratedPower,
  timeInBands,
  timeInState,
  typeOutput,
  watchLoads,
  type BandTimes,
  type DiscWind,
  type FactorFit,
  type FarmOutput,
  type LoadState,
  type Ramp,
  type RampCause,
  type TimeInState,
  type TypeOutput,
} from '../rotor/index.ts';
import type { RampDefinition, Site, TurbineType } from '../site/index.ts';
import { SHEAR_EDGES, VEER_EDGES } from './bands.ts';
import type { ActualOutput } from './output-store.ts';

/** What one turbine type meets through the night, a record for each profile of the series. */
export interface DiscSeries {
  readonly turbine: TurbineType;
  readonly winds: readonly DiscWind[];
}

/** A ramp of the farm with its causes, the firmest first. */
export interface FarmRamp {
  readonly ramp: Ramp;
  readonly causes: readonly RampCause[];
}

/** A watched state of the newest profile, and how long it has held through the night. */
export interface WatchedLoad {
  readonly now: LoadState;
  readonly time: TimeInState;
}

/** What one type's disc met. */
export interface DiscNight {
  readonly turbine: string;
  readonly loads: readonly WatchedLoad[];
  /** Of the shear exponent. */
  readonly shearBands: BandTimes;
  /** Of the size of veer, degrees per 100 m. */
  readonly veerBands: BandTimes;
}

/** The farm's night. Series run in parallel with the night's `timeMs`. */
export interface FarmState {
  readonly output: FarmOutput;
  readonly ramps: readonly FarmRamp[];
  /** Definitions that the ramps were sought by. */
  readonly definitions: readonly RampDefinition[];
  readonly discs: readonly DiscNight[];
  /** null where no output of the farm is open. */
  readonly actual: FarmActual | null;
}

/** What the farm's own systems reported, beside what is reckoned. */
export interface FarmActual {
  readonly sources: readonly string[];
  /** kW, in parallel with the night's times; NaN where nothing was reported. */
  readonly powerKw: Float64Array;
  /** Of all that is open up to the moment, by the feed's own levels. */
  readonly fit: FactorFit;
}

/** What counts as a ramp where the site file does not say; common practice, without source. */
export const USUAL_RAMPS: readonly RampDefinition[] = [{ name: '30 % within an hour', share: 0.3, withinS: 3600 }];

export interface FarmNight {
  readonly site: Site;
  readonly timeMs: readonly number[];
  readonly profiles: readonly Profile[];
  readonly discs: readonly DiscSeries[];
  readonly tracks: readonly JetTrack[];
  /** UTC ms; NaN where the sun does not rise or the place is not known. */
  readonly sunriseMs: number;
  readonly actual: { readonly output: ActualOutput; readonly fit: FactorFit } | null;
}

/** The farm through a night; types without a power curve have loads and no power. */
export function farmThrough(night: FarmNight): FarmState {
  const { site, timeMs, actual } = night;
  const types = night.discs.map(({ turbine, winds }) => typeOutput(turbine, winds));
  const output = farmOutput(types, site.farmFactor);
  const definitions = site.ramps.length > 0 ? site.ramps : USUAL_RAMPS;
  const capacityKw = output.ratedKw * output.factor;
  const ramps = output.why === '' ? findRamps({ timeMs, powerKw: output.equivalentKw }, capacityKw, definitions) : [];
  return {
    output,
    definitions,
    ramps: ramps.map((ramp) => ({ ramp, causes: causesOfFarmRamp(ramp, types, night) })),
    discs: night.discs.map((series) => discNight(series, night)),
    actual:
      actual === null
        ? null
        : { sources: actual.output.sources, powerKw: meanOutputAt(timeMs, actual.output), fit: actual.fit },
  };
}

/** Asked of the type that holds most of the farm's power: its disc is the one the farm follows. */
function causesOfFarmRamp(ramp: Ramp, types: readonly TypeOutput[], night: FarmNight): RampCause[] {
  const share = ({ turbine }: TypeOutput): number => turbine.count * ratedPower(turbine);
  const most = types.reduce((best, type) => (share(type) > share(best) ? type : best));
  const winds = night.discs[types.indexOf(most)]!.winds;
  return causesOfRamp(ramp, {
    disc: most.turbine,
    timeMs: night.timeMs,
    hubSpeed: winds.map((wind) => wind.hubSpeed),
    hubDirection: winds.map((wind) => wind.hubDirection),
    state: most.state,
    tracks: night.tracks,
    sunrisesMs: Number.isNaN(night.sunriseMs) ? [] : [night.sunriseMs],
  });
}

function discNight({ turbine, winds }: DiscSeries, { site, timeMs, profiles }: FarmNight): DiscNight {
  const states = winds.map((wind, k) => watchLoads(wind, profiles[k]!, site));
  const newest = states.at(-1) ?? [];
  return {
    turbine: turbine.name,
    loads: newest.map((now, i) => ({
      now,
      time: timeInState(
        timeMs,
        states.map((state) => state[i]!.on),
      ),
    })),
    shearBands: timeInBands(
      timeMs,
      winds.map((wind) => wind.shearExponent),
      SHEAR_EDGES,
    ),
    veerBands: timeInBands(
      timeMs,
      winds.map((wind) => Math.abs(wind.veerPer100M)),
      VEER_EDGES,
    ),
  };
}
