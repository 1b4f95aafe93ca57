// When is it night at a place? Sunset, sunrise and civil twilight, polar day and night included. Times are UTC ms.
// The positions of the sun come from astronomy-engine; sunset and sunrise are the upper limb on a level horizon with
// 34' of refraction, civil twilight the sun's centre 6 degrees below (the almanacs' usual definitions).

import { Body, Equator, Horizon, Observer, SearchAltitude, SearchHourAngle, SearchRiseSet } from 'astronomy-engine';

const DAY_MS = 86_400_000;
const MS_PER_DEGREE = DAY_MS / 360;
/** Altitude of the sun's centre when its upper limb touches the horizon, degrees: refraction 34', semi-diameter 16'. */
const RISE_ALTITUDE = -50 / 60;
const CIVIL_ALTITUDE = -6;
const RISING = 1;
const SETTING = -1;

export type NightKind = 'night' | 'polar-day' | 'polar-night' | 'unknown';

/**
 * The night between two solar noons. Nights partition time: every moment belongs to exactly one, the forenoon to the
 * night past, the afternoon to the night to come.
 */
export interface Night {
  /** `polar-day`: the sun stays up; `polar-night`: it is down at one noon or both; `unknown`: no position. */
  readonly kind: NightKind;
  /** Sun down from here: sunset, or the noon before when the sun was down already. NaN when it stays up. */
  readonly startMs: number;
  /** Sun down until here: sunrise, or the noon after when the sun stays down. NaN when it stays up. */
  readonly endMs: number;
  /** NaN when the sun does not set between the two noons. */
  readonly sunsetMs: number;
  /** NaN when the sun does not rise between the two noons. */
  readonly sunriseMs: number;
  /** End of evening civil twilight; NaN when it does not end before the next noon. */
  readonly civilDuskMs: number;
  /** Begin of morning civil twilight; NaN when there is none. */
  readonly civilDawnMs: number;
  /** In words, why there is no plain night; empty when there is one. */
  readonly why: string;
}

export type Light = 'day' | 'dusk' | 'night' | 'unknown';

/** A stretch of time under one light; `dusk` is civil twilight, evening or morning. */
export interface LightSpan {
  readonly startMs: number;
  readonly endMs: number;
  readonly light: Light;
}

/** Solar noon to solar noon: the events between, and the light at the first noon. */
interface SunDay {
  readonly noonMs: number;
  readonly nextNoonMs: number;
  readonly lightAtNoon: Light;
  readonly night: Night;
}

/**
 * The night a moment belongs to, at a place.
 * @param timeMs UTC, ms
 * @param latitude degrees, north positive
 * @param longitude degrees, east positive
 * @returns kind `unknown` and NaN times when any argument is NaN or the latitude is impossible
 */
export function nightOf(timeMs: number, latitude: number, longitude: number): Night {
  if (!isPlace(latitude, longitude) || !Number.isFinite(timeMs)) return UNKNOWN_NIGHT;
  return sunDayOf(timeMs, latitude, longitude).night;
}

/**
 * Day, dusk and night from `startMs` to `endMs`, without gap or overlap, for the strip under a time axis.
 * @returns one span `unknown` when the position is not known; none when the time range is empty or not finite
 */
export function lightSpans(startMs: number, endMs: number, latitude: number, longitude: number): LightSpan[] {
  if (!(endMs > startMs) || !Number.isFinite(endMs - startMs)) return [];
  if (!isPlace(latitude, longitude)) return [{ startMs, endMs, light: 'unknown' }];
  const spans: LightSpan[] = [];
  let day = sunDayOf(startMs, latitude, longitude);
  let light = day.lightAtNoon;
  let from = day.noonMs;
  const close = (until: number): void => {
    const span = { startMs: Math.max(from, startMs), endMs: Math.min(until, endMs), light };
    if (span.endMs > span.startMs) spans.push(span);
    from = until;
  };
  for (;;) {
    for (const change of changesOf(day.night)) {
      if (change.light === light) continue;
      close(change.timeMs);
      light = change.light;
    }
    if (day.nextNoonMs >= endMs) break;
    day = sunDayOf(day.nextNoonMs, latitude, longitude);
  }
  close(endMs);
  return spans;
}

