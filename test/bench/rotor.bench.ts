// A fleet of twelve turbine types on profiles of 120 gates: the numbers of every disc, one core.

import { BlockBuilder, gatherWindAt, windColumn, type ProfileBlock, type WindColumn } from '../../src/profile/index.ts';
import { FleetScan } from '../../src/rotor/index.ts';
import { processorMs } from './processor-time.ts';

interface Figure {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly note?: string;
}

const GATES = 120;
const TYPES = Array.from({ length: 12 }, (_, k) => ({ hubHeight: 80 + 7 * k, rotorDiameter: 90 + 12 * k }));

export default function bench(report: (figure: Figure) => void): Promise<void> {
  const profiles = Array.from({ length: 64 }, (_, index) => profile(index, 25));
  report({ ...rate(profiles), name: 'rotor: 12 types, 120 gates, same heights', unit: 'profiles/s' });
  const irregular = Array.from({ length: 64 }, (_, index) => profile(index, 25 + index / 64));
  report({ ...rate(irregular), name: 'rotor: 12 types, 120 gates, heights new each time', unit: 'profiles/s' });
  report({ ...year(), name: 'rotor: a year of 10-min profiles, 120 gates, four types', unit: 's' });
  return Promise.resolve();
}

/** 52,560 profiles out of a block, gathered and scanned, as a page of a year asks for it. */
function year(): { value: number; note: string } {
  const count = 52_560;
  const levels = count * GATES;
  const block: ProfileBlock = {
    ...new BlockBuilder().finish(),
    profileCount: count,
    offsets: Uint32Array.from({ length: count + 1 }, (_, k) => k * GATES),
    heightAgl: Float32Array.from({ length: levels }, (_, k) => 10 + 25 * (k % GATES)),
    speed: Float32Array.from({ length: levels }, (_, k) => 8 + 6 * Math.sin(0.01 * k)),
    direction: Float32Array.from({ length: levels }, (_, k) => k % 360),
    mark: new Uint32Array(levels),
  };
  const scan = new FleetScan(TYPES.slice(0, 4));
  const column = windColumn(GATES);
  let check = 0;
  const ms = processorMs(() => {
    check = 0;
    for (let k = 0; k < count; k++) check += scan.scan(gatherWindAt(block, k, column)).equivalentSpeed[3]!;
  }, 3);
  return { value: Number((ms / 1000).toFixed(3)), note: `processor time; sum ${check.toFixed(1)}` };
}

function profile(index: number, spacing: number): WindColumn {
  const column = windColumn(GATES);
  column.count = GATES;
  for (let k = 0; k < GATES; k++) {
    column.heightAgl[k] = 10 + spacing * k;
    column.speed[k] = 8 + 6 * Math.sin(0.05 * k + 0.3 * index);
    column.direction[k] = (200 + k + index) % 360;
    column.speedUncertainty[k] = NaN;
  }
  return column;
}

function rate(profiles: readonly WindColumn[]): { value: number; note: string } {
  const scan = new FleetScan(TYPES);
  const count = 10_000;
  let check = 0;
  const ms = processorMs(() => {
    check = 0;
    for (let k = 0; k < count; k++) check += scan.scan(profiles[k % profiles.length]!).equivalentSpeed[5]!;
  });
  return { value: Math.round((1000 * count) / ms), note: `processor time; sum ${check.toFixed(1)}` };
}
