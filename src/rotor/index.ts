export { meanOutputAt } from './actual-output.ts';
export { densityAt, type HubDensity } from './density.ts';
export {
  measureDisagreement,
  pairInTime,
  type Disagreement,
  type HeightDifference,
  type ProfilePair,
} from './disagreement.ts';
export { segmentArea, topTip, type Disc } from './disc.ts';
export { discSlices, type DiscSlice, type DiscSlices } from './disc-slices.ts';
export type { DiscUncertainty } from './disc-uncertainty.ts';
export { noseInDisc, windOnDisc, type DiscWind, type DiscWindOptions, type WindAt } from './disc-wind.ts';
export { sampleDurationsS, timeInBands, type BandTimes } from './durations.ts';
export {
  farmOutput,
  fitFarmFactor,
  keepsTurning,
  ratedPower,
  typeOutput,
  type FactorFit,
  type FarmOutput,
  type ReckonedWind,
  type TurbineState,
  type TypeOutput,
} from './fleet-power.ts';
export { FleetScan, type FleetWind } from './fleet-scan.ts';
export { cubeMean, discQuadrature, type DiscQuadrature } from './integral.ts';
export { joinProfiles, type Join, type JoinedProfile, type JoinOptions, type KnownDisagreement } from './join.ts';
export { LOADS_CAUTION, timeInState, watchLoads, type LoadState, type TimeInState } from './loads.ts';
export { normalisePower, normaliseSpeed, powerFromCurve } from './power.ts';
export {
  causeInWords,
  causesOfRamp,
  rampInWords,
  type ClockWords,
  type NoseTrack,
  type RampCause,
  type RampCauseName,
  type RampEvidence,
} from './ramp-causes.ts';
export { findRamps, type OutputSeries, type Ramp } from './ramps.ts';
export { swingingDoor } from './swinging-door.ts';
export { windAtHeight } from './wind-at-height.ts';
