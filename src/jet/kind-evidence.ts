// Gathers the evidence for each kind of jet from its track, the sun, the temperature, the turning and the terrain.

import {
  bruntVaisalaFrequency,
  eastward,
  froudeNumber,
  nightOf,
  northward,
  signedAngle,
  veerBetween,
} from '../air/index.ts';
import type { Profile, Station } from '../profile/index.ts';
import type { TerrainAxis } from '../site/index.ts';
import { COMMON_PRACTICE, row, type Evidence } from './evidence.ts';
import { virtualPotentialTemperatureAt } from './jet-layer.ts';
import type { JetTrack, TrackPoint } from './track.ts';
import type { Turning } from './turning.ts';
import { windAtHeights } from './wind-at.ts';

/** All that a kind is judged from. */
export interface KindCase {
  readonly track: JetTrack;
  readonly station: Station;
  /** The station's profiles, ascending in time, from before the track on. */
  readonly profiles: readonly Profile[];
  /** How the wind turned near the nose; null when not looked at. */
  readonly turning: Turning | null;
  /** Terrain that bears on the station. */
  readonly axes: readonly TerrainAxis[];
  /** Profiles of the air before it meets the barrier, from stations upstream. */
  readonly undisturbed: readonly Profile[];
}

const HOUR_MS = 3600_000;
const BLACKADAR = 'Blackadar (1957, Bull. Amer. Meteor. Soc. 38)';

/** For and against a nocturnal jet. */
export function nocturnalEvidence({ track, station, profiles, turning }: KindCase): Evidence[] {
  const stability = stabilityBelow(profiles, track);
  return [
    row(
      'nocturnal',
      'onset after sunset',
      onsetAfterSunset(track, station, profiles),
      'h',
      '-1 to 7',
      [
        [-1.0001, -1.5],
        [7, 1],
        [Infinity, -0.7],
      ],
      BLACKADAR,
    ),
    row(
      'nocturnal',
      'share of its time between sunset and two hours after sunrise',
      nightShare(track, station),
      '',
      'at least 0.9',
      [
        [0.5, -2],
        [0.9 - 1e-9, -0.3],
        [Infinity, 1],
      ],
    ),
    row('nocturnal', 'rise of potential temperature up to the nose', stability, 'K/km', 'at least 3', [
      [0.5, -1],
      [3 - 1e-9, 0],
      [Infinity, 0.7],
    ]),
    row(
      'nocturnal',
      'turning of the wind as a share of the inertial rate',
      turning?.status === 'told' ? turning.measuredRate / turning.inertialRate : NaN,
      '',
      '0.5 to 1.5',
      [
        [0, -1],
        [0.5 - 1e-9, -0.5],
        [1.5, 1],
        [Infinity, -0.2],
      ],
      BLACKADAR,
    ),
    row(
      'nocturnal',
      'usual height of the nose',
      middle(track.points, (point) => point.noseHeight),
      'm',
      'at most 1000',
      [
        [1000, 0.3],
        [1500, -0.3],
        [Infinity, -1.2],
      ],
      COMMON_PRACTICE,
    ),
  ];
}

/** For and against something else: a front, a cyclone, the day. */
export function otherEvidence({ track, station }: KindCase): Evidence[] {
  const hours = (track.points.at(-1)!.timeMs - track.beganMs) / HOUR_MS;
  return [
    row('other', 'share of its time by day', 1 - nightShare(track, station), '', 'at least 0.3', [
      [0.1, -1],
      [0.3 - 1e-9, 0],
      [Infinity, 2],
    ]),
    row('other', 'how long it has lasted', hours, 'h', 'at least 18', [
      [18 - 1e-9, 0],
      [Infinity, 1.5],
    ]),
  ];
}

