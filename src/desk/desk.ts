// The engine: takes profiles and a site, gives the state of a night. Pure and deterministic, no clock, no I/O; the same
// code in a browser's worker and in Node.

import { lightSpans, type LightSpan } from '../air/index.ts';
import {
  criteriaOf,
  findJets,
  storyOf,
  trackJets,
  type Criteria,
  type JetFinding,
  type JetStory,
  type JetTrack,
  type StorySetting,
} from '../jet/index.ts';
import type { MoistureNumbers } from '../moisture/index.ts';
import {
  MARK,
  profileAt,
  profileRange,
  profilesOf,
  type Profile,
  type ProfileBlock,
  type Station,
} from '../profile/index.ts';
import { screen, type FeedScreening } from '../quality/index.ts';
import { siteStation, type Site } from '../site/index.ts';
import { AirSources } from './air-sources.ts';
import { archiveOf, type ArchiveView } from './archive/view.ts';
import { farmRecord, fitRecord, reckonRecord, type FarmRecord, type ReckonedRecord } from './farm-record.ts';
import { farmThrough, type DiscSeries, type FarmNight, type FarmState } from './farm.ts';
import type { FeedName } from './feed-name.ts';
import { FeedStore, type Acceptance } from './feed-store.ts';
import { inflowState, windTooOld, type InflowQuestion, type InflowState, type NoInflow } from './inflow.ts';
import { facesOf, joinNight, type DiscFaceWind, type FeedSeries, type NightJoin } from './joined-night.ts';
import { MoistDesk } from './moist-desk.ts';
import type { MoistureQuestion, MoistureState } from './moist-night.ts';
import { nightWindow, type NightWindow } from './night-window.ts';
import { OutputStore } from './output-store.ts';
import { standTogether } from './same-place.ts';
import { siteDiscWind } from './site-disc.ts';
import type { TransportHistory } from './usual-transport.ts';

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
  /** Whether migrating birds may carry the signal of some level of each profile. */
  readonly migrants: readonly boolean[];
  /** The stories of the night's jets as far as they are known at `atMs`. */
  readonly tracks: readonly JetTrack[];
  /** Kind with evidence, turning and layer of each track, in the order of `tracks`. */
  readonly stories: readonly JetStory[];
  readonly discs: readonly DiscSeries[];
  /** The newest profile across each disc, in the order of `discs`; empty without a profile. */
  readonly faces: readonly DiscFaceWind[];
  /** The instruments whose winds the discs rest on; null where it is the feed's own alone. */
  readonly join: NightJoin | null;
  readonly farm: FarmState;
  /** Of the newest profile, with its own humidity or that of a station which may lend it; null before the first one. */
  readonly moisture: MoistureNumbers | null;
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

/** Screens look at neighbours: so much of the time before a night is given to them, ms. */
const LEAD_MS = 3 * 3_600_000;
/** Air older than this is never lent, ms: soundings are twelve hours apart, and a day says whether one was missed. */
const LENT_MS = 24 * 3_600_000;

export class Desk {
  readonly site: Site;
  readonly #store: FeedStore;
  readonly #screened = new Map<string, Screened>();
  /** The night last asked for, by feed. */
  readonly #nights = new Map<string, { raw: ProfileBlock; from: number; to: number; screened: Screened }>();
  readonly #outputs = new OutputStore();
  readonly #records = new Map<string, { readonly block: ProfileBlock; readonly record: ReckonedRecord }>();

  readonly #moist: MoistDesk;

