// A sounding of a made-up station as a bulletin of TEMP, parts A to D.

import { encodeTemp } from './encode-temp.ts';

/** The 15th of the month, 12 UTC; 1000 hPa at the ground, 10 m/s from 200 degrees at 925 hPa and more above. */
export function madeBulletin(station: number, knots: boolean): string {
  return encodeTemp({
    station: String(station),
    day: 15,
    hour: 12,
    knots,
    surface: {
      pressure: 1000,
      temperature: { degrees: 14, figure: 6 },
      depression: 20,
      wind: { direction: 180, speed: 5 },
    },
    standard: [
      [925, 745, 10],
      [850, 1455, 6],
      [700, 3012, 1],
      [500, 5620, 17],
      [300, 9230, 44],
      [100, 16_320, 57],
      [50, 20_740, 56],
    ].map(([pressure, height, degrees], k) => ({
      pressure: pressure!,
      height: height!,
      temperature: { degrees: degrees!, figure: k < 3 ? 6 : 5 },
      depression: 30,
      wind: { direction: 200 + 5 * k, speed: 10 + 3 * k },
    })),
    significant: [950, 900, 640].map((pressure) => ({
      pressure,
      temperature: { degrees: 8, figure: 2 },
      depression: 56,
    })),
    winds: [980, 890, 610].map((pressure) => ({ pressure, wind: { direction: 230, speed: 17 } })),
    lowestWindPressure: 50,
  }).join('');
}
