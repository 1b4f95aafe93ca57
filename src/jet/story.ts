// The whole story of a track: what kind of jet, how its layer is built, how its wind turns, and a sentence that says so.

import { nightOf } from '../air/index.ts';
import type { Profile, Station } from '../profile/index.ts';
import type { TerrainAxis } from '../site/index.ts';
import type { Jet } from './find-jets.ts';
import { jetLayer, type Disc, type JetLayer } from './jet-layer.ts';
import { kindOf, type KindFinding } from './kinds.ts';
import { storyInWords, type WordFormat } from './story-words.ts';
import { thermalTurn, type ThermalTurn } from './thermal-turn.ts';
import type { JetTrack, TimedFinding } from './track.ts';
import { turningAt, type Turning } from './turning.ts';

/** What is known of the place and the night. Profiles and findings are the station's own, ascending in time. */
export interface StorySetting {
  readonly station: Station;
  readonly profiles: readonly Profile[];
  readonly findings: readonly TimedFinding[];
  /** Terrain axes that bear on the station. */
  readonly axes: readonly TerrainAxis[];
  /** Profiles from stations upstream, where the wind is undisturbed by the terrain; may be empty. */
  readonly undisturbed: readonly Profile[];
  readonly discs: readonly Disc[];
  /** m/s; NaN where nobody states it. */
  readonly geostrophicSpeed: number;
}

export interface JetStory extends KindFinding {
  readonly track: JetTrack;
  /** Layer of the jet in the last profile of the track; null where no jet was found in that very profile. */
  readonly layer: JetLayer | null;
  /** At the usual height of the nose, since dusk and up to the track's last point. */
  readonly turning: Turning;
  /** The same at fixed heights, upward as far as winds are known. */
  readonly turnings: readonly Turning[];
  /** Above the core in the last profile of the track. */
  readonly thermal: ThermalTurn | null;
  /** One plain sentence or two. */
  readonly words: string;
}

/** Heights of a turning around the nose, as shares of its height: the first that can be told is taken. */
const AROUND = [1, 1.25, 0.8];

/** m above ground */
const FIXED_HEIGHTS = [50, 100, 150, 200, 300, 400, 600, 800, 1000, 1500];

/** Tells the story of a track. */
export function storyOf(track: JetTrack, setting: StorySetting, format: WordFormat): JetStory {
  const { station, findings, discs } = setting;
  const last = track.points.at(-1)!;
  const profiles = setting.profiles.filter(({ timeMs }) => timeMs <= last.timeMs);
  const profile = profiles.findLast(({ timeMs }) => timeMs === last.timeMs);
  const jet = nearest(findings.find(({ timeMs }) => timeMs === last.timeMs)?.finding.jets ?? [], last.noseHeight);
  const { sunsetMs } = nightOf(track.beganMs, station.latitude, station.longitude);
  const heights = track.points.map(({ noseHeight }) => noseHeight).sort((a, b) => a - b);
  const usual = heights[heights.length >> 1]!;
  const options = {
    latitude: station.latitude,
    sinceMs: Number.isNaN(sunsetMs) ? track.beganMs : Math.min(sunsetMs, track.beganMs),
    geostrophicSpeed: setting.geostrophicSpeed,
  };
  const aroundNose = turningAt(
    profiles,
    AROUND.map((share) => share * usual),
    options,
  );
  const turning = aroundNose.find(({ status }) => status === 'told') ?? aroundNose[0]!;
  const kind = kindOf({ ...setting, track, profiles, turning });
  return {
    track,
    ...kind,
    layer: profile === undefined || jet === undefined ? null : jetLayer(profile, jet, discs),
    turning,
    turnings: turningAt(profiles, FIXED_HEIGHTS, options).filter(({ fit }) => fit.used > 0),
    thermal: profile === undefined ? null : thermalTurn(profile, jet?.core.top ?? last.noseHeight, station.latitude),
    words: storyInWords(track, kind.kind, turning, format),
  };
}

function nearest(jets: readonly Jet[], height: number): Jet | undefined {
  const away = (jet: Jet): number => Math.abs(jet.noseHeight - height);
  return [...jets].sort((a, b) => away(a) - away(b))[0];
}
