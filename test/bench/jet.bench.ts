// Noses and the four categories on profiles of 120 gates, one core: ours, a bare scan of the same arrays, and the same
// categories in vectorised NumPy where there is one. Then one profile with its confidence, and a night's tracks.

import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { CRITERIA, findJets, scanNoses, trackJets, type TimedFinding } from '../../src/jet/index.ts';
import { BlockBuilder, profileAt, unplacedStation, type ProfileBlock } from '../../src/profile/index.ts';

interface Figure {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly note?: string;
}

const GATES = 120;
const PROFILES = 50_000;
const SCRIPT = 'test/bench/jet-numpy.py';

export default function bench(report: (figure: Figure) => void): Promise<void> {
  const block = profiles(PROFILES);
  const bare = rate(() => bareScan(block));
  report({ name: 'bare scan for maximum and fall-off', value: bare.perSecond, unit: 'profiles/s' });
  for (const name of ['whiteman-1997', 'whiteman-1997-layer', 'andreas-2000', 'baas-2009'] as const) {
    const ours = rate(() => scanNoses(block, CRITERIA[name]).category.reduce((sum, one) => sum + Number(one >= 0), 0));
    report({
      name: `noses by ${name}`,
      value: ours.perSecond,
      unit: 'profiles/s',
      note: `${ours.result} with a jet; ${(ours.perSecond / bare.perSecond).toFixed(2)} of the bare scan`,
    });
  }
  const theirs = numpy(block);
  report({ name: 'the four categories in NumPy', value: theirs.perSecond, unit: 'profiles/s', note: theirs.note });

  const night = findings(block, 145);
  const one = rate(() => findings(block, 145).length, 5);
  report({ name: 'one finding with confidence', value: Math.round(1e6 / (145 * one.runsPerSecond)), unit: 'us' });
  const tracks = rate(() => trackJets(night).length, 20);
  report({ name: 'tracks of a night of 145 profiles', value: round(1000 / tracks.runsPerSecond), unit: 'ms' });
  return Promise.resolve();
}

/** Jets that come and go on gates 25 m apart, with noise. */
function profiles(count: number): ProfileBlock {
  const builder = new BlockBuilder();
  const station = unplacedStation('bench');
  const heightAgl = Float64Array.from({ length: GATES }, (_, k) => 25 + 24.7 * k);
  let state = 1;
  const uniform = (): number => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 4294967296;
  };
  for (let index = 0; index < count; index++) {
    const peak = 8 + 14 * uniform();
    const height = 150 + 500 * uniform();
    const width = 150 + 300 * uniform();
    const speed = heightAgl.map((z) =>
      Math.max(0, 5 + (peak - 5) * Math.exp(-(((z - height) / width) ** 2)) + 0.4 * (uniform() + uniform() - 1)),
    );
    const direction = heightAgl.map((z) => 200 + z / 100);
    builder.add({ station, source: 'bench', timeMs: 600_000 * index, levels: { heightAgl, speed, direction } });
  }
  return builder.finish();
}

function findings(block: ProfileBlock, count: number): TimedFinding[] {
  return Array.from({ length: count }, (_, index) => ({
    stationId: 'bench',
    timeMs: block.timeMs[index]!,
    finding: findJets(profileAt(block, index), CRITERIA.duskveer),
  }));
}

function bareScan({ speed, offsets, profileCount }: ProfileBlock): number {
  let sum = 0;
  for (let index = 0; index < profileCount; index++) {
    const end = offsets[index + 1]!;
    let nose = offsets[index]!;
    for (let k = nose + 1; k < end; k++) if (speed[k]! > speed[nose]!) nose = k;
    let least = speed[nose]!;
    for (let k = nose + 1; k < end; k++) if (speed[k]! < least) least = speed[k]!;
    sum += speed[nose]! - least;
  }
  return sum;
}

/** The quickest of several runs after two to warm up, by the processor time used: other work on the machine counts little. */
function rate<R>(run: () => R, runs = 9): { result: R; runsPerSecond: number; perSecond: number } {
  run();
  let result = run();
  const ms = Array.from({ length: runs }, () => {
    const began = process.cpuUsage();
    result = run();
    const used = process.cpuUsage(began);
    return (used.user + used.system) / 1000;
  });
  const quickest = Math.min(...ms);
  return { result, runsPerSecond: 1000 / quickest, perSecond: Math.round((1000 * PROFILES) / quickest) };
}

function numpy(block: ProfileBlock): { perSecond: number; note: string } {
  if (!existsSync(SCRIPT)) return { perSecond: NaN, note: 'run from the checkout' };
  const folder = mkdtempSync(join(tmpdir(), 'duskveer-'));
  try {
    const file = join(folder, 'speed.f32');
    writeFileSync(file, block.speed);
    const { status, stdout } = spawnSync('python3', [SCRIPT, file, String(GATES)], { encoding: 'utf8' });
    if (status !== 0) return { perSecond: NaN, note: 'no python3 with numpy here' };
    const [perSecond, found] = stdout.trim().split(' ').map(Number);
    return { perSecond: Math.round(perSecond!), note: `${found} with a jet` };
  } finally {
    rmSync(folder, { recursive: true });
  }
}

const round = (value: number): number => Math.round(100 * value) / 100;
