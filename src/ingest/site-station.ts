// A station as the file tells of it, corrected by what the site file says.

import type { Station } from '../profile/index.ts';
import { siteStation, type Site } from '../site/index.ts';

/**
 * The station by its record in the site, found by identifier, alias or name; what the site leaves open stays the file's.
 * A file that names no station (empty identifier) is taken for the site's only one, if it has just one.
 */
export function stationBySite(site: Site, found: Station): Station {
  const only = found.id === '' && site.stations.length === 1 ? site.stations[0] : undefined;
  const known = only ?? (found.id === '' ? undefined : (siteStation(site, found.id) ?? siteStation(site, found.name)));
  if (known === undefined) return found;
  return {
    id: known.id,
    name: known.name === '' ? found.name : known.name,
    latitude: orElse(known.latitude, found.latitude),
    longitude: orElse(known.longitude, found.longitude),
    elevation: orElse(known.elevation, found.elevation),
  };
}

function orElse(value: number, otherwise: number): number {
  return Number.isNaN(value) ? otherwise : value;
}

/** A name for a station that the file does not name: the file's own, without folders and ending. */
export function stationOfFileName(source: string): string {
  const file = source.split(/[/\\]/u).at(-1) ?? '';
  const stem = file.replace(/(?:\.(?:gz|zip|nc|nc4|cdf|csv|tsv|txt|bufr?|json|covjson))+$/iu, '');
  return stem === '' ? source : stem;
}