/** For and against a barrier jet along an axis. */
export function barrierEvidence(kindCase: KindCase, axis: TerrainAxis): Evidence[] {
  const { track, station, profiles } = kindCase;
  const toward = (middleDirection(track.points) + 180) % 360;
  const offAxis = Math.abs(signedAngle(toward - axis.bearing));
  // Low pressure lies to the left of the flow toward the barrier in the north, to the right in the south: dammed air runs
  // there, with the barrier on its right in the north and on its left, as the bearing has it, in the south.
  const expected = station.latitude < 0 ? axis.bearing : axis.bearing + 180;
  const height = middle(track.points, (point) => point.noseHeight);
  return [
    row(
      'barrier',
      `angle between the nose wind and ${axis.name}`,
      Math.min(offAxis, 180 - offAxis),
      'degrees',
      'at most 30',
      [
        [30, 1.5],
        [45, 0],
        [Infinity, -3],
      ],
      COMMON_PRACTICE,
    ),
    row(
      'barrier',
      'angle to the way that dammed air runs along it',
      Math.abs(signedAngle(toward - expected)),
      'degrees',
      'at most 60',
      [
        [60, 0.5],
        [Infinity, -1],
      ],
      COMMON_PRACTICE,
    ),
    row(
      'barrier',
      'height of the nose as a share of the crest',
      height / axis.crestHeight,
      '',
      'below 1',
      [
        [1 - 1e-9, 1],
        [Infinity, -3],
      ],
      COMMON_PRACTICE,
    ),
    row(
      'barrier',
      'Froude number of the flow toward it',
      froudeOf(kindCase, axis, profiles),
      '',
      'below 1',
      [
        [1 - 1e-9, 1],
        [Infinity, -2],
      ],
      COMMON_PRACTICE,
    ),
    row(
      'barrier',
      'strength along it against the undisturbed wind',
      strengthAlong(kindCase, axis, height),
      '',
      'about 1.45, at least 1.2',
      [
        [1.05, -1.5],
        [1.2 - 1e-9, 0],
        [Infinity, 1.5],
      ],
      COMMON_PRACTICE,
    ),
  ];
}

/** For and against a jet out of a valley. */
export function valleyEvidence({ track, station }: KindCase, axis: TerrainAxis): Evidence[] {
  const toward = (middleDirection(track.points) + 180) % 360;
  const source = COMMON_PRACTICE;
  return [
    row(
      'valley-exit',
      `angle between the nose wind and the way down ${axis.name}`,
      Math.abs(signedAngle(toward - axis.bearing)),
      'degrees',
      'at most 30',
      [
        [30, 1.5],
        [45, 0],
        [Infinity, -3],
      ],
      source,
    ),
    row(
      'valley-exit',
      'usual height of the nose',
      middle(track.points, (point) => point.noseHeight),
      'm',
      '40 to 200',
      [
        [40 - 1e-9, -0.5],
        [200, 1.5],
        [300, 0],
        [Infinity, -2],
      ],
      source,
    ),
    row(
      'valley-exit',
      'share of its time between sunset and two hours after sunrise',
      nightShare(track, station),
      '',
      'at least 0.9',
      [
        [0.5, -2],
        [0.9 - 1e-9, 0],
        [Infinity, 0.7],
      ],
      source,
    ),
    row(
      'valley-exit',
      'greatest speed',
      track.peak.noseSpeed,
      'm/s',
      'at most 20',
      [
        [20, 0.3],
        [Infinity, -1.5],
      ],
      source,
    ),
  ];
}

/** Hours from sunset to the track's beginning; NaN where data begin with it or there is no sunset. */
function onsetAfterSunset(track: JetTrack, station: Station, profiles: readonly Profile[]): number {
  const before = profiles.filter(({ timeMs }) => timeMs < track.beganMs).length;
  if (before < 2) return NaN;
  const { sunsetMs } = nightOf(track.beganMs, station.latitude, station.longitude);
  return (track.beganMs - sunsetMs) / HOUR_MS;
}

/** Share of the track's points between sunset and two hours after sunrise; NaN where that is not known. */
function nightShare(track: JetTrack, station: Station): number {
  let night = 0;
  for (const { timeMs } of track.points) {
    // Two hours back, so that the morning after belongs to the night; an hour's grace before sunset is not given.
    const { kind, startMs, endMs } = nightOf(timeMs - 2 * HOUR_MS, station.latitude, station.longitude);
    if (kind === 'unknown') return NaN;
    if (kind === 'polar-night' || (timeMs >= startMs && timeMs <= endMs + 2 * HOUR_MS)) night++;
  }
  return night / track.points.length;
}

