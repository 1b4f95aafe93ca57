export { densityAt, type HubDensity } from './density.ts';
export { bottomTip, discArea, segmentArea, topTip, type Disc } from './disc.ts';
export {
  measureDisagreement,
  pairInTime,
  type Disagreement,
  type HeightDifference,
  type ProfilePair,
} from './disagreement.ts';
export type { DiscUncertainty } from './disc-uncertainty.ts';
export { bestSpeed, noseInDisc, windOnDisc, type DiscWind, type DiscWindOptions, type WindAt } from './disc-wind.ts';
export { FleetScan, type FleetWind } from './fleet-scan.ts';
export { cubeMean, discQuadrature, type DiscQuadrature } from './integral.ts';
export { disagreementInWords, joinProfiles, type Join, type JoinedProfile, type KnownDisagreement } from './join.ts';
export { normalisePower, normaliseSpeed, powerFromCurve } from './power.ts';
