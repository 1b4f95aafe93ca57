// A list of stations among the files to be read: it holds no profile, and is not to be mistaken for a table of them.

import { concatBlocks } from '../../profile/index.ts';
import type { FileFormat } from '../format.ts';
import { isStationList } from './station-list.ts';

export const stationListFormat: FileFormat = {
  name: 'station-list',
  title: 'lists of stations (CSV, or the list of the IGRA archive)',
  recognise: isStationList,
  // eslint-disable-next-line @typescript-eslint/require-await -- there is nothing to read
  async *read(source) {
    yield {
      block: concatBlocks([]),
      problems: [
        {
          code: 'ingest/station-list',
          what: 'This is a list of stations and holds no profiles.',
          mend: 'Name it with --stations, so that files without positions find them there.',
          where: { source: source.name },
          mild: true,
        },
      ],
    };
  },
};
