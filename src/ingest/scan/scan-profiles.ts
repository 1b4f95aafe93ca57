// From scans to profiles: each sweep on a cone becomes one profile of winds.

import { directionOf, DuskveerError, speedOf, throwIfCancelled, type Problem } from '../../air/index.ts';
import { BlockBuilder, MARK, type ProfileBlock, type Station } from '../../profile/index.ts';
import type { ReadOptions } from '../format.ts';
import { numbersOf, textOf, type Dataset } from '../netcdf/dataset.ts';
import { instrumentOf, stationsOf } from '../netcdf/file-station.ts';
import { Piece } from '../netcdf/gather.ts';
import { findTime, timesOf } from '../netcdf/times.ts';
import { scaleOf, type ScanVariables } from './find-scan.ts';
import { rangeDoubt } from './overlap.ts';
import { decodedRows, signalScale, type SignalScale } from './signal.ts';
import { isNoCone, sweepsOf, VERTICAL, type Sweep } from './sweeps.ts';
import { fitCone, LEAST_BEAMS, type Beams, type ConeFit } from './velocity-azimuth.ts';

/** With fewer beams, or beams from less than some 130 degrees, the wind is marked as resting on few. */
const ENOUGH_BEAMS = 6;
const GOOD_CONDITION = 10;
/** Scatter of the beams about the fit, m/s: beyond the first the wind is doubtful, beyond the second it is none. */
const DOUBTFUL_SCATTER = 1;
const HOPELESS_SCATTER = 3;
// The four above: common practice, without source.
/** Gate lengths from the instrument within which the outgoing pulse is still heard; common practice, without source. */
const BLIND_GATES = 2.2;
/** Radius of the Earth as refracted radar beams feel it, m: 4/3 of the true one (Doviak & Zrnić 1993). */
const RADAR_EARTH_RADIUS = (4 / 3) * 6_371_000;

interface Scan {
  readonly dataset: Dataset;
  readonly variables: ScanVariables;
  readonly azimuth: Float64Array;
  readonly elevation: Float64Array;
  readonly timeMs: Float64Array;
  readonly range: Float64Array;
  readonly station: Station;
  readonly isRadar: boolean;
  /** m: gates nearer than this hear the outgoing pulse; in the file's own ranges. */
  readonly blindRange: number;
  /** m/s: how finely velocities are stored. */
  readonly leastDeviation: number;
  readonly notes: readonly string[];
  /** Ranges that cannot be right make every height doubtful. */
  readonly marks: number;
}

/**
 * A profile from each conical sweep of a file.
 * @throws DuskveerError `ingest/scan-no-cone` when no sweep is one, `ingest/netcdf-no-profiles` without times
 * @throws Cancelled
 */
export function* profilesFromScan(
  dataset: Dataset,
  variables: ScanVariables,
  options: ReadOptions,
): Generator<{ block: ProfileBlock; problems: readonly Problem[] }> {
  const problems: Problem[] = [...dataset.problems];
  const { scan, sweeps, scale } = openScan(dataset, variables, options, problems);
  let passedOver = 0;
  let builder = new BlockBuilder();
  for (const [index, sweep] of sweeps.entries()) {
    throwIfCancelled(options.signal);
    if (isNoCone(dataset, index) || !addSweep(builder, scan, sweep, scale)) passedOver++;
    if (builder.levelCount > 2 ** 18) {
      yield { block: builder.finish(), problems: problems.splice(0) };
      builder = new BlockBuilder();
    }
  }
  if (passedOver > 0) problems.push(noCone(dataset, passedOver, sweeps.length));
  yield { block: builder.finish(), problems };
}

