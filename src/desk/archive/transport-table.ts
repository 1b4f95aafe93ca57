// The transports of other nights out of an archive's table of profiles, for what is usual in a month and at an hour.

import type { TransportHistory } from '../usual-transport.ts';
import { archiveTableKind, timeOf, type TableCell } from './read-tables.ts';

/** Name of the column in the table of profiles. */
export const TRANSPORT_COLUMN = 'below_3km_kg_per_m_s';

interface Gathered {
  readonly timeMs: number[];
  readonly below3Km: number[];
}

/** Takes tables as `ArchiveTableReader` does; of others than that of profiles nothing. */
export class TransportTableReader {
  readonly #stations = new Map<string, Gathered>();
  #place: { readonly station: number; readonly time: number; readonly transport: number } | null = null;

  begin(columns: readonly string[]): void {
    const at = (name: string): number => columns.indexOf(name);
    const isMeant = archiveTableKind(columns) === 'profiles' && columns.includes(TRANSPORT_COLUMN);
    this.#place = isMeant ? { station: at('station'), time: at('time'), transport: at(TRANSPORT_COLUMN) } : null;
  }

  take(rows: readonly (readonly TableCell[])[]): void {
    if (this.#place === null) return;
    const { station, time, transport } = this.#place;
    for (const cells of rows) {
      const below3Km = numberOf(cells[transport]);
      const id = cells[station];
      if (typeof id !== 'string' || !Number.isFinite(below3Km)) continue;
      let gathered = this.#stations.get(id);
      if (gathered === undefined) {
        gathered = { timeMs: [], below3Km: [] };
        this.#stations.set(id, gathered);
      }
      gathered.timeMs.push(timeOf(cells[time]));
      gathered.below3Km.push(below3Km);
    }
  }

  /** By identifier of the station, its instruments together. */
  histories(): Map<string, TransportHistory> {
    return new Map(
      [...this.#stations].map(([id, gathered]) => [id, { ...gathered, source: `the scanned archive of ${id}` }]),
    );
  }
}

function numberOf(cell: TableCell): number {
  return cell === undefined || cell === null || cell === '' ? NaN : Number(cell);
}
