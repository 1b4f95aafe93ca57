// The story of a jet through the night: noses of successive profiles joined into tracks.
//
// All profiles at hand are joined at once, so late and out-of-order ones end in the same tracks: among all ways through
// the noses the best is taken (dynamic programming), then the best through what is left, as long as one is worth a track.
// A nose speaks for the way by the log odds of its confidence, a step against it by how far height, speed and direction
// move for the time between; hence a weak nose between sure ones is passed through, and a lone one starts nothing.

import { normalDirection, signedAngle } from '../air/index.ts';
import type { JetFinding, SmoothNose } from './find-jets.ts';
import { threadThrough } from './thread.ts';
import { phaseOf, rateOf, type Phase, type Rate } from './rates.ts';

/** What was found in one profile. */
export interface TimedFinding {
  readonly stationId: string;
  readonly timeMs: number;
  readonly finding: JetFinding;
}

/** A point of the thread: the noses of single profiles smoothed along the track (`thread.ts`). */
export interface TrackPoint {
  readonly timeMs: number;
  /** m above ground */
  readonly noseHeight: number;
  /** m/s */
  readonly noseSpeed: number;
  /** Degrees, from; NaN when not known. */
  readonly noseDirection: number;
  /** Probability that the criteria hold at this nose. */
  readonly confidence: number;
  /** m, one standard deviation */
  readonly heightSpread: number;
  /** m/s, one standard deviation */
  readonly speedSpread: number;
  /** More time than usual lies between the point before and this one: the thread is broken here. */
  readonly afterGap: boolean;
}

export interface JetTrack {
  readonly stationId: string;
  readonly criteria: string;
  readonly beganMs: number;
  /** Time of the last point once profiles after it show no jet; null while it lasts as far as data go. */
  readonly endedMs: number | null;
  readonly phase: Phase;
  readonly peak: TrackPoint;
  readonly points: readonly TrackPoint[];
  /** Changes over the last hour and a half of the track, from the noses as found: a smoothed thread would look too sure. */
  readonly rates: { readonly height: Rate; readonly speed: Rate; readonly direction: Rate };
  /** Index among the tracks returned of the one this flowed into or split from; null when neither. */
  readonly mergedInto: number | null;
  readonly splitFrom: number | null;
}

export interface TrackOptions {
  /** Confidence at which a track begins, and the one at which it is given up. */
  readonly begin: number;
  readonly giveUp: number;
  /** The longest time without a nose that a track outlives, ms. */
  readonly longestGapMs: number;
}

export const TRACK_DEFAULTS: TrackOptions = { begin: 0.5, giveUp: 0.3, longestGapMs: 2 * 3600_000 };

const HOUR_MS = 3600_000;
/** Evidence of a profile counts in full when it comes this long after the one before: sooner ones tell much the same. */
const FULL_WEIGHT_MS = 600_000;
/** What a track must be worth beyond its own evidence, in natural log units: three sure profiles of 10 minutes. */
const BIRTH = 6.5;
/** The most that one profile can say for or against. */
const MOST_EVIDENCE = 3;
/** Cost of an hour, and of each profile of 10 minutes, passed over without a nose. */
const GAP_PER_HOUR = 0.5;
const PASSED_OVER = 1;

/** Gates of a step in height (m), speed (m/s) and direction (degrees): at once, and what an hour adds (as its root). */
const GATES = {
  height: { atOnce: 40, inAnHour: 150 },
  speed: { atOnce: 0.7, inAnHour: 2 },
  direction: { atOnce: 8, inAnHour: 25 },
};
/** A step of more than so many standard deviations in any of them joins nothing. */
const FURTHEST = 4;

interface Node extends SmoothNose {
  readonly timeMs: number;
  /** Position of the profile among the station's. */
  readonly profile: number;
  readonly gain: number;
  score: number;
  from: Node | null;
  taken: boolean;
}

/** Joins noses into tracks, station by station. Order of the findings, and findings given twice, make no difference. */
export function trackJets(findings: readonly TimedFinding[], options: Partial<TrackOptions> = {}): JetTrack[] {
  const settings = { ...TRACK_DEFAULTS, ...options };
  const stations = new Map<string, TimedFinding[]>();
  for (const one of findings) {
    const same = stations.get(one.stationId);
    if (same === undefined) stations.set(one.stationId, [one]);
    else same.push(one);
  }
  return [...stations.keys()].sort().flatMap((id) => tracksOf(inOrder(stations.get(id)!), settings));
}

/** By time, one finding a time: of several the surer, so that the order given does not matter. */
function inOrder(findings: readonly TimedFinding[]): TimedFinding[] {
  const rank = ({ finding }: TimedFinding): number[] => [
    Number.isNaN(finding.confidence) ? -1 : finding.confidence,
    Number.isNaN(finding.assessedTo) ? -1 : finding.assessedTo,
    ...finding.noses.map((nose) => nose.height),
  ];
  const sorted = [...findings].sort((a, b) => a.timeMs - b.timeMs || compare(rank(b), rank(a)));
  return sorted.filter((one, k) => k === 0 || one.timeMs !== sorted[k - 1]!.timeMs);
}