function openScan(
  dataset: Dataset,
  variables: ScanVariables,
  options: ReadOptions,
  problems: Problem[],
): { scan: Scan; sweeps: Sweep[]; scale: SignalScale | null } {
  const rays = variables.velocity.shape[0]!;
  const gates = variables.velocity.shape[1]!;
  const timeSource = findTime(dataset, problems);
  if (timeSource === null) throw noTime(dataset);
  // Every ray counts as a profile here, so that times and places are found as for any other file.
  const piece = new Piece(
    {
      profileDimensions: [variables.velocity.dimensions[0]!],
      profileShape: [rays],
      levelDimension: null,
      levelCount: 1,
      ragged: null,
    },
    0,
    rays,
  );
  const { timeMs } = timesOf(dataset, piece, timeSource);
  const azimuth = decodedRows(variables.azimuth, 0, rays, scaleOf(variables.azimuth));
  const angle = decodedRows(variables.elevation, 0, rays, scaleOf(variables.elevation));
  const elevation = variables.fromZenith ? angle.map((zenith) => 90 - zenith) : angle;
  const range = decodedRows(variables.range, 0, gates, scaleOf(variables.range));
  const sweeps = sweepsOf(dataset, azimuth, elevation, timeMs);
  const isRadar =
    /radar/u.test(instrumentOf(dataset, false)) || /radar/iu.test(textOf(dataset.attributes, 'instrument_name'));

  const notes: string[] = [];
  if (!variables.signStated)
    notes.push(`${variables.velocity.name} does not say its sign: taken as positive away from the instrument`);
  const sample =
    sweeps[0] === undefined || variables.signal === null
      ? null
      : decodedRows(variables.signal, sweeps[0].from, sweeps[0].to);
  const scale = sample === null ? null : signalScale(variables.signal!, sample);
  if (scale === null) notes.push('no signal in the file: winds are screened by the fit alone');
  else if (scale.note !== '') notes.push(scale.note);

  const ratio = sample === null || scale === null ? null : sample.map(scale.toRatio);
  const doubt = isRadar ? null : rangeDoubt(range, ratio, gates);
  const spacing = gates > 1 ? range[1]! - range[0]! : NaN;
  const gateLength = numbersOf(dataset.attributes, 'range_gate_length')[0] ?? spacing;
  let blindRange = BLIND_GATES * gateLength;
  if (doubt !== null) {
    problems.push(wrongRange(dataset, variables, doubt.what));
    notes.push(`heights are doubtful: ${doubt.what}`);
    // The pulse is as long as it is, wherever the file says its gates lie.
    if (!Number.isNaN(doubt.likelySpacing)) {
      blindRange = range[0]! + ((blindRange - range[0]!) / doubt.likelySpacing) * spacing;
    }
  }
  const { stations } = stationsOf(dataset, piece, undefined, options);
  const scan: Scan = {
    dataset,
    variables,
    azimuth,
    elevation,
    timeMs,
    range,
    station: stations[0]!,
    isRadar,
    blindRange: isRadar ? 0 : blindRange,
    // A uniform rounding error of one step has a deviation of step / sqrt(12).
    leastDeviation: (numbersOf(dataset.attributes, 'radial_velocity_resolution')[0] ?? 0) / Math.sqrt(12),
    notes,
    marks: doubt === null ? 0 : MARK['source-doubts'],
  };
  return { scan, sweeps, scale };
}

/** @returns false when the sweep is no cone: too few beams, or all from one side */
function addSweep(builder: BlockBuilder, scan: Scan, sweep: Sweep, scale: SignalScale | null): boolean {
  const rays = sweep.to - sweep.from;
  const gates = scan.range.length;
  const { velocity, sign, signal } = scan.variables;
  const geometry = allBeams(scan, sweep);
  if (fitCone(geometry) === null) return false;
  const cone = coneElevation(scan, sweep);
  const values = decodedRows(velocity, sweep.from, sweep.to, sign * scaleOf(velocity));
  const signals = signal === null ? null : decodedRows(signal, sweep.from, sweep.to);
  const beams: Beams = {
    count: 0,
    azimuth: new Float64Array(rays),
    elevation: new Float64Array(rays),
    velocity: new Float64Array(rays),
  };
  const column = (): Float64Array => new Float64Array(gates).fill(NaN);
  const levels = {
    heightAgl: column(),
    speed: column(),
    direction: column(),
    verticalSpeed: column(),
    signal: column(),
    speedUncertainty: column(),
    mark: new Uint32Array(gates),
  };
  let top = 0;
  for (let gate = 0; gate < gates; gate++) {
    levels.heightAgl[gate] = heightOf(scan.range[gate]!, cone, scan.isRadar);
    const strength = gatherGate(beams, scan, sweep, gate, values, signals, scale);
    levels.signal[gate] = strength > 0 ? 10 * Math.log10(strength) : NaN;
    const fit = fitCone(beams, scan.leastDeviation);
    levels.mark[gate] = scan.marks | marksOf(fit, scan, gate);
    if (fit === null) continue;
    levels.speed[gate] = speedOf(fit.u, fit.v);
    levels.direction[gate] = directionOf(fit.u, fit.v);
    levels.verticalSpeed[gate] = fit.w;
    levels.speedUncertainty[gate] = fit.speedUncertainty;
    if (fit.standardError <= HOPELESS_SCATTER) top = gate + 1;
  }
  // Above the last wind there are thousands of gates of noise in some files.
  const cut = <T extends Float64Array | Uint32Array>(values: T): T => values.subarray(0, top) as T;
  builder.add({
    station: scan.station,
    source: scan.dataset.source,
    instrument: scan.isRadar ? 'radar' : 'lidar',
    timeMs: scan.timeMs[sweep.to - 1]!,
    periodS: (scan.timeMs[sweep.to - 1]! - scan.timeMs[sweep.from]!) / 1000,
    notes: [`winds from ${rays} beams at ${Number(cone.toFixed(1))} degrees elevation`, ...scan.notes],
    levels: {
      heightAgl: cut(levels.heightAgl),
      speed: cut(levels.speed),
      direction: cut(levels.direction),
      verticalSpeed: cut(levels.verticalSpeed),
      signal: cut(levels.signal),
      speedUncertainty: cut(levels.speedUncertainty),
      mark: cut(levels.mark),
    },
  });
  return true;
}

