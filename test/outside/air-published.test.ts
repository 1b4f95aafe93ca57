// Published figures, each with its source; all from memory, so that they run anywhere.

import psychrolib from 'psychrolib';
import { describe, expect, it } from 'vitest';
import {
  airDensity,
  airDensityIec,
  dewPointOf,
  equivalentPotentialTemperature,
  equivalentPotentialTemperatureSimple,
  inertialPeriodS,
  lclTemperature,
  lclTemperatureOfDewPoint,
  lclTemperatureOfRelative,
  mixingRatioOf,
  saturationOverIce,
  saturationOverWater,
  saturationVapourPressure,
  specificHumidityOfRelative,
  standardAtmosphere,
  ZERO_CELSIUS,
} from '../../src/air/index.ts';

describe('US Standard Atmosphere 1976, tables by geometric altitude', () => {
  it.each([
    [-1000, 294.651, 1139.3, 1.347],
    [0, 288.15, 1013.25, 1.225],
    [500, 284.9, 954.61, 1.1673],
    [1000, 281.651, 898.76, 1.1117],
    [2000, 275.154, 795.01, 1.0066],
    [3000, 268.659, 701.21, 0.90925],
    [5000, 255.676, 540.48, 0.73643],
    [10000, 223.252, 264.99, 0.41351],
  ])('at %d m', (height, temperature, pressureHpa, density) => {
    const air = standardAtmosphere(height);
    expect(Math.abs(air.temperature - temperature)).toBeLessThan(0.002);
    expect(Math.abs(air.pressure / 100 / pressureHpa - 1)).toBeLessThan(1e-4);
    expect(Math.abs(air.density / density - 1)).toBeLessThan(1e-4);
  });
});

describe('saturation vapour pressure over water', () => {
  // Smithsonian Meteorological Tables (List 1951), table 94, after Goff & Gratch (1946).
  it.each([
    [-20, 1.254],
    [-10, 2.8627],
    [0, 6.1078],
    [10, 12.272],
    [20, 23.373],
    [30, 42.43],
    [40, 73.777],
  ])('Smithsonian tables at %d degrees', (celsius, hectopascal) => {
    for (const formula of [saturationVapourPressure, saturationOverWater]) {
      expect(Math.abs(formula(celsius + ZERO_CELSIUS) / 100 / hectopascal - 1)).toBeLessThan(0.006);
    }
  });

  // Wexler (1976, J. Res. NBS 80A), to which Bolton fitted eq. 10 within 0.1 % from -30 to 35 degrees.
  it.each([
    [0, 6.1121],
    [20, 23.388],
    [30, 42.47],
  ])('Wexler at %d degrees', (celsius, hectopascal) => {
    expect(Math.abs(saturationVapourPressure(celsius + ZERO_CELSIUS) / 100 / hectopascal - 1)).toBeLessThan(0.001);
  });

  // Smithsonian Meteorological Tables (List 1951), table 96, over ice.
  it.each([
    [-10, 2.597],
    [-20, 1.032],
    [-40, 0.1283],
  ])('over ice at %d degrees', (celsius, hectopascal) => {
    expect(Math.abs(saturationOverIce(celsius + ZERO_CELSIUS) / 100 / hectopascal - 1)).toBeLessThan(0.006);
  });
});

describe('air density', () => {
  it('is 1.225 kg/m3 for the reference of IEC 61400-12-1: 15 degrees, 1013.25 hPa, dry', () => {
    expect(airDensityIec(288.15, 101_325, 0)).toBeCloseTo(1.225, 4);
    expect(airDensity(288.15, 101_325, 0)).toBeCloseTo(1.225, 4);
  });
});

describe('half-pendulum day', () => {
  // 12 sidereal hours over the sine of the latitude (AMS Glossary).
  it.each([
    [30, 23.93],
    [45, 16.92],
    [60, 13.82],
    [-30, 23.93],
  ])('at %d degrees of latitude', (latitude, hours) => {
    expect(inertialPeriodS(latitude) / 3600).toBeCloseTo(hours, 2);
  });
});

