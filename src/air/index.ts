export * from './constants.ts';
export { Cancelled, DuskveerError, placeInWords, throwIfCancelled, type Place, type Problem } from './errors.ts';
export {
  dewPointOf,
  dewPointOfVapourPressure,
  mixingRatioOf,
  potentialTemperature,
  relativeHumidityOf,
  saturationVapourPressure,
  specificHumidityOfDewPoint,
  specificHumidityOfRelative,
  specificHumidityOfVapour,
  vapourPressureOf,
  virtualTemperature,
} from './humidity.ts';
export { fromJsonNumber, toJsonNumber, toJsonNumbers } from './json.ts';
export {
  CALM_SPEED,
  directionOf,
  eastward,
  normalDirection,
  northward,
  signedAngle,
  speedOf,
  veerBetween,
} from './wind.ts';
export { lightSpans, nightOf, type Light, type LightSpan, type Night, type NightKind } from './sun.ts';
export {
  FOOT,
  fromHeightUnit,
  fromSpeedUnit,
  KNOT,
  parseUnit,
  toHeightUnit,
  toInside,
  toSpeedUnit,
  type HeightUnit,
  type ParsedUnit,
  type Quantity,
  type SpeedUnit,
} from './units.ts';
