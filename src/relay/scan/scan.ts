// `scan`: years of files, on several cores, into tables; goes on where it was stopped.

import { availableParallelism } from 'node:os';
import { CRITERIA, CRITERIA_NAMES } from '../../jet/index.ts';
import type { Station } from '../../profile/index.ts';
import type { Site } from '../../site/index.ts';
import { numberOption, parseOptions, UsageError, type Command } from '../command.ts';
import { chosenCriteria } from '../jets.ts';
import { turbinesOf } from '../rotor.ts';
import { SITE_OPTION, siteOf } from '../site-option.ts';
import { STATIONS_HELP, STATIONS_OPTION, stationsOf } from '../stations-option.ts';
import type { ScanQuestion } from './question.ts';
import { runScan } from './run-scan.ts';

const MOST_WORKERS = 256;

export const command: Command = {
  help: `duskveer scan PATH... --out DIR [--site FILE] [--criteria NAME] [--hub M --diameter M] [--workers N]

Reads any number of files, and all files in folders, in any format that read knows, screens them, looks for jets and works
out the wind on the rotors. Writes into DIR, each as CSV and as Parquet:
  profiles        a row a profile: status, strongest jet, rotor-equivalent speed, shear and veer by turbine type
  jets            a row a jet found
  nights          a row a station, instrument and night: how much was seen, when jets began and ended, what rotors met
  problems        what could not be read, and why
  columns.json    unit, meaning and source of every column
DIR/parts keeps what each file came to. A scan that was stopped goes on from there when called again; a file is read anew
only when it, the options or the program have changed. The result is the same whatever the number of workers.

Prints a JSON line with what was found. Exit 3 when some input could not be read; the rest is in the tables.

  --out DIR          where the tables go; made if it is not there
  --site FILE        stations, turbine types and criteria of a site
  --criteria NAME    one of these; without it the site's, which is duskveer unless the site file says otherwise
${CRITERIA_NAMES.map((name) => `                     ${name.padEnd(24)} ${CRITERIA[name].title}`).join('\n')}
  --hub M            hub height above ground and
  --diameter M       rotor diameter of a disc, instead of the site's turbine types
${STATIONS_HELP}
  --workers N        threads; without it one for each core`,
  async run(args) {
    const { values, positionals } = parseOptions(args, {
      ...SITE_OPTION,
      ...STATIONS_OPTION,
      out: { type: 'string' },
      criteria: { type: 'string' },
      hub: { type: 'string' },
      diameter: { type: 'string' },
      workers: { type: 'string', default: String(availableParallelism()) },
    });
    if (values.out === undefined) throw new UsageError('It needs --out with the folder that the tables go to.');
    if (positionals.length === 0) throw new UsageError('It needs at least one file or folder.');
    if (positionals.includes('-')) throw new UsageError('It reads files and folders only: stdin cannot be read again.');
    const workers = numberOption('workers', values.workers, 1, MOST_WORKERS);
    if (!Number.isInteger(workers)) throw new UsageError(`--workers needs a whole number, not "${values.workers}".`);
    const site = await siteOf(values.site);
    const stations = await stationsOf(values.stations);
    const question = questionOf(site, stations.stations, values.criteria, values.hub, values.diameter);
    return runScan(positionals, values.out, question, workers, stations.problems);
  },
};

function questionOf(
  site: Site,
  stationList: readonly Station[],
  criteria: string | undefined,
  hub: string | undefined,
  diameter: string | undefined,
): ScanQuestion {
  const discs = turbinesOf(site, hub, diameter).map(({ name, hubHeight, rotorDiameter, groundElevation }) => ({
    name,
    hubHeight,
    rotorDiameter,
    groundElevation,
  }));
  return { site, stationList, criteria: chosenCriteria(site, criteria), discs };
}
