// The screens at the sizes that stations send: a day of minutes, a night of ten minutes, a network's year of soundings.

import { BlockBuilder, REJECTING, type Instrument, type ProfileBlock } from '../../src/profile/index.ts';
import { screen, SCREENS } from '../../src/quality/index.ts';
import { randomFrom } from '../support/random.ts';
import { processorMs } from './processor-time.ts';

type Report = (figure: { name: string; value: number; unit: string; note?: string }) => void;

interface Record {
  readonly instrument: Instrument;
  readonly profiles: number;
  readonly stepS: number;
  readonly levels: number;
  /** m */
  readonly spacing: number;
}

/** A jet that grows and turns, 0.7 m/s of noise, and a gate in fifty that is wrong. */
function made({ instrument, profiles, stepS, levels, spacing }: Record): ProfileBlock {
  const random = randomFrom(3);
  const gauss = (): number => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
  const heightAgl = Array.from({ length: levels }, (_, k) => 40 + spacing * k);
  const builder = new BlockBuilder();
  for (let i = 0; i < profiles; i++) {
    const turn = (Math.PI * i) / profiles;
    const speed = heightAgl.map((z) => 4 + 12 * Math.sin(turn) * Math.exp(-(((z - 400) / 350) ** 2)));
    const wrong = heightAgl.map(() => (random() < 0.02 ? 15 : 0));
    builder.add({
      station: { id: 'made', name: 'Made', latitude: 47, longitude: 3, elevation: 120 },
      source: 'made',
      instrument,
      timeMs: Date.UTC(2024, 3, 20, 18) + 1000 * stepS * i,
      periodS: stepS,
      levels: {
        heightAgl,
        u: speed.map((each, k) => each * Math.cos(turn) + 0.7 * gauss() + wrong[k]!),
        v: speed.map((each) => each * Math.sin(turn) + 0.7 * gauss()),
        verticalSpeed: heightAgl.map(() => 0.2 * gauss()),
        signal: heightAgl.map((z) => 20 - z / 300 + gauss()),
      },
    });
  }
  return builder.finish();
}

const RECORDS: readonly [string, Record][] = [
  ['a day of 1 minute by 200 levels', { instrument: 'lidar', profiles: 1440, stepS: 60, levels: 200, spacing: 15 }],
  [
    'a night of 10 minutes by 120 levels',
    { instrument: 'wind-profiler', profiles: 84, stepS: 600, levels: 120, spacing: 60 },
  ],
  [
    'a year of soundings of 150 levels',
    { instrument: 'radiosonde', profiles: 730, stepS: 43_200, levels: 150, spacing: 150 },
  ],
];

export default function bench(report: Report): Promise<void> {
  for (const [name, record] of RECORDS) {
    const block = made(record);
    const rejected = screen(block).block.mark.filter((bits) => (bits & REJECTING) !== 0).length;
    report({
      name: `quality: ${name}`,
      value: Math.round(processorMs(() => screen(block)) * 10) / 10,
      unit: 'ms',
      note: `all screens, processor time; ${((100 * rejected) / block.mark.length).toFixed(1)} % rejected of 2 % wrong`,
    });
    const costs = SCREENS.map((one) => {
      const without = SCREENS.map((other) => other.name).filter((other) => other !== one.name);
      return { name: one.name, ms: processorMs(() => screen(block, { without })) };
    });
    const dearest = costs.reduce((most, cost) => (cost.ms > most.ms ? cost : most));
    report({
      name: `quality: ${name}, dearest screen alone`,
      value: Math.round(dearest.ms * 10) / 10,
      unit: 'ms',
      note: dearest.name,
    });
  }
  return Promise.resolve();
}
