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
