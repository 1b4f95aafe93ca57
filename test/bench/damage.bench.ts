// Ten million spoiled bytes through every reader.

import { writeCoverageJson, writeCsv, writeNetcdf } from '../../src/ingest/index.ts';
import { BlockBuilder, type ProfileBlock } from '../../src/profile/index.ts';
import { buildClassic } from '../ingest/netcdf/build-classic.ts';
import { buildHdf5 } from '../ingest/netcdf/build-hdf5.ts';
import { joined } from '../support/bufr-writer.ts';
import { encodeTemp, type CodedSounding } from '../support/encode-temp.ts';
import { igraText, type IgraLevel } from '../support/make-igra.ts';
import { profilerReport } from '../support/profiler-report.ts';
import { bytesOf } from '../support/sources.ts';
import { spoil, type Figure } from './spoil.ts';

export default async function bench(report: (figure: Figure) => void): Promise<void> {
  // The HDF5 library speaks of its troubles on its own.
  console.error = (): void => undefined;
  const block = made();
  await spoil('netcdf-classic', writeNetcdf([block]), report);
  await spoil('netcdf-classic', buildClassic(scan()), (figure) =>
    report({ ...figure, name: figure.name.replace('netcdf-classic', 'netcdf-classic, conical scan') }),
  );
  await spoil('netcdf-4', await buildHdf5(), report);
  await spoil('coverage-json', bytesOf(writeCoverageJson([block])), report);
  await spoil('bufr', joined(...Array.from({ length: 20 }, (_, k) => profilerReport(1 + k, 30 * k))), report);
  await spoil('temp-pilot', bytesOf(bulletins()), report);
  await spoil('igra', bytesOf(Array.from({ length: 8 }, (_, k) => igra(k)).join('')), report);
  await spoil('csv', bytesOf([...writeCsv([block])].join('')), report);
}

/** A few ten-minute profiles of growing length. */
function made(): ProfileBlock {
  const builder = new BlockBuilder();
  for (let index = 0; index < 12; index++) {
    const heights = Array.from({ length: 5 + index }, (_, k) => 40 * (k + 1));
    builder.add({
      station: { id: 'made', name: 'Made', latitude: 52, longitude: 9, elevation: 70 },
      source: 'made',
      instrument: 'lidar',
      timeMs: Date.UTC(2024, 0, 1) + 600_000 * index,
      periodS: index < 2 ? 600 : NaN,
      levels: {
        heightAgl: heights,
        speed: heights.map((_, k) => k + index),
        direction: heights.map((_, k) => 200 + k),
        temperature: heights.map((_, k) => 285 - k),
      },
    });
  }
  return builder.finish();
}

/** Three turns of a lidar's beam. */
function scan(): Parameters<typeof buildClassic>[0] {
  const [rays, gates] = [72, 12];
  const along = (value: (ray: number) => number): number[] => Array.from({ length: rays }, (_, ray) => value(ray));
  const variable = (dimensions: string[], data: number[], units: string) => ({
    type: 'f4' as const,
    dimensions,
    data,
    attributes: { units },
  });
  const velocity = Array.from({ length: rays * gates }, (_, k) => {
    const [ray, gate] = [Math.floor(k / gates), k % gates];
    return 0.5 * (5 + gate) * Math.sin((ray * 15 * Math.PI) / 180);
  });
  return {
    dimensions: { time: rays, range: gates },
    attributes: { title: 'Doppler lidar' },
    variables: {
      time: variable(
        ['time'],
        along((ray) => ray),
        'seconds since 2024-06-01',
      ),
      range: variable(
        ['range'],
        Array.from({ length: gates }, (_, k) => 150 + 100 * k),
        'm',
      ),
      azimuth: variable(
        ['time'],
        along((ray) => (15 * ray) % 360),
        'degrees',
      ),
      elevation: variable(
        ['time'],
        along(() => 60),
        'degrees',
      ),
      radial_velocity: variable(['time', 'range'], velocity, 'm/s'),
      snr: variable(
        ['time', 'range'],
        velocity.map(() => 5),
        'dB',
      ),
    },
  };
}

function bulletins(): string {
  const sounding = (k: number): CodedSounding => ({
    station: String(10_900 + k),
    day: 15,
    hour: 12,
    knots: k % 2 === 0,
    surface: {
      pressure: 1000 - k,
      temperature: { degrees: 14, figure: 6 },
      depression: 20,
      wind: { direction: 180, speed: 5 },
    },
    standard: [
      [925, 745, 10],
      [850, 1455, 6],
      [700, 3012, 1],
      [500, 5620, 17],
      [300, 9230, 44],
      [100, 16_320, 57],
      [50, 20_740, 56],
    ].map(([pressure, height, degrees], j) => ({
      pressure: pressure!,
      height: height!,
      temperature: { degrees: degrees!, figure: j < 3 ? 6 : 5 },
      depression: 30,
      wind: { direction: 200 + 5 * j, speed: 10 + 3 * j },
    })),
    significant: [950, 900, 640].map((pressure) => ({
      pressure,
      temperature: { degrees: 8, figure: 2 },
      depression: 56,
    })),
    winds: [980, 890, 610].map((pressure) => ({ pressure, wind: { direction: 230, speed: 17 } })),
    lowestWindPressure: 50,
  });
  return Array.from({ length: 12 }, (_, k) => encodeTemp(sounding(k)).join('')).join('');
}

function igra(index: number): string {
  const levels = Array.from({ length: 40 }, (_, k): IgraLevel => ({
    major: k % 3 === 2 ? 3 : 2,
    minor: k === 0 ? 1 : 0,
    pressure: k % 3 === 2 ? null : Math.round(100_500 * Math.exp(-0.03 * k)),
    height: k % 2 === 0 ? 40 + 240 * k : null,
    temperature: 200 - 6 * k,
    relative: null,
    depression: 20 + k,
    direction: (200 + 2 * k) % 360,
    speed: 50 + 3 * k,
  }));
  return igraText({
    id: 'XXM00010999',
    year: 2000,
    month: 6,
    day: 1 + index,
    hour: 12,
    release: 1130,
    latitude: 50,
    longitude: 8,
    levels,
  });
}
