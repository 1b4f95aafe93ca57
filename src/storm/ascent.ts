// A parcel's way up: where it becomes cloud, where it is warmer than its surroundings, and what energy that gives.
// With the virtual temperature throughout (Doswell & Rasmussen 1994, Wea. Forecasting 9, 625-629).

import {
  EPSILON,
  GAS_CONSTANT_DRY,
  KAPPA,
  lclPressure,
  lclTemperature,
  saturationVapourPressure,
} from '../air/index.ts';
import { firstAbove, RUNG, virtualAtX, virtualOfVapour, type Environment } from './environment.ts';
import { lnEquivalent, saturatedTemperature } from './pseudoadiabat.ts';

/** Air about to be lifted. */
export interface ParcelStart {
  /** Pa */
  readonly pressure: number;
  /** K */
  readonly temperature: number;
  /** kg/kg */
  readonly mixingRatio: number;
}

export interface Ascent {
  /** Pa */
  readonly lclPressure: number;
  /** K */
  readonly lclTemperature: number;
  /** Pa; NaN when the parcel is nowhere buoyant at or above its condensation level */
  readonly lfcPressure: number;
  /** Pa; the top of data when still buoyant there; NaN without LFC */
  readonly elPressure: number;
  /** J/kg, all positive area above the LFC; 0 without LFC */
  readonly cape: number;
  /** J/kg, all negative area from the start to the LFC, negative; NaN without LFC */
  readonly cin: number;
  /** J/kg, negative area between LFC and EL, negative: a lid that the parcel meets once free */
  readonly negativeAboveLfc: number;
  /** Whether the parcel is still buoyant where data end. */
  readonly positiveAtTop: boolean;
}

/** Called after each step with the energies so far; true ends the ascent early. */
export type Enough = (cape: number, cin: number) => boolean;

/**
 * Lifts a parcel: dry adiabat to the condensation level (Bolton 1980, eq. 15), pseudoadiabat above.
 * LFC: lowest point at or above the condensation level where buoyancy becomes positive. EL: highest point where it ends.
 * @returns NaN throughout when start or surroundings do not allow it
 */
export function liftParcel(environment: Environment, start: ParcelStart, enough: Enough = () => false): Ascent {
  const path = new ParcelPath(start);
  const startX = -Math.log(start.pressure);
  const energy = new Energy(path.lclX);
  energy.add(startX, path.virtualTemperature(startX) - virtualAtX(environment, startX));

  let lclAhead = path.lclX > startX;
  if (!lclAhead) energy.reachLcl();
  for (let k = firstAbove(environment, startX); k < environment.count; k++) {
    const x = environment.x[k]!;
    if (lclAhead && path.lclX <= x) {
      energy.add(path.lclX, path.virtualTemperature(path.lclX) - virtualAtX(environment, path.lclX));
      energy.reachLcl();
      lclAhead = false;
    }
    if (x > energy.x) energy.add(x, path.virtualTemperature(x) - environment.virtualTemperature[k]!);
    if (enough(energy.cape, energy.cin)) break;
  }
  return energy.result(path);
}

/** Temperatures, K, of a parcel at pressures (Pa, falling), for drawing its way up; NaN below its start. */
export function parcelTemperatures(start: ParcelStart, pressures: ArrayLike<number>): Float64Array {
  const path = new ParcelPath(start);
  return Float64Array.from(pressures, (pressure) =>
    pressure <= start.pressure ? path.temperature(-Math.log(pressure)) : NaN,
  );
}

/** A parcel's way up beside its surroundings, for drawing. Columns by falling pressure, from the start. */
export interface Trace {
  /** Pa */
  readonly pressure: Float64Array;
  /** K, of the parcel */
  readonly temperature: Float64Array;
  /** K, of the parcel; the area between it and `surroundings` is what energies are reckoned from */
  readonly virtualTemperature: Float64Array;
  /** K, virtual temperature of the air around */
  readonly surroundings: Float64Array;
}

/** Points closer than this in ln p, 20 m, are not drawn apart. */
const DRAWN_APART = 0.0025;

/** The way up of a parcel through its surroundings, its condensation level among the points. */
export function parcelTrace(environment: Environment, start: ParcelStart): Trace {
  const path = new ParcelPath(start);
  const xs = [-Math.log(start.pressure)];
  for (let k = firstAbove(environment, xs[0]!); k < environment.count; k++) {
    const x = environment.x[k]!;
    if (x <= xs.at(-1)! + (k + 1 < environment.count ? DRAWN_APART : 0)) continue;
    if (xs.at(-1)! < path.lclX && path.lclX < x) xs.push(path.lclX);
    xs.push(x);
  }
  const column = (): Float64Array => new Float64Array(xs.length);
  const trace = { pressure: column(), temperature: column(), virtualTemperature: column(), surroundings: column() };
  // The path is asked by rising x only, so temperature and virtual temperature are taken together.
  xs.forEach((x, k) => {
    trace.pressure[k] = Math.exp(-x);
    trace.temperature[k] = path.temperature(x);
    trace.virtualTemperature[k] = path.virtualTemperature(x);
    trace.surroundings[k] = virtualAtX(environment, x);
  });
  return trace;
}

/** A parcel's temperature as it rises; asked by rising x = -ln p. */
class ParcelPath {
  readonly lclX: number;
  readonly lclTemperature: number;
  readonly #start: ParcelStart;
  readonly #startX: number;
  readonly #vapourShare: number;
  readonly #lnEquivalent: number;
  // The moist part is reckoned at rungs and taken as linear between them.
  #lowX: number;
  #lowTemperature: number;
  #lowVirtual: number;
  #highX: number;
  #highTemperature: number;
  #highVirtual: number;

