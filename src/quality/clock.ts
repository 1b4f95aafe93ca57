// Clock jumps: a source that reports every so many minutes keeps its beat; profiles off the beat of nearly all others were
// stamped by a clock that had jumped. Common practice, without source. A jump by whole steps leaves no trace here.

import { MARK, type ProfileBlock } from '../profile/index.ts';
import { type Series, type Screened } from './series.ts';

const FEWEST_PROFILES = 8;
/** Sources without a beat: successive times differ by less than this, or the usual step is longer, ms. */
const SHORTEST_STEP_MS = 60_000;
const LONGEST_STEP_MS = 3_600_000;
/** On the beat within this part of a step, off it beyond that part. */
const ON_BEAT = 0.1;
const OFF_BEAT = 0.2;
/** Parts of a step among which the commonest phase is sought. */
const BINS = 24;
/** There is a beat when this share of all profiles is on it. */
const BEAT_SHARE = 0.8;

/** Adds `clock` to all levels of profiles that are off the beat of their series. */
export function clockJumps({ block, series }: Screened, marks: Uint32Array): void {
  for (const one of series) {
    for (const i of offBeat(block, one)) {
      for (let k = block.offsets[i]!; k < block.offsets[i + 1]!; k++) marks[k]! |= MARK.clock;
    }
  }
}

function offBeat(block: ProfileBlock, { profiles, stepMs }: Series): number[] {
  if (profiles.length < FEWEST_PROFILES || !(stepMs >= SHORTEST_STEP_MS && stepMs <= LONGEST_STEP_MS)) return [];
  const phases = profiles.map((i) => (block.timeMs[i]! % stepMs) / stepMs);
  const beat = beatOf(phases);
  if (beat === undefined) return [];
  return profiles.filter((_, at) => apart(phases[at]!, beat) > OFF_BEAT);
}

/** Part of a step between two phases, round the circle. */
const apart = (a: number, b: number): number => Math.abs(a - b - Math.round(a - b));

/** The phase that nearly all share; undefined where there is none. */
function beatOf(phases: readonly number[]): number | undefined {
  const bins = new Uint32Array(BINS);
  for (const phase of phases) bins[Math.min(BINS - 1, Math.floor(phase * BINS))]!++;
  const fullest = bins.indexOf(Math.max(...bins));
  const candidate = (fullest + 0.5) / BINS;
  const onBeat = phases.filter((phase) => apart(phase, candidate) <= ON_BEAT);
  return onBeat.length >= BEAT_SHARE * phases.length ? candidate : undefined;
}
