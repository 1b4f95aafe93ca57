// Larkmoor Ridge, an invented wind farm on invented plains: a night with a jet from dusk to dawn, and a calm one after it.

import { columnWinds, windFrom, type Wind } from './air-column.ts';
import type { AtmospherePlan } from './atmosphere.ts';
import { at, everyMinutes, ramp, spell } from './clock.ts';
import { farmOutputCsv } from './farm-output.ts';
import { mastCsv } from './mast.ts';
import { demoNight, siteFileStation, type DemoNight } from './night.ts';
import { profilerFile } from './profiler-file.ts';
import { profilerRecord } from './profiler.ts';
import { sondeCsv } from './sonde.ts';

const PLACE = { latitude: 38.2, longitude: -99.4, elevation: 640 };
const SONDE_PLACE = { latitude: 38.05, longitude: -99.7, elevation: 662 };

// Sun at this place (UTC): sets 01:48, rises 11:23. The site's clock is six hours behind.
const FIRST_DUSK = at('2024-05-22T00:45Z');
const FIRST_DAWN = at('2024-05-22T11:23Z');
const SECOND_DUSK = at('2024-05-23T00:45Z');
const SECOND_DAWN = at('2024-05-23T11:23Z');
const HOUR = 3_600_000;

/** Height of the jet's core in the pressure wind, and the scale of the friction layer below it, m. */
const CORE = 260;
const FRICTION = 165;
/** After midnight the air over the ridge sinks by so much aloft, m, between these times. */
const SINKING = 390;
const SINKS_FROM = at('2024-05-22T07:10Z');
const SINKS_UNTIL = at('2024-05-22T08:40Z');

/** A south-south-westerly with its core a few hundred metres up, as over ground that slopes; it dies on the second day. */
function pressureWind(heightAgl: number, timeMs: number): Wind {
  const aboveCore = Math.max(0, heightAgl - CORE) / 620;
  const belowCore = Math.max(0, CORE - heightAgl) / 900;
  const shape = 4.4 + 12 * Math.exp(-Math.pow(aboveCore, 1.6)) - 2 * belowCore + 1.6 * ramp(heightAgl, 1800, 4000);
  const strength = 0.53 * (1 - 0.78 * ramp(timeMs, FIRST_DAWN + 2 * HOUR, SECOND_DUSK - 3 * HOUR));
  return windFrom(shape * strength, 202 + 6 * Math.min(2.5, heightAgl / 1000));
}

function mixedDepth(timeMs: number): number {
  if (timeMs < FIRST_DUSK) return 1750;
  if (timeMs < FIRST_DAWN + HOUR) return 0;
  if (timeMs < SECOND_DUSK) return 1800 * ramp(timeMs, FIRST_DAWN, FIRST_DAWN + 6 * HOUR);
  return 0;
}

/** What blows at a height after the sinking blew at the height returned; the lowest air stays where it is. */
function heightBefore(heightAgl: number, timeMs: number): number {
  const stirred = ramp(timeMs, FIRST_DAWN + HOUR, FIRST_DAWN + 4 * HOUR);
  const sunk = SINKING * ramp(timeMs, SINKS_FROM, SINKS_UNTIL) * (1 - stirred);
  return heightAgl + sunk * (1 - Math.exp(-Math.pow(heightAgl / 150, 2.4)));
}

function* winds(timesMs: readonly number[]): Generator<(heightAgl: number) => Wind> {
  const column = columnWinds({ latitude: PLACE.latitude, pressureWind, mixedDepth, frictionDepth: FRICTION }, timesMs);
  let index = 0;
  for (const windAt of column) {
    const timeMs = timesMs[index++]!;
    yield (heightAgl) => windAt(heightBefore(heightAgl, timeMs));
  }
}

/** Hours since dusk, while it is night. */
function nightHours(timeMs: number): number {
  const dusk = timeMs < SECOND_DUSK ? FIRST_DUSK : SECOND_DUSK;
  return Math.max(0, (timeMs - dusk) / HOUR);
}

function stillCool(timeMs: number): number {
  const dawn = timeMs < SECOND_DUSK ? FIRST_DAWN : SECOND_DAWN;
  return 1 - ramp(timeMs, dawn, dawn + 4 * HOUR);
}

const ATMOSPHERE: AtmospherePlan = {
  seed: 862001,
  winds,
  convection: (timeMs) => Math.min(1, mixedDepth(timeMs) / 500),
  surfacePressure: 93_900,
  mixedTheta: 305.5,
  mixedHumidity: 0.0112,
  lidHeight: 1700,
  thetaAbove: (aboveLid) => 4 * (1 - Math.exp(-aboveLid / 150)) + 0.0035 * aboveLid,
  groundCooling: (timeMs) => 3.4 * Math.sqrt(nightHours(timeMs)) * stillCool(timeMs),
  coolingDepth: (timeMs) => 60 + 14 * nightHours(timeMs),
  broughtHumidity: (timeMs) =>
    0.0032 * ramp(timeMs, FIRST_DUSK + HOUR, FIRST_DAWN) * (1 - 0.7 * ramp(timeMs, FIRST_DAWN, SECOND_DUSK)),
  broughtHeight: 420,
  broughtWidth: 520,
  eddies: (timeMs) => 0.26 + 0.1 * Math.min(1, mixedDepth(timeMs) / 400),
};