  constructor(start: ParcelStart) {
    this.#start = start;
    this.#startX = -Math.log(start.pressure);
    this.#vapourShare = start.mixingRatio / (EPSILON + start.mixingRatio);
    const vapour = this.#vapourShare * start.pressure;
    this.lclTemperature = Math.min(lclTemperature(start.temperature, vapour), start.temperature);
    const pressure = lclPressure(start.temperature, start.pressure, this.lclTemperature);
    this.lclX = -Math.log(pressure);
    this.#lnEquivalent = lnEquivalent(this.lclTemperature, pressure, this.#vapourShare * pressure);
    this.#lowX = this.#highX = this.lclX;
    this.#lowTemperature = this.#highTemperature = this.lclTemperature;
    this.#lowVirtual = this.#highVirtual = virtualOfVapour(this.lclTemperature, pressure, this.#vapourShare * pressure);
  }

  temperature(x: number): number {
    if (x <= this.lclX) return this.#dryTemperature(x);
    const share = this.#climbTo(x);
    return this.#lowTemperature + share * (this.#highTemperature - this.#lowTemperature);
  }

  virtualTemperature(x: number): number {
    if (x <= this.lclX) return virtualOfVapour(this.#dryTemperature(x), 1, this.#vapourShare);
    const share = this.#climbTo(x);
    return this.#lowVirtual + share * (this.#highVirtual - this.#lowVirtual);
  }

  #dryTemperature(x: number): number {
    return this.#start.temperature * Math.exp(-KAPPA * (x - this.#startX));
  }

  /** Moves the two rungs until x lies between them. @returns how far between, 0 to 1 */
  #climbTo(x: number): number {
    while (this.#highX < x) {
      const slope =
        this.#highX > this.#lowX ? (this.#highTemperature - this.#lowTemperature) / (this.#highX - this.#lowX) : -50;
      this.#lowX = this.#highX;
      this.#lowTemperature = this.#highTemperature;
      this.#lowVirtual = this.#highVirtual;
      this.#highX += RUNG;
      const pressure = Math.exp(-this.#highX);
      const guess = this.#lowTemperature + slope * RUNG;
      this.#highTemperature = saturatedTemperature(this.#lnEquivalent, pressure, guess);
      const vapour = saturationVapourPressure(this.#highTemperature);
      this.#highVirtual = virtualOfVapour(this.#highTemperature, pressure, vapour);
    }
    return (x - this.#lowX) / (this.#highX - this.#lowX);
  }
}

/** Sums buoyant energy over -ln p, split where buoyancy changes sign. */
class Energy {
  x = NaN;
  cape = 0;
  cin = 0;
  readonly #lclX: number;
  #excess = NaN;
  #aboveLcl = false;
  #lfcX = NaN;
  #elX = NaN;
  #negativeAbove = 0;
  #negativePending = 0;

  constructor(lclX: number) {
    this.#lclX = lclX;
  }

  /** The next point up: excess of the parcel's virtual temperature, K. */
  add(x: number, excess: number): void {
    const fromX = this.x;
    const from = this.#excess;
    this.x = x;
    this.#excess = excess;
    if (Number.isNaN(fromX)) return;
    if (from < 0 && excess > 0) {
      const crossing = fromX + ((x - fromX) * from) / (from - excess);
      this.#addArea((from / 2) * (crossing - fromX));
      this.#riseAt(crossing);
      this.#addArea((excess / 2) * (x - crossing));
    } else if (from > 0 && excess < 0) {
      const crossing = fromX + ((x - fromX) * from) / (from - excess);
      this.#addArea((from / 2) * (crossing - fromX));
      this.#elX = crossing;
      this.#addArea((excess / 2) * (x - crossing));
    } else {
      if (from <= 0 && excess > 0) this.#riseAt(fromX);
      if (from > 0 && excess === 0) this.#elX = x;
      this.#addArea(((from + excess) / 2) * (x - fromX));
    }
  }

  /** The last point added was the condensation level. */
  reachLcl(): void {
    this.#aboveLcl = true;
    if (this.#excess > 0) this.#riseAt(this.x);
  }

  #riseAt(x: number): void {
    if (!this.#aboveLcl || !Number.isNaN(this.#lfcX)) return;
    this.#lfcX = Math.max(x, this.#lclX);
  }

  #addArea(kelvin: number): void {
    const energy = GAS_CONSTANT_DRY * kelvin;
    if (Number.isNaN(this.#lfcX)) {
      if (!(energy > 0)) this.cin += energy;
    } else if (energy > 0) {
      this.cape += energy;
      this.#negativeAbove += this.#negativePending;
      this.#negativePending = 0;
    } else {
      this.#negativePending += energy;
    }
  }

  result(path: ParcelPath): Ascent {
    const positiveAtTop = this.#excess > 0 && !Number.isNaN(this.#lfcX);
    const computable = !Number.isNaN(this.#excess);
    const free = !Number.isNaN(this.#lfcX);
    return {
      lclPressure: Math.exp(-path.lclX),
      lclTemperature: path.lclTemperature,
      lfcPressure: Math.exp(-this.#lfcX),
      elPressure: free ? Math.exp(positiveAtTop ? -this.x : -this.#elX) : NaN,
      cape: computable ? this.cape : NaN,
      cin: free ? this.cin : NaN,
      negativeAboveLfc: free ? this.#negativeAbove : NaN,
      positiveAtTop,
    };
  }
}
