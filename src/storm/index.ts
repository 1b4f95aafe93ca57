export type { LayerAdvection } from './advection.ts';
export { deepSounding, type AloftSource } from './aloft.ts';
export { liftParcel, parcelTemperatures, parcelTrace, type Ascent, type ParcelStart, type Trace } from './ascent.ts';
export { fineEnvironment, type Environment } from './environment.ts';
export { vectorFigure, type Figure, type VectorFigure } from './figure.ts';
export { hodographOf, meanWind, windAt, type Hodograph } from './hodograph.ts';
export type { Inflow, InflowKind, StableLayer } from './inflow.ts';
export { ingredientsOf, type Ingredient, type OtherIngredients } from './ingredients.ts';
export type { JetWind } from './jet-wind.ts';
export { joinWindAndAir, type JoinOptions, type WindAndAir } from './join.ts';
export { clusterMotion, stormMotion, type ClusterMotion, type StormMotion } from './motion.ts';
export type { Mover, StormNumbers } from './numbers.ts';
export type { Parcel } from './parcel.ts';
export { lnEquivalent, saturatedTemperature } from './pseudoadiabat.ts';
export { atLnPressure, soundingOf, type Sounding } from './sounding.ts';
export { type ParcelName } from './start.ts';
export {
  assessStorm,
  relativeTo,
  stormOf,
  type RelativeWind,
  type StormAssessment,
  type StormOptions,
} from './storm.ts';
export { bulkShear, helicity } from './wind-layers.ts';