const START = at('2024-05-21T21:00Z');
const END = at('2024-05-23T14:00Z');
const GATES = [
  ...Array.from({ length: 14 }, (_, k) => 30 + 20 * k),
  ...Array.from({ length: 43 }, (_, k) => 330 + 40 * k),
];

const SITE = {
  name: 'Larkmoor Ridge',
  about: 'Invented: the place, its coordinates, its turbines and its weather exist nowhere.',
  time_zone: 'Etc/GMT+6',
  stations: [
    siteFileStation('larkmoor-lidar', 'Larkmoor Ridge lidar', 'lidar', PLACE),
    siteFileStation('larkmoor-mast', 'Larkmoor Ridge mast', 'mast', PLACE),
    siteFileStation('tern-hollow', 'Tern Hollow soundings', 'radiosonde', SONDE_PLACE),
  ],
  turbines: [
    {
      name: 'Plover 140',
      count: 34,
      hub_height_m: 105,
      rotor_diameter_m: 140,
      power_curve: {
        air_density_kg_per_m3: 1.225,
        speed_mps: [3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13, 25],
        power_kw: [40, 170, 410, 760, 1240, 1870, 2640, 3390, 3920, 4150, 4200, 4200],
      },
    },
    {
      name: 'Curlew 164',
      count: 16,
      hub_height_m: 125,
      rotor_diameter_m: 164,
      power_curve: {
        air_density_kg_per_m3: 1.225,
        speed_mps: [3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13, 25],
        power_kw: [70, 270, 610, 1110, 1800, 2720, 3850, 4950, 5650, 5930, 6000, 6000],
      },
    },
  ],
  limits: [
    { name: 'Blade lifts', kind: 'lifting', height_m: 105, speed_mps: 10 },
    { name: 'Climbing', kind: 'climbing', height_m: 105, speed_mps: 15 },
  ],
  ramps: [
    { name: '30 % within an hour', share: 0.3, within_minutes: 60 },
    { name: '20 % within half an hour', share: 0.2, within_minutes: 30 },
  ],
  units: { speed: 'm/s', height: 'm' },
};

/** The nights at Larkmoor Ridge. */
export function plains(): DemoNight {
  const record = profilerRecord(ATMOSPHERE, {
    seed: 862002,
    gates: GATES,
    timesMs: everyMinutes(10, START, END),
    noise: 0.12,
    noisePerKm: 0.06,
    echoAtGround: 20,
    echoLossPerKm: 10.5,
    leastEcho: -1,
    outages: [spell('2024-05-22T04:20Z', '2024-05-22T05:00Z'), spell('2024-05-22T18:10Z', '2024-05-22T19:30Z')],
    noisySpells: [spell('2024-05-22T06:40Z', '2024-05-22T07:30Z')],
    withAir: true,
  });
  const sounding = (seed: number, launch: string): string =>
    sondeCsv(ATMOSPHERE, { seed, station: 'tern-hollow', ...SONDE_PLACE, launchMs: at(launch), top: 12_000 });
  return demoNight(
    {
      id: 'plains',
      title: 'Larkmoor Ridge: a jet over the plains, and a calm night after it',
      now: '2024-05-22T09:06:00Z',
    },
    SITE,
    {
      'larkmoor-lidar.nc': profilerFile(record, {
        station: 'larkmoor-lidar',
        name: 'Larkmoor Ridge lidar',
        title: 'Larkmoor Ridge: winds of a lidar, temperature and humidity of a radiometer beside it',
        instrument: 'lidar',
        ...PLACE,
        periodS: 600,
      }),
      'larkmoor-mast.csv': mastCsv(ATMOSPHERE, {
        seed: 862003,
        station: 'larkmoor-mast',
        heights: [10, 40, 80, 120],
        timesMs: everyMinutes(10, START, END),
      }),
      'tern-hollow-evening.csv': sounding(862004, '2024-05-21T23:30Z'),
      'tern-hollow-midnight.csv': sounding(862005, '2024-05-22T05:30Z'),
    },
    {
      'larkmoor-output.csv': farmOutputCsv(ATMOSPHERE, {
        seed: 862006,
        types: SITE.turbines,
        timesMs: everyMinutes(10, START, END),
        share: 0.91,
        standing: { count: 4, during: spell('2024-05-22T05:10Z', '2024-05-22T06:40Z') },
        gaps: [spell('2024-05-22T02:30Z', '2024-05-22T02:50Z')],
      }),
    },
  );
}
