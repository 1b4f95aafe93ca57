// One row a feed and night: how much was seen, how often there was a jet, when it began and ended, what it did to rotors.

import type { Night, NightKind } from '../../air/index.ts';
import type { FeedName } from '../feed-name.ts';
import { isDark, nightDate, nightNumber, sunOfNight } from './night-number.ts';
import { JET_ROW, jetOffsets, NOT_ASSESSABLE_ROW, type DiscColumns, type FeedRows } from './rows.ts';

const HOUR_MS = 3_600_000;

/** Of so many profiles with a jet in a row the first is the onset and the last the end: one alone may be chance. */
const RUN = 3;
/** A silence longer than this ends a run. */
const LONGEST_SILENCE_MS = 2 * HOUR_MS;

/** Means over the profiles of the night that the rotor's wind is known for; NaN where there is none. */
export interface RotorMean {
  readonly profiles: number;
  /** m/s */
  readonly hubSpeed: number;
  readonly equivalentSpeed: number;
  readonly shearExponent: number;
  /** Degrees from the lower to the upper tip, signed. */
  readonly veer: number;
}

/** A feed's night, from one mean solar noon to the next; without a position from 12 UTC to 12 UTC. */
export interface NightRow {
  readonly feed: FeedName;
  /** Date of its evening by the sun at the station, `2024-05-21`. */
  readonly night: string;
  readonly kind: NightKind;
  /** UTC, ms; NaN where the sun does neither or its times are not known. */
  readonly sunsetMs: number;
  readonly sunriseMs: number;
  readonly profiles: number;
  readonly assessable: number;
  readonly jets: number;
  /** The same while the sun is down; of an unknown night, all. */
  readonly darkProfiles: number;
  readonly darkAssessable: number;
  readonly darkJets: number;
  /** First and last profile with a jet, UTC, ms. */
  readonly firstJetMs: number;
  readonly lastJetMs: number;
  /** First and last profile of the runs of three or more with a jet, passing over profiles that are not assessable. */
  readonly onsetMs: number;
  readonly endMs: number;
  /** The fastest nose: UTC ms, m/s, m above ground, degrees from. */
  readonly peakMs: number;
  readonly peakSpeed: number;
  readonly peakHeight: number;
  readonly peakDirection: number;
  /** Highest category of the night; -1 without jet and where the criteria know none. */
  readonly category: number;
  /** By turbine type, over assessable profiles while the sun is down. */
  readonly discs: readonly { readonly withJet: RotorMean; readonly withoutJet: RotorMean }[];
}

/** Gathers the nights of one feed out of its rows, which come ascending in time, in as many portions as one likes. */
export class NightGatherer {
  readonly #feed: FeedName;
  #current: OpenNight | null = null;

  constructor(feed: FeedName) {
    this.#feed = feed;
  }

  /** Takes the next rows. @returns the nights that they end */
  add(rows: FeedRows): NightRow[] {
    const done: NightRow[] = [];
    const { timeMs } = rows.profiles;
    const offsets = jetOffsets(rows.profiles);
    for (let row = 0; row < timeMs.length; row++) {
      const number = nightNumber(timeMs[row]!, this.#feed.station.longitude);
      if (this.#current?.number !== number) {
        done.push(...this.finish());
        this.#current = new OpenNight(this.#feed, number, rows.discs.length);
      }
      this.#current.add(rows, row, offsets);
    }
    return done;
  }

  /** The night still open, if any. */
  finish(): NightRow[] {
    const last = this.#current;
    this.#current = null;
    return last === null ? [] : [last.close()];
  }
}

/** All nights of a feed. @param rows ascending in time */
export function nightRows(rows: FeedRows): NightRow[] {
  const gatherer = new NightGatherer(rows.feed);
  return [...gatherer.add(rows), ...gatherer.finish()];
}

class OpenNight {
  readonly number: number;
  readonly #feed: FeedName;
  readonly #sun: Night;
  readonly #means: { withJet: MeanGatherer; withoutJet: MeanGatherer }[];
  #counts = { profiles: 0, assessable: 0, jets: 0, darkProfiles: 0, darkAssessable: 0, darkJets: 0 };
  #firstJetMs = NaN;
  #lastJetMs = NaN;
  #onsetMs = NaN;
  #endMs = NaN;
  #runStartMs = NaN;
  #runLastMs = NaN;
  #runLength = 0;
  #peak = { peakMs: NaN, peakSpeed: NaN, peakHeight: NaN, peakDirection: NaN };
  #category = -1;

