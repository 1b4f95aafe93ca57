// Ashwillow Plain, an invented station on invented plains: a summer night in which the jet brings moist air northward under
// steep lapse rates, in two surges. Soundings in the evening and at midnight, a tower, three profilers around.

import { columnWinds, windFrom, type Wind } from './air-column.ts';
import type { AtmospherePlan } from './atmosphere.ts';
import { at, everyMinutes, ramp } from './clock.ts';
import { mastCsv } from './mast.ts';
import { demoNight, siteFileStation, type DemoNight, type Place } from './night.ts';
import { profilerFile } from './profiler-file.ts';
import { profilerRecord } from './profiler.ts';
import { sondeCsv } from './sonde.ts';

const HOUR = 3_600_000;
// Sun at Ashwillow (UTC): sets 02:01, rises 11:04. The site's clock is six hours behind.
const START = at('2024-06-27T22:00Z');
const END = at('2024-06-28T13:00Z');
const DUSK = at('2024-06-28T01:10Z');
const DAWN = at('2024-06-28T11:04Z');

interface StormStation extends Place {
  readonly id: string;
  readonly name: string;
  readonly seed: number;
  /** The jet weakens northward, and the streams of the two southern stations run together. */
  readonly strength: number;
  readonly turned: number;
  /** When each surge of moist air begins to arrive. */
  readonly moistMs: readonly [number, number];
}

const ASHWILLOW: StormStation = {
  id: 'ashwillow',
  name: 'Ashwillow Plain',
  latitude: 39.6,
  longitude: -97.1,
  elevation: 430,
  seed: 862301,
  strength: 0.86,
  turned: 0,
  moistMs: [at('2024-06-28T04:40Z'), at('2024-06-28T07:00Z')],
};
const DRY_FORK: StormStation = {
  id: 'dry-fork',
  name: 'Dry Fork',
  latitude: 38.4,
  longitude: -97.45,
  elevation: 460,
  seed: 862302,
  strength: 1,
  turned: 7,
  moistMs: [at('2024-06-28T02:20Z'), at('2024-06-28T05:00Z')],
};
const LONG_SLOUGH: StormStation = {
  id: 'long-slough',
  name: 'Long Slough',
  latitude: 38.6,
  longitude: -96.2,
  elevation: 380,
  seed: 862303,
  strength: 1.02,
  turned: -6,
  moistMs: [at('2024-06-28T01:50Z'), at('2024-06-28T04:30Z')],
};

/** Southerly low down, westerly aloft: a wind that turns and freshens with height, with a core below a kilometre. */
function pressureWind(station: StormStation, heightAgl: number): Wind {
  const aboveCore = Math.max(0, heightAgl - 650) / 1000;
  const belowCore = Math.max(0, 650 - heightAgl) / 1600;
  const low = 10.4 + 7.2 * Math.exp(-Math.pow(aboveCore, 1.6)) - 3 * belowCore;
  const speed = low * station.strength + 22 * ramp(heightAgl, 2500, 11_500);
  const direction = 188 + 24 * ramp(heightAgl, 0, 2500) + 46 * ramp(heightAgl, 2000, 8000);
  return windFrom(speed, direction + station.turned * (1 - ramp(heightAgl, 1500, 4000)));
}

function mixedDepth(timeMs: number): number {
  return timeMs < DUSK ? 1500 : timeMs < DAWN + HOUR ? 0 : 500;
}

/** Warm and dry air from high ground lies over the moist layer as a lid, steep above it up to the tropopause. */
function thetaAbove(aboveLid: number): number {
  const lid = 2.6 * (1 - Math.exp(-aboveLid / 140));
  const steep = 0.0019 * Math.min(aboveLid, 3600);
  const middle = 0.0038 * Math.min(Math.max(0, aboveLid - 3600), 6600);
  return lid + steep + middle + 0.016 * Math.max(0, aboveLid - 10_200);
}

