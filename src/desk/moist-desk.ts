// The desk's part that knows of vapour: gathers what the numbers of a moist night need out of all feeds, and keeps what is
// dear to work out.

import { distanceBetween } from '../air/index.ts';
import type { JetCore } from '../jet/index.ts';
import { moistureOf, OLDEST_HUMIDITY_S, withLentAir, type MoistureNumbers } from '../moisture/index.ts';
import { profileAt, type Profile, type ProfileBlock, type Station } from '../profile/index.ts';
import type { Site } from '../site/index.ts';
import { AirSources } from './air-sources.ts';
import { arrivalBoard, type ArrivalBoard } from './arrivals.ts';
import type { FeedName } from './feed-name.ts';
import { growthOf, type MoistureState } from './moist-night.ts';
import type { NightWindow } from './night-window.ts';
import { lowHumidityOf, onePerPlace, SAME_PLACE, stationRecord, type StationRecord } from './station-record.ts';
import { triangleStates } from './triangles.ts';
import { isAlike, usualTransport, type TransportHistory } from './usual-transport.ts';

/** What the desk lends to this part. */
interface DeskAccess {
  readonly site: Site;
  names(): FeedName[];
  /** A feed's profiles, screened as a whole; the same object until data come. */
  block(key: string): ProfileBlock;
  /** What may lend its air, as known at a moment. */
  airSources(sinceMs: number, atMs: number): AirSources;
}

interface MoistNight {
  readonly atMs: number;
  readonly feed: FeedName;
  readonly window: NightWindow;
  readonly night: readonly { readonly profile: Profile; readonly jetLayer: JetCore | undefined }[];
  /** Station that alone lends humidity; empty for any. */
  readonly humidityFrom: string;
  readonly archives: readonly TransportHistory[];
}

export class MoistDesk {
  readonly #desk: DeskAccess;
  /** `lowHumidityOf` each screened feed, for the scores of past arrivals. */
  readonly #humidity = new WeakMap<ProfileBlock, Float64Array>();
  #sources: { readonly blocks: readonly ProfileBlock[]; readonly sources: AirSources } | null = null;
  readonly #moistBlocks = new Map<string, { block: ProfileBlock; sources: AirSources; moist: ProfileBlock }>();

  constructor(desk: DeskAccess) {
    this.#desk = desk;
  }

