// The winds of all instruments at one place as one series of profiles, and by how much the instruments disagree.

import type { Profile } from '../profile/index.ts';
import {
  joinProfiles,
  measureDisagreement,
  pairInTime,
  type Disagreement,
  type JoinedProfile,
} from '../rotor/index.ts';
import { siteStation, type Site } from '../site/index.ts';
import type { FeedName } from './feed-name.ts';

/** A feed's screened profiles, ascending in time. */
export interface FeedSeries {
  readonly feed: FeedName;
  readonly profiles: readonly Profile[];
}

/** Heights that one instrument gives to a joined profile. */
export interface JoinedPart {
  readonly feed: FeedName;
  /** m above ground, lowest and highest of its levels */
  readonly bottom: number;
  readonly top: number;
  readonly levels: number;
}

/** What two instruments at one place differ by, the worse minus the better. */
export interface FeedDisagreement {
  readonly better: FeedName;
  readonly worse: FeedName;
  readonly known: Disagreement;
}

export interface JoinedSeries {
  /** For each profile of the base in turn; the profile itself where no other instrument measured at the time. */
  readonly joined: readonly JoinedProfile[];
  readonly disagreements: readonly FeedDisagreement[];
  /** Profiles of the other feeds that stand in no join. */
  readonly left: readonly Profile[];
}

/** Profiles further apart in time than half the longer interval, or than this, ms, are not joined. Our own choice. */
const FARTHEST_MS = 600_000;

/**
 * Joins every profile of a feed with those of other feeds at the same place and time, the better one winning by height.
 * What the feeds steadily differ by is measured over all of the profiles given and not read as veer.
 */
export function joinSeries(base: FeedSeries, others: readonly FeedSeries[], site: Site): JoinedSeries {
  const feeds = [base, ...others];
  const feedOf = new Map<Profile, number>();
  feeds.forEach(({ profiles }, index) => profiles.forEach((profile) => feedOf.set(profile, index)));
  const stated = (profile: Profile): number => siteStation(site, profile.station.id)?.speedUncertainty ?? NaN;
  const measured = new Map<string, FeedDisagreement>();
  const disagreement = (better: Profile, worse: Profile): Disagreement => {
    const [first, second] = [feedOf.get(better)!, feedOf.get(worse)!];
    const key = `${first} ${second}`;
    let known = measured.get(key);
    if (known === undefined) {
      const pairs = pairInTime(
        feeds[first]!.profiles,
        feeds[second]!.profiles,
        tolerance(feeds[first]!, feeds[second]!),
      );
      known = {
        better: feeds[first]!.feed,
        worse: feeds[second]!.feed,
        known: measureDisagreement(pairs, stated),
      };
      measured.set(key, known);
    }
    return known.known;
  };
  const left = new Set(others.flatMap(({ profiles }) => profiles));
  const joined = base.profiles.map((profile) => {
    const beside = others.flatMap((other) => {
      const found = nearestInTime(other.profiles, profile.timeMs, tolerance(base, other));
      return found === undefined ? [] : [found];
    });
    beside.forEach((each) => left.delete(each));
    if (beside.length === 0) return joinProfiles([profile]);
    const one = joinProfiles([profile, ...beside], { disagreement, speedUncertainty: stated });
    // Place and time are those of the feed that is looked at, whichever instrument is the better one.
    const { station, timeMs, periodS } = profile;
    return { ...one, profile: { ...one.profile, station, timeMs, periodS } };
  });
  return {
    joined,
    disagreements: [...measured.values()].filter(({ known }) => known.times > 0),
    left: [...left].sort((a, b) => a.timeMs - b.timeMs),
  };
}

/** Which heights of a joined profile come from which feed, from the ground up. */
export function partsOf({ levels }: JoinedProfile, feeds: readonly FeedSeries[]): JoinedPart[] {
  const parts = feeds.flatMap(({ feed, profiles }) => {
    const own = levels.filter((level) => profiles.includes(level.profile)).map((level) => level.heightAgl);
    if (own.length === 0) return [];
    return [{ feed, bottom: own[0]!, top: own.at(-1)!, levels: own.length }];
  });
  return parts.sort((a, b) => a.bottom - b.bottom);
}

function tolerance(a: FeedSeries, b: FeedSeries): number {
  const interval = Math.max(usualInterval(a.profiles), usualInterval(b.profiles));
  return Math.min(FARTHEST_MS, interval / 2);
}

/** Median; without two profiles as long as may be. */
function usualInterval(profiles: readonly Profile[]): number {
  const intervals = profiles.slice(1).map((profile, k) => profile.timeMs - profiles[k]!.timeMs);
  return intervals.sort((a, b) => a - b)[intervals.length >> 1] ?? FARTHEST_MS;
}

function nearestInTime(profiles: readonly Profile[], timeMs: number, within: number): Profile | undefined {
  let [low, high] = [0, profiles.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (profiles[middle]!.timeMs < timeMs) low = middle + 1;
    else high = middle;
  }
  const near = [profiles[low - 1], profiles[low]].filter((profile) => profile !== undefined);
  const distance = (profile: Profile): number => Math.abs(profile.timeMs - timeMs);
  return near.filter((profile) => distance(profile) <= within).sort((a, b) => distance(a) - distance(b))[0];
}
