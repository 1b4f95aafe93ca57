// What every invented night hands to the generator.

export interface DemoNight {
  /** Files by path below demo-profiles. */
  readonly files: Readonly<Record<string, Uint8Array | string>>;
  /** What the manifest says of the night. */
  readonly entry: NightEntry;
}

export interface NightEntry {
  readonly id: string;
  readonly title: string;
  /** Path of the site file. */
  readonly site: string;
  /** Paths of the files with profiles. */
  readonly files: readonly string[];
  /** Paths of the files with a farm's actual output; left out where there are none. */
  readonly outputs?: readonly string[];
  /** UTC: the moment at which the page opens. */
  readonly now: string;
}

/** A night of a folder: the site file, files with profiles, and files with a farm's actual output. */
export function demoNight(
  about: { readonly id: string; readonly title: string; readonly now: string },
  site: Record<string, unknown>,
  profiles: Readonly<Record<string, Uint8Array | string>>,
  outputs: Readonly<Record<string, string>> = {},
): DemoNight {
  const path = (name: string): string => `${about.id}/${name}`;
  const files = Object.fromEntries(
    Object.entries({ ...profiles, ...outputs }).map(([name, content]) => [path(name), content]),
  );
  return {
    files: { [path('site.json')]: `${JSON.stringify(site, null, 2)}\n`, ...files },
    entry: {
      id: about.id,
      title: about.title,
      site: path('site.json'),
      files: Object.keys(profiles).map(path),
      ...(Object.keys(outputs).length > 0 ? { outputs: Object.keys(outputs).map(path) } : {}),
      now: about.now,
    },
  };
}

export interface Place {
  /** degrees */
  readonly latitude: number;
  readonly longitude: number;
  /** m above sea level */
  readonly elevation: number;
}

/** A station as the site file has it. */
export function siteFileStation(id: string, name: string, instrument: string, place: Place): Record<string, unknown> {
  return {
    id,
    name,
    instrument,
    latitude_deg: place.latitude,
    longitude_deg: place.longitude,
    elevation_m: place.elevation,
  };
}
