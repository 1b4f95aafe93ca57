export { densityAt, type HubDensity } from './density.ts';
export { bottomTip, discArea, segmentArea, topTip, type Disc } from './disc.ts';
export { noseInDisc, windOnDisc, type DiscWind, type DiscWindOptions } from './disc-wind.ts';
export { FleetScan, type FleetWind } from './fleet-scan.ts';
export { normalisePower, normaliseSpeed, powerFromCurve } from './power.ts';
