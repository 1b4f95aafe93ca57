// Distances and bearings on the sphere of the house's mean radius.

import { EARTH_RADIUS } from './constants.ts';
import { normalDirection } from './wind.ts';

/** A place on the Earth, degrees north and east. */
export interface LatLon {
  readonly latitude: number;
  readonly longitude: number;
}

const RADIANS = Math.PI / 180;

/** Great-circle distance, m (haversine form, exact for small distances). NaN where a place is not known. */
export function distanceBetween(from: LatLon, to: LatLon): number {
  const across = Math.sin(((to.latitude - from.latitude) * RADIANS) / 2);
  const along = Math.sin(((to.longitude - from.longitude) * RADIANS) / 2);
  const cosines = Math.cos(from.latitude * RADIANS) * Math.cos(to.latitude * RADIANS);
  return 2 * EARTH_RADIUS * Math.asin(Math.min(1, Math.sqrt(across * across + cosines * along * along)));
}

/** Direction in which the great circle leaves `from` toward `to`, degrees clockwise from north in [0, 360). */
export function bearingTo(from: LatLon, to: LatLon): number {
  const east = Math.sin((to.longitude - from.longitude) * RADIANS) * Math.cos(to.latitude * RADIANS);
  const north =
    Math.cos(from.latitude * RADIANS) * Math.sin(to.latitude * RADIANS) -
    Math.sin(from.latitude * RADIANS) *
      Math.cos(to.latitude * RADIANS) *
      Math.cos((to.longitude - from.longitude) * RADIANS);
  return normalDirection(Math.atan2(east, north) / RADIANS);
}
