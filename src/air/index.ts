export * from './constants.ts';
export { coriolisParameter, inertialPeriodS } from './coriolis.ts';
export { airDensity, airDensityIec } from './density.ts';
export { Cancelled, DuskveerError, placeInWords, throwIfCancelled, type Place, type Problem } from './errors.ts';
export {
  dewPointOf,
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
export { bearingTo, distanceBetween, type LatLon } from './geodesy.ts';
export { hypsometricHeights } from './hypsometric.ts';
export { fromJsonNumber, toJsonNumber, toJsonNumbers } from './json.ts';
export { moistAirFactor, saturationOverIce, saturationOverWater } from './vapour.ts';
export { directionOf, eastward, normalDirection, northward, signedAngle, speedOf, veerBetween } from './wind.ts';
export {
  equivalentPotentialTemperature,
  equivalentPotentialTemperatureSimple,
  lclPressure,
  lclTemperature,
  lclTemperatureOfDewPoint,
  lclTemperatureOfRelative,
} from './saturation.ts';
export { powerLawSpeed, shearExponent, type PowerLaw } from './shear.ts';
export {
  bruntVaisalaFrequency,
  bruntVaisalaSquared,
  bulkRichardson,
  froudeNumber,
  type MovingLevel,
  type ThermalLevel,
} from './stability.ts';
export { standardAtmosphere, standardHeight, type StandardAir } from './standard-atmosphere.ts';
export { lightSpans, nightOf, type Light, type LightSpan, type Night, type NightKind } from './sun.ts';
export { advectionBetweenHeights, advectionBetweenPressures, type LayerWind } from './thermal-wind.ts';
export {
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
