// A station as the file tells of it, corrected by what the site file says and completed from the user's station list.

import type { Station } from '../profile/index.ts';
import { siteStation } from '../site/index.ts';
import type { ReadOptions } from './format.ts';
import { listedStation } from './stations/find-station.ts';

/** What the user has told of stations. */
export type KnownStations = Pick<ReadOptions, 'site' | 'stationList'>;

/**
 * The station by its record in the site, found by identifier, alias or name; what the site leaves open stays the file's, and
 * what that leaves open comes from the station list.
 * A file that names no station (empty identifier) is taken for the site's only one, if it has just one.
 * @param others further identifiers under which the file speaks of it
 */
export function stationBySite(
  { site, stationList }: KnownStations,
  found: Station,
  others: readonly string[] = [],
): Station {
  const names = [found.id, ...others, found.name].filter((name) => name !== '');
  const only = found.id === '' && site.stations.length === 1 ? site.stations[0] : undefined;
  const known = only ?? names.map((name) => siteStation(site, name)).find((record) => record !== undefined);
  const aliases = known === undefined ? [] : [known.id, ...known.aliases];
  const listed = listedStation(stationList, [...names, ...aliases]);
  const plainName = found.name === '' || found.name === found.id;
  return {
    id: known?.id ?? found.id,
    name: (known?.name ?? '') || (plainName ? (listed?.name ?? found.name) : found.name),
    latitude: firstKnown(known?.latitude, found.latitude, listed?.latitude),
    longitude: firstKnown(known?.longitude, found.longitude, listed?.longitude),
    elevation: firstKnown(known?.elevation, found.elevation, listed?.elevation),
  };
}

/** The first number that is one; NaN where none is. */
export function firstKnown(...values: readonly (number | undefined)[]): number {
  for (const value of values) if (value !== undefined && !Number.isNaN(value)) return value;
  return NaN;
}

/** A name for a station that the file does not name: the file's own, without folders and ending. */
export function stationOfFileName(source: string): string {
  const file = source.split(/[/\\]/u).at(-1) ?? '';
  const stem = file.replace(/(?:\.(?:gz|zip|nc|nc4|cdf|csv|tsv|txt|bufr?|json|covjson))+$/iu, '');
  return stem === '' ? source : stem;
}
