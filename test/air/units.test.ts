import { describe, expect, it } from 'vitest';
import {
  fromHeightUnit,
  fromSpeedUnit,
  parseUnit,
  toHeightUnit,
  toInside,
  toSpeedUnit,
  type SpeedUnit,
} from '../../src/air/index.ts';

// Definitions: nautical mile 1852 m (First International Extraordinary Hydrographic Conference, Monaco 1929),
// foot 0.3048 m and mile 1609.344 m (international yard and pound agreement, 1959).
describe('display units', () => {
  it.each<[SpeedUnit, number]>([
    ['m/s', 10],
    ['kt', 19.438445],
    ['km/h', 36],
    ['mph', 22.369363],
  ])('tells 10 m/s as %s', (unit, shown) => {
    expect(toSpeedUnit(10, unit)).toBeCloseTo(shown, 6);
    expect(fromSpeedUnit(shown, unit)).toBeCloseTo(10, 6);
  });

  it('tells heights in feet', () => {
    expect(toHeightUnit(304.8, 'ft')).toBeCloseTo(1000, 10);
    expect(fromHeightUnit(1000, 'ft')).toBeCloseTo(304.8, 10);
    expect(toHeightUnit(NaN, 'ft')).toBeNaN();
  });
});

describe('parseUnit', () => {
  it.each([
    ['m s-1', 'speed', 10, 10],
    ['m/s', 'speed', 10, 10],
    ['m.s-1', 'speed', 10, 10],
    ['m s**-1', 'speed', 10, 10],
    ['m s^{-1}', 'speed', 10, 10],
    ['m·s⁻¹', 'speed', 10, 10],
    ['[M/S]', 'speed', 10, 10],
    ['knots', 'speed', 3600, 1852],
    ['kt', 'speed', 3600, 1852],
    ['kts', 'speed', 3600, 1852],
    ['km/h', 'speed', 36, 10],
    ['km h-1', 'speed', 36, 10],
    ['mph', 'speed', 3600, 1609.344],
    ['hPa', 'pressure', 1013.25, 101_325],
    ['mb', 'pressure', 1, 100],
    ['mbar', 'pressure', 1, 100],
    ['Pa', 'pressure', 1, 1],
    ['kPa', 'pressure', 1, 1000],
    ['degC', 'temperature', 20, 293.15],
    ['C', 'temperature', 20, 293.15],
    ['deg C', 'temperature', 20, 293.15],
    ['°C', 'temperature', 20, 293.15],
    ['° C', 'temperature', 20, 293.15],
    ['celsius', 'temperature', 20, 293.15],
    ['K', 'temperature', 20, 20],
    ['kelvin', 'temperature', 20, 20],
    ['degF', 'temperature', 212, 373.15],
    ['degree', 'angle', 90, 90],
    ['degrees', 'angle', 90, 90],
    ['deg', 'angle', 90, 90],
    ['°', 'angle', 90, 90],
    ['degrees_true', 'angle', 90, 90],
    ['degree_north', 'angle', 52, 52],
    ['radian', 'angle', Math.PI, 180],
    ['%', 'fraction', 50, 0.5],
    ['percent', 'fraction', 50, 0.5],
    ['1', 'fraction', 0.5, 0.5],
    ['', 'fraction', 0.5, 0.5],
    ['kg kg-1', 'humidity-ratio', 0.01, 0.01],
    ['kg/kg', 'humidity-ratio', 0.01, 0.01],
    ['g/kg', 'humidity-ratio', 10, 0.01],
    ['g kg-1', 'humidity-ratio', 10, 0.01],
    ['m', 'length', 5, 5],
    ['km', 'length', 5, 5000],
    ['gpm', 'length', 5, 5],
    ['ft', 'length', 1000, 304.8],
    ['feet', 'length', 1000, 304.8],
    ['m2 s-2', 'geopotential', 98, 98],
    ['s', 'time', 3, 3],
    ['seconds', 'time', 3, 3],
    ['minutes', 'time', 3, 180],
    ['hours', 'time', 3, 10_800],
    ['days', 'time', 3, 259_200],
  ])('reads %j as %s', (text, quantity, given, inside) => {
    const unit = parseUnit(text);
    expect(unit?.quantity).toBe(quantity);
    expect(toInside(given, unit!)).toBeCloseTo(inside, 9);
  });

  it('does not guess at what it does not know', () => {
    expect(parseUnit('furlong/fortnight')).toBeNull();
    expect(parseUnit('dBZ')).toBeNull();
  });
});