function compare(a: readonly number[], b: readonly number[]): number {
  for (let k = 0; k < Math.max(a.length, b.length); k++) {
    const difference = (a[k] ?? -1) - (b[k] ?? -1);
    if (difference !== 0) return difference;
  }
  return 0;
}

function tracksOf(findings: readonly TimedFinding[], options: TrackOptions): JetTrack[] {
  const weights = findings.map(({ timeMs }, k) =>
    k === 0 ? 1 : Math.min(3, Math.max(0.1, (timeMs - findings[k - 1]!.timeMs) / FULL_WEIGHT_MS)),
  );
  const nodes = findings.flatMap(({ timeMs, finding }, profile) =>
    finding.noses.map((nose): Node => ({
      ...nose,
      timeMs,
      profile,
      gain: evidence(nose.confidence, options.giveUp) * weights[profile]!,
      score: 0,
      from: null,
      taken: false,
    })),
  );
  const passing = passingCosts(findings, weights);
  const paths = runsOf(nodes, options).flatMap((run) => pathsOf(run, passing, options));
  paths.sort((a, b) => a[0]!.timeMs - b[0]!.timeMs || a[0]!.height - b[0]!.height);
  const usualStepMs = usualStep(findings);
  return paths.map((path) => describe(path, paths, findings, usualStepMs, options));
}

/** Nodes parted where no way leads across, so that years cost no more than their nights. */
function runsOf(nodes: readonly Node[], { longestGapMs }: TrackOptions): Node[][] {
  const runs: Node[][] = [];
  for (const node of nodes) {
    const run = runs.at(-1);
    if (run !== undefined && node.timeMs - run.at(-1)!.timeMs <= longestGapMs) run.push(node);
    else runs.push([node]);
  }
  return runs;
}

/** The best way, then the best through what it leaves, and so on. */
function pathsOf(nodes: readonly Node[], passing: readonly number[], options: TrackOptions): Node[][] {
  const paths: Node[][] = [];
  for (;;) {
    const path = bestPath(nodes, passing, options);
    if (path === null) return paths;
    for (const node of path) node.taken = true;
    const trimmed = trim(path, options);
    if (trimmed.length > 0) paths.push(trimmed);
  }
}

/** Log odds of a confidence against those of giving up, bounded. */
function evidence(confidence: number, giveUp: number): number {
  const odds = (p: number): number => Math.log((p + 0.01) / (1.01 - p));
  return Math.min(MOST_EVIDENCE, Math.max(-MOST_EVIDENCE, odds(confidence) - odds(giveUp)));
}

/** Cost of passing over all assessable profiles up to the k-th, summed up. */
function passingCosts(findings: readonly TimedFinding[], weights: readonly number[]): number[] {
  let sum = 0;
  return findings.map(
    ({ finding }, k) => (sum += finding.noses.length > 0 || finding.confidence >= 0 ? PASSED_OVER * weights[k]! : 0),
  );
}

/** The best way through nodes not yet taken; null when none is worth a track. */
function bestPath(nodes: readonly Node[], passing: readonly number[], options: TrackOptions): Node[] | null {
  let best: Node | null = null;
  let first = 0;
  for (let k = 0; k < nodes.length; k++) {
    const node = nodes[k]!;
    if (node.taken) continue;
    node.score = node.gain - BIRTH;
    node.from = null;
    while (node.timeMs - nodes[first]!.timeMs > options.longestGapMs) first++;
    for (let j = first; j < k; j++) {
      const before = nodes[j]!;
      if (before.taken || before.profile === node.profile) continue;
      const passed = passing[node.profile - 1]! - passing[before.profile]!;
      const score = before.score + node.gain - passed - stepCost(before, node);
      if (score > node.score) {
        node.score = score;
        node.from = before;
      }
    }
    if (best === null || node.score > best.score) best = node;
  }
  if (best === null || best.score <= 0) return null;
  const path: Node[] = [];
  for (let node: Node | null = best; node !== null; node = node.from) path.push(node);
  return path.reverse();
}

/** How unlikely a step from one nose to the next is; infinite beyond the gates, which widen with the time between. */
function stepCost(before: Node, after: Node): number {
  const hours = (after.timeMs - before.timeMs) / HOUR_MS;
  const height2 =
    square(after.height - before.height) / gate(GATES.height, hours, before.heightSpread, after.heightSpread);
  const speed2 = square(after.speed - before.speed) / gate(GATES.speed, hours, before.speedSpread, after.speedSpread);
  const turn = signedAngle(after.direction - before.direction);
  const turn2 = Number.isNaN(turn) ? 0 : square(turn) / gate(GATES.direction, hours, 0, 0);
  if (Math.max(height2, speed2, turn2) > square(FURTHEST)) return Infinity;
  return (height2 + speed2 + turn2) / 2 + GAP_PER_HOUR * hours;
}

const square = (value: number): number => value * value;

/** Square of the distance that is one standard deviation for a step. */
function gate(widths: { atOnce: number; inAnHour: number }, hours: number, one: number, other: number): number {
  return square(widths.atOnce) + square(widths.inAnHour) * hours + square(one) + square(other);
}

