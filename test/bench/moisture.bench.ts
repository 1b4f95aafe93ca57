// Moisture numbers of one sounding of 5,000 levels, of a year of soundings, and of a whole moist night with its triangle.

import { Desk } from '../../src/desk/index.ts';
import { moistureOf } from '../../src/moisture/index.ts';
import { BlockBuilder, profileAt, profilesOf, unplacedStation, type ProfileBlock } from '../../src/profile/index.ts';
import { PLAIN_SITE } from '../../src/site/index.ts';
import { processorMs } from './processor-time.ts';

interface Figure {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly note?: string;
}

const LEVELS = 5_000;
const HOUR_MS = 3_600_000;

export default function bench(report: (figure: Figure) => void): Promise<void> {
  const profile = profileAt(soundings(1, LEVELS, 4), 0);
  const options = { jetLayer: { bottom: 200, top: 900 } };
  const runs = 20;
  const tell = (name: string, ms: number, decimals: number): void =>
    report({ name: `moisture: ${name}`, value: Number(ms.toFixed(decimals)), unit: 'ms', note: 'processor time' });
  const one = processorMs(() => {
    for (let k = 0; k < runs; k++) moistureOf(profile, options);
  });
  tell('all numbers of a sounding of 5,000 levels', one / runs, 2);

  const year = soundings(730, 120, 100);
  tell(
    'all numbers of a year of 12-hourly soundings of 120 levels',
    processorMs(() => {
      for (const each of profilesOf(year)) moistureOf(each, options);
    }),
    0,
  );

  const desk = moistDesk();
  desk.moisture(15 * HOUR_MS, { feed: 'A/wind-profiler' });
  const night = processorMs(() => desk.moisture(14.9 * HOUR_MS, { feed: 'A/wind-profiler' }));
  tell('a night of 90 profiles with lent humidity, arrivals and a triangle', night, 0);
  return Promise.resolve();
}

function soundings(count: number, levels: number, step: number): ProfileBlock {
  const heightAgl = Array.from({ length: levels }, (_, k) => step * k);
  const builder = new BlockBuilder();
  for (let k = 0; k < count; k++) {
    builder.add({
      station: unplacedStation('bench'),
      source: 'bench',
      timeMs: 12 * HOUR_MS * k,
      levels: {
        heightAgl,
        speed: heightAgl.map((z) => 8 + 10 * Math.exp(-(((z - 500) / 300) ** 2))),
        direction: heightAgl.map((z) => 180 + z / 100),
        pressure: heightAgl.map((z) => 100_000 * Math.exp(-z / 8000)),
        temperature: heightAgl.map((z) => Math.max(215, 298 - 0.0065 * z)),
        specificHumidity: heightAgl.map((z) => 0.014 * Math.exp(-z / 2500)),
      },
    });
  }
  return builder.finish();
}

/** Three profilers, two of them with humidity, every ten minutes for fifteen hours. */
function moistDesk(): Desk {
  const desk = new Desk({
    ...PLAIN_SITE,
    neighbours: [['A', 'B', 'C']],
    upstream: [{ station: 'A', from: ['B', 'C'] }],
  });
  const heightAgl = Array.from({ length: 54 }, (_, k) => 100 + 60 * k);
  for (const [id, latitude, longitude] of [
    ['A', 39.6, 0],
    ['B', 38.4, -0.4],
    ['C', 38.6, 0.9],
  ] as const) {
    const builder = new BlockBuilder();
    for (let k = 0; k <= 90; k++) {
      builder.add({
        station: { id, name: id, latitude, longitude, elevation: 300 },
        source: id,
        instrument: 'wind-profiler',
        timeMs: 600_000 * k,
        levels: {
          heightAgl,
          speed: heightAgl.map((z) => 8 + 10 * Math.exp(-(((z - 600) / 400) ** 2))),
          direction: heightAgl.map(() => 185),
          ...(id === 'A'
            ? {}
            : {
                pressure: heightAgl.map((z) => 97_000 * Math.exp(-z / 8400)),
                temperature: heightAgl.map((z) => 298 - 0.0065 * z),
                specificHumidity: heightAgl.map((z) => (k < 40 ? 0.012 : 0.014) * Math.exp(-z / 2500)),
              }),
        },
      });
    }
    desk.accept(builder.finish());
  }
  return desk;
}
