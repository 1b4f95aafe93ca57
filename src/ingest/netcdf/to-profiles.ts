// From a file's variables to profiles: the one place where netCDF meets the profile model.

import {
  directionOf,
  DuskveerError,
  normalDirection,
  speedOf,
  throwIfCancelled,
  type Problem,
} from '../../air/index.ts';
import { blockOfColumns, type ColumnsInput, type ProfileBlock } from '../../profile/index.ts';
import type { ReadOptions } from '../format.ts';
import { assumedUnit } from '../csv/assumed-units.ts';
import { ASSUMED_PRESSURE_NOTE, levelHumidity } from '../level-humidity.ts';
import { findScan } from '../scan/find-scan.ts';
import { profilesFromScan } from '../scan/scan-profiles.ts';
import { textOf, type Dataset } from './dataset.ts';
import { stationsOf } from './file-station.ts';
import { instrumentsOf, marksOf, revisionsOf } from './flags.ts';
import { piecesOf, type Piece } from './gather.ts';
import { groundHeights } from './ground-heights.ts';
import { planOf, type LevelRole, type Plan } from './plan.ts';
import { withoutPadding } from './padding.ts';
import { timesOf } from './times.ts';
import { joinedByHeight } from './wide.ts';

interface Part {
  readonly block: ProfileBlock;
  readonly problems: readonly Problem[];
}

/**
 * All profiles of a dataset, in pieces; of its groups where it has none itself.
 * @throws DuskveerError when no profile can be had, with what is missing
 * @throws Cancelled
 */
export function* profilesFrom(dataset: Dataset, options: ReadOptions): Generator<Part> {
  const problems: Problem[] = [...dataset.problems];
  let plan: Plan;
  try {
    plan = planOf(dataset, options, problems);
  } catch (error) {
    if (!(error instanceof DuskveerError)) throw error;
    const scan = findScan(dataset);
    if (scan !== null) {
      yield* profilesFromScan(dataset, scan, options);
      return;
    }
    const joined = joinedByHeight(dataset);
    if (joined !== null) {
      yield* profilesFrom(joined, options);
      return;
    }
    yield* profilesFromGroups(dataset.groups, options, error);
    return;
  }
  // A single height beside variables that carry theirs in their names is only the first of them.
  const joined = plan.layout.levelDimension === null ? joinedByHeight(dataset) : null;
  if (joined !== null) {
    yield* profilesFrom(joined, options);
    return;
  }
  const rowDimension = plan.layout.profileDimensions[0];
  const divisible = [...plan.roles.values()].every(({ variable }) => variable.dimensions[0] === rowDimension);
  const told = new Set<string>();
  for (const piece of piecesOf(plan.layout, divisible)) {
    throwIfCancelled(options.signal);
    const block = blockOf(plan, piece, options, problems);
    const fresh = problems.splice(0).filter(({ code, where }) => {
      const key = `${code} ${where.key ?? ''}`;
      return !told.has(key) && told.add(key);
    });
    yield { block, problems: fresh };
  }
}

/** Some groups hold profiles, others only what belongs to them. @throws `error` when none holds any */
function* profilesFromGroups(groups: readonly Dataset[], options: ReadOptions, error: DuskveerError): Generator<Part> {
  let found = false;
  let first = error;
  for (const group of groups) {
    try {
      for (const part of profilesFrom(group, options)) {
        found = true;
        yield part;
      }
    } catch (trouble) {
      if (!(trouble instanceof DuskveerError)) throw trouble;
      if (first === error && trouble.code !== error.code) first = trouble;
    }
  }
  if (!found) throw first;
}