function changesOf(night: Night): { timeMs: number; light: Light }[] {
  const changes: { timeMs: number; light: Light }[] = [
    { timeMs: night.sunsetMs, light: 'dusk' },
    { timeMs: night.civilDuskMs, light: 'night' },
    { timeMs: night.civilDawnMs, light: 'dusk' },
    { timeMs: night.sunriseMs, light: 'day' },
  ];
  return changes.filter((change) => !Number.isNaN(change.timeMs)).sort((a, b) => a.timeMs - b.timeMs);
}

function isPlace(latitude: number, longitude: number): boolean {
  return Math.abs(latitude) <= 90 && Number.isFinite(longitude);
}

/** The searches cost a fraction of a millisecond each, too much for every profile of a year's scan. */
const cache = new Map<string, SunDay>();
const CACHE_SIZE = 4096;

function sunDayOf(timeMs: number, latitude: number, longitude: number): SunDay {
  // Mean solar noon is at most 17 minutes from the true one, so the day counted from it may be one off.
  const number = Math.floor((timeMs + longitude * MS_PER_DEGREE) / DAY_MS - 0.5);
  const day = sunDay(number, latitude, longitude);
  if (timeMs < day.noonMs) return sunDay(number - 1, latitude, longitude);
  if (timeMs >= day.nextNoonMs) return sunDay(number + 1, latitude, longitude);
  return day;
}

function sunDay(number: number, latitude: number, longitude: number): SunDay {
  const key = `${number} ${latitude} ${longitude}`;
  const known = cache.get(key);
  if (known !== undefined) return known;
  const observer = new Observer(latitude, longitude, 0);
  const meanNoonMs = (number + 0.5) * DAY_MS - longitude * MS_PER_DEGREE;
  const noonMs = trueNoon(meanNoonMs, observer);
  const nextNoonMs = trueNoon(meanNoonMs + DAY_MS, observer);
  const day = {
    noonMs,
    nextNoonMs,
    lightAtNoon: lightAt(noonMs, observer),
    night: nightBetween(noonMs, nextNoonMs, observer),
  };
  if (cache.size >= CACHE_SIZE) cache.clear();
  cache.set(key, day);
  return day;
}

function trueNoon(meanNoonMs: number, observer: Observer): number {
  const start = new Date(meanNoonMs - DAY_MS / 24);
  return SearchHourAngle(Body.Sun, observer, 0, start).time.date.getTime();
}

function nightBetween(noonMs: number, nextNoonMs: number, observer: Observer): Night {
  const start = new Date(noonMs);
  const limit = (nextNoonMs - noonMs) / DAY_MS;
  const rise = (direction: number): number =>
    SearchRiseSet(Body.Sun, observer, direction, start, limit)?.date.getTime() ?? NaN;
  const civil = (direction: number): number =>
    SearchAltitude(Body.Sun, observer, direction, start, limit, CIVIL_ALTITUDE)?.date.getTime() ?? NaN;
  const sunsetMs = rise(SETTING);
  const sunriseMs = rise(RISING);
  const times = { sunsetMs, sunriseMs, civilDuskMs: civil(SETTING), civilDawnMs: civil(RISING) };
  const staysUp = Number.isNaN(sunsetMs) && Number.isNaN(sunriseMs) && lightAt(noonMs, observer) === 'day';
  if (staysUp) return { kind: 'polar-day', startMs: NaN, endMs: NaN, ...times, why: 'The sun does not set.' };
  const startMs = Number.isNaN(sunsetMs) ? noonMs : sunsetMs;
  const endMs = Number.isNaN(sunriseMs) ? nextNoonMs : sunriseMs;
  const whole = startMs === sunsetMs && endMs === sunriseMs;
  return whole
    ? { kind: 'night', startMs, endMs, ...times, why: '' }
    : { kind: 'polar-night', startMs, endMs, ...times, why: 'The sun does not come above the horizon at noon.' };
}

function lightAt(timeMs: number, observer: Observer): Light {
  const time = new Date(timeMs);
  const place = Equator(Body.Sun, time, observer, true, true);
  const { altitude } = Horizon(time, observer, place.ra, place.dec);
  if (altitude >= RISE_ALTITUDE) return 'day';
  return altitude >= CIVIL_ALTITUDE ? 'dusk' : 'night';
}

const UNKNOWN_NIGHT: Night = {
  kind: 'unknown',
  startMs: NaN,
  endMs: NaN,
  sunsetMs: NaN,
  sunriseMs: NaN,
  civilDuskMs: NaN,
  civilDawnMs: NaN,
  why: 'The position of the station is not known, so neither are its sunset and sunrise.',
};
