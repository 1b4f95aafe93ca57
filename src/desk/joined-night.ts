// What a night's discs rest on: which instruments, joined at which heights, and by how much they disagree.

import type { Instrument, Profile } from '../profile/index.ts';
import type { DiscSlice, DiscSlices } from '../rotor/index.ts';
import type { Site } from '../site/index.ts';
import { joinSeries, partsOf, type FeedDisagreement, type FeedSeries, type JoinedPart } from './joined-series.ts';
import { siteDiscSlices } from './site-disc.ts';

export type { FeedSeries } from './joined-series.ts';

/** The instruments of a place whose winds are joined. */
export interface NightJoin {
  /** Of the newest profile, from the ground up; one alone where the others did not measure at its time. */
  readonly parts: readonly JoinedPart[];
  /** What was done where one hands over to another, in words. */
  readonly words: readonly string[];
  readonly disagreements: readonly FeedDisagreement[];
}

/** A slice of the newest profile across a disc, and the instrument that measured it. */
export interface FaceSlice extends DiscSlice {
  readonly instrument: Instrument;
}

export interface DiscFaceWind extends DiscSlices {
  readonly slices: readonly FaceSlice[];
}

/** The profiles of a feed joined with those of the other feeds at its place, one for each of the feed's own. */
export function joinNight(
  base: FeedSeries,
  others: readonly FeedSeries[],
  site: Site,
): { readonly profiles: readonly Profile[]; readonly join: NightJoin | null } {
  const present = others.filter(({ profiles }) => profiles.length > 0);
  if (present.length === 0) return { profiles: base.profiles, join: null };
  const { joined, disagreements } = joinSeries(base, present, site);
  const newest = joined.at(-1);
  return {
    profiles: joined.map(({ profile }) => profile),
    join: {
      parts: newest === undefined ? [] : partsOf(newest, [base, ...present]),
      words: newest?.joins.map(({ words }) => words) ?? [],
      disagreements,
    },
  };
}

/** The newest profile across each of the site's discs. */
export function facesOf(profile: Profile | undefined, join: NightJoin | null, site: Site): DiscFaceWind[] {
  if (profile === undefined) return [];
  const by = (height: number): Instrument =>
    join?.parts.find(({ bottom, top }) => height >= bottom && height <= top)?.feed.instrument ?? profile.instrument;
  return site.turbines.map((turbine) => {
    const face = siteDiscSlices(profile, turbine, site);
    const offset = profile.station.elevation - turbine.groundElevation;
    const raise = Number.isNaN(offset) ? 0 : -offset;
    return { ...face, slices: face.slices.map((slice) => ({ ...slice, instrument: by(slice.height + raise) })) };
  });
}
