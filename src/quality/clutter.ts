// Ground clutter and the outgoing pulse: the lowest gates of a remote sensor may show echoes that do not move with the wind:
// speeds near zero, or directions that have nothing to do with those just above, profile after profile. Common practice,
// without source (that clutter pulls profilers' lowest gates toward zero: Wilczak et al. 1995 speak of it, from memory).

import { veerBetween } from '../air/index.ts';
import { INSTRUMENTS, MARK, REJECTING, type Instrument, type ProfileBlock } from '../profile/index.ts';
import type { Screened } from './series.ts';

const REMOTE: ReadonlySet<Instrument> = new Set<Instrument>(['wind-profiler', 'lidar', 'sodar', 'radar']);
/** Only so many of the lowest heights can be clutter, and none above this, m. */
const GATES = 4;
const HIGHEST = 400;
/** A gate is judged where it and the sound gate above, at most so far away, m, both have wind in so many profiles. */
const FARTHEST = 150;
const FEWEST_PROFILES = 4;
/** Clutter is where this share of the profiles is unlike the gate above. */
const UNLIKE_SHARE = 0.5;
/** The gate above must blow for its likeness to mean anything, m/s. */
const BLOWING = 2.5;
/** Unlike: slower than this, m/s, ... */
const STILL = 0.3;
/** ... or turned by more than this, degrees: no surface layer turns so much within a gate or two. */
const TURNED = 60;

/** Adds `clutter` to all levels of the lowest gates that are persistently unlike the gate above. */
export function clutter({ block, series }: Screened, marks: Uint32Array): void {
  for (const { instrument, profiles } of series) {
    if (!REMOTE.has(INSTRUMENTS[instrument]!) || profiles.length < FEWEST_PROFILES) continue;
    const gates = lowestGates(block, marks, profiles);
    let sound = gates.length - 1;
    for (let g = sound - 1; g >= 0; g--) {
      if (g < GATES && isUnlike(block, gates[g]!, gates[sound]!)) {
        for (const k of gates[g]!.levels) if (k >= 0) marks[k]! |= MARK.clutter;
      } else sound = g;
    }
  }
}

interface Gate {
  /** m above ground */
  readonly height: number;
  /** Level of the block for each profile of the series; -1: none. */
  readonly levels: Int32Array;
}

/** The lowest heights of a series, in whole metres, with one more above them to start from. */
function lowestGates(block: ProfileBlock, marks: Uint32Array, profiles: readonly number[]): Gate[] {
  const { offsets, heightAgl, speed } = block;
  const gates = new Map<number, Int32Array>();
  profiles.forEach((i, at) => {
    for (let k = offsets[i]!; k < offsets[i + 1]! && heightAgl[k]! <= HIGHEST + FARTHEST; k++) {
      if ((marks[k]! & REJECTING) !== 0 || Number.isNaN(speed[k]!)) continue;
      const height = Math.round(heightAgl[k]!);
      let levels = gates.get(height);
      if (levels === undefined) gates.set(height, (levels = new Int32Array(profiles.length).fill(-1)));
      levels[at] = k;
    }
  });
  return [...gates]
    .map(([height, levels]) => ({ height, levels }))
    .sort((a, b) => a.height - b.height)
    .slice(0, GATES + 1);
}

function isUnlike(block: ProfileBlock, gate: Gate, above: Gate): boolean {
  if (gate.height > HIGHEST || above.height - gate.height > FARTHEST) return false;
  const { speed, direction } = block;
  let compared = 0;
  let unlike = 0;
  gate.levels.forEach((k, at) => {
    const reference = above.levels[at]!;
    if (k < 0 || reference < 0 || speed[reference]! < BLOWING) return;
    compared++;
    if (speed[k]! < STILL || Math.abs(veerBetween(direction[reference]!, direction[k]!)) > TURNED) unlike++;
  });
  return compared >= FEWEST_PROFILES && unlike >= UNLIKE_SHARE * compared;
}
