// Migrating birds: at night they fly in bands of height, add their own flight to the wind and fill a UHF profiler's beams, so
// that winds are wrong by up to 15 m/s right where jets are (Wilczak et al. 1995, J. Atmos. Oceanic Technol. 12; figures from
// memory). What gives them away is not that gates disagree with their surroundings, which the continuity screens mark, but
// that they all disagree in one heading, profile after profile, at night and in season. The limits are our own choices.

import { directionOf, eastward, nightOf, northward, signedAngle, speedOf } from '../air/index.ts';
import { INSTRUMENTS, MARK, REJECTING, type ProfileBlock } from '../profile/index.ts';
import type { Site } from '../site/index.ts';
import { median, type Screened } from './series.ts';

/** Months of the usual passage in either hemisphere, where the site file names none; common practice, without source. */
const PASSAGE_MONTHS: readonly number[] = [3, 4, 5, 8, 9, 10, 11];
/** m above ground: most fly here. */
const LOWEST = 50;
const HIGHEST = 2500;
/** m/s that flight adds. */
const SLOWEST_FLIGHT = 3;
const FASTEST_FLIGHT = 20;
/** What a suspect gate is held against: sound gates so near in time, ms, and height, m. */
const NEAR_MS = 90 * 60_000;
const NEAR_HEIGHT = 150;
/** A profile tells of birds with so many suspect gates whose headings agree so well (length of the mean unit vector). */
const FEWEST_GATES = 3;
const AGREEMENT = 0.75;
/** A flock lasts: so many profiles within NEAR_MS must tell the same heading within so many degrees. */
const FEWEST_PROFILES = 3;
const SAME_HEADING = 45;
/** Birds are wide and strong echoes: their gates' median width is so many times that of sound ones, their signal no weaker. */
const BROADER = 1.5;
/** Another instrument within so long, ms, that differs by so much, m/s, settles it. */
const BESIDE_MS = 20 * 60_000;
const BESIDE_DIFFERENCE = 4;

/** What the suspect gates of one profile have in common. */
interface Flight {
  readonly profile: number;
  /** degrees toward which the additional movement goes */
  readonly toward: number;
  readonly gates: readonly number[];
}

/**
 * Adds `migrants-likely` to the band of heights in which birds fly, and `migrants-certain` to its suspect gates where the
 * heading is one that the site file names for the month, their spectra are as wide as those of birds, or another instrument at
 * the station contradicts them.
 */
export function migrants({ block, series, site }: Screened, marks: Uint32Array): void {
  for (const { instrument, profiles } of series) {
    if (INSTRUMENTS[instrument] !== 'wind-profiler') continue;
    const flights = profiles
      .filter((i) => isSeasonAndNight(block, i, site))
      .flatMap((i) => flightOf(block, marks, profiles, i) ?? []);
    for (const flight of flights) {
      if (!lasts(block, flight, flights)) continue;
      const certain =
        isNamedHeading(block, flight, site) ||
        echoesLikeBirds(block, flight, marks) ||
        isContradicted(block, flight, marks, series.map((s) => s.profiles).flat());
      markBand(block, marks, flight, certain);
    }
  }
}

function isSeasonAndNight(block: ProfileBlock, i: number, site: Site): boolean {
  const { latitude, longitude } = block.stations[block.stationIndex[i]!]!;
  const timeMs = block.timeMs[i]!;
  const months = site.migration.length > 0 ? site.migration.flatMap((each) => each.months) : PASSAGE_MONTHS;
  if (!months.includes(monthOf(timeMs))) return false;
  const { startMs, endMs } = nightOf(timeMs, latitude, longitude);
  return timeMs >= startMs && timeMs < endMs;
}

function monthOf(timeMs: number): number {
  return new Date(timeMs).getUTCMonth() + 1;
}

function isSuspect(marks: Uint32Array, k: number): boolean {
  return (marks[k]! & (MARK['time-jump'] | MARK.contested)) !== 0;
}

/** The common heading of a profile's suspect gates; null where they are few or of many minds. */
function flightOf(block: ProfileBlock, marks: Uint32Array, profiles: readonly number[], i: number): Flight | null {
  const { offsets, heightAgl, speed, direction } = block;
  const near = profiles.filter((j) => Math.abs(block.timeMs[j]! - block.timeMs[i]!) <= NEAR_MS);
  const gates: number[] = [];
  let [sumU, sumV] = [0, 0];
  for (let k = offsets[i]!; k < offsets[i + 1]!; k++) {
    const height = heightAgl[k]!;
    if (!isSuspect(marks, k) || !(height >= LOWEST && height <= HIGHEST)) continue;
    const sound = soundWind(block, marks, near, height);
    if (sound === null) continue;
    const u = eastward(speed[k]!, direction[k]!) - sound.u;
    const v = northward(speed[k]!, direction[k]!) - sound.v;
    const size = speedOf(u, v);
    if (!(size >= SLOWEST_FLIGHT && size <= FASTEST_FLIGHT)) continue;
    gates.push(k);
    sumU += u / size;
    sumV += v / size;
  }
  if (gates.length < FEWEST_GATES || speedOf(sumU, sumV) < AGREEMENT * gates.length) return null;
  return { profile: i, toward: (directionOf(sumU, sumV) + 180) % 360, gates };
}

