// A profiler's record as a CF netCDF file.

import { writeNetcdf } from '../../src/ingest/index.ts';
import { BlockBuilder, MARK, type Instrument } from '../../src/profile/index.ts';
import type { Place } from './night.ts';
import type { ProfilerRecord } from './profiler.ts';

export interface ProfilerFile extends Place {
  readonly station: string;
  readonly name: string;
  readonly title: string;
  readonly instrument: Instrument;
  readonly periodS: number;
}

export function profilerFile(record: ProfilerRecord, about: ProfilerFile): Uint8Array {
  const { station: id, name, latitude, longitude, elevation, instrument, periodS } = about;
  const builder = new BlockBuilder();
  const gates = record.gates.length;
  record.timesMs.forEach((timeMs, index) => {
    const part = <T>(values: readonly T[]): T[] => values.slice(gates * index, gates * (index + 1));
    builder.add({
      station: { id, name, latitude, longitude, elevation },
      source: id,
      instrument,
      timeMs,
      periodS,
      levels: {
        heightAgl: record.gates,
        speed: part(record.speed),
        direction: part(record.direction),
        verticalSpeed: part(record.verticalSpeed),
        signal: part(record.signal),
        // Empty where no radiometer stands beside the profiler.
        pressure: part(record.pressure),
        temperature: part(record.temperature),
        specificHumidity: part(record.specificHumidity),
        mark: part(record.doubted).map((doubted) => (doubted ? MARK['source-doubts'] : 0)),
      },
    });
  });
  return writeNetcdf([builder.finish()], {
    title: about.title,
    comment: 'All of it is invented: place, instrument and weather. Made by demo-profiles/generate.ts.',
  });
}
