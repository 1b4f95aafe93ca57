// The simulated nights beside this checkout as blocks, with the true wind of each level.

import { gunzipSync } from 'node:zlib';
import { BlockBuilder, type ProfileBlock } from '../../src/profile/index.ts';
import { readShared, readSharedJson } from '../support/shared.ts';

export interface Night {
  readonly block: ProfileBlock;
  /** Length of the difference of reported and true wind of each level, m/s; NaN where nothing is reported. */
  readonly error: Float64Array;
  readonly instrument: 'lidar' | 'wind-profiler';
}

interface Row {
  time: string;
  height: number;
  speed: number;
  direction: number;
  temperature: number;
}

function rowsOf(path: string): Row[] {
  const lines = gunzipSync(readShared(path)).toString('utf8').trim().split('\n');
  const names = lines[0]!.split(',');
  const number = (text: string | undefined): number => (text === undefined || text === '' ? NaN : Number(text));
  return lines.slice(1).map((line) => {
    const cells = line.split(',');
    const cell = (name: string): string | undefined => cells[names.indexOf(name)];
    return {
      time: cell('time')!,
      height: number(cell('height')),
      speed: number(cell('speed')),
      direction: number(cell('direction')),
      temperature: number(cell('temperature')),
    };
  });
}

const vector = ({ speed, direction }: Row): [number, number] => [
  -speed * Math.sin((direction * Math.PI) / 180),
  -speed * Math.cos((direction * Math.PI) / 180),
];

export function readNight(number: string): Night {
  const about = readSharedJson(`nights/night-${number}.json`) as {
    latitude_deg: number;
    longitude_deg: number;
    instrument: string;
  };
  const instrument = about.instrument === 'lidar' ? 'lidar' : 'wind-profiler';
  const truth = new Map(rowsOf(`nights/truth/night-${number}.csv.gz`).map((row) => [`${row.time} ${row.height}`, row]));
  const byTime = new Map<string, Row[]>();
  for (const row of rowsOf(`nights/night-${number}.csv.gz`)) {
    byTime.set(row.time, [...(byTime.get(row.time) ?? []), row]);
  }
  const builder = new BlockBuilder();
  const error: number[] = [];
  const station = {
    id: `sim-${number}`,
    name: `sim-${number}`,
    latitude: about.latitude_deg,
    longitude: about.longitude_deg,
    elevation: 0,
  };
  for (const [time, rows] of byTime) {
    rows.sort((a, b) => a.height - b.height);
    builder.add({
      station,
      source: 'nights',
      instrument,
      timeMs: Date.parse(time),
      periodS: 600,
      levels: {
        heightAgl: rows.map((row) => row.height),
        speed: rows.map((row) => row.speed),
        direction: rows.map((row) => row.direction),
      },
    });
    for (const row of rows) {
      const [u, v] = vector(row);
      const [trueU, trueV] = vector(truth.get(`${time} ${row.height}`)!);
      error.push(Math.hypot(u - trueU, v - trueV));
    }
  }
  return { block: builder.finish(), error: Float64Array.from(error), instrument };
}
