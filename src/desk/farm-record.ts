// The farm over a whole record: power by hub height and by the whole profile, time in bands, sums by day or month. Of one
// feed alone, by its measured levels: what a night joins and continues would cost a year too much.

import { gatherWindAt, profileAt, windColumn, type ProfileBlock } from '../profile/index.ts';
import {
  densityAt,
  farmOutput,
  fitFarmFactor,
  FleetScan,
  meanOutputAt,
  sampleDurationsS,
  timeInBands,
  typeOutput,
  type BandTimes,
  type FactorFit,
  type FarmOutput,
  type ReckonedWind,
} from '../rotor/index.ts';
import type { Site } from '../site/index.ts';
import { groundOffset } from './site-disc.ts';
import { SHEAR_EDGES, VEER_EDGES } from './bands.ts';
import type { ActualOutput } from './output-store.ts';

/** A record reckoned once; series run in parallel with `timeMs`. */
export interface ReckonedRecord {
  /** UTC, ms, ascending */
  readonly timeMs: Float64Array;
  readonly output: FarmOutput;
  /** By turbine type. */
  readonly shearExponent: readonly Float64Array[];
  /** degrees per 100 m, without sign */
  readonly veerPer100M: readonly Float64Array[];
}

/** Reckons every profile of a feed on every disc. */
export function reckonRecord(block: ProfileBlock, site: Site): ReckonedRecord {
  const { turbines } = site;
  const count = block.profileCount;
  const station = block.stations[0];
  const discs = turbines.map((turbine) => ({
    hubHeight: turbine.hubHeight + (station === undefined ? 0 : groundOffset(turbine, station)),
    rotorDiameter: turbine.rotorDiameter,
  }));
  const scan = new FleetScan(discs);
  let most = 0;
  for (let k = 0; k < count; k++) most = Math.max(most, block.offsets[k + 1]! - block.offsets[k]!);
  const column = windColumn(most);
  const winds = turbines.map((): ReckonedWind[] => []);
  const shearExponent = turbines.map(() => new Float64Array(count));
  const veerPer100M = turbines.map(() => new Float64Array(count));
  for (let k = 0; k < count; k++) {
    const wind = scan.scan(gatherWindAt(block, k, column));
    const profile = block.temperature === null ? null : profileAt(block, k);
    discs.forEach((disc, type) => {
      winds[type]!.push({
        status: wind.plans[type]!.why === '' ? 'ok' : 'not-assessable',
        hubSpeed: wind.hubSpeed[type]!,
        equivalentSpeed: wind.equivalentSpeed[type]!,
        equivalentSpeedVeer: wind.equivalentSpeedVeer[type]!,
        airDensity: profile === null ? NaN : densityAt(profile, disc.hubHeight).airDensity,
      });
      shearExponent[type]![k] = wind.shearExponent[type]!;
      veerPer100M[type]![k] = Math.abs(wind.veerPer100M[type]!);
    });
  }
  const types = turbines.map((turbine, type) => typeOutput(turbine, winds[type]!));
  return { timeMs: block.timeMs, output: farmOutput(types, site.farmFactor), shearExponent, veerPer100M };
}

/** What a stretch of the record gave. */
export interface RecordSum {
  /** UTC ms: begin of the day or month, UTC. */
  readonly startMs: number;
  /** Hours in which the output could be reckoned. */
  readonly hours: number;
  readonly hubMwh: number;
  readonly equivalentMwh: number;
  /** Of the hours in which it was reported too; NaN where it was not. */
  readonly actualMwh: number;
}

/** The record of one feed as far as it is known at a moment. */
export interface FarmRecord {
  readonly timeMs: Float64Array;
  readonly hubKw: Float64Array;
  readonly equivalentKw: Float64Array;
  /** null where no output is open. */
  readonly actualKw: Float64Array | null;
  readonly ratedKw: number;
  readonly why: string;
  readonly about: string;
  readonly discs: readonly {
    readonly turbine: string;
    readonly shearBands: BandTimes;
    readonly veerBands: BandTimes;
  }[];
  readonly sumsBy: 'day' | 'month';
  readonly sums: readonly RecordSum[];
}

