// A dropped file that holds a farm's actual output instead of profiles.

import type { Desk } from '../../desk/index.ts';
import { isOutputTable, readOutputSeries } from '../../ingest/index.ts';
import type { FileReport, OpenFile } from './protocol.ts';

/** So many bytes tell what a file is. */
const HEAD_BYTES = 2 ** 16;
/** Ten years of minutes are less; anything longer is no table of output. */
const LARGEST_BYTES = 2 ** 28;

export async function isOutput({ blob }: OpenFile): Promise<boolean> {
  if (blob.size > LARGEST_BYTES) return false;
  return isOutputTable(new Uint8Array(await blob.slice(0, HEAD_BYTES).arrayBuffer()));
}

/** Reads the file into the desk. What had to be taken for granted stands among its problems, mildly. */
export async function readOutput({ name, blob }: OpenFile, desk: Desk): Promise<FileReport> {
  const { timeMs, powerKw, problems, notes } = readOutputSeries(name, await blob.text(), desk.site.fileTimeZone);
  desk.acceptOutput(name, timeMs, powerKw);
  const taken = notes.map((note) => ({
    code: 'ingest/output-assumed',
    what: `${note.charAt(0).toUpperCase()}${note.slice(1)}.`,
    mend: 'Write the unit into the heading (output_mw) and the zone into the times (…Z), or state the zone in the site file.',
    where: { source: name },
    mild: true,
  }));
  return { name, formats: [], profiles: 0, stations: 0, outputTimes: timeMs.length, problems: [...problems, ...taken] };
}