describe('Bolton (1980): his forms agree among themselves as he states', () => {
  const cases = [
    [1000, 30, 20],
    [1000, 10, 9],
    [850, 15, -5],
    [900, 25, 12],
    [700, 0, -20],
  ] as const;

  it.each(cases)('condensation temperature of %d hPa, %d, %d degrees within 0.1 K', (_, temperatureC, dewPointC) => {
    const temperature = temperatureC + ZERO_CELSIUS;
    const dewPoint = dewPointC + ZERO_CELSIUS;
    const vapour = saturationVapourPressure(dewPoint);
    const exact = lclTemperature(temperature, vapour);
    const relative = vapour / saturationVapourPressure(temperature);
    expect(Math.abs(lclTemperatureOfDewPoint(temperature, dewPoint) - exact)).toBeLessThan(0.1);
    expect(Math.abs(lclTemperatureOfRelative(temperature, relative) - exact)).toBeLessThan(0.1);
  });

  it.each(cases)('equivalent potential temperature of %d hPa, %d, %d degrees within 0.3 K', (hpa, celsius, dew) => {
    const temperature = celsius + ZERO_CELSIUS;
    const vapour = saturationVapourPressure(dew + ZERO_CELSIUS);
    const mixingRatio = (0.622 * vapour) / (hpa * 100 - vapour);
    const atLcl = lclTemperature(temperature, vapour);
    const exact = equivalentPotentialTemperature(temperature, hpa * 100, vapour, mixingRatio, atLcl);
    const simple = equivalentPotentialTemperatureSimple(temperature, hpa * 100, mixingRatio, atLcl);
    expect(Math.abs(simple - exact)).toBeLessThan(0.3);
  });
});

// A second program, after the ASHRAE Handbook - Fundamentals (2017); it takes 0.621945 for the ratio of gas constants
// and the Hyland-Wexler vapour pressure, hence some tenths of a percent. Below freezing it speaks of ice: not compared.
describe('psychrometrics of a second program', () => {
  psychrolib.SetUnitSystem(psychrolib.SI);

  it.each([
    [25, 0.8, 101_325],
    [10, 0.7, 101_325],
    [35, 0.5, 95_000],
    [2, 0.95, 85_000],
  ])('at %d degrees, humidity %d, %d Pa', (celsius, relative, pressure) => {
    const temperature = celsius + ZERO_CELSIUS;
    const specific = specificHumidityOfRelative(relative, temperature, pressure);
    const otherRatio = psychrolib.GetHumRatioFromRelHum(celsius, relative, pressure);
    expect(Math.abs(saturationVapourPressure(temperature) / psychrolib.GetSatVapPres(celsius) - 1)).toBeLessThan(0.002);
    expect(Math.abs(mixingRatioOf(specific) / otherRatio - 1)).toBeLessThan(0.002);
    expect(Math.abs(specific / psychrolib.GetSpecificHumFromHumRatio(otherRatio) - 1)).toBeLessThan(0.002);
    const dewPointC = dewPointOf(specific, pressure) - ZERO_CELSIUS;
    expect(Math.abs(dewPointC - psychrolib.GetTDewPointFromRelHum(celsius, relative))).toBeLessThan(0.03);
    const otherDensity = psychrolib.GetMoistAirDensity(celsius, otherRatio, pressure);
    expect(Math.abs(airDensity(temperature, pressure, specific) / otherDensity - 1)).toBeLessThan(0.0005);
  });

  it('has the same standard atmosphere (it takes geopotential for geometric height)', () => {
    const other = psychrolib.GetStandardAtmPressure(1000);
    expect(Math.abs(standardAtmosphere(1000).pressure / other - 1)).toBeLessThan(0.0005);
  });
});
