// Moisture numbers of one sounding of 5,000 levels, all of them.

import { moistureOf } from '../../src/moisture/index.ts';
import { BlockBuilder, profileAt, unplacedStation } from '../../src/profile/index.ts';
import { processorMs } from './processor-time.ts';

interface Figure {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly note?: string;
}

const LEVELS = 5_000;

export default function bench(report: (figure: Figure) => void): Promise<void> {
  const heightAgl = Array.from({ length: LEVELS }, (_, k) => 4 * k);
  const builder = new BlockBuilder();
  builder.add({
    station: unplacedStation('bench'),
    source: 'bench',
    timeMs: 0,
    levels: {
      heightAgl,
      speed: heightAgl.map((z) => 8 + 10 * Math.exp(-(((z - 500) / 300) ** 2))),
      direction: heightAgl.map((z) => 180 + z / 100),
      pressure: heightAgl.map((z) => 100_000 * Math.exp(-z / 8000)),
      temperature: heightAgl.map((z) => Math.max(215, 298 - 0.0065 * z)),
      specificHumidity: heightAgl.map((z) => 0.014 * Math.exp(-z / 2500)),
    },
  });
  const profile = profileAt(builder.finish(), 0);
  const options = { jetLayer: { bottom: 200, top: 900 } };
  const runs = 20;
  const ms = processorMs(() => {
    for (let k = 0; k < runs; k++) moistureOf(profile, options);
  });
  report({
    name: 'moisture: all numbers of a sounding of 5,000 levels',
    value: Number((ms / runs).toFixed(2)),
    unit: 'ms',
    note: 'processor time',
  });
  return Promise.resolve();
}