/** Beams of a gate that carry wind into `beams`; @returns their mean signal, linear, NaN without */
function gatherGate(
  beams: Beams,
  scan: Scan,
  sweep: Sweep,
  gate: number,
  values: Float64Array,
  signals: Float64Array | null,
  scale: SignalScale | null,
): number {
  const gates = scan.range.length;
  let sum = 0;
  beams.count = 0;
  for (let ray = sweep.from; ray < sweep.to; ray++) {
    const at = (ray - sweep.from) * gates + gate;
    const velocity = values[at]!;
    if (Number.isNaN(velocity) || Number.isNaN(scan.azimuth[ray]!) || Number.isNaN(scan.elevation[ray]!)) continue;
    if (signals !== null && scale !== null) {
      const ratio = scale.toRatio(signals[at]!);
      if (!(ratio >= scale.least)) continue;
      sum += ratio;
    }
    beams.azimuth[beams.count] = scan.azimuth[ray]!;
    beams.elevation[beams.count] = scan.elevation[ray]!;
    beams.velocity[beams.count] = velocity;
    beams.count++;
  }
  return signals === null || beams.count === 0 ? NaN : sum / beams.count;
}

function marksOf(fit: ConeFit | null, scan: Scan, gate: number): number {
  if (fit === null) return MARK['low-signal'];
  let marks = 0;
  if (scan.range[gate]! < scan.blindRange) marks |= MARK.clutter;
  if (fit.standardError > HOPELESS_SCATTER) marks |= MARK['low-signal'];
  if (fit.beams < ENOUGH_BEAMS || fit.condition > GOOD_CONDITION || fit.standardError > DOUBTFUL_SCATTER) {
    marks |= MARK['few-beams'];
  }
  return marks;
}

function allBeams(scan: Scan, { from, to }: Sweep): Beams {
  const azimuth = scan.azimuth.slice(from, to);
  const elevation = scan.elevation.slice(from, to);
  const count = azimuth.length < LEAST_BEAMS ? 0 : azimuth.length;
  return { count, azimuth, elevation, velocity: new Float64Array(azimuth.length) };
}

/** Mean elevation of the beams that are not vertical. */
function coneElevation(scan: Scan, { from, to }: Sweep): number {
  const slanting = scan.elevation.slice(from, to).filter((elevation) => elevation < VERTICAL);
  return slanting.reduce((sum, elevation) => sum + elevation, 0) / slanting.length;
}

/** Height above the instrument; a radar's far and low beams rise over the curve of the Earth. */
function heightOf(range: number, elevation: number, isRadar: boolean): number {
  const radians = (elevation * Math.PI) / 180;
  const straight = range * Math.sin(radians);
  return isRadar ? straight + (range * Math.cos(radians)) ** 2 / (2 * RADAR_EARTH_RADIUS) : straight;
}

function noTime(dataset: Dataset): DuskveerError {
  return new DuskveerError({
    code: 'ingest/netcdf-no-profiles',
    what: 'The scan has no time that can be read.',
    mend: 'Give its times as seconds, minutes, hours or days since a date, in the standard calendar.',
    where: { source: dataset.source },
  });
}

function wrongRange(dataset: Dataset, { range }: ScanVariables, what: string): Problem {
  return {
    code: 'ingest/scan-range-doubtful',
    what,
    mend: 'Correct the ranges in the file; until then its heights are marked as doubtful.',
    where: { source: dataset.source, key: range.name },
  };
}

function noCone(dataset: Dataset, passedOver: number, all: number): Problem {
  return {
    code: 'ingest/scan-no-cone',
    what: `${passedOver} of ${all} sweeps were passed over: their beams do not stand round a cone, so they give no wind.`,
    mend: 'Nothing to do if they are vertical stares or sections; winds need at least four beams round the compass.',
    where: { source: dataset.source },
  };
}
