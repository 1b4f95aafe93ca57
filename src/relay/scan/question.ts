// What is asked of every file of a scan, as plain data that threads can share, and a short mark of it.

import { createHash } from 'node:crypto';
import type { NamedDisc } from '../../desk/index.ts';
import type { Criteria } from '../../jet/index.ts';
import type { Station } from '../../profile/index.ts';
import type { Site } from '../../site/index.ts';

export interface ScanQuestion {
  readonly site: Site;
  /** The user's own list of stations. */
  readonly stationList: readonly Station[];
  readonly criteria: Criteria;
  readonly discs: readonly NamedDisc[];
}

/** A digest of texts: the same for the same texts, whatever the machine. */
export function markOf(...texts: readonly string[]): string {
  return createHash('sha256').update(JSON.stringify(texts)).digest('hex').slice(0, 32);
}
