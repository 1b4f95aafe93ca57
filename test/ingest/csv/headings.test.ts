import { describe, expect, it } from 'vitest';
import { readHeading } from '../../../src/ingest/csv/headings.ts';

const meaningOf = (text: string): string | null => {
  const heading = readHeading(text);
  if (heading === null) return null;
  const unit = heading.unit === null ? '' : ` ${heading.unit.quantity}*${heading.unit.scale.toPrecision(4)}`;
  const height = Number.isNaN(heading.height) ? '' : ` @${heading.height}`;
  return `${heading.meaning}${height}${unit}${heading.wrongUnit === '' ? '' : ` !${heading.wrongUnit}`}`;
};

describe('readHeading', () => {
  it.each([
    // Long tables, without and with units.
    ['datetime', 'time'],
    ['Time (UTC)', 'time'],
    ['timestamp_utc', 'time'],
    ['Date', 'date'],
    ['height', 'heightAgl'],
    ['height_agl_m', 'heightAgl length*1.000'],
    ['Height above ground [m]', 'heightAgl length*1.000'],
    ['height_amsl_m', 'heightAmsl length*1.000'],
    ['altitude_ft', 'heightAmsl length*0.3048'],
    ['Height [m AGL]', 'heightAgl length*1.000'],
    ['z', 'heightAgl'],
    ['wspd', 'speed'],
    ['Wind speed (kt)', 'speed speed*0.5144'],
    ['windSpeed', 'speed'],
    ['speed_mps', 'speed speed*1.000'],
    ['speed_m_s', 'speed speed*1.000'],
    ['wind_speed_ms', 'speed speed*1.000'],
    ['Speed m/s', 'speed speed*1.000'],
    ['Wind speed, m s-1', 'speed speed*1.000'],
    ['mean wind speed', 'speed'],
    ['wdir', 'direction'],
    ['wind_direction_deg', 'direction angle*1.000'],
    ['direction (true)', 'direction'],
    ['u', 'u'],
    ['v_wind', 'v'],
    ['w', 'verticalSpeed'],
    ['temperature_c', 'temperature temperature*1.000'],
    ['temp [K]', 'temperature temperature*1.000'],
    ['Temperature (°F)', 'temperature temperature*0.5556'],
    ['pressure [hPa]', 'pressure pressure*100.0'],
    ['p', 'pressure'],
    ['dew point', 'dewPoint'],
    ['dewpoint_k', 'dewPoint temperature*1.000'],
    ['humidity', 'relativeHumidity'],
    ['RH (%)', 'relativeHumidity fraction*0.01000'],
    ['humidity (g/kg)', 'specificHumidity humidity-ratio*0.001000'],
    ['q', 'specificHumidity'],
    ['cnr', 'signal'],
    ['station', 'station'],
    ['Latitude (deg)', 'latitude angle*1.000'],
    ['lon', 'longitude'],
    ['elevation_m', 'elevation length*1.000'],
    ['unix time', 'epoch'],
    // Wide tables.
    ['ws_80m', 'speed @80'],
    ['ws80', 'speed @80'],
    ['speed_100', 'speed @100'],
    ['wd_80 (deg)', 'direction @80 angle*1.000'],
    ['WS at 40.5 m [m/s]', 'speed @40.5 speed*1.000'],
    ['wind_speed_80m_mps', 'speed @80 speed*1.000'],
    ['80m_speed', 'speed @80'],
    ['wind speed (120 m)', 'speed @120'],
    ['u10', 'u @10'],
    ['temp_2m_c', 'temperature @2 temperature*1.000'],
    ['T_200ft', 'temperature @60.96'],
    // Units that are none.
    ['speed [furlong]', 'speed !furlong'],
    ['temperature [m/s]', 'temperature !m/s'],
    // What is no mean value or no quantity of ours.
    ['t_index', null],
    ['scan_type', null],
    ['ws_80m_std', 'speedDeviation @80'],
    ['speed_max', null],
    ['wind gust', 'gust'],
    ['qc_speed', null],
    ['potential temperature', null],
    ['Latitude: 52', null],
    ['12.5', null],
    ['', null],
  ])('%s', (text, expected) => {
    expect(meaningOf(text)).toBe(expected);
  });
});