  state({ atMs, feed, window, night, humidityFrom, archives }: MoistNight): MoistureState {
    const sources = this.#desk.airSources(window.startMs - 1000 * OLDEST_HUMIDITY_S, atMs);
    const lent = (profile: Profile): Profile[] =>
      sources.for(profile).filter(({ station }) => humidityFrom === '' || station.id === humidityFrom);
    const timeMs = night.map(({ profile }) => profile.timeMs);
    const numbers = night.map(({ profile, jetLayer }) => moistureOf(profile, { jetLayer, humidity: lent(profile) }));
    const records = this.#records(atMs);
    const growth = growthOf(timeMs, numbers, window.night.sunsetMs);
    const newest = night.at(-1)?.profile;
    return {
      atMs,
      feed,
      window,
      timeMs,
      numbers,
      growth,
      arrivals: this.#arrivals(atMs, feed.station, records),
      triangles: triangleStates({
        atMs,
        startMs: window.startMs,
        named: this.#desk.site.neighbours,
        records: fullestByStation(records),
        humidityFor: (profile) => sources.for(profile),
      }),
      usual: usualTransport(newest?.timeMs ?? atMs, growth.now, [this.#transports(feed.key, atMs), ...archives]),
      lenders: newest === undefined ? [] : sources.for(newest).map(({ station: { id, name } }) => ({ id, name })),
    };
  }

  /** The newest profile alone; other feeds are looked at only where it has no humidity of its own. */
  newest(profile: Profile, jetLayer: JetCore | undefined): MoistureNumbers {
    const own = moistureOf(profile, { jetLayer });
    if (own.humidityFrom !== '') return own;
    const sources = this.#desk.airSources(profile.timeMs - 1000 * OLDEST_HUMIDITY_S, profile.timeMs);
    return moistureOf(profile, { jetLayer, humidity: sources.for(profile) });
  }

  /** A feed's profiles with lent air laid on. */
  block(feed: string): ProfileBlock {
    const block = this.#desk.block(feed);
    const sources = this.#allSources();
    const held = this.#moistBlocks.get(feed);
    if (held?.block === block && held.sources === sources) return held.moist;
    const moist = withLentAir(block, (profile) => sources.for(profile));
    this.#moistBlocks.set(feed, { block, sources, moist });
    return moist;
  }

  #arrivals(atMs: number, target: Station, records: readonly FeedRecord[]): ArrivalBoard {
    const { upstream } = this.#desk.site;
    const wanted = upstream.filter(({ station }) => station === target.id).flatMap(({ from }) => from);
    const byStation = fullestByStation(records);
    const moistAt = (isHere: (station: Station) => boolean): StationRecord | undefined =>
      fullest(records.filter(({ record, moist }) => moist > 0 && isHere(record.station)))?.record;
    return arrivalBoard({
      atMs,
      wanted,
      target,
      upstream: wanted.flatMap((id) => moistAt((station) => station.id === id) ?? byStation.get(id) ?? []),
      all: onePerPlace(byStation.values()),
      here: moistAt((station) => station.id === target.id || distanceBetween(station, target) <= SAME_PLACE) ?? null,
    });
  }

  /** What every feed has measured up to a moment. */
  #records(atMs: number): FeedRecord[] {
    return this.#desk.names().flatMap(({ key, station }) => {
      const block = this.#desk.block(key);
      let humidity = this.#humidity.get(block);
      if (humidity === undefined) {
        humidity = lowHumidityOf(block);
        this.#humidity.set(block, humidity);
      }
      const record = stationRecord(block, station, atMs, humidity);
      if (record.timeMs.length === 0) return [];
      return [{ record, moist: record.lowHumidity.filter((value) => value >= 0).length }];
    });
  }

  /** Transports of the feed on other days, where the record that is open has so many. */
  #transports(feed: string, atMs: number): TransportHistory {
    const block = this.#desk.block(feed);
    const sources = this.#allSources();
    const indices = [...block.timeMs.keys()].filter((k) => block.timeMs[k]! <= atMs && isAlike(block.timeMs[k]!, atMs));
    return {
      timeMs: indices.map((index) => block.timeMs[index]!),
      below3Km: indices.map((index) => {
        const profile = profileAt(block, index);
        return moistureOf(profile, { humidity: sources.for(profile) }).below3Km.size;
      }),
      source: 'the record that is open',
    };
  }

  /** What may lend its air in the whole record; made again when data have come. */
  #allSources(): AirSources {
    const blocks = this.#desk.names().map(({ key }) => this.#desk.block(key));
    const held = this.#sources;
    if (held?.blocks.length === blocks.length && held.blocks.every((block, k) => block === blocks[k])) {
      return held.sources;
    }
    const sources = new AirSources(this.#desk.site);
    for (const block of blocks) sources.gather(block);
    this.#sources = { blocks, sources };
    return sources;
  }
}

interface FeedRecord {
  readonly record: StationRecord;
  /** Profiles with humidity. */
  readonly moist: number;
}

function fullest(records: readonly FeedRecord[]): FeedRecord | undefined {
  return [...records].sort((a, b) => b.record.timeMs.length - a.record.timeMs.length)[0];
}

/** Of several instruments at a station the one with the most profiles. */
function fullestByStation(records: readonly FeedRecord[]): Map<string, StationRecord> {
  const ids = new Set(records.map(({ record }) => record.station.id));
  return new Map([...ids].map((id) => [id, fullest(records.filter(({ record }) => record.station.id === id))!.record]));
}
