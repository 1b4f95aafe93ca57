// Garrow Foothills, an invented station below an invented range: a winter night with a barrier jet. A south-westerly flow
// cannot climb the range, turns and runs northward along it, 45 % faster than the wind along the range far upstream.

import { windFrom, type Wind } from './air-column.ts';
import type { AtmospherePlan } from './atmosphere.ts';
import { at, everyMinutes, ramp, spell } from './clock.ts';
import { demoNight, siteFileStation, type DemoNight } from './night.ts';
import { profilerFile } from './profiler-file.ts';
import { profilerRecord } from './profiler.ts';
import { sondeCsv } from './sonde.ts';

const FOOTHILL = { latitude: 46.4, longitude: -121.7, elevation: 310 };
const UPSTREAM = { latitude: 46.3, longitude: -123.6, elevation: 40 };
const CREST_HEIGHT = 2200;

// Sun at this place (UTC): sets 00:48, rises 15:46. The site's clock is eight hours behind.
const START = at('2024-01-16T22:00Z');
const END = at('2024-01-17T18:00Z');
const BEGIN = at('2024-01-16T23:30Z');
const FULL = at('2024-01-17T03:30Z');
const EASE = at('2024-01-17T12:30Z');
const OVER = at('2024-01-17T17:00Z');
/** By how much the wind along the range is stronger at its foot than far upstream. */
const STRENGTHENED = 1.45;

/** Far upstream: south-westerly, veering and freshening with height, slowed near the ground. */
function undisturbed(heightAgl: number, timeMs: number): Wind {
  const strength = 0.75 + 0.25 * ramp(timeMs, START, FULL) - 0.2 * ramp(timeMs, EASE, OVER);
  const speed = (12.6 + 0.5 * (heightAgl / 1000)) * (1 - 0.55 * Math.exp(-heightAgl / 130));
  return windFrom(speed * strength, 204 + 8 * Math.min(4, heightAgl / 1000));
}

/** At the foot of the range: what would cross it is held back below the crest, what runs along it is strengthened. */
function atFoot(heightAgl: number, timeMs: number): Wind {
  const far = undisturbed(heightAgl, timeMs);
  const held = ramp(timeMs, BEGIN, FULL) * (1 - ramp(timeMs, EASE, OVER));
  const belowCrest = 1 - ramp(heightAgl, 0.55 * CREST_HEIGHT, 1.15 * CREST_HEIGHT);
  const fromNose = (heightAgl - 950) / 560;
  const core = Math.exp(-fromNose * fromNose);
  // Just below the crest the air stands between the jet and the free flow above.
  const fromSlack = (heightAgl - 1950) / 450;
  const slack = Math.exp(-fromSlack * fromSlack);
  return {
    u: far.u * (1 - 0.85 * held * belowCrest),
    v: far.v * (1 + (STRENGTHENED - 1) * held * core - 0.4 * held * slack),
  };
}

const AIR = {
  surfacePressure: 97_600,
  mixedTheta: 277.5,
  mixedHumidity: 0.0036,
  lidHeight: 0,
  // Stable from the ground up: some 5 K a kilometre.
  thetaAbove: (aboveLid: number) => 0.005 * aboveLid,
  groundCooling: () => 0.8,
  coolingDepth: () => 120,
  broughtHumidity: () => 0,
  broughtHeight: 0,
  broughtWidth: 1,
  convection: () => 0,
  eddies: () => 0.45,
};

function atmosphere(
  seed: number,
  wind: (heightAgl: number, timeMs: number) => Wind,
  surfacePressure: number,
): AtmospherePlan {
  return {
    ...AIR,
    surfacePressure,
    seed,
    winds: (timesMs) => timesMs.map((timeMs) => (heightAgl: number) => wind(heightAgl, timeMs)),
  };
}

const FOOTHILL_AIR = atmosphere(862101, atFoot, 97_600);
const UPSTREAM_AIR = atmosphere(862102, undisturbed, 100_900);

const SITE = {
  name: 'Garrow Foothills',
  about: 'Invented: the place, the range, their coordinates and the weather exist nowhere.',
  time_zone: 'Etc/GMT+8',
  stations: [
    siteFileStation('garrow-profiler', 'Garrow Foothills profiler', 'wind-profiler', FOOTHILL),
    siteFileStation('gull-flats', 'Gull Flats soundings', 'radiosonde', UPSTREAM),
  ],
  turbines: [],
  terrain_axes: [
    {
      name: 'Garrow Range',
      kind: 'barrier',
      // The range lies to the east, on the left of one who looks south.
      bearing_deg: 180,
      crest_height_m: CREST_HEIGHT,
      stations: ['garrow-profiler'],
    },
  ],
  upstream: [{ station: 'garrow-profiler', from: ['gull-flats'] }],
};

/** The night at Garrow Foothills. */
export function barrier(): DemoNight {
  const record = profilerRecord(FOOTHILL_AIR, {
    seed: 862103,
    gates: Array.from({ length: 56 }, (_, k) => 120 + 60 * k),
    timesMs: everyMinutes(15, START, END),
    noise: 0.3,
    noisePerKm: 0.12,
    echoAtGround: 24,
    echoLossPerKm: 7,
    leastEcho: -1,
    outages: [spell('2024-01-17T09:15Z', '2024-01-17T09:45Z')],
    noisySpells: [],
    withAir: true,
  });
  const sounding = (seed: number, launch: string): string =>
    sondeCsv(UPSTREAM_AIR, { seed, station: 'gull-flats', ...UPSTREAM, launchMs: at(launch), top: 6000 });
  return demoNight(
    { id: 'barrier', title: 'Garrow Foothills: a barrier jet below a range', now: '2024-01-17T10:30:00Z' },
    SITE,
    {
      'garrow-profiler.nc': profilerFile(record, {
        station: 'garrow-profiler',
        name: 'Garrow Foothills profiler',
        title: 'Garrow Foothills: winds of a profiler, temperature and humidity of a radiometer beside it',
        instrument: 'wind-profiler',
        ...FOOTHILL,
        periodS: 900,
      }),
      'gull-flats-evening.csv': sounding(862104, '2024-01-17T00:00Z'),
      'gull-flats-night.csv': sounding(862106, '2024-01-17T06:00Z'),
      'gull-flats-morning.csv': sounding(862105, '2024-01-17T12:00Z'),
    },
  );
}
