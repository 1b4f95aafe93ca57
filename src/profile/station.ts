// Where a profile was measured.

export interface Station {
  /** Short, stable: WIGOS or WMO identifier, or the name the site file gives. */
  readonly id: string;
  readonly name: string;
  /** Degrees north; NaN when not known. */
  readonly latitude: number;
  /** Degrees east; NaN when not known. */
  readonly longitude: number;
  /** Ground above mean sea level, m; NaN when not known. */
  readonly elevation: number;
}

export const INSTRUMENTS = [
  'unknown',
  'radiosonde',
  'dropsonde',
  'pilot-balloon',
  'wind-profiler',
  'lidar',
  'sodar',
  'radar',
  'mast',
  'merged',
  'model',
] as const;

/** What measured the profile. */
export type Instrument = (typeof INSTRUMENTS)[number];

/** A station of which only the name is known. */
export function unplacedStation(id: string): Station {
  return { id, name: id, latitude: NaN, longitude: NaN, elevation: NaN };
}

/** True when both records speak of the same place and name: values equal, missing equals missing. */
export function sameStation(a: Station, b: Station): boolean {
  return (
    a.id === b.id &&
    a.name === b.name &&
    Object.is(a.latitude, b.latitude) &&
    Object.is(a.longitude, b.longitude) &&
    Object.is(a.elevation, b.elevation)
  );
}
