// What years of profiles say together: how often, when, how high, how strong, from where, and what it did to rotors.
// Counts only, so that any number of parts join in any order to the same figures.

import { HistogramTally, type Histogram } from './histogram.ts';
import type { NightRow } from './nights.ts';
import { JET_ROW, jetOffsets, NOT_ASSESSABLE_ROW, type FeedRows } from './rows.ts';

const HOUR_MS = 3_600_000;
const MONTHS = 12;
const HOURS = 24;

/** Sectors of the rose, each 22.5 degrees wide, the first around north. */
export const ROSE_SECTORS = 16;
/** Classes of the rose by nose speed, m/s: below the first, between, from the last on. */
export const ROSE_SPEEDS = [12, 16, 20] as const;

/** The columns the figures rest on, of one feed; the jet is the strongest of its profile. All of equal length. */
export interface FigureRows {
  readonly timeMs: ArrayLike<number>;
  /** Index into STATUSES. */
  readonly status: ArrayLike<number>;
  /** Highest met by the strongest jet; below 0 or NaN where there is none. */
  readonly category: ArrayLike<number>;
  /** 1 while the sun is down, or where nobody knows. */
  readonly dark: ArrayLike<number>;
  /** NaN where there is no jet. */
  readonly noseHeight: ArrayLike<number>;
  readonly noseSpeed: ArrayLike<number>;
  readonly noseDirection: ArrayLike<number>;
  readonly discs: readonly {
    readonly equivalentSpeed: ArrayLike<number>;
    readonly shearExponent: ArrayLike<number>;
    readonly veer: ArrayLike<number>;
  }[];
}

/** What the figures need of a night. */
export type FigureNight = Pick<
  NightRow,
  'darkAssessable' | 'jets' | 'category' | 'onsetMs' | 'endMs' | 'sunsetMs' | 'sunriseMs'
>;

/** Distributions of the rotor's wind over the assessable profiles of the dark hours. */
export interface RotorFigures {
  readonly equivalentSpeed: Histogram;
  readonly shearExponent: Histogram;
  readonly veer: Histogram;
}

/** Counts by month and hour, flat: `month * 24 + hour`. */
export interface MonthHours {
  readonly profiles: readonly number[];
  readonly assessable: readonly number[];
  readonly jets: readonly number[];
}

export interface ArchiveFigures {
  readonly profiles: number;
  readonly assessable: number;
  readonly jets: number;
  readonly byMonthHour: MonthHours;
  /** m above ground and m/s */
  readonly noseHeight: Histogram;
  readonly noseSpeed: Histogram;
  /** Jets by direction and speed: `sector * (ROSE_SPEEDS.length + 1) + class`. */
  readonly rose: readonly number[];
  /** Jets of unknown direction. */
  readonly roseUnknown: number;
  /** Nights with an assessable profile in the dark, and those of them with a jet at any time. */
  readonly nights: number;
  readonly nightsWithJet: number;
  /**
   * Hours after sunset of the first lasting jet, and after sunrise of its end, negative before; a value a night. Of a least
   * category: on the nights that reach it.
   */
  readonly onset: Histogram;
  readonly end: Histogram;
  /** By turbine type. */
  readonly discs: readonly { readonly withJet: RotorFigures; readonly withoutJet: RotorFigures }[];
}

/** Month 0 to 11 and hour 0 to 23 of a moment, by whichever clock. */
export type Clock = (timeMs: number) => { readonly month: number; readonly hour: number };

/** The clock of the mean sun at a longitude; UTC where it is not known. */
export function solarClock(longitude: number): Clock {
  const shift = Number.isFinite(longitude) ? (longitude / 15) * HOUR_MS : 0;
  return (timeMs) => {
    const local = new Date(timeMs + shift);
    return { month: local.getUTCMonth(), hour: local.getUTCHours() };
  };
}

/** Gathers the figures; tallies of parts are joined by `merge`. */
export class ArchiveTally {
  readonly #profiles = new Float64Array(MONTHS * HOURS);
  readonly #assessable = new Float64Array(MONTHS * HOURS);
  readonly #jets = new Float64Array(MONTHS * HOURS);
  readonly #noseHeight = new HistogramTally(0, 50, 60);
  readonly #noseSpeed = new HistogramTally(0, 1, 50);
  readonly #rose = new Float64Array(ROSE_SECTORS * (ROSE_SPEEDS.length + 1));
  #roseUnknown = 0;
  #nights = 0;
  #nightsWithJet = 0;
  readonly #onset = new HistogramTally(-6, 0.5, 48);
  readonly #end = new HistogramTally(-18, 0.5, 48);
  readonly #discs: { withJet: RotorTally; withoutJet: RotorTally }[];
  readonly #leastCategory: number;

  /**
   * @param discs how many turbine types the rows have
   * @param leastCategory jets below it are no jets here; 0 counts all, those of criteria without categories too
   */
  constructor(discs: number, leastCategory = 0) {
    this.#leastCategory = leastCategory;
    this.#discs = Array.from({ length: discs }, () => ({ withJet: new RotorTally(), withoutJet: new RotorTally() }));
  }

