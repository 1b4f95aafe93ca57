// Ten million spoiled bytes through every reader.

import { writeCoverageJson, writeCsv, writeNetcdf } from '../../src/ingest/index.ts';
import { BlockBuilder, type ProfileBlock } from '../../src/profile/index.ts';
import { buildHdf5 } from '../ingest/netcdf/build-hdf5.ts';
import { joined } from '../support/bufr-writer.ts';
import { madeBulletin } from '../support/made-bulletin.ts';
import { igraText, type IgraLevel } from '../support/make-igra.ts';
import { madeScan } from '../support/made-scan.ts';
import { profilerReport } from '../support/profiler-report.ts';
import { bytesOf } from '../support/sources.ts';
import { spoil, type Figure } from './spoil.ts';

export default async function bench(report: (figure: Figure) => void): Promise<void> {
  // The HDF5 library speaks of its troubles on its own.
  console.error = (): void => undefined;
  const block = made();
  await spoil('netcdf-classic', writeNetcdf([block]), report);
  await spoil('netcdf-classic', madeScan(3), (figure) =>
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

const bulletins = (): string => Array.from({ length: 12 }, (_, k) => madeBulletin(10_900 + k, k % 2 === 0)).join('');

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
