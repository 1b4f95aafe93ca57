// Quill Mouth, an invented wind farm beyond the mouth of an invented valley in the southern hemisphere: on a clear night
// the valley empties itself of cold air, a shallow jet that blows through the rotors.

import { windFrom, type Wind } from './air-column.ts';
import type { AtmospherePlan } from './atmosphere.ts';
import { at, everyMinutes, ramp } from './clock.ts';
import { mastCsv } from './mast.ts';
import { demoNight, siteFileStation, type DemoNight } from './night.ts';
import { profilerFile } from './profiler-file.ts';
import { profilerRecord } from './profiler.ts';

const PLACE = { latitude: -43.4, longitude: 171.2, elevation: 420 };
/** Degrees: down the valley, toward its mouth. */
const DOWN_VALLEY = 140;

// Sun at this place (UTC): sets 07:54, rises 17:48. The site's clock is twelve hours ahead.
const START = at('2024-02-09T04:00Z');
const END = at('2024-02-09T22:00Z');
const DUSK = at('2024-02-09T07:54Z');
const DAWN = at('2024-02-09T17:48Z');
const HOUR = 3_600_000;

function night(timeMs: number): number {
  return ramp(timeMs, DUSK - HOUR, DUSK + 3.5 * HOUR) * (1 - ramp(timeMs, DAWN, DAWN + 2.5 * HOUR));
}

function wind(heightAgl: number, timeMs: number): Wind {
  const flowing = night(timeMs);
  // The outflow breathes a little; its nose rises as the pool of cold air deepens.
  const hours = (timeMs - DUSK) / HOUR;
  const strength = 13.2 * flowing * (1 + 0.06 * Math.sin(2 * Math.PI * hours * 1.1));
  const noseHeight = 85 + 45 * ramp(timeMs, DUSK + HOUR, DAWN);
  const relative = heightAgl / noseHeight;
  const outflow = windFrom(strength * relative * Math.exp(1 - relative), DOWN_VALLEY + 180);
  // By day air is drawn up the valley; aloft a weak north-westerly.
  const daytime = windFrom(4.2 * (1 - flowing) * Math.exp(-heightAgl / 500), DOWN_VALLEY + 12);
  const aloft = windFrom(4.5 * (1 - Math.exp(-heightAgl / 450)), 335 - 20 * Math.min(1, heightAgl / 1000));
  return { u: outflow.u + daytime.u + aloft.u, v: outflow.v + daytime.v + aloft.v };
}

const ATMOSPHERE: AtmospherePlan = {
  seed: 862201,
  winds: (timesMs) => timesMs.map((timeMs) => (heightAgl: number) => wind(heightAgl, timeMs)),
  convection: (timeMs) => (1 - night(timeMs)) * 0.7,
  eddies: (timeMs) => 0.25 + 0.35 * (1 - night(timeMs)),
  surfacePressure: 96_700,
  mixedTheta: 295,
  mixedHumidity: 0.0072,
  lidHeight: 1200,
  thetaAbove: (aboveLid) => 3 * (1 - Math.exp(-aboveLid / 150)) + 0.004 * aboveLid,
  groundCooling: (timeMs) => 8.5 * night(timeMs),
  coolingDepth: (timeMs) => 60 + 130 * ramp(timeMs, DUSK, DAWN),
  broughtHumidity: () => 0,
  broughtHeight: 0,
  broughtWidth: 1,
};

const SITE = {
  name: 'Quill Mouth',
  about: 'Invented: the place, the valley, their coordinates, the turbines and the weather exist nowhere.',
  time_zone: 'Etc/GMT-12',
  stations: [
    siteFileStation('quill-lidar', 'Quill Mouth lidar', 'lidar', PLACE),
    siteFileStation('quill-mast', 'Quill Mouth mast', 'mast', PLACE),
  ],
  turbines: [
    {
      name: 'Dotterel 120',
      count: 16,
      hub_height_m: 95,
      rotor_diameter_m: 120,
      power_curve: {
        air_density_kg_per_m3: 1.225,
        speed_mps: [3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13, 25],
        power_kw: [30, 120, 290, 540, 890, 1340, 1880, 2410, 2790, 2960, 3000, 3000],
      },
    },
  ],
  terrain_axes: [
    {
      name: 'Quill Valley',
      kind: 'valley',
      bearing_deg: DOWN_VALLEY,
      crest_height_m: 900,
      stations: ['quill-lidar', 'quill-mast'],
    },
  ],
};

/** The night at Quill Mouth. */
export function valley(): DemoNight {
  const timesMs = everyMinutes(10, START, END);
  const record = profilerRecord(ATMOSPHERE, {
    seed: 862202,
    gates: Array.from({ length: 49 }, (_, k) => 30 + 20 * k),
    timesMs,
    noise: 0.1,
    noisePerKm: 0.15,
    echoAtGround: 18,
    echoLossPerKm: 17,
    leastEcho: -1,
    outages: [],
    noisySpells: [],
    withAir: false,
  });
  return demoNight(
    { id: 'valley', title: 'Quill Mouth: a jet out of a valley, southern hemisphere', now: '2024-02-09T13:20:00Z' },
    SITE,
    {
      'quill-lidar.nc': profilerFile(record, {
        station: 'quill-lidar',
        name: 'Quill Mouth lidar',
        title: 'Quill Mouth: winds of a lidar',
        instrument: 'lidar',
        ...PLACE,
        periodS: 600,
      }),
      'quill-mast.csv': mastCsv(ATMOSPHERE, {
        seed: 862203,
        station: 'quill-mast',
        heights: [10, 30, 60, 95],
        timesMs,
      }),
    },
  );
}