function blockOf(plan: Plan, piece: Piece, options: ReadOptions, problems: Problem[]): ProfileBlock {
  const { dataset, launched, time } = plan;
  const notes: string[] = [];
  const found = stationsOf(dataset, piece, plan.height.variable.name, options);
  const ground = groundHeights(plan, piece, found, notes, problems);
  const read = (role: LevelRole): Float32Array | null => columnOf(plan, piece, role, ground.downward, notes, problems);
  const { speed, direction } = windOf(read);
  const pressure = read('pressure');
  const temperature = read('temperature');
  const humidity = levelHumidity(
    {
      specificHumidity: read('specificHumidity'),
      mixingRatio: read('mixingRatio'),
      dewPoint: read('dewPoint'),
      relativeHumidity: read('relativeHumidity'),
      temperature,
      pressure,
    },
    ground.heightAmsl,
  );
  if (humidity.pressureAssumed) notes.push(ASSUMED_PRESSURE_NOTE);
  for (const [name, values] of piece.undeclared) {
    const listed = [...values]
      .slice(0, 3)
      .map((value) => Number(value.toPrecision(6)))
      .join(', ');
    notes.push(`${name}: ${listed} taken as missing, though the file does not say so`);
  }
  const { timeMs, periodS } = timesOf(dataset, piece, time);
  const { profileCount } = piece;
  const columns: ColumnsInput = {
    stations: ground.stations,
    sources: [dataset.source],
    profileCount,
    offsets: piece.offsets,
    stationIndex: ground.stationIndex,
    sourceIndex: new Uint16Array(profileCount),
    instrumentIndex: instrumentsOf(dataset, piece, launched),
    revision: revisionsOf(dataset, piece),
    timeMs,
    periodS: launched ? periodS.fill(0) : periodS,
    notes:
      notes.length === 0 ? {} : Object.fromEntries(Array.from({ length: profileCount }, (_, index) => [index, notes])),
    heightAgl: ground.heightAgl,
    speed,
    direction,
    verticalSpeed: read('verticalSpeed'),
    pressure,
    temperature,
    specificHumidity: humidity.specificHumidity,
    signal: read('signal'),
    speedUncertainty: read('speedUncertainty'),
    consensus: read('consensus'),
    spectralWidth: read('spectralWidth'),
    mark: marksOf(plan, piece, ground.downward) ?? new Uint32Array(ground.heightAgl.length),
  };
  // Heights common to all profiles pad nothing.
  return blockOfColumns(plan.height.variable.dimensions.length > 1 ? withoutPadding(columns) : columns);
}

/** Speed and direction as measured, or out of components where the file has only these. */
function windOf(read: (role: LevelRole) => Float32Array | null): Record<'speed' | 'direction', Float32Array | null> {
  const speed = read('speed');
  const direction = read('direction');
  if (speed !== null && direction !== null) return { speed, direction };
  const u = read('u');
  const v = read('v');
  if (u === null || v === null) return { speed, direction };
  for (let k = 0; k < u.length; k++) {
    const east = u[k]!;
    const north = v[k]!;
    u[k] = speedOf(east, north);
    v[k] = directionOf(east, north);
  }
  return { speed: u, direction: v };
}

function columnOf(
  plan: Plan,
  piece: Piece,
  role: LevelRole,
  downward: boolean,
  notes: string[],
  problems: Problem[],
): Float32Array | null {
  const finding = plan.roles.get(role);
  if (finding === undefined) return null;
  const { variable, unit } = finding;
  let values: Float32Array | null;
  try {
    values = piece.levels(variable, unit ?? { scale: 1, offset: 0 }, downward);
  } catch (error) {
    // What belongs to the wind ends the reading; anything else is only missing.
    if (!(error instanceof DuskveerError) || role === 'speed' || role === 'u') throw error;
    problems.push(error.problem);
    return null;
  }
  if (values === null) return null;
  if (role === 'consensus') inShares(values);
  else if (unit === null && role !== 'signal' && role !== 'spectralWidth') {
    const assumed = assumedUnit(role, sampleOf(values));
    notes.push(`${variable.name} has no unit: taken as ${assumed.words}`);
    const { scale, offset } = assumed.unit;
    if (scale !== 1 || offset !== 0) for (let k = 0; k < values.length; k++) values[k] = values[k]! * scale + offset;
  }
  const standardName = textOf(variable.attributes, 'standard_name');
  if (standardName === 'wind_to_direction') {
    for (let k = 0; k < values.length; k++) values[k] = normalDirection(values[k]! + 180);
  } else if (standardName === 'downward_air_velocity') {
    for (let k = 0; k < values.length; k++) values[k] = -values[k]!;
  }
  return values;
}

/** Shares written as per cent without saying so become shares. */
function inShares(values: Float32Array): void {
  if (values.some((value) => value > 1.5)) for (let k = 0; k < values.length; k++) values[k]! /= 100;
}

/** Enough values to judge their range by. */
function sampleOf(values: Float32Array): Float32Array {
  const step = Math.ceil(values.length / 5000);
  return step <= 1
    ? values
    : Float32Array.from({ length: Math.floor(values.length / step) }, (_, k) => values[k * step]!);
}
