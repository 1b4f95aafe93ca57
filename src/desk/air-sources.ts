// Temperature and humidity for winds that come without: the newest profile of each station around, not later than the wind.

import { distanceBetween } from '../air/index.ts';
import { profilesOf, type Profile, type ProfileBlock } from '../profile/index.ts';
import { siteStation, type Site } from '../site/index.ts';

/** Stations further away do not lend their air, m, unless the site file names them. Our own choice. */
const FARTHEST = 150_000;
/** What was measured this near, m, goes before what is newer but further away. Our own choice. */
const NEAR = 50_000;
/** Levels that make a profile of humidity. */
const LEAST_LEVELS = 2;

/** Gathers what may lend its air, block by block, and finds what may serve a wind. */
export class AirSources {
  readonly #site: Site;
  readonly #stations = new Map<string, Profile[]>();
  #sorted = true;

  constructor(site: Site) {
    this.#site = site;
  }

  gather(block: ProfileBlock): void {
    if (block.specificHumidity === null) return;
    for (const profile of profilesOf(block)) {
      if (!carriesHumidity(profile)) continue;
      const known = this.#stations.get(profile.station.id);
      if (known === undefined) this.#stations.set(profile.station.id, [profile]);
      else known.push(profile);
      this.#sorted = false;
    }
  }

  /** Of each station that may serve the newest profile at or before the wind's time. */
  for(wind: Profile): Profile[] {
    this.#sort();
    const found: Profile[] = [];
    for (const profiles of this.#stations.values()) {
      const newest = profiles[countUpTo(profiles, wind.timeMs) - 1];
      if (newest !== undefined && this.#mayServe(newest, wind)) found.push(newest);
    }
    return found;
  }

  /** The same, but only those near the wind where there are any. */
  nearest(wind: Profile): Profile[] {
    const all = this.for(wind);
    const near = all.filter(({ station }) => distanceBetween(station, wind.station) <= NEAR);
    return near.length > 0 ? near : all;
  }

  #mayServe(source: Profile, wind: Profile): boolean {
    if (siteStation(this.#site, source.station.id) !== undefined) return true;
    return distanceBetween(source.station, wind.station) <= FARTHEST;
  }

  #sort(): void {
    if (this.#sorted) return;
    for (const profiles of this.#stations.values()) profiles.sort((a, b) => a.timeMs - b.timeMs);
    this.#sorted = true;
  }
}

function carriesHumidity({ specificHumidity }: Profile): boolean {
  let levels = 0;
  for (const value of specificHumidity ?? []) if (value >= 0 && ++levels >= LEAST_LEVELS) return true;
  return false;
}

/** How many of the profiles, ascending in time, are valid at or before a time. */
function countUpTo(profiles: readonly Profile[], timeMs: number): number {
  let low = 0;
  let high = profiles.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (profiles[middle]!.timeMs <= timeMs) low = middle + 1;
    else high = middle;
  }
  return low;
}