  constructor(site: Site) {
    this.site = site;
    this.#store = new FeedStore(site);
    this.#moist = new MoistDesk({
      site,
      names: () => this.#store.names(),
      block: (key) => this.block(key)!,
      airSources: (sinceMs, atMs) => this.airSources(sinceMs, atMs),
    });
  }

  /** Takes profiles in any order, twice or late; ends in the same state as in order and once. */
  accept(block: ProfileBlock): Acceptance {
    return this.#store.accept(block);
  }

  /** Takes a farm's actual output: kW by time, UTC ms, ascending. A file of the same name takes the place of the one before. */
  acceptOutput(source: string, timeMs: Float64Array, powerKw: Float64Array): void {
    this.#outputs.accept(source, timeMs, powerKw);
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

  /** All of a feed's profiles as an archive, yielding the share done; null where there is no such feed. */
  *archive({ feed: key, criteria }: NightQuestion): Generator<number, ArchiveView | null> {
    const block = this.block(key);
    const feed = this.#store.names().find((name) => name.key === key);
    if (block === null || feed === undefined) return null;
    const { site } = this;
    const question = { site, criteria: criteriaOf(criteria ?? site.criteria), discs: site.turbines, source: '' };
    return yield* archiveOf(block, feed, question);
  }

  /** The night of a feed as known at a moment: nothing later than `atMs` is looked at. Null where there is no such feed. */
  night(atMs: number, question: NightQuestion): NightState | null {
    const raw = this.#store.block(question.feed);
    const feed = this.#store.names().find((name) => name.key === question.feed);
    if (raw === null || feed === undefined) return null;
    const window = nightWindow(atMs, feed.station, raw.timeMs);
    const criteria = criteriaOf(question.criteria ?? this.site.criteria);
    const screened = this.#screenedNight(question.feed, raw, window.startMs, atMs);
    const { block } = screened;
    const indices = [...block.timeMs.keys()].filter((index) => block.timeMs[index]! >= window.startMs);
    const findings = indices.map((index) => this.#finding(screened, index, criteria));
    const profiles = indices.map((index) => profileAt(block, index));
    const timed = findings.map((finding, k) => ({
      stationId: feed.station.id,
      timeMs: block.timeMs[indices[k]!]!,
      finding,
    }));
    const timeMs = indices.map((index) => block.timeMs[index]!);
    const tracks = trackJets(timed);
    const together = this.#together(feed, window.startMs, atMs);
    const { join, profiles: winds } = joinNight({ feed, profiles: [...profilesOf(block)] }, together, this.site);
    const joined = winds.slice(winds.length - indices.length);
    const discs = this.site.turbines.map((turbine) => ({
      turbine,
      winds: joined.map((profile, k) =>
        siteDiscWind(profile, turbine, findings[k]!.jets[0]?.noseHeight ?? NaN, this.site),
      ),
    }));
    const { sunriseMs } = window.night;
    const setting = { ...this.#placeOf(feed.station, window.startMs, atMs), findings: timed, profiles };
    return {
      atMs,
      feed,
      window,
      lights: lightSpans(window.startMs, window.endMs, feed.station.latitude, feed.station.longitude),
      criteria,
      timeMs,
      findings,
      migrants: profiles.map(({ mark }) => mark.some((bits) => (bits & MIGRANTS) !== 0)),
      tracks,
      stories: tracks.map((track) => storyOf(track, setting, { time: utcClock })),
      discs,
      faces: facesOf(joined.at(-1), join, this.site),
      join,
      farm: farmThrough({
        site: this.site,
        timeMs,
        profiles: joined,
        discs,
        tracks,
        sunriseMs,
        actual: this.#actual(question.feed, atMs),
      }),
      moisture: profiles.length === 0 ? null : this.#moist.newest(profiles.at(-1)!, findings.at(-1)!.jets[0]?.core),
    };
  }

  /** The farm over a feed's whole record up to a moment; null where there is no such feed. */
  farmRecord(feed: string, atMs: number): FarmRecord | null {
    const record = this.#record(feed);
    return record === null ? null : farmRecord(record, atMs, this.site, this.#outputs.all());
  }

  #record(feed: string): ReckonedRecord | null {
    const block = this.block(feed);
    if (block === null) return null;
    let known = this.#records.get(feed);
    if (known?.block !== block) {
      known = { block, record: reckonRecord(block, this.site) };
      this.#records.set(feed, known);
    }
    return known.record;
  }

  #actual(feed: string, atMs: number): FarmNight['actual'] {
    const output = this.#outputs.all();
    return output === null ? null : { output, fit: fitRecord(this.#record(feed)!, atMs, output) };
  }

  /** The other feeds at a feed's place, as screened for a night. */
  #together(feed: FeedName, startMs: number, atMs: number): FeedSeries[] {
    const others = this.#store.names().filter((name) => standTogether(name, feed));
    return others.map((name) => {
      const { block } = this.#screenedNight(name.key, this.#store.block(name.key)!, startMs, atMs);
      return { feed: name, profiles: [...profilesOf(block)] };
    });
  }

  /** What storms get of the air at a moment, of nothing later; null where there is no such feed or no profile yet. */
  inflow(atMs: number, { feed: key, criteria, oldestAirS }: InflowQuestion): InflowState | NoInflow | null {
    const raw = this.#store.block(key);
    const feed = this.#store.names().find((name) => name.key === key);
    const newest = raw === null ? 0 : countUntil(raw.timeMs, atMs);
    if (raw === null || feed === undefined || newest === 0) return null;
    const { startMs } = nightWindow(atMs, feed.station, raw.timeMs);
    const screened = this.#screenedNight(key, raw, Math.min(startMs, raw.timeMs[newest - 1]!), atMs);
    const index = screened.block.profileCount - 1;
    const wind = profileAt(screened.block, index);
    const why = windTooOld(wind, atMs);
    if (why !== '') return { atMs, feed, why };
    const finding = this.#finding(screened, index, criteriaOf(criteria ?? this.site.criteria));
    const sources = this.airSources(wind.timeMs - LENT_MS, wind.timeMs);
    return inflowState(atMs, { feed, wind, finding, sources, oldestAirS });
  }

  /**
   * What vapour the night carries, as known at a moment; null where there is no such feed.
   * @param archives transports of other days out of an archive's tables
   */
  moisture(atMs: number, question: MoistureQuestion, archives: readonly TransportHistory[] = []): MoistureState | null {
    const raw = this.#store.block(question.feed);
    const feed = this.#store.names().find((name) => name.key === question.feed);
    if (raw === null || feed === undefined) return null;
    const window = nightWindow(atMs, feed.station, raw.timeMs);
    const criteria = criteriaOf(question.criteria ?? this.site.criteria);
    const screened = this.#screenedNight(question.feed, raw, window.startMs, atMs);
    const indices = [...screened.block.timeMs.keys()].filter((k) => screened.block.timeMs[k]! >= window.startMs);
    const night = indices.map((index) => ({
      profile: profileAt(screened.block, index),
      jetLayer: this.#finding(screened, index, criteria).jets[0]?.core,
    }));
    return this.#moist.state({ atMs, feed, window, night, humidityFrom: question.humidityFrom ?? '', archives });
  }

  /** A feed's profiles with the air that may serve them laid on where they have none of their own; see `block`. */
  moistBlock(feed: string): ProfileBlock | null {
    return this.block(feed) === null ? null : this.#moist.block(feed);
  }

  /**
   * What may lend temperature and humidity to winds of a moment, as it was known then. Screens see no later profile.
   * @param sinceMs nothing measured before is looked at
   */
  airSources(sinceMs: number, atMs: number): AirSources {
    const sources = new AirSources(this.site);
    for (const { key } of this.#store.names()) {
      const raw = this.#store.block(key)!;
      if (raw.specificHumidity === null) continue;
      const part = profileRange(raw, countUntil(raw.timeMs, sinceMs - 1), countUntil(raw.timeMs, atMs));
      sources.gather(screen(part, { site: this.site }).block);
    }
    return sources;
  }

  /** The stories of all jets of a feed, with the whole record known; empty where there is no such feed. */
  stories({ feed: key, criteria: name }: NightQuestion): JetStory[] {
    const screened = this.#screenedFeed(key);
    const feed = this.#store.names().find((each) => each.key === key);
    if (screened === null || feed === undefined) return [];
    const { block } = screened;
    const criteria = criteriaOf(name ?? this.site.criteria);
    const timed = Array.from(block.timeMs, (timeMs, index) => ({
      stationId: feed.station.id,
      timeMs,
      finding: this.#finding(screened, index, criteria),
    }));
    return trackJets(timed).map((track) => {
      const lastMs = track.points.at(-1)!.timeMs;
      const { startMs } = nightWindow(track.beganMs, feed.station, block.timeMs);
      const [from, to] = [countUntil(block.timeMs, startMs - 1), countUntil(block.timeMs, lastMs)];
      const profiles = Array.from({ length: to - from }, (_, k) => profileAt(block, from + k));
      const place = this.#placeOf(feed.station, startMs, lastMs);
      return storyOf(track, { ...place, findings: timed.slice(from, to), profiles }, { time: utcClock });
    });
  }

  /** What a story must know of the place: terrain, the wind far upstream, the discs. */
  #placeOf(station: Station, startMs: number, atMs: number): Omit<StorySetting, 'profiles' | 'findings'> {
    return {
      station,
      axes: this.site.terrainAxes.filter((axis) => axis.stations.includes(station.id)),
      undisturbed: this.#upstreamProfiles(station.id, startMs, atMs),
      discs: this.site.turbines,
      geostrophicSpeed: this.site.geostrophicWind?.speed ?? NaN,
    };
  }

  /** Profiles of the stations that the site file names as upstream of one, ascending in time. */
  #upstreamProfiles(station: string, startMs: number, atMs: number): Profile[] {
    const from = this.site.upstream.filter((each) => each.station === station).flatMap((each) => each.from);
    const keys = this.#store
      .names()
      .filter((name) => from.includes(name.station.id))
      .map((name) => name.key);
    return keys
      .flatMap((key) => [...profilesOf(this.#screenedNight(key, this.#store.block(key)!, startMs, atMs).block)])
      .sort((a, b) => a.timeMs - b.timeMs);
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

  /** A night as the screens see it at a moment: the profiles from shortly before it up to then, and none later. */
  #screenedNight(key: string, raw: ProfileBlock, startMs: number, atMs: number): Screened {
    const from = countUntil(raw.timeMs, startMs - LEAD_MS);
    const to = Math.max(from, countUntil(raw.timeMs, atMs));
    const known = this.#nights.get(key);
    if (known?.raw === raw && known.from === from && known.to === to) return known.screened;
    const part = profileRange(raw, from, to);
    const { block, feeds } = screen(part, { site: this.site });
    const screened = { raw: part, block, screening: feeds, findings: new Map() };
    this.#nights.set(key, { raw, from, to, screened });
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

/** How many of the ascending times are at or before a moment. */
function countUntil(timeMs: Float64Array, moment: number): number {
  let [low, high] = [0, timeMs.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (timeMs[middle]! <= moment) low = middle + 1;
    else high = middle;
  }
  return low;
}

const MIGRANTS = MARK['migrants-likely'] | MARK['migrants-certain'];

/** `22:40 UTC`: the desk knows no reader's clock. */
function utcClock(timeMs: number): string {
  return `${new Date(timeMs).toISOString().slice(11, 16)} UTC`;
}

function medianInterval(times: Float64Array): number {
  if (times.length < 2) return NaN;
  const intervals = Float64Array.from({ length: times.length - 1 }, (_, k) => times[k + 1]! - times[k]!).sort();
  return intervals[intervals.length >> 1]!;
}
