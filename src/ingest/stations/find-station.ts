// Finds a station in a list by any of the names under which files speak of it.

import type { Station } from '../../profile/index.ts';

/** Lists are long and asked for every report: each gets its index once. */
const indexes = new WeakMap<readonly Station[], ReadonlyMap<string, Station>>();

/**
 * The list's record of a station; undefined where it has none.
 * WMO numbers are also found in the identifiers of WIGOS (WMO-No. 1160: 0-20000-0-10999) and of the IGRA archive
 * (ABM00010999), and the other way round. A name serves where only one station of the list bears it.
 * @param names identifiers and names, the surest first
 */
export function listedStation(list: readonly Station[], names: readonly string[]): Station | undefined {
  if (list.length === 0) return undefined;
  let index = indexes.get(list);
  if (index === undefined) indexes.set(list, (index = indexOf(list)));
  for (const name of names) {
    for (const key of keysOf(name)) {
      const station = index.get(key);
      if (station !== undefined) return station;
    }
  }
  return undefined;
}

function indexOf(list: readonly Station[]): ReadonlyMap<string, Station> {
  const index = new Map<string, Station>();
  const putNew = (key: string, station: Station): void => {
    if (key !== '' && !index.has(key)) index.set(key, station);
  };
  for (const station of list) putNew(plain(station.id), station);
  for (const station of list) for (const key of keysOf(station.id)) putNew(key, station);
  const bearers = new Map<string, number>();
  for (const { name } of list) bearers.set(plain(name), (bearers.get(plain(name)) ?? 0) + 1);
  for (const station of list) if (bearers.get(plain(station.name)) === 1) putNew(plain(station.name), station);
  return index;
}

const plain = (name: string): string => name.trim().toLowerCase();

/** The name itself, and the WMO number in it, five figures wide: spreadsheets drop its leading noughts. */
function keysOf(name: string): string[] {
  const key = plain(name);
  if (/^\d{1,5}$/u.test(key)) return [key, key.padStart(5, '0')];
  const number = /^(?:0-2000\d-0-|[a-z]{2}m000)(\d{5})$/u.exec(key)?.[1];
  return number === undefined ? [key] : [key, number];
}
