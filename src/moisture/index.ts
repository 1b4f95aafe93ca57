export { type PotentialInstability } from './instability.ts';
export { moistureOf, type MoistureNumbers, type MoistureOptions } from './moisture.ts';
export { fluxOf, precipitableWater, transportByHeight, transportByPressure, type Transport } from './transport.ts';
export { windField, type FieldPoint, type WindField } from './wind-field.ts';
