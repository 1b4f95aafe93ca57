// How fast a year of ten-minute profiles with 120 gates becomes a picture of 1600 x 600 pixels, and what it holds in
// memory. Processor time, since the machine may be shared.

import {
  buildSectionGrid,
  colourScale,
  FIELDS,
  SectionPainter,
  type FieldName,
  type SectionView,
} from '../../src/plot/index.ts';
import { BlockBuilder, unplacedStation, type ProfileBlock } from '../../src/profile/index.ts';

interface Figure {
  name: string;
  value: number;
  unit: string;
  note?: string;
}

const PROFILES = 52_560;
const GATES = 120;
const TEN_MINUTES_MS = 600_000;
const YEAR_MS = PROFILES * TEN_MINUTES_MS;
const FIRST_PAINTS = 7;
const FRAMES = 60;

export default async function bench(report: (figure: Figure) => void): Promise<void> {
  const block = year();
  for (const field of ['speed', 'direction', 'shear'] as const) await measure(block, field, report);
}

async function measure(block: ProfileBlock, field: FieldName, report: (figure: Figure) => void): Promise<void> {
  const paint = { scale: colourScale(FIELDS[field].scale, 'dark'), range: FIELDS[field].range };
  const whole = view(1, 0);
  let grid = buildSectionGrid([block], { field });
  let painter = new SectionPainter(grid);
  const out = painter.paint(whole, paint);

  const grids: number[] = [];
  const painters: number[] = [];
  const firsts: number[] = [];
  for (let k = 0; k < FIRST_PAINTS; k++) {
    grids.push(spent(() => (grid = buildSectionGrid([block], { field }))));
    painters.push(spent(() => (painter = new SectionPainter(grid))));
    firsts.push(grids[k]! + painters[k]! + spent(() => painter.paint(whole, paint, out)));
  }
  report({ name: `${field}, year: grid`, value: median(grids), unit: 'ms', note: quickest(grids) });
  report({ name: `${field}, year: pyramid`, value: median(painters), unit: 'ms', note: quickest(painters) });
  const note = `from block to pixels; ${quickest(firsts)}`;
  report({ name: `${field}, year: first paint`, value: median(firsts), unit: 'ms', note });

  for (const share of [1, 0.5, 1 / 12, 1 / 52, 1 / 365]) {
    const frames = Array.from({ length: FRAMES }, (_, k) => {
      const from = (k / FRAMES) * (1 - share);
      return spent(() => painter.paint(view(share, from), paint, out));
    });
    const days = Math.round(share * 365);
    const slow = [...frames].sort((a, b) => a - b)[Math.floor(0.95 * FRAMES)]!;
    const frameNote = `95 in 100 below ${slow.toFixed(1)}; ${quickest(frames)}`;
    report({ name: `${field}: repaint, ${days} days`, value: median(frames), unit: 'ms', note: frameNote });
  }

  const before = await memory();
  const held = new SectionPainter(buildSectionGrid([block], { field }));
  const after = await memory();
  const pixels = held.paint(view(1, 0), paint).length;
  const memoryNote = `grid and pyramid, beside ${Math.round(pixels / 2 ** 20)} MiB of pixels`;
  report({ name: `${field}, year: held`, value: (after - before) / 2 ** 20, unit: 'MiB', note: memoryNote });
}

function view(share: number, from: number): SectionView {
  const startMs = from * YEAR_MS;
  return { startMs, endMs: startMs + share * YEAR_MS, bottom: 0, top: 3000, width: 1600, height: 600 };
}

/** Processor time, ms. */
function spent(work: () => unknown): number {
  const began = process.cpuUsage();
  work();
  const { user, system } = process.cpuUsage(began);
  return (user + system) / 1000;
}

function median(values: readonly number[]): number {
  return [...values].sort((a, b) => a - b)[values.length >> 1]!;
}

function quickest(values: readonly number[]): string {
  return `quickest ${Math.min(...values).toFixed(1)}`;
}

/** Bytes in use once garbage is gone; freed buffers are given back a moment after the collection. */
async function memory(): Promise<number> {
  for (let k = 0; k < 3; k++) {
    globalThis.gc?.();
    await new Promise((resolve) => setTimeout(resolve, 60));
  }
  const { heapUsed, arrayBuffers } = process.memoryUsage();
  return heapUsed + arrayBuffers;
}

/** Smooth winds with a nightly jet, one gate in thirty missing. */
function year(): ProfileBlock {
  const builder = new BlockBuilder();
  const station = unplacedStation('bench');
  const heightAgl = Float32Array.from({ length: GATES }, (_, k) => 25 * (k + 1));
  for (let p = 0; p < PROFILES; p++) {
    const speed = heightAgl.map((height, k) => {
      if ((p * 31 + k * 17) % 30 === 0) return NaN;
      const jet = Math.sin((2 * Math.PI * p) / 144) * Math.exp(-(((height - 400) / 250) ** 2));
      return 8 + height / 500 + 8 * Math.max(0, jet) + Math.sin(p * 0.7 + k);
    });
    const direction = heightAgl.map((height) => (200 + p / 40 + height / 60) % 360);
    const levels = { heightAgl, speed, direction };
    builder.add({ station, source: 'bench', timeMs: (p + 1) * TEN_MINUTES_MS, periodS: 600, levels });
  }
  return builder.finish();
}