  addRows(rows: FigureRows, clock: Clock): void {
    for (let row = 0; row < rows.timeMs.length; row++) {
      const { month, hour } = clock(rows.timeMs[row]!);
      const cell = month * HOURS + hour;
      const status = rows.status[row]!;
      this.#profiles[cell]!++;
      if (status === NOT_ASSESSABLE_ROW) continue;
      this.#assessable[cell]!++;
      const jet = status === JET_ROW && this.#reaches(rows.category[row]!);
      if (jet) {
        this.#jets[cell]!++;
        this.#noseHeight.add(rows.noseHeight[row]!);
        this.#noseSpeed.add(rows.noseSpeed[row]!);
        this.#addToRose(rows.noseSpeed[row]!, rows.noseDirection[row]!);
      }
      if (rows.dark[row] === 1) {
        rows.discs.forEach((disc, i) => {
          const tally = this.#discs[i]!;
          (jet ? tally.withJet : tally.withoutJet).add(disc, row);
        });
      }
    }
  }

  addNights(nights: Iterable<FigureNight>): void {
    for (const night of nights) {
      if (night.darkAssessable === 0) continue;
      this.#nights++;
      if (!this.#reaches(night.category)) continue;
      if (night.jets > 0) this.#nightsWithJet++;
      this.#onset.add((night.onsetMs - night.sunsetMs) / HOUR_MS);
      this.#end.add((night.endMs - night.sunriseMs) / HOUR_MS);
    }
  }

  merge(other: ArchiveTally): void {
    const add = (to: Float64Array, from: Float64Array): void => from.forEach((count, k) => (to[k]! += count));
    add(this.#profiles, other.#profiles);
    add(this.#assessable, other.#assessable);
    add(this.#jets, other.#jets);
    add(this.#rose, other.#rose);
    this.#noseHeight.merge(other.#noseHeight);
    this.#noseSpeed.merge(other.#noseSpeed);
    this.#roseUnknown += other.#roseUnknown;
    this.#nights += other.#nights;
    this.#nightsWithJet += other.#nightsWithJet;
    this.#onset.merge(other.#onset);
    this.#end.merge(other.#end);
    this.#discs.forEach((disc, i) => {
      disc.withJet.merge(other.#discs[i]!.withJet);
      disc.withoutJet.merge(other.#discs[i]!.withoutJet);
    });
  }

  figures(): ArchiveFigures {
    const sum = (counts: Float64Array): number => counts.reduce((total, count) => total + count, 0);
    return {
      profiles: sum(this.#profiles),
      assessable: sum(this.#assessable),
      jets: sum(this.#jets),
      byMonthHour: { profiles: [...this.#profiles], assessable: [...this.#assessable], jets: [...this.#jets] },
      noseHeight: this.#noseHeight.histogram(),
      noseSpeed: this.#noseSpeed.histogram(),
      rose: [...this.#rose],
      roseUnknown: this.#roseUnknown,
      nights: this.#nights,
      nightsWithJet: this.#nightsWithJet,
      onset: this.#onset.histogram(),
      end: this.#end.histogram(),
      discs: this.#discs.map(({ withJet, withoutJet }) => ({
        withJet: withJet.figures(),
        withoutJet: withoutJet.figures(),
      })),
    };
  }

  #reaches(category: number): boolean {
    return this.#leastCategory === 0 || category >= this.#leastCategory;
  }

  #addToRose(speed: number, direction: number): void {
    if (Number.isNaN(direction)) {
      this.#roseUnknown++;
      return;
    }
    const sector = Math.round((direction / 360) * ROSE_SECTORS) % ROSE_SECTORS;
    const speedClass = ROSE_SPEEDS.filter((least) => speed >= least).length;
    this.#rose[sector * (ROSE_SPEEDS.length + 1) + speedClass]!++;
  }
}

class RotorTally {
  readonly #equivalentSpeed = new HistogramTally(0, 1, 40);
  readonly #shearExponent = new HistogramTally(-0.5, 0.05, 40);
  readonly #veer = new HistogramTally(-60, 5, 36);

  add({ equivalentSpeed, shearExponent, veer }: FigureRows['discs'][number], row: number): void {
    this.#equivalentSpeed.add(equivalentSpeed[row]!);
    this.#shearExponent.add(shearExponent[row]!);
    this.#veer.add(veer[row]!);
  }

  merge(other: RotorTally): void {
    this.#equivalentSpeed.merge(other.#equivalentSpeed);
    this.#shearExponent.merge(other.#shearExponent);
    this.#veer.merge(other.#veer);
  }

  figures(): RotorFigures {
    return {
      equivalentSpeed: this.#equivalentSpeed.histogram(),
      shearExponent: this.#shearExponent.histogram(),
      veer: this.#veer.histogram(),
    };
  }
}

/** The figures' columns out of a feed's rows. @param dark 1 while the sun is down, by row */
export function figureRows({ profiles, jets, discs }: FeedRows, dark: ArrayLike<number>): FigureRows {
  const offsets = jetOffsets(profiles);
  const ofStrongest = (values: ArrayLike<number>): Float32Array =>
    Float32Array.from(profiles.jetCount, (count, row) => (count === 0 ? NaN : values[offsets[row]!]!));
  return {
    timeMs: profiles.timeMs,
    status: profiles.status,
    category: ofStrongest(jets.category),
    dark,
    noseHeight: ofStrongest(jets.noseHeight),
    noseSpeed: ofStrongest(jets.noseSpeed),
    noseDirection: ofStrongest(jets.noseDirection),
    discs,
  };
}
