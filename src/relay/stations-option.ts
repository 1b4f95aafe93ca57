// The list of stations named on the command line.

import { stat } from 'node:fs/promises';
import { DuskveerError } from '../air/index.ts';
import { readStationList, type StationList } from '../ingest/index.ts';
import { UsageError } from './command.ts';
import { fileSource, pathProblem } from './inputs.ts';
import { problemInWords } from './reporter.ts';

export const STATIONS_OPTION = { stations: { type: 'string' } } as const;

/** For the help of every command that reads profiles. */
export const STATIONS_HELP = `  --stations FILE    places of stations that files name and do not place, such as bulletins: a table with the headings
                     identifier,name,latitude,longitude,elevation, or the station list of the IGRA archive`;

/**
 * The stations of a file, none where no file is named; rows that cannot be used come as problems.
 * @throws UsageError when the file cannot be opened or is no list of stations
 */
export async function stationsOf(path: string | undefined): Promise<StationList> {
  if (path === undefined) return { stations: [], problems: [] };
  try {
    return await readStationList(fileSource(path, path, (await stat(path)).size));
  } catch (error) {
    const problem = error instanceof DuskveerError ? error.problem : pathProblem(path, error as NodeJS.ErrnoException);
    throw new UsageError(problemInWords(problem), { cause: error });
  }
}
