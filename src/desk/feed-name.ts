// Which feed a profile belongs to: one instrument at one station, as the site file knows them.

import { INSTRUMENTS, type Instrument, type ProfileBlock, type Station } from '../profile/index.ts';
import { siteStation, type Site } from '../site/index.ts';

/** One instrument at one station: what a reader of the page chooses between. */
export interface FeedName {
  /** `station/instrument`, stable. */
  readonly key: string;
  readonly station: Station;
  readonly instrument: Instrument;
}

/** The feed of the i-th profile of a block. */
export function feedNameOf(block: ProfileBlock, index: number, site: Site): FeedName {
  const told = block.stations[block.stationIndex[index]!]!;
  const known = siteStation(site, told.id);
  const instrument = known?.instrument ?? INSTRUMENTS[block.instrumentIndex[index]!]!;
  const station = placed(told, known);
  return { key: `${station.id}/${instrument}`, station, instrument };
}

/** What the site file says of a station wins, key by key; what it leaves out comes from the file. */
function placed(told: Station, known: Station | undefined): Station {
  if (known === undefined) return told;
  const either = (a: number, b: number): number => (Number.isNaN(a) ? b : a);
  return {
    id: known.id,
    name: known.name,
    latitude: either(known.latitude, told.latitude),
    longitude: either(known.longitude, told.longitude),
    elevation: either(known.elevation, told.elevation),
  };
}

/** Positive when a is to be preferred: files that place one station differently must end in one place, whichever came first. */
export function compareStations(a: Station, b: Station): number {
  const known = ({ latitude, longitude, elevation }: Station): number =>
    [latitude, longitude, elevation].filter((value) => !Number.isNaN(value)).length;
  const inWords = ({ name, latitude, longitude, elevation }: Station): string =>
    [latitude, longitude, elevation, name].join('/');
  return known(a) - known(b) || (inWords(a) > inWords(b) ? 1 : inWords(a) < inWords(b) ? -1 : 0);
}