/** Rise of virtual potential temperature from the lowest 50 to 150 m up to the nose at the peak, K/km. */
function stabilityBelow(profiles: readonly Profile[], track: JetTrack): number {
  const profile = profiles.find(({ timeMs }) => timeMs === track.peak.timeMs);
  if (profile === undefined) return NaN;
  const top = Math.max(track.peak.noseHeight, 200);
  for (const bottom of [50, 100, 150]) {
    const gradient =
      (1000 * (virtualPotentialTemperatureAt(profile, top) - virtualPotentialTemperatureAt(profile, bottom))) /
      (top - bottom);
    if (!Number.isNaN(gradient)) return gradient;
  }
  return NaN;
}

/** Undisturbed profile nearest in time to the peak, at most six hours off. */
function undisturbedAt({ undisturbed, track }: KindCase): Profile | undefined {
  const away = (profile: Profile): number => Math.abs(profile.timeMs - track.peak.timeMs);
  return undisturbed.filter((one) => away(one) <= 6 * HOUR_MS).sort((a, b) => away(a) - away(b))[0];
}

/** Component of a profile's mean wind from `bottom` to `top` toward a bearing, m/s. */
function meanToward(profile: Profile, bottom: number, top: number, bearing: number): number {
  const heights = Array.from({ length: 9 }, (_, k) => bottom + ((top - bottom) * k) / 8);
  const known = windAtHeights(profile, heights).filter(({ u, v }) => Number.isFinite(u + v));
  if (known.length === 0) return NaN;
  // Toward a bearing: as a wind of unit speed from the opposite direction blows.
  const [east, north] = [eastward(1, bearing + 180), northward(1, bearing + 180)];
  return known.reduce((sum, { u, v }) => sum + u * east + v * north, 0) / known.length;
}

/** U/(N h): undisturbed flow square to the barrier below its crest, stability at the station, crest height. */
function froudeOf(kindCase: KindCase, axis: TerrainAxis, profiles: readonly Profile[]): number {
  const undisturbed = undisturbedAt(kindCase);
  const profile = profiles.find(({ timeMs }) => timeMs === kindCase.track.peak.timeMs);
  if (undisturbed === undefined || profile === undefined) return NaN;
  // The barrier stands on the left of its bearing.
  const flow = meanToward(undisturbed, 100, axis.crestHeight, axis.bearing - 90);
  const level = (height: number): { height: number; virtualPotentialTemperature: number } => ({
    height,
    virtualPotentialTemperature: virtualPotentialTemperatureAt(profile, height),
  });
  const heights = [0.9, 0.7, 0.5, 0.3].map((share) => share * axis.crestHeight);
  const top = heights.map(level).find((one) => !Number.isNaN(one.virtualPotentialTemperature));
  const bottom = [50, 100, 200, 300].map(level).find((one) => !Number.isNaN(one.virtualPotentialTemperature));
  if (top === undefined || bottom === undefined) return NaN;
  return froudeNumber(Math.abs(flow), bruntVaisalaFrequency(bottom, top), axis.crestHeight);
}

/** The nose's speed along the axis over that of the undisturbed wind at its height. */
function strengthAlong(kindCase: KindCase, axis: TerrainAxis, height: number): number {
  const undisturbed = undisturbedAt(kindCase);
  if (undisturbed === undefined) return NaN;
  const along = (speed: number, direction: number): number =>
    speed * Math.cos((veerBetween(axis.bearing, direction + 180) * Math.PI) / 180);
  const nose = middle(kindCase.track.points, ({ noseSpeed, noseDirection }) => along(noseSpeed, noseDirection));
  const elsewhere = meanToward(undisturbed, 0.7 * height, 1.3 * height, axis.bearing);
  // Against the undisturbed flow, or out of calm, it is stronger beyond measure.
  return nose / elsewhere > 0 ? Math.min(nose / elsewhere, 10) : Number.isNaN(elsewhere) ? NaN : 10;
}

/** Median over the points. */
function middle(points: readonly TrackPoint[], valueOf: (point: TrackPoint) => number): number {
  const values = points.map(valueOf).sort((a, b) => a - b);
  return values[values.length >> 1]!;
}

/** Direction of the summed wind of the points, degrees. */
function middleDirection(points: readonly TrackPoint[]): number {
  const reference = points[0]!.noseDirection;
  return reference + middle(points, (point) => signedAngle(point.noseDirection - reference));
}
