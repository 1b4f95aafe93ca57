// Wind and humidity of one station at a height, for the field through several stations.

import { eastward, northward } from '../air/index.ts';
import type { FieldPoint } from '../moisture/index.ts';
import { REJECTING, REJECTING_AIR, type Profile } from '../profile/index.ts';

/** Levels of a station that may be used, ascending: those of the wind and those of the humidity. */
export interface StationLevels {
  readonly id: string;
  readonly latitude: number;
  readonly longitude: number;
  readonly wind: { readonly heightAgl: number[]; readonly u: number[]; readonly v: number[] };
  readonly humidity: { readonly heightAgl: number[]; readonly specificHumidity: number[] };
}

export function levelsOf(profile: Profile): StationLevels {
  const { station, heightAgl, speed, direction, specificHumidity, mark } = profile;
  const wind: StationLevels['wind'] = { heightAgl: [], u: [], v: [] };
  const humidity: StationLevels['humidity'] = { heightAgl: [], specificHumidity: [] };
  for (let k = 0; k < profile.levelCount; k++) {
    const height = heightAgl[k]!;
    const u = eastward(speed[k]!, direction[k]!);
    const v = northward(speed[k]!, direction[k]!);
    if ((mark[k]! & REJECTING) === 0 && Number.isFinite(height + u + v)) {
      wind.heightAgl.push(height);
      wind.u.push(u);
      wind.v.push(v);
    }
    const moist = specificHumidity?.[k] ?? NaN;
    if ((mark[k]! & REJECTING_AIR) === 0 && Number.isFinite(height + moist)) {
      humidity.heightAgl.push(height);
      humidity.specificHumidity.push(moist);
    }
  }
  return { id: station.id, latitude: station.latitude, longitude: station.longitude, wind, humidity };
}

/** Linear in height between levels; missing outside them. */
export function pointAt(levels: StationLevels, heightAgl: number): FieldPoint {
  const { wind, humidity } = levels;
  return {
    latitude: levels.latitude,
    longitude: levels.longitude,
    u: linear(wind.heightAgl, wind.u, heightAgl),
    v: linear(wind.heightAgl, wind.v, heightAgl),
    specificHumidity: linear(humidity.heightAgl, humidity.specificHumidity, heightAgl),
  };
}

function linear(heights: readonly number[], values: readonly number[], height: number): number {
  const above = heights.findIndex((candidate) => candidate >= height);
  if (above < 0) return NaN;
  if (heights[above] === height) return values[above]!;
  if (above === 0) return NaN;
  const share = (height - heights[above - 1]!) / (heights[above]! - heights[above - 1]!);
  return values[above - 1]! + share * (values[above]! - values[above - 1]!);
}