/** Cuts what comes before the first nose sure enough to begin with, and what trails off below giving up. */
function trim(path: readonly Node[], options: TrackOptions): Node[] {
  const begin = path.findIndex((node) => node.confidence >= options.begin);
  if (begin < 0) return [];
  const end = path.findLastIndex((node) => node.confidence >= options.giveUp);
  return path.slice(begin, end + 1);
}

function usualStep(findings: readonly TimedFinding[]): number {
  const steps = findings.slice(1).map(({ timeMs }, k) => timeMs - findings[k]!.timeMs);
  steps.sort((a, b) => a - b);
  return steps.length > 0 ? steps[steps.length >> 1]! : Infinity;
}

function describe(
  path: readonly Node[],
  paths: readonly (readonly Node[])[],
  findings: readonly TimedFinding[],
  usualStepMs: number,
  options: TrackOptions,
): JetTrack {
  const points = pointsOf(path, usualStepMs);
  const last = path.at(-1)!;
  const first = path[0]!;
  const assessableAfter = findings.slice(last.profile + 1).filter(({ finding }) => finding.confidence >= 0).length;
  const ended = assessableAfter >= 2 || findings.at(-1)!.timeMs - last.timeMs > options.longestGapMs;
  const endedMs = ended ? last.timeMs : null;
  const rates = {
    height: rateOf(path, (node) => node.height),
    speed: rateOf(path, (node) => node.speed),
    direction: rateOf(path, (node, reference) => signedAngle(node.direction - reference.direction)),
  };
  return {
    stationId: findings[0]!.stationId,
    criteria: findings[0]!.finding.criteria,
    beganMs: first.timeMs,
    endedMs,
    phase: phaseOf(rates.speed, endedMs !== null),
    peak: points.reduce((best, point) => (point.noseSpeed > best.noseSpeed ? point : best)),
    points,
    rates,
    mergedInto: ended ? neighbourAt(last, path, paths, options) : null,
    splitFrom: neighbourAt(first, path, paths, options),
  };
}

/**
 * What the true height (m), speed (m/s) and direction (degrees) of a nose wander in an hour, and how far the direction of
 * a single profile may be off. Found on simulated nights: near these the threads lie closest to the true noses, and the
 * spread of the height holds them about 70 % of the time.
 */
const WANDER = { height: 80, speed: 1, direction: 12 };
const DIRECTION_SPREAD = 5;
/** The least that a single profile's height (m) and speed (m/s) may be off, so that no point binds the thread wholly. */
const LEAST_SPREAD = { height: 5, speed: 0.05 };

/** The thread through the noses of a path. */
function pointsOf(path: readonly Node[], usualStepMs: number): TrackPoint[] {
  const timeMs = path.map((node) => node.timeMs);
  const height = threadThrough(
    timeMs,
    path.map((node) => node.height),
    path.map((node) => node.heightSpread + LEAST_SPREAD.height),
    WANDER.height,
  );
  const speed = threadThrough(
    timeMs,
    path.map((node) => node.speed),
    path.map((node) => node.speedSpread + LEAST_SPREAD.speed),
    WANDER.speed,
  );
  const direction = threadThrough(
    timeMs,
    unwrapped(path),
    path.map((node) => (Number.isNaN(node.direction) ? UNKNOWN : DIRECTION_SPREAD)),
    WANDER.direction,
  );
  return path.map((node, k) => ({
    timeMs: node.timeMs,
    noseHeight: height.value[k]!,
    noseSpeed: speed.value[k]!,
    noseDirection: normalDirection(direction.value[k]!),
    confidence: node.confidence,
    heightSpread: height.spread[k]!,
    speedSpread: speed.spread[k]!,
    afterGap: k > 0 && node.timeMs - path[k - 1]!.timeMs > 2.5 * usualStepMs,
  }));
}

/** Spread, degrees, of a direction that is not known: it bears on nothing. */
const UNKNOWN = 1e6;

/** Directions without the leap at north; one not known is taken as the one before, NaN where none is known. */
function unwrapped(path: readonly Node[]): number[] {
  let last = path.find(({ direction }) => !Number.isNaN(direction))?.direction ?? NaN;
  return path.map(({ direction }) => (Number.isNaN(direction) ? last : (last += signedAngle(direction - last))));
}

/** Another track that runs on both sides of a node's time and lies within a step of it. */
function neighbourAt(
  node: Node,
  own: readonly Node[],
  paths: readonly (readonly Node[])[],
  options: TrackOptions,
): number | null {
  const found = paths.findIndex((path) => {
    if (path === own || path[0]!.timeMs >= node.timeMs || path.at(-1)!.timeMs <= node.timeMs) return false;
    return path.some(
      (other) =>
        Math.abs(other.timeMs - node.timeMs) <= options.longestGapMs / 4 &&
        stepCost(other.timeMs <= node.timeMs ? other : node, other.timeMs <= node.timeMs ? node : other) < 2,
    );
  });
  return found < 0 ? null : found;
}
