// Soundings to lift parcels through, built from lists as a report gives them.

import { hypsometricHeights, specificHumidityOfDewPoint, ZERO_CELSIUS } from '../../src/air/index.ts';
import { BlockBuilder, profileAt, type LevelInput, type Profile, type Station } from '../../src/profile/index.ts';

export interface Report {
  readonly pressureHpa: readonly number[];
  readonly temperatureC: readonly number[];
  readonly dewPointC: readonly number[];
}

export const PLAINS: Station = { id: 'plains', name: 'Plains', latitude: 40, longitude: -98, elevation: 400 };

export function profileOf(levels: LevelInput, station: Station = PLAINS, timeMs = 0): Profile {
  const builder = new BlockBuilder();
  builder.add({ station, source: 'test', instrument: 'radiosonde', timeMs, levels });
  return profileAt(builder.finish(), 0);
}

/** Level columns of a report, heights above ground by the hypsometric equation from `lowest`. */
export function airLevels({ pressureHpa, temperatureC, dewPointC }: Report, lowest = 0): LevelInput {
  const pressure = pressureHpa.map((value) => value * 100);
  const temperature = temperatureC.map((value) => value + ZERO_CELSIUS);
  const specificHumidity = dewPointC.map((value, k) => specificHumidityOfDewPoint(value + ZERO_CELSIUS, pressure[k]!));
  const heightAgl = hypsometricHeights(pressure, temperature, specificHumidity, lowest);
  return { heightAgl, pressure, temperature, specificHumidity };
}

/** An invented evening over plains: unstable, capped. */
export const EVENING: Report = {
  pressureHpa: [960, 950, 925, 900, 850, 800, 750, 700, 600, 500, 400, 300, 250, 200, 150, 100],
  temperatureC: [28, 27, 25, 23, 19.5, 17, 13, 9, 0, -10, -23, -40, -51, -58, -62, -66],
  dewPointC: [19, 18.5, 17.5, 16.5, 13, 6, 1, -5, -16, -27, -40, -54, -63, -71, -79, -85],
};

/** The same after some hours of cooling from below: a stable layer under the moist air. */
export const MIDNIGHT: Report = {
  ...EVENING,
  temperatureC: [17, 20, 23.5, 23, 19.5, 17, 13, 9, 0, -10, -23, -40, -51, -58, -62, -66],
  dewPointC: [15, 16, 17, 16.5, 13, 6, 1, -5, -16, -27, -40, -54, -63, -71, -79, -85],
};

/** The lowest levels of a report down to a pressure. */
export function upTo(report: Report, pressureHpa: number): Report {
  const count = report.pressureHpa.filter((value) => value >= pressureHpa).length;
  return {
    pressureHpa: report.pressureHpa.slice(0, count),
    temperatureC: report.temperatureC.slice(0, count),
    dewPointC: report.dewPointC.slice(0, count),
  };
}