  constructor(feed: FeedName, number: number, discs: number) {
    this.number = number;
    this.#feed = feed;
    this.#sun = sunOfNight(number, feed.station);
    this.#means = Array.from({ length: discs }, () => ({
      withJet: new MeanGatherer(),
      withoutJet: new MeanGatherer(),
    }));
  }

  add({ profiles, jets, discs }: FeedRows, row: number, offsets: Uint32Array): void {
    const timeMs = profiles.timeMs[row]!;
    const status = profiles.status[row]!;
    const counts = this.#counts;
    const dark = isDark(timeMs, this.#sun);
    counts.profiles++;
    if (dark) counts.darkProfiles++;
    if (status === NOT_ASSESSABLE_ROW) return;
    const jet = status === JET_ROW;
    counts.assessable++;
    if (jet) counts.jets++;
    if (dark) {
      counts.darkAssessable++;
      if (jet) counts.darkJets++;
      discs.forEach((disc, i) => {
        const mean = this.#means[i]!;
        (jet ? mean.withJet : mean.withoutJet).add(disc, row);
      });
    }
    this.#follow(timeMs, jet);
    for (let k = offsets[row]!; k < offsets[row + 1]!; k++) {
      this.#category = Math.max(this.#category, jets.category[k]!);
      if (jets.noseSpeed[k]! <= this.#peak.peakSpeed) continue;
      this.#peak = {
        peakMs: timeMs,
        peakSpeed: jets.noseSpeed[k]!,
        peakHeight: jets.noseHeight[k]!,
        peakDirection: jets.noseDirection[k]!,
      };
    }
  }

  close(): NightRow {
    return {
      feed: this.#feed,
      night: nightDate(this.number),
      kind: this.#sun.kind,
      sunsetMs: this.#sun.sunsetMs,
      sunriseMs: this.#sun.sunriseMs,
      ...this.#counts,
      firstJetMs: this.#firstJetMs,
      lastJetMs: this.#lastJetMs,
      onsetMs: this.#onsetMs,
      endMs: this.#endMs,
      ...this.#peak,
      category: this.#category,
      discs: this.#means.map(({ withJet, withoutJet }) => ({ withJet: withJet.mean(), withoutJet: withoutJet.mean() })),
    };
  }

  #follow(timeMs: number, jet: boolean): void {
    if (!jet || timeMs - this.#runLastMs > LONGEST_SILENCE_MS) this.#runLength = 0;
    if (!jet) return;
    if (Number.isNaN(this.#firstJetMs)) this.#firstJetMs = timeMs;
    this.#lastJetMs = timeMs;
    if (this.#runLength === 0) this.#runStartMs = timeMs;
    this.#runLength++;
    this.#runLastMs = timeMs;
    if (this.#runLength < RUN) return;
    if (Number.isNaN(this.#onsetMs)) this.#onsetMs = this.#runStartMs;
    this.#endMs = timeMs;
  }
}

const MEAN_COLUMNS = [
  'hubSpeed',
  'equivalentSpeed',
  'shearExponent',
  'veer',
] as const satisfies readonly (keyof DiscColumns)[];

class MeanGatherer {
  #profiles = 0;
  readonly #sums = MEAN_COLUMNS.map(() => 0);
  readonly #counts = MEAN_COLUMNS.map(() => 0);

  add(disc: DiscColumns, row: number): void {
    if (!Number.isNaN(disc.equivalentSpeed[row]!)) this.#profiles++;
    MEAN_COLUMNS.forEach((name, i) => {
      const value = disc[name][row]!;
      if (Number.isNaN(value)) return;
      this.#sums[i]! += value;
      this.#counts[i]!++;
    });
  }

  mean(): RotorMean {
    const [hubSpeed, equivalentSpeed, shearExponent, veer] = this.#sums.map((sum, i) => sum / this.#counts[i]!);
    return {
      profiles: this.#profiles,
      hubSpeed: hubSpeed!,
      equivalentSpeed: equivalentSpeed!,
      shearExponent: shearExponent!,
      veer: veer!,
    };
  }
}
