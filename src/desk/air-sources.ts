// Temperature and humidity for winds that come without: the newest profile of each station around, not later than the wind.

import { distanceBetween } from '../air/index.ts';
import { OLDEST_HUMIDITY_S } from '../moisture/index.ts';
import { profilesOf, type Profile, type ProfileBlock } from '../profile/index.ts';
import { siteStation, type Site } from '../site/index.ts';

/** Stations further away do not lend their air, m, unless the site file names them. Our own choice. */
const FARTHEST = 150_000;
/** What was measured this near, m, goes before what is newer but further away. Our own choice. */
const NEAR = 50_000;
/** Levels that make a profile of humidity. */
const LEAST_LEVELS = 2;
/** Up to here, m above ground, it matters how far the humidity of a source reaches. */
const WANTED_REACH = 3000;
/** What reaches less than this share as high as another that is not too old lends nothing: a mast beside a sounding. */
const LEAST_REACH = 0.5;

/** Gathers what may lend its air, block by block, and finds what may serve a wind. */
export class AirSources {
  readonly #site: Site;
  readonly #stations = new Map<string, Source[]>();
  #sorted = true;

  constructor(site: Site) {
    this.#site = site;
  }

  gather(block: ProfileBlock): void {
    if (block.specificHumidity === null) return;
    for (const profile of profilesOf(block)) {
      const reach = reachOf(profile);
      if (Number.isNaN(reach)) continue;
      const known = this.#stations.get(profile.station.id);
      const source = { profile, reach, timeMs: profile.timeMs };
      if (known === undefined) this.#stations.set(profile.station.id, [source]);
      else known.push(source);
      this.#sorted = false;
    }
  }

  /** Of each station that may serve the newest profile at or before the wind's time. */
  for(wind: Profile): Profile[] {
    this.#sort();
    const found: Source[] = [];
    for (const sources of this.#stations.values()) {
      const newest = sources[countUpTo(sources, wind.timeMs) - 1];
      if (newest !== undefined && this.#mayServe(newest.profile, wind)) found.push(newest);
    }
    const inTime = found.filter(({ timeMs }) => wind.timeMs - timeMs <= 1000 * OLDEST_HUMIDITY_S);
    const farthest = Math.max(0, ...inTime.map(({ reach }) => reach));
    return found.filter(({ reach }) => reach >= LEAST_REACH * farthest).map(({ profile }) => profile);
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
    for (const sources of this.#stations.values()) sources.sort((a, b) => a.timeMs - b.timeMs);
    this.#sorted = true;
  }
}

interface Source {
  readonly profile: Profile;
  /** m above ground, at most `WANTED_REACH` */
  readonly reach: number;
  readonly timeMs: number;
}

/** How high the humidity reaches, m above ground, as far as that matters; NaN without a profile of it. */
function reachOf({ specificHumidity, heightAgl }: Profile): number {
  let levels = 0;
  let reach = NaN;
  (specificHumidity ?? []).forEach((value, k) => {
    if (!(value >= 0)) return;
    levels++;
    reach = heightAgl[k]!;
  });
  return levels >= LEAST_LEVELS ? Math.min(reach, WANTED_REACH) : NaN;
}

/** How many of the sources, ascending in time, are valid at or before a time. */
function countUpTo(sources: readonly Source[], timeMs: number): number {
  let low = 0;
  let high = sources.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (sources[middle]!.timeMs <= timeMs) low = middle + 1;
    else high = middle;
  }
  return low;
}
