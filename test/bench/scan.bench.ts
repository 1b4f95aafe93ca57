// The archive: the compute part beside a bare sum of the same arrays, one core; then the whole command over files by month,
// with its time and its memory. A year unless SCAN_YEARS says otherwise; ten years are what the house promises for.

import { spawn, spawnSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { judge, type ArchiveQuestion } from '../../src/desk/index.ts';
import { writeNetcdf } from '../../src/ingest/index.ts';
import { CRITERIA } from '../../src/jet/index.ts';
import { blockOfColumns, INSTRUMENTS, type ProfileBlock } from '../../src/profile/index.ts';
import { PLAIN_SITE } from '../../src/site/index.ts';
import { processorMs } from './processor-time.ts';

interface Figure {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly note?: string;
}

const GATES = 120;
const STEP_MS = 600_000;
const YEARS = Number(process.env['SCAN_YEARS'] ?? 1);
const FIRST_YEAR = 2014;

const QUESTION: ArchiveQuestion = {
  site: PLAIN_SITE,
  criteria: CRITERIA['whiteman-1997'],
  discs: [{ name: 'disc', hubHeight: 110, rotorDiameter: 130, groundElevation: NaN }],
  source: 'bench',
};

export default async function bench(report: (figure: Figure) => void): Promise<void> {
  const block = month(FIRST_YEAR, 0);
  const sum = processorMs(() => sumOf(block), 15);
  const compute = processorMs(() => judge(block, QUESTION), 15);
  const rate = (ms: number): number => Math.round((1000 * block.profileCount) / ms);
  report({ name: 'sum of heights, speeds, directions and marks', value: rate(sum), unit: 'profiles/s' });
  report({
    name: 'nose, four categories and rotor of the same',
    value: rate(compute),
    unit: 'profiles/s',
    note: `${(sum / compute).toFixed(2)} of the bare sum`,
  });

  const folder = mkdtempSync(join(tmpdir(), 'duskveer-bench-'));
  try {
    const files = join(folder, 'files');
    mkdirSync(files);
    let profiles = 0;
    for (let index = 0; index < 12 * YEARS; index++) {
      const one = month(FIRST_YEAR + Math.floor(index / 12), index % 12);
      profiles += one.profileCount;
      writeFileSync(join(files, `gates-${String(index).padStart(3, '0')}.nc`), writeNetcdf([one]));
    }
    // Builds the command line where it is not built yet.
    spawnSync(process.execPath, ['src/relay/duskveer.mjs', '--help'], { stdio: 'ignore' });
    for (const criteria of ['whiteman-1997', 'duskveer']) {
      const out = join(folder, criteria);
      const ran = await scan([files, '--out', out, '--hub', '110', '--diameter', '130', '--criteria', criteria]);
      const note = `${profiles} profiles of ${GATES} gates in ${12 * YEARS} files, by ${criteria}, two threads`;
      report({ name: `scan end to end, ${criteria}`, value: ran.seconds, unit: 's', note });
      report({ name: `memory of it, ${criteria}`, value: ran.megabytes, unit: 'MB', note: 'greatest resident size' });
      report({ name: `processor time of it, ${criteria}`, value: ran.processorSeconds, unit: 's' });
    }
  } finally {
    rmSync(folder, { recursive: true });
  }
}

/** A month of ten-minute profiles on gates 25 m apart: a jet in most nights, with noise. */
function month(year: number, number: number): ProfileBlock {
  const startMs = Date.UTC(year, number, 1);
  const count = (Date.UTC(year, number + 1, 1) - startMs) / STEP_MS;
  const levels = count * GATES;
  const [heightAgl, speed, direction] = [0, 0, 0].map(() => new Float32Array(levels)) as [
    Float32Array<ArrayBuffer>,
    Float32Array<ArrayBuffer>,
    Float32Array<ArrayBuffer>,
  ];
  let state = year * 12 + number;
  const uniform = (): number => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 4294967296;
  };
  let strength = 0;
  for (let index = 0; index < count; index++) {
    if (index % 144 === 0) strength = 14 * uniform();
    const night = Math.max(0, Math.sin((2 * Math.PI * index) / 144));
    const nose = 200 + 300 * night;
    for (let k = 0; k < GATES; k++) {
      const z = 30 + 25 * k;
      const at = index * GATES + k;
      heightAgl[at] = z;
      speed[at] = Math.max(0, 6 + z / 900 + strength * night * Math.exp(-(((z - nose) / 260) ** 2)) + uniform() - 0.5);
      direction[at] = (200 + z / 60 + 6 * uniform()) % 360;
    }
  }
  return blockOfColumns({
    stations: [{ id: 'gates', name: 'Gates', latitude: 41, longitude: -99, elevation: 500 }],
    sources: ['bench'],
    profileCount: count,
    offsets: Uint32Array.from({ length: count + 1 }, (_, index) => index * GATES),
    stationIndex: new Uint16Array(count),
    sourceIndex: new Uint16Array(count),
    instrumentIndex: new Uint8Array(count).fill(INSTRUMENTS.indexOf('lidar')),
    timeMs: Float64Array.from({ length: count }, (_, index) => startMs + (index + 1) * STEP_MS),
    periodS: new Float32Array(count).fill(STEP_MS / 1000),
    notes: {},
    heightAgl,
    speed,
    direction,
  });
}

function sumOf({ heightAgl, speed, direction, mark }: ProfileBlock): number {
  let sum = 0;
  for (let k = 0; k < heightAgl.length; k++) sum += heightAgl[k]!;
  for (let k = 0; k < speed.length; k++) sum += speed[k]!;
  for (let k = 0; k < direction.length; k++) sum += direction[k]!;
  for (let k = 0; k < mark.length; k++) sum += mark[k]!;
  return sum;
}

/** Runs the command as a user does. Memory as the system keeps it for a process; where it keeps none, NaN. */
async function scan(
  args: readonly string[],
): Promise<{ seconds: number; megabytes: number; processorSeconds: number }> {
  const beganMs = performance.now();
  const child = spawn(process.execPath, ['src/relay/duskveer.mjs', 'scan', ...args, '--workers', '2'], {
    stdio: 'ignore',
  });
  let kilobytes = NaN;
  let ticks = NaN;
  const watch = setInterval(() => {
    try {
      const held = /VmHWM:\s+(\d+)/.exec(readFileSync(`/proc/${child.pid!}/status`, 'utf8'));
      if (held !== null) kilobytes = Number(held[1]);
      const fields = readFileSync(`/proc/${child.pid!}/stat`, 'utf8')
        .replace(/^.*\) /, '')
        .split(' ');
      ticks = Number(fields[11]) + Number(fields[12]);
    } catch {
      // The process has ended, or this system tells nothing of processes.
    }
  }, 50);
  const code = await new Promise((resolve) => child.on('close', resolve));
  clearInterval(watch);
  if (code !== 0) throw new Error(`scan ended with ${String(code)}`);
  return {
    seconds: Math.round((performance.now() - beganMs) / 100) / 10,
    megabytes: Math.round(kilobytes / 1024),
    processorSeconds: ticks / 100,
  };
}
