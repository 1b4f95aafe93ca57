// The lists of stations among the files: they are read before the profiles that need them.

import { DuskveerError } from '../../air/index.ts';
import { isStationList, readStationList, type StationList } from '../../ingest/index.ts';
import { blobSource } from './blob-source.ts';
import type { OpenFile } from './protocol.ts';

/** As much of a file as tells what it is, bytes. */
const HEAD = 64 * 1024;

/** For each file whether it is a list of stations. */
export async function areStationLists(files: readonly OpenFile[]): Promise<boolean[]> {
  return Promise.all(
    files.map(async ({ blob }) => isStationList(new Uint8Array(await blob.slice(0, HEAD).arrayBuffer()))),
  );
}

/** The stations of each file that is a list of them. */
export async function readStationLists(
  files: readonly OpenFile[],
  signal: AbortSignal,
): Promise<ReadonlyMap<OpenFile, StationList>> {
  const are = await areStationLists(files);
  const lists = new Map<OpenFile, StationList>();
  for (const file of files.filter((_, k) => are[k])) {
    try {
      lists.set(file, await readStationList(blobSource(file), signal));
    } catch (error) {
      if (!(error instanceof DuskveerError)) throw error;
      lists.set(file, { stations: [], problems: [error.problem] });
    }
  }
  return lists;
}