/** Mean of the sound gates around a height in the profiles given; null where there are none. */
function soundWind(
  { offsets, heightAgl, speed, direction }: ProfileBlock,
  marks: Uint32Array,
  profiles: readonly number[],
  height: number,
): { u: number; v: number } | null {
  let [sumU, sumV, count] = [0, 0, 0];
  for (const j of profiles) {
    for (let k = offsets[j]!; k < offsets[j + 1]! && heightAgl[k]! <= height + NEAR_HEIGHT; k++) {
      if (heightAgl[k]! < height - NEAR_HEIGHT || isSuspect(marks, k) || (marks[k]! & REJECTING) !== 0) continue;
      const u = eastward(speed[k]!, direction[k]!);
      const v = northward(speed[k]!, direction[k]!);
      if (Number.isNaN(u + v)) continue;
      sumU += u;
      sumV += v;
      count++;
    }
  }
  return count === 0 ? null : { u: sumU / count, v: sumV / count };
}

function lasts({ timeMs }: ProfileBlock, flight: Flight, flights: readonly Flight[]): boolean {
  const alike = flights.filter(
    (other) =>
      Math.abs(timeMs[other.profile]! - timeMs[flight.profile]!) <= NEAR_MS &&
      Math.abs(signedAngle(other.toward - flight.toward)) <= SAME_HEADING,
  );
  return alike.length >= FEWEST_PROFILES;
}

function isNamedHeading({ timeMs }: ProfileBlock, { profile, toward }: Flight, site: Site): boolean {
  const month = monthOf(timeMs[profile]!);
  return site.migration.some(
    (named) => named.months.includes(month) && Math.abs(signedAngle(toward - named.toward)) <= named.spread,
  );
}

/** Whether the suspect gates have the wide spectra of birds beside the sound gates of their profile; never where none is told. */
function echoesLikeBirds(block: ProfileBlock, { profile, gates }: Flight, marks: Uint32Array): boolean {
  const { spectralWidth, signal, offsets, heightAgl, speed } = block;
  if (spectralWidth === null) return false;
  const sound: number[] = [];
  for (let k = offsets[profile]!; k < offsets[profile + 1]!; k++) {
    const isSound = !isSuspect(marks, k) && (marks[k]! & REJECTING) === 0 && !Number.isNaN(speed[k]!);
    if (isSound && heightAgl[k]! <= HIGHEST) sound.push(k);
  }
  const middle = (column: Float32Array, levels: readonly number[]): number =>
    median(levels.map((k) => column[k]!).filter((value) => !Number.isNaN(value)));
  const isBroad = middle(spectralWidth, gates) >= BROADER * middle(spectralWidth, sound);
  const isWeak = signal !== null && middle(signal, gates) < middle(signal, sound);
  return isBroad && !isWeak;
}

/** Whether most of the flight's gates are contradicted by another instrument of the station at the same time. */
function isContradicted(
  block: ProfileBlock,
  { profile, gates }: Flight,
  marks: Uint32Array,
  all: readonly number[],
): boolean {
  const station = block.stations[block.stationIndex[profile]!]!.id;
  const beside = all.filter(
    (j) =>
      block.instrumentIndex[j] !== block.instrumentIndex[profile] &&
      block.stations[block.stationIndex[j]!]!.id === station &&
      Math.abs(block.timeMs[j]! - block.timeMs[profile]!) <= BESIDE_MS,
  );
  const differing = gates.filter((k) => {
    const other = soundWind(block, marks, beside, block.heightAgl[k]!);
    if (other === null) return false;
    const u = eastward(block.speed[k]!, block.direction[k]!) - other.u;
    const v = northward(block.speed[k]!, block.direction[k]!) - other.v;
    return speedOf(u, v) >= BESIDE_DIFFERENCE;
  });
  return differing.length > gates.length / 2;
}

/** The band from lowest to highest suspect gate: what lies between them is not to be trusted either. */
function markBand(block: ProfileBlock, marks: Uint32Array, { profile, gates }: Flight, certain: boolean): void {
  const low = block.heightAgl[gates[0]!]!;
  const high = block.heightAgl[gates[gates.length - 1]!]!;
  for (let k = block.offsets[profile]!; k < block.offsets[profile + 1]!; k++) {
    if (block.heightAgl[k]! >= low && block.heightAgl[k]! <= high) marks[k]! |= MARK['migrants-likely'];
  }
  if (certain) for (const k of gates) marks[k]! |= MARK['migrants-certain'];
}
