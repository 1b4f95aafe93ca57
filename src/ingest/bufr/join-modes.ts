// A wind profiler measures in modes, short pulses for fine gates below and long ones for coarse gates above, and many send each
// mode as a report of its own. Joined they are one profile; where both reach, the finer gates count.

import {
  BlockBuilder,
  INSTRUMENTS,
  MARK,
  profileAt,
  VALUE_COLUMNS,
  type LevelInput,
  type Profile,
  type ProfileBlock,
  type ValueColumn,
} from '../../profile/index.ts';

/** Two reports with more than this share of the smaller one's heights in common are one report twice. */
const SAME_HEIGHTS = 0.7;
/** m */
const SAME_HEIGHT = 1;
const NOTE = 'Reports of several modes of the profiler joined; where they overlap the finer gates count.';

/** The block with the modes of each wind profiler and time in one profile; the block itself where there are none. */
export function joinModes(block: ProfileBlock): ProfileBlock {
  const groups = new Map<string, number[]>();
  for (let i = 0; i < block.profileCount; i++) {
    const isProfiler = INSTRUMENTS[block.instrumentIndex[i]!] === 'wind-profiler';
    const { id } = block.stations[block.stationIndex[i]!]!;
    const key = isProfiler ? `${id} ${block.timeMs[i]!} ${block.revision[i]!}` : `${i}`;
    const group = groups.get(key);
    if (group === undefined) groups.set(key, [i]);
    else group.push(i);
  }
  if (groups.size === block.profileCount) return block;
  const builder = new BlockBuilder();
  for (const group of groups.values()) {
    for (const profile of joined(group.map((i) => profileAt(block, i))))
      builder.add({ ...profile, levels: levelsOf(profile) });
  }
  return builder.finish();
}

/** One profile where the reports are modes; else all of them. */
function joined(reports: readonly Profile[]): readonly Profile[] {
  const modes = [...reports].sort((a, b) => spacingOf(a) - spacingOf(b));
  const areModes = modes.every(
    (mode, k) => mode.levelCount > 0 && modes.slice(0, k).every((finer) => !isSameReport(finer, mode)),
  );
  if (reports.length < 2 || !areModes) return reports;
  let [profile] = modes;
  for (const mode of modes.slice(1)) profile = withMode(profile!, mode);
  return [{ ...profile!, notes: [...profile!.notes, NOTE] }];
}

/** Levels of both; those of the coarser one that a finer wind stands beside are marked as doubled. */
function withMode(finer: Profile, coarser: Profile): Profile {
  const reach = spacingOf(coarser) / 2;
  const winds = [...finer.heightAgl].filter((_, k) => !Number.isNaN(finer.speed[k]!));
  const isCovered = (height: number): boolean => winds.some((other) => Math.abs(other - height) <= reach);
  const both = (a: Float32Array | null, b: Float32Array | null): Float32Array | null => {
    if (a === null && b === null) return null;
    const column = new Float32Array(finer.levelCount + coarser.levelCount).fill(NaN);
    if (a !== null) column.set(a);
    if (b !== null) column.set(b, finer.levelCount);
    return column;
  };
  const mark = new Uint32Array(finer.levelCount + coarser.levelCount);
  mark.set(finer.mark);
  coarser.mark.forEach((bits, k) => {
    mark[finer.levelCount + k] = isCovered(coarser.heightAgl[k]!) ? bits | MARK.doubled : bits;
  });
  const columns = Object.fromEntries(VALUE_COLUMNS.map((name) => [name, both(finer[name], coarser[name])]));
  return { ...finer, ...columns, levelCount: mark.length, mark };
}

function levelsOf(profile: Profile): LevelInput {
  const columns: Partial<Record<ValueColumn, Float32Array>> = {};
  for (const name of VALUE_COLUMNS) if (profile[name] !== null) columns[name] = profile[name];
  return { ...columns, heightAgl: profile.heightAgl, mark: profile.mark };
}

/** Middle distance from gate to gate, m; nothing where there is one gate. */
function spacingOf({ heightAgl }: Profile): number {
  const steps = Array.from(heightAgl.subarray(1), (height, k) => height - heightAgl[k]!)
    .filter((step) => step > 0)
    .sort((a, b) => a - b);
  return steps[steps.length >> 1] ?? 0;
}

function isSameReport(a: Profile, b: Profile): boolean {
  const heights = [...a.heightAgl];
  const shared = [...b.heightAgl].filter((z) => heights.some((other) => Math.abs(other - z) <= SAME_HEIGHT)).length;
  return shared >= SAME_HEIGHTS * Math.min(a.levelCount, b.levelCount);
}
