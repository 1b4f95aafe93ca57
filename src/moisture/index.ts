export { arrivalOf, type Arrival, type WayWind } from './arrival.ts';
export {
  findSurges,
  matchArrivals,
  scoreArrivals,
  type ArrivalMatch,
  type ArrivalScore,
  type Surge,
  type SurgeRule,
} from './arrival-score.ts';
export {
  humidityUncertainty,
  OLDEST_HUMIDITY_S,
  withLentAir,
  type HumidAir,
  type HumidityOptions,
  type HumidityUse,
} from './humid-air.ts';
export { airColumn, type AirColumn } from './air-column.ts';
export type { PotentialInstability } from './instability.ts';
export { moistureOf, type MoistureNumbers, type MoistureOptions } from './moisture.ts';
export { fluxOf, precipitableWater, transportByHeight, transportByPressure, type Transport } from './transport.ts';
export {
  triangleLayers,
  triangleThroughTime,
  type TriangleLayer,
  type TriangleOptions,
  type TriangleTime,
} from './triangle.ts';
export { windField, type FieldPoint, type WindField } from './wind-field.ts';
