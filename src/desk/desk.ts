// The engine: takes profiles and a site, gives the state of a night. Pure and deterministic, no clock, no I/O; the same
// code in a browser's worker and in Node.

import type { LightSpan } from '../air/index.ts';
import { lightSpans } from '../air/index.ts';
import { criteriaOf, findJets, trackJets, type Criteria, type JetFinding, type JetTrack } from '../jet/index.ts';
import { moistureOf, type MoistureNumbers } from '../moisture/index.ts';
import { profileAt, type Profile, type ProfileBlock } from '../profile/index.ts';
import { screen, type FeedScreening } from '../quality/index.ts';
import { windOnDisc, type DiscWind } from '../rotor/index.ts';
import { siteStation, type Site, type TurbineType } from '../site/index.ts';
import { FeedStore, type Acceptance, type FeedName } from './feed-store.ts';
import { nightWindow, type NightWindow } from './night-window.ts';

/** A feed with what a reader must know to choose it and to trust it. */
export interface FeedState extends FeedName {
  readonly profiles: number;
  readonly firstMs: number;
  readonly lastMs: number;
  /** m above ground: highest level of any profile. */
  readonly top: number;
  /** Usual time between profiles, ms: the median; NaN for a lone profile. */
  readonly intervalMs: number;
  readonly screening: readonly FeedScreening[];
}

/** What one turbine type meets through the night, a record for each profile of the series. */
export interface DiscSeries {
  readonly turbine: TurbineType;
  readonly winds: readonly DiscWind[];
}

/** One feed's night as far as it is known at a moment. Series run in parallel with `timeMs`. */
export interface NightState {
  readonly atMs: number;
  readonly feed: FeedName;
  readonly window: NightWindow;
  readonly lights: readonly LightSpan[];
  readonly criteria: Criteria;
  /** Valid times of the profiles in the window up to `atMs`, ascending. */
  readonly timeMs: readonly number[];
  readonly findings: readonly JetFinding[];
  /** The stories of the night's jets as far as they are known at `atMs`. */
  readonly tracks: readonly JetTrack[];
  readonly discs: readonly DiscSeries[];
  readonly moisture: readonly MoistureNumbers[];
}

export interface NightQuestion {
  /** Key of the feed. */
  readonly feed: string;
  /** Criteria set by name; the site's unless told. */
  readonly criteria?: string;
}

/** A screened feed with the answers already worked out for it. */
interface Screened {
  readonly raw: ProfileBlock;
  readonly block: ProfileBlock;
  readonly screening: readonly FeedScreening[];
  /** By criteria name, by profile index. */
  readonly findings: Map<string, (JetFinding | undefined)[]>;
}

export class Desk {
  readonly site: Site;
  readonly #store: FeedStore;
  readonly #screened = new Map<string, Screened>();

  constructor(site: Site) {
    this.site = site;
    this.#store = new FeedStore(site);
  }

  /** Takes profiles in any order, twice or late; ends in the same state as in order and once. */
  accept(block: ProfileBlock): Acceptance {
    return this.#store.accept(block);
  }

  /** All feeds by key. */
  feeds(): FeedState[] {
    return this.#store.names().map((name) => {
      const { block, screening } = this.#screenedFeed(name.key)!;
      let top = 0;
      for (const height of block.heightAgl) if (height > top) top = height;
      return {
        ...name,
        profiles: block.profileCount,
        firstMs: block.timeMs[0]!,
        lastMs: block.timeMs[block.profileCount - 1]!,
        top,
        intervalMs: medianInterval(block.timeMs),
        screening,
      };
    });
  }

  /** A feed's profiles, screened and ascending in time; null where there is no such feed. */
  block(feed: string): ProfileBlock | null {
    return this.#screenedFeed(feed)?.block ?? null;
  }

  /** The night of a feed as known at a moment: nothing later than `atMs` is looked at. Null where there is no such feed. */
  night(atMs: number, question: NightQuestion): NightState | null {
    const screened = this.#screenedFeed(question.feed);
    const feed = this.#store.names().find((name) => name.key === question.feed);
    if (screened === null || feed === undefined) return null;
    const { block } = screened;
    const window = nightWindow(atMs, feed.station, block.timeMs);
    const criteria = criteriaOf(question.criteria ?? this.site.criteria);
    const indices: number[] = [];
    for (let index = 0; index < block.profileCount; index++) {
      const timeMs = block.timeMs[index]!;
      if (timeMs >= window.startMs && timeMs <= atMs) indices.push(index);
    }
    const findings = indices.map((index) => this.#finding(screened, index, criteria));
    const profiles = indices.map((index) => profileAt(block, index));
    const timed = findings.map((finding, k) => ({
      stationId: feed.station.id,
      timeMs: block.timeMs[indices[k]!]!,
      finding,
    }));
    return {
      atMs,
      feed,
      window,
      lights: lightSpans(window.startMs, window.endMs, feed.station.latitude, feed.station.longitude),
      criteria,
      timeMs: indices.map((index) => block.timeMs[index]!),
      findings,
      tracks: trackJets(timed),
      discs: this.site.turbines.map((turbine) => ({ turbine, winds: discWinds(turbine, profiles, findings) })),
      moisture: profiles.map((profile, k) => moistureOf(profile, { jetLayer: coreOf(findings[k]!) })),
    };
  }

  #screenedFeed(key: string): Screened | null {
    const raw = this.#store.block(key);
    if (raw === null) return null;
    let screened = this.#screened.get(key);
    if (screened?.raw !== raw) {
      const { block, feeds } = screen(raw, { site: this.site });
      screened = { raw, block, screening: feeds, findings: new Map() };
      this.#screened.set(key, screened);
    }
    return screened;
  }

  #finding({ block, findings }: Screened, index: number, criteria: Criteria): JetFinding {
    let known = findings.get(criteria.name);
    if (known === undefined) {
      known = new Array<JetFinding | undefined>(block.profileCount);
      findings.set(criteria.name, known);
    }
    const profile = profileAt(block, index);
    known[index] ??= findJets(profile, criteria, {
      speedUncertainty: siteStation(this.site, profile.station.id)?.speedUncertainty ?? NaN,
    });
    return known[index];
  }
}

function coreOf(finding: JetFinding): { bottom: number; top: number } | undefined {
  return finding.jets[0]?.core;
}

function discWinds(turbine: TurbineType, profiles: readonly Profile[], findings: readonly JetFinding[]): DiscWind[] {
  return profiles.map((profile, k) => windOnDisc(profile, turbine, { nose: findings[k]!.jets[0]?.noseHeight ?? NaN }));
}

function medianInterval(times: Float64Array): number {
  if (times.length < 2) return NaN;
  const intervals = Float64Array.from({ length: times.length - 1 }, (_, k) => times[k + 1]! - times[k]!).sort();
  return intervals[intervals.length >> 1]!;
}
