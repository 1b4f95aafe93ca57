// How fast a year of ten-minute profiles with 120 gates becomes a picture, and what it holds in memory.

import { buildSectionGrid, colourScale, FIELDS, SectionPainter, type FieldName } from '../../src/plot/index.ts';
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

export default function bench(report: (figure: Figure) => void): void {
  const block = year();
  for (const field of ['speed', 'direction'] as const) measure(block, field, report);
}

function measure(block: ProfileBlock, field: FieldName, report: (figure: Figure) => void): void {
  const paint = { scale: colourScale(FIELDS[field].scale, 'dark'), range: FIELDS[field].range };
  const view = (share: number, from: number) => ({
    startMs: from * YEAR_MS,
    endMs: (from + share) * YEAR_MS,
    bottom: 0,
    top: 3000,
    width: 1600,
    height: 600,
  });
  const before = memory();
  const begin = performance.now();
  const grid = buildSectionGrid([block], { field });
  const gridMs = performance.now() - begin;
  const painter = new SectionPainter(grid);
  const pyramidMs = performance.now() - begin - gridMs;
  const out = painter.paint(view(1, 0), paint);
  const firstMs = performance.now() - begin;
  report({ name: `plot ${field}: year, grid`, value: gridMs, unit: 'ms' });
  report({ name: `plot ${field}: year, pyramid`, value: pyramidMs, unit: 'ms' });
  report({
    name: `plot ${field}: year, first paint`,
    value: firstMs,
    unit: 'ms',
    note: 'from block to pixels, 1600 x 600',
  });
  report({ name: `plot ${field}: year, held`, value: (memory() - before) / 2 ** 20, unit: 'MiB' });

  for (const share of [1, 0.5, 1 / 12, 1 / 52, 1 / 365]) {
    const times: number[] = [];
    for (let frame = 0; frame < 40; frame++) {
      const from = (frame / 40) * (1 - share);
      const start = performance.now();
      painter.paint(view(share, from), paint, out);
      times.push(performance.now() - start);
    }
    times.sort((a, b) => a - b);
    const name = `plot ${field}: repaint of ${Math.round(share * 365)} days`;
    report({ name, value: times[20]!, unit: 'ms', note: `95 in 100 below ${times[37]!.toFixed(1)}` });
  }
}

function memory(): number {
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
    builder.add({
      station,
      source: 'bench',
      timeMs: (p + 1) * TEN_MINUTES_MS,
      periodS: 600,
      levels: { heightAgl, speed, direction },
    });
  }
  return builder.finish();
}
