// A fleet of twelve turbine types on profiles of 120 gates: the numbers of every disc, one core.

import { windColumn, type WindColumn } from '../../src/profile/index.ts';
import { FleetScan } from '../../src/rotor/index.ts';

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
  return Promise.resolve();
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
  let check = 0;
  const run = (count: number): number => {
    const began = performance.now();
    for (let k = 0; k < count; k++) check += scan.scan(profiles[k % profiles.length]!).equivalentSpeed[5]!;
    return performance.now() - began;
  };
  run(5_000);
  const ms = [run(20_000), run(20_000), run(20_000)].sort((a, b) => a - b)[1]!;
  return { value: Math.round(20_000_000 / ms), note: `median of 3 runs of 20,000; sum ${check.toFixed(1)}` };
}