const DAY_MS = 86_400_000;
/** Records longer than this are summed by month. */
const LONGEST_BY_DAY_MS = 62 * DAY_MS;

/** The record up to a moment, beside the actual output where there is one. */
export function farmRecord(record: ReckonedRecord, atMs: number, site: Site, actual: ActualOutput | null): FarmRecord {
  const count = countUntil(record.timeMs, atMs);
  const timeMs = record.timeMs.slice(0, count);
  const { output } = record;
  const hubKw = output.hubKw.slice(0, count);
  const equivalentKw = output.equivalentKw.slice(0, count);
  const actualKw = actual === null ? null : meanOutputAt(timeMs, actual);
  const sumsBy = count > 0 && timeMs[count - 1]! - timeMs[0]! > LONGEST_BY_DAY_MS ? 'month' : 'day';
  return {
    timeMs,
    hubKw,
    equivalentKw,
    actualKw,
    ratedKw: output.ratedKw * output.factor,
    why: output.why,
    about: output.about,
    discs: site.turbines.map(({ name }, type) => ({
      turbine: name,
      shearBands: timeInBands(timeMs, record.shearExponent[type]!.subarray(0, count), SHEAR_EDGES),
      veerBands: timeInBands(timeMs, record.veerPer100M[type]!.subarray(0, count), VEER_EDGES),
    })),
    sumsBy,
    sums: sumsOf(timeMs, { hubKw, equivalentKw, actualKw }, sumsBy),
  };
}

/** The factor that brings what was reckoned up to a moment to what was reported. */
export function fitRecord(record: ReckonedRecord, atMs: number, actual: ActualOutput): FactorFit {
  const count = countUntil(record.timeMs, atMs);
  const { equivalentKw, factor } = record.output;
  const reckoned = equivalentKw.subarray(0, count).map((power) => power / factor);
  return fitFarmFactor(reckoned, meanOutputAt(record.timeMs.subarray(0, count), actual));
}

function sumsOf(
  timeMs: Float64Array,
  { hubKw, equivalentKw, actualKw }: Pick<FarmRecord, 'hubKw' | 'equivalentKw' | 'actualKw'>,
  by: 'day' | 'month',
): RecordSum[] {
  const durations = sampleDurationsS(timeMs);
  const sums = new Map<number, { -readonly [key in keyof RecordSum]: RecordSum[key] }>();
  for (let k = 0; k < timeMs.length; k++) {
    if (!Number.isFinite(equivalentKw[k]!)) continue;
    // A time is the end of its period: midnight still belongs to the day before.
    const startMs = startOf(timeMs[k]! - 1, by);
    const hours = durations[k]! / 3600;
    let sum = sums.get(startMs);
    if (sum === undefined)
      sums.set(startMs, (sum = { startMs, hours: 0, hubMwh: 0, equivalentMwh: 0, actualMwh: NaN }));
    sum.hours += hours;
    sum.hubMwh += (hours * hubKw[k]!) / 1000;
    sum.equivalentMwh += (hours * equivalentKw[k]!) / 1000;
    const reported = actualKw?.[k] ?? NaN;
    if (Number.isFinite(reported)) sum.actualMwh = zeroIfNone(sum.actualMwh) + (hours * reported) / 1000;
  }
  return [...sums.values()];
}

function startOf(timeMs: number, by: 'day' | 'month'): number {
  const at = new Date(timeMs);
  return Date.UTC(at.getUTCFullYear(), at.getUTCMonth(), by === 'day' ? at.getUTCDate() : 1);
}

function zeroIfNone(value: number): number {
  return Number.isNaN(value) ? 0 : value;
}

/** How many of the ascending times are at or before a moment. */
function countUntil(timeMs: Float64Array, moment: number): number {
  let count = timeMs.length;
  while (count > 0 && timeMs[count - 1]! > moment) count--;
  return count;
}