function atmosphere(station: StormStation): AtmospherePlan {
  const nightHours = (timeMs: number): number => Math.max(0, (timeMs - DUSK) / HOUR);
  return {
    seed: station.seed,
    winds: (timesMs) =>
      columnWinds(
        {
          latitude: station.latitude,
          pressureWind: (heightAgl) => pressureWind(station, heightAgl),
          mixedDepth,
          frictionDepth: 130,
        },
        timesMs,
      ),
    convection: (timeMs) => Math.min(1, mixedDepth(timeMs) / 500),
    eddies: (timeMs) => 0.35 + 0.15 * Math.min(1, mixedDepth(timeMs) / 400),
    surfacePressure: 96_300 + (430 - station.elevation) * 11,
    mixedTheta: 307.5,
    mixedHumidity: 0.0135,
    lidHeight: 1500,
    thetaAbove,
    groundCooling: (timeMs) => 2.6 * Math.sqrt(nightHours(timeMs)),
    coolingDepth: (timeMs) => 90 + 22 * nightHours(timeMs),
    broughtHumidity: (timeMs) =>
      station.moistMs.reduce((sum, startMs) => sum + SURGE * ramp(timeMs, startMs, startMs + SURGE_TAKES), 0),
    broughtHeight: 650,
    broughtWidth: 600,
  };
}

/** kg/kg that each surge brings at the height where it is strongest, and how long it takes to come, ms. */
const SURGE = 0.0021;
const SURGE_TAKES = 1.1 * HOUR;

const TRIANGLE = [ASHWILLOW, DRY_FORK, LONG_SLOUGH];

const SITE = {
  name: 'Ashwillow Plain',
  about: 'Invented: the places, their coordinates and the weather exist nowhere.',
  time_zone: 'Etc/GMT+6',
  stations: [
    ...TRIANGLE.map((station) => siteFileStation(station.id, `${station.name} profiler`, 'wind-profiler', station)),
    siteFileStation('ashwillow-sonde', 'Ashwillow Plain soundings', 'radiosonde', ASHWILLOW),
    siteFileStation('ashwillow-tower', 'Ashwillow Plain tower', 'mast', ASHWILLOW),
  ],
  turbines: [],
  neighbours: [TRIANGLE.map((station) => station.id)],
  upstream: [{ station: 'ashwillow', from: ['dry-fork', 'long-slough'] }],
};

/** The night at Ashwillow Plain. */
export function storm(): DemoNight {
  const profiler = (station: StormStation, seed: number, withAir: boolean): Uint8Array =>
    profilerFile(
      profilerRecord(atmosphere(station), {
        seed,
        gates: Array.from({ length: 54 }, (_, k) => 100 + 60 * k),
        timesMs: everyMinutes(10, START, END),
        noise: 0.3,
        noisePerKm: 0.1,
        echoAtGround: 24,
        echoLossPerKm: 7,
        leastEcho: -1,
        outages: [],
        noisySpells: [],
        withAir,
      }),
      {
        ...station,
        station: station.id,
        name: `${station.name} profiler`,
        title: `${station.name}: winds of a profiler${withAir ? ', temperature and humidity of a radiometer beside it' : ''}`,
        instrument: 'wind-profiler',
        periodS: 600,
      },
    );
  const sounding = (seed: number, launch: string): string =>
    sondeCsv(atmosphere(ASHWILLOW), {
      ...ASHWILLOW,
      seed,
      station: 'ashwillow-sonde',
      launchMs: at(launch),
      top: 14_500,
    });
  return demoNight(
    { id: 'storm', title: 'Ashwillow Plain: a jet that feeds storms', now: '2024-06-28T06:30:00Z' },
    SITE,
    {
      'ashwillow.nc': profiler(ASHWILLOW, 862304, false),
      'dry-fork.nc': profiler(DRY_FORK, 862305, true),
      'long-slough.nc': profiler(LONG_SLOUGH, 862306, true),
      'ashwillow-evening.csv': sounding(862307, '2024-06-27T23:30Z'),
      'ashwillow-midnight.csv': sounding(862308, '2024-06-28T05:30Z'),
      'ashwillow-tower.csv': mastCsv(atmosphere(ASHWILLOW), {
        seed: 862309,
        station: 'ashwillow-tower',
        heights: [10, 60, 140, 240, 320],
        timesMs: everyMinutes(20, START, END),
      }),
    },
  );
}
