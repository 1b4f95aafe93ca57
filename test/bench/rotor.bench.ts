// A fleet of twelve turbine types on profiles of 120 gates: the numbers of every disc, one core.

import { farmRecord, reckonRecord } from '../../src/desk/farm-record.ts';
import { BlockBuilder, gatherWindAt, windColumn, type ProfileBlock, type WindColumn } from '../../src/profile/index.ts';
import { FleetScan } from '../../src/rotor/index.ts';
import { PLAIN_SITE } from '../../src/site/index.ts';
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
  report({
    ...pageYear(),
    name: 'rotor: the page’s whole record, a year, 120 gates, four types with curves',
    unit: 's',
  });
  return Promise.resolve();
}

/** What the page waits for when it shows a year: power, bands and sums of profiles that are screened already. */
function pageYear(): { value: number; note: string } {
  const turbines = TYPES.slice(0, 4).map((type, k) => ({
    ...type,
    name: `type ${k}`,
    count: 10,
    powerCurve: { speed: [3, 12, 25], powerKw: [0, 3000, 3000], airDensity: 1.225 },
    cutIn: 3,
    rated: 12,
    cutOut: 25,
    restart: 22,
    groundElevation: NaN,
  }));
  const site = { ...PLAIN_SITE, turbines };
  const block = yearBlock();
  let sums = 0;
  const ms = processorMs(() => {
    sums = farmRecord(reckonRecord(block, site), Infinity, site, null).sums.length;
  }, 3);
  return { value: Number((ms / 1000).toFixed(3)), note: `processor time; ${sums} months` };
}

const YEAR = 52_560;

function yearBlock(): ProfileBlock {
  const count = YEAR;
  const levels = count * GATES;
  return {
    ...new BlockBuilder().finish(),
    profileCount: count,
    timeMs: Float64Array.from({ length: count }, (_, k) => Date.UTC(2024, 0, 1) + k * 600_000),
    offsets: Uint32Array.from({ length: count + 1 }, (_, k) => k * GATES),
    heightAgl: Float32Array.from({ length: levels }, (_, k) => 10 + 25 * (k % GATES)),
    speed: Float32Array.from({ length: levels }, (_, k) => 8 + 6 * Math.sin(0.01 * k)),
    direction: Float32Array.from({ length: levels }, (_, k) => k % 360),
    mark: new Uint32Array(levels),
  };
}

/** 52,560 profiles out of a block, gathered and scanned. */
function year(): { value: number; note: string } {
  const count = YEAR;
  const block = yearBlock();
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
